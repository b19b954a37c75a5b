"""The worklist: states in words, yours first, what runs, finding by typing and scanning."""

from __future__ import annotations

from gaugelog.screens.evidence import EvidenceScreen
from gaugelog.screens.step import StepScreen
from gaugelog.screens.worklist import WorklistScreen
from gaugelog.work import steps
from tests.screens.conftest import At
from tests.screens.pilot import LARGE, Seen, run_screen


def _row(seen: Seen, point: str) -> str:
    return next(line for line in seen.lines()[3:] if point in line)


def test_each_point_shows_its_state_by_word_and_sign_and_its_next_step(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on()
        assert "▸ in work" in _row(seen, "FB-1")
        assert "7/23 Bond the gauge" in _row(seen, "FB-1")
        assert "○ released" in _row(seen, "FB-2")
        assert "2 points, 2 for you" in seen.lines()[0]

    job = at(6)
    run_screen(job.book, job.folder, play)


def test_running_windows_and_cures_are_shown(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on()
        assert "◷ 10 min to wait" in _row(seen, "FB-1")
        await seen.keys("down")
        assert "not before" in seen.text()

    job = at(7)
    run_screen(job.book, job.folder, play, size=LARGE)


def test_what_is_yours_comes_first_and_the_rest_by_zone(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on("q.reyes")
        text = seen.text()
        assert text.index("For you now") < text.index("FB-1") < text.index("Zone ")
        assert text.index("Zone ") < text.index("FB-2")
        assert "you: decide the hold" in _row(seen, "FB-1")

    job = at(11)
    run_screen(job.book, job.folder, play, size=LARGE)


def test_typing_narrows_the_list_and_escape_shows_all(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.type("fb-2", enter=False)
        assert "FB-1" not in seen.text()
        await seen.keys("escape")
        assert "FB-1" in seen.text()

    job = at(0)
    run_screen(job.book, job.folder, play)


def test_a_scanned_label_opens_its_point(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.type("fb-2")
        assert isinstance(seen.room, StepScreen)
        assert "FB-2" == seen.room.point
        await seen.keys("escape")
        assert isinstance(seen.room, WorklistScreen)

    job = at(0)
    run_screen(job.book, job.folder, play)


def test_a_label_of_no_point_is_told(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.type("ZZ-9")
        assert "No point is called “ZZ-9”." in seen.text()

    job = at(0)
    run_screen(job.book, job.folder, play)


def test_the_cursor_moves_while_the_field_keeps_the_keys(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.keys("down", "enter")
        assert isinstance(seen.room, StepScreen)
        assert "FB-2" == seen.room.point

    job = at(0)
    run_screen(job.book, job.folder, play)


def test_what_another_process_keeps_shows_by_itself(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on()
        steps.do(job.book, job.keys["t.okoro"], point="FB-2", typed={"safe": "yes"})
        seen.app.tick()
        await seen.rest()
        assert "2/23" in _row(seen, "FB-2")

    job = at(0)
    run_screen(job.book, job.folder, play)


def test_a_point_under_review_opens_the_review_of_who_may_review_it(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on("q.reyes")
        await seen.type("FB-1")
        assert isinstance(seen.room, EvidenceScreen)

    job = at(23)
    job.submit()
    run_screen(job.book, job.folder, play)


def test_only_keys_that_work_now_are_shown_and_offered_in_the_palette(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on()
        keys = seen.lines()[-1]
        assert "f8 Hand over" in keys
        assert "f2 Worklist" not in keys
        offered = {each.title for each in seen.app.get_system_commands(seen.app.screen)}
        assert "Review" in offered
        assert "Worklist" not in offered
        await seen.keys("f3")
        assert "f2 Worklist" in seen.lines()[-1]

    job = at(0)
    run_screen(job.book, job.folder, play)


def test_a_code_that_was_refused_makes_room_for_the_next(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.type("ZZ-9")
        assert "No point is called “ZZ-9”." in seen.text()
        await seen.type("FB-2")
        assert isinstance(seen.room, StepScreen)
        assert "FB-2" in seen.lines()[0]

    job = at(0)
    run_screen(job.book, job.folder, play)
