"""An error that nobody foresaw is said plainly; the screen stays, and it can be tried again."""

from __future__ import annotations

import threading

import pytest

from gaugelog.errors import StorageTrouble
from gaugelog.screens.attempt import Attempt
from gaugelog.screens.desk import Desk, Seat
from gaugelog.screens.evidence import EvidenceScreen
from gaugelog.screens.step import StepScreen
from gaugelog.screens.worklist import WorklistScreen
from gaugelog.work.doing import StepOutcome
from gaugelog.work.logbook import Logbook
from gaugelog.work.looking import InHand
from gaugelog.work.reviewing import Waiting, evidence_of, waiting_for_review
from tests.screens.conftest import At
from tests.screens.pilot import LARGE, Seen, run_screen
from tests.work.job import WORD


def _full(*_: object, **__: object) -> None:
    raise OSError(28, "No space left on device")


def test_a_dialog_is_not_stuck_by_an_error_of_the_machine(
    at: At, monkeypatch: pytest.MonkeyPatch
) -> None:
    whole = Desk.sign_on

    async def play(seen: Seen) -> None:
        monkeypatch.setattr(Desk, "sign_on", _full)
        await seen.sign_on()
        assert "This is a defect of Gaugelog (OSError" in seen.text()
        assert "Unlocking your key" not in seen.text()
        monkeypatch.setattr(Desk, "sign_on", whole)
        await seen.type(WORD)
        assert isinstance(seen.room, WorklistScreen)

    job = at(0)
    run_screen(job.book, job.folder, play)


def test_a_look_that_fails_is_told_and_the_next_one_shows(
    at: At, monkeypatch: pytest.MonkeyPatch
) -> None:
    async def play(seen: Seen) -> None:
        monkeypatch.setattr("gaugelog.screens.evidence.evidence_of", _full)
        await seen.sign_on("q.reyes")
        assert isinstance(seen.room, EvidenceScreen)
        assert "This is a defect of Gaugelog (OSError" in seen.text()
        monkeypatch.setattr("gaugelog.screens.evidence.evidence_of", evidence_of)
        seen.room.facts_changed()
        await seen.rest()
        assert "Checks, the smallest margin first" in seen.text()

    job = at(2)
    run_screen(job.book, job.folder, play, place="review", point="FB-1", size=LARGE)


def test_a_look_for_another_person_is_not_lost_while_one_runs(
    at: At, monkeypatch: pytest.MonkeyPatch
) -> None:
    gate, asked = threading.Event(), []

    def slowly(book: Logbook, person: str) -> list[Waiting]:
        asked.append(person)
        if person == "q.reyes":
            gate.wait(5)
        return waiting_for_review(book, person)

    async def play(seen: Seen) -> None:
        monkeypatch.setattr("gaugelog.screens.review.waiting_for_review", slowly)
        await seen.sign_on("q.reyes")
        seen.app.go("review")
        await seen.pilot.pause()
        seen.app.desk.sit(Seat(job.keys["t.okoro"], "Tobe Okoro"))
        seen.room.seat_changed()
        gate.set()
        await seen.rest()
        assert "1 wait, 0 for you" in seen.lines()[0]
        assert ["q.reyes", "t.okoro"] == asked

    job = at(23)
    job.submit()
    run_screen(job.book, job.folder, play)


def test_a_list_that_could_not_be_read_is_read_when_it_can_be(
    at: At, monkeypatch: pytest.MonkeyPatch
) -> None:
    def broken(*_: object) -> None:
        raise StorageTrouble("The logbook can't be read.", "Look at the disk.")

    async def play(seen: Seen) -> None:
        monkeypatch.setattr("gaugelog.screens.review.waiting_for_review", broken)
        await seen.sign_on("q.reyes")
        await seen.keys("f3")
        assert "✗ The logbook can't be read." in seen.text()
        monkeypatch.setattr("gaugelog.screens.review.waiting_for_review", waiting_for_review)
        seen.room.facts_changed()
        await seen.rest()
        assert "1 wait, 1 for you" in seen.lines()[0]
        assert "can't be read" not in seen.text()

    job = at(23)
    job.submit()
    run_screen(job.book, job.folder, play)


def test_a_step_kept_after_the_seat_changed_is_not_carried_to_who_sits_there_now(
    at: At, monkeypatch: pytest.MonkeyPatch
) -> None:
    gate = threading.Event()

    class Slowly(Attempt):
        def __call__(self) -> tuple[StepOutcome, InHand]:
            gate.wait(5)
            return super().__call__()

    async def play(seen: Seen) -> None:
        monkeypatch.setattr("gaugelog.screens.step.Attempt", Slowly)
        await seen.sign_on()
        await seen.type("FB-1")
        await seen.type("K7-03/1")
        await seen.type("RM-2")
        await seen.type("350.12", enter=False)
        room = seen.room
        assert isinstance(room, StepScreen)
        room.action_do()
        await seen.pilot.pause()
        seen.app.desk.sit(Seat(job.keys["q.reyes"], "Quilla Reyes"))
        room.seat_changed()
        gate.set()
        await seen.rest()
        assert "3/23" in seen.text()
        assert {} == room.draft.carried == seen.app.drafts.load("q.reyes").carried

    job = at(1)
    run_screen(job.book, job.folder, play)


def test_no_room_on_top_ends_nothing(at: At, monkeypatch: pytest.MonkeyPatch) -> None:
    def broken(*_: object) -> None:
        raise StorageTrouble("The logbook can't be read.", "Look at the disk.")

    async def play(seen: Seen) -> None:
        assert [] == seen.app.rooms()
        seen.app.go("worklist")
        monkeypatch.setattr(Logbook, "head", broken)
        assert not seen.app._something_kept()

    job = at(0)
    run_screen(job.book, job.folder, play)
