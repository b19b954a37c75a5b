"""Review: the queue, the evidence on one page, acceptance, return, and who may not."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.errors import MachineTrouble
from gaugelog.intake.pictures import load_pictures
from gaugelog.screens.evidence import EvidenceScreen
from gaugelog.screens.review import ReviewScreen
from gaugelog.screens.viewer import Viewer
from gaugelog.work import photos, reviews, steps
from tests.pictures import camera_jpeg
from tests.screens.conftest import At
from tests.screens.pilot import LARGE, SMALL, Job, Seen, run_screen
from tests.work.job import INSULATION, WORD


class Watched(Viewer):
    """A viewer that notes what it would show."""

    def __init__(self, broken: bool = False) -> None:
        super().__init__()
        self.shown: list[Path] = []
        self._broken = broken

    def show(self, path: Path) -> None:
        """Note it, or fail as a machine without a viewer does."""
        if self._broken:
            raise MachineTrouble("This machine has no viewer.", "Use: gaugelog record POINT")
        self.shown.append(path)


@pytest.fixture
def submitted(at: At) -> Job:
    """A job whose first point waits for review."""
    job = at(23)
    job.submit()
    return job


async def _evidence(seen: Seen, person: str = "q.reyes") -> None:
    await seen.sign_on(person)
    await seen.keys("f3", "enter")


@pytest.mark.parametrize("size", [SMALL, LARGE])
def test_the_queue_says_which_points_are_for_whom(submitted: Job, size: tuple[int, int]) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on("q.reyes")
        await seen.keys("f3")
        assert "review: 1 wait, 1 for you" in seen.lines()[0]
        assert "For you" in seen.text()
        await seen.keys("f8")
        await seen.keys("escape")
        await seen.sign_on("t.okoro")
        assert "review: 1 wait, 0 for you" in seen.lines()[0]
        assert "Not for you: t.okoro does not have the role reviewer." in seen.text()

    run_screen(submitted.book, submitted.folder, play, size=size)


def test_an_empty_queue_is_told(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on("q.reyes")
        await seen.keys("f3")
        assert "Nothing waits for review." in seen.text()

    job = at(0)
    run_screen(job.book, job.folder, play)


@pytest.mark.parametrize("size", [SMALL, LARGE])
def test_the_evidence_stands_on_one_page(submitted: Job, size: tuple[int, int]) -> None:
    async def play(seen: Seen) -> None:
        await _evidence(seen)
        assert isinstance(seen.room, EvidenceScreen)
        text = seen.text()
        assert "awaiting review" in text
        assert "Checks, the smallest margin first" in text
        assert text.index("noise, on") < text.index("resistance, b") < text.index("press, on")
        pages = []
        for _ in range(4):
            await seen.keys("pagedown")
            pages.append(seen.text())
        assert any("let go on at steps 5, 12" in page for page in pages)
        await seen.keys("end")
        assert "23  Label and leave" in seen.text()

    run_screen(submitted.book, submitted.folder, play, size=size)


def test_a_scanned_point_opens(submitted: Job) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on("q.reyes")
        await seen.keys("f3")
        await seen.type("fb-7")
        assert "✗ Nothing here is called “fb-7”." in seen.text()
        seen.app.screen.query_one("#find").clear()  # type: ignore[attr-defined]
        await seen.type("fb-1")
        assert isinstance(seen.room, EvidenceScreen)

    run_screen(submitted.book, submitted.folder, play)


def test_the_reviewer_accepts_with_the_secret_again(submitted: Job) -> None:
    async def play(seen: Seen) -> None:
        await _evidence(seen)
        await seen.keys("f5")
        assert "Signing says:" in seen.text()
        await seen.type("wrong words")
        assert "✗" in seen.text()
        await seen.type(WORD)
        assert "FB-1 is accepted: revision 1; head" in seen.text()
        assert "✓ accepted" in seen.text()
        assert "Accept" not in seen.lines()[-1]
        await seen.keys("f5")
        assert isinstance(seen.app.screen, EvidenceScreen)

    run_screen(submitted.book, submitted.folder, play)
    assert "accepted" == submitted.state()


def test_the_reviewer_returns_it_with_a_reason_to_a_step(submitted: Job) -> None:
    async def play(seen: Seen) -> None:
        await _evidence(seen)
        await seen.keys("f7")
        await seen.type("seal is thin")
        await seen.type("99")
        await seen.type(WORD)
        assert "“99” is no step that is done." in seen.text()
        await seen.keys("up")
        await seen.keys("backspace", "backspace")
        await seen.type("13")
        await seen.type(WORD)
        assert "FB-1 is returned; work goes on from step 13." in seen.text()
        await seen.keys("end")
        assert "returned revision 1, Quilla Reyes (QR): seal is thin" in seen.text()

    run_screen(submitted.book, submitted.folder, play, size=LARGE)
    assert "returned" == submitted.state()
    assert "coat" == steps.next_step(submitted.book, "FB-1").step.id  # type: ignore[union-attr]


def test_a_return_needs_a_reason(submitted: Job) -> None:
    async def play(seen: Seen) -> None:
        await _evidence(seen)
        await seen.keys("f7", "enter")
        assert "Why: this can't be left out." in seen.text()
        await seen.keys("escape")
        assert "awaiting review" in seen.text()

    run_screen(submitted.book, submitted.folder, play, size=LARGE)


def test_who_did_the_work_is_told_that_they_can_not_review_it(submitted: Job) -> None:
    async def play(seen: Seen) -> None:
        await _evidence(seen, "t.okoro")
        assert "You can't review this. t.okoro does not have the role reviewer." in seen.text()
        assert "Accept" not in seen.lines()[-1]
        assert "Return" not in seen.lines()[-1]
        await seen.keys("f5", "f7")
        assert isinstance(seen.app.screen, EvidenceScreen)

    run_screen(submitted.book, submitted.folder, play)


def test_a_record_accepted_elsewhere_meanwhile_is_said_to_be(submitted: Job) -> None:
    async def play(seen: Seen) -> None:
        await _evidence(seen)
        submitted.accept()
        seen.app.tick()
        await seen.rest()
        assert "! FB-1 is accepted now." in seen.text()
        assert "Accept" not in seen.lines()[-1]

    run_screen(submitted.book, submitted.folder, play)


def test_what_was_returned_while_the_dialog_was_open_is_not_accepted(submitted: Job) -> None:
    async def play(seen: Seen) -> None:
        await _evidence(seen)
        await seen.keys("f5")
        reviews.give_back(
            submitted.book, submitted.keys["q.reyes"], point="FB-1", reason="looked again"
        )
        await seen.type(WORD)
        assert "FB-1 is not under review." in seen.text()

    run_screen(submitted.book, submitted.folder, play)
    assert "returned" == submitted.state()


def test_the_record_opens_in_the_viewer_of_the_system(submitted: Job) -> None:
    viewer = Watched()

    async def play(seen: Seen) -> None:
        await _evidence(seen)
        await seen.keys("o")
        assert "Opened FB-1-r1.pdf: revision 1, submitted" in seen.text()

    run_screen(submitted.book, submitted.folder, play, viewer=viewer)
    (path,) = viewer.shown
    assert "FB-1-r1.pdf" == path.name
    assert reviews.record(submitted.book, point="FB-1").pdf == path.read_bytes()


def test_a_machine_without_a_viewer_is_told(submitted: Job) -> None:
    async def play(seen: Seen) -> None:
        await _evidence(seen)
        await seen.keys("o")
        assert "✗ This machine has no viewer." in seen.text()
        assert "gaugelog record POINT" in seen.text()

    run_screen(submitted.book, submitted.folder, play, viewer=Watched(broken=True))


def test_photos_open_by_their_digit(at: At, tmp_path: Path) -> None:
    job, viewer = at(2), Watched()
    (tmp_path / "IMG 1.jpg").write_bytes(camera_jpeg())
    photos.add(
        job.book, job.keys["t.okoro"], load_pictures([tmp_path / "IMG 1.jpg"]),
        point="FB-1", note="as received",
    )  # fmt: skip

    async def play(seen: Seen) -> None:
        await seen.sign_on("q.reyes")
        await seen.keys("2", "1")
        assert "IMG 1.jpg: as received" in seen.text()
        assert "Opened photo 1, IMG 1.jpg" in seen.text()
        assert "No record was submitted yet" in seen.text()

    run_screen(job.book, job.folder, play, place="review", point="FB-1", viewer=viewer)
    (path,) = viewer.shown
    assert camera_jpeg() == path.read_bytes()
    assert path.name.endswith("IMG-1.jpg")


def test_escape_leads_back_to_the_queue(submitted: Job) -> None:
    async def play(seen: Seen) -> None:
        await _evidence(seen)
        await seen.keys("escape")
        assert isinstance(seen.room, ReviewScreen)

    run_screen(submitted.book, submitted.folder, play)


def test_attempts_and_skipped_steps_are_shown_with_their_reasons(at: At) -> None:
    job = at(10)
    job.do("t.okoro", {**INSULATION, "insulation": "0.2 GΩ"})
    job.do("t.okoro", {**INSULATION, "insulation": "2 GΩ"}, reason="flux left")

    async def play(seen: Seen) -> None:
        await seen.sign_on("q.reyes")
        assert "1. 0.2 GΩ: FAIL; again because: flux left" in seen.text()
        assert "Steps left out" in seen.text()

    run_screen(job.book, job.folder, play, place="review", point="FB-1", size=LARGE)
