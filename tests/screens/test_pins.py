"""Finding the cause of a failed check in place, by resistances between pins."""

from __future__ import annotations

from gaugelog.screens.pins import PinsScreen
from gaugelog.screens.step import StepScreen
from tests.screens.conftest import At
from tests.screens.pilot import LARGE, Seen, run_screen


async def _failed(seen: Seen) -> None:
    await seen.sign_on()
    await seen.type("FB-1")
    await seen.keys("space")
    for typed in ("yes", "yes", "yes", "IT-5", "yes", "0.4 GΩ", "yes"):
        await seen.type(typed)


def test_a_failed_check_leads_to_the_pins_and_back_with_nothing_kept(at: At) -> None:
    async def play(seen: Seen) -> None:
        await _failed(seen)
        head = job.book.head()
        await seen.keys("f6")
        assert isinstance(seen.room, PinsScreen)
        assert "supply- (1) to signal+ (2): sound 352.48 Ω" in seen.text()
        assert "signal+ (2) to ARTICLE: sound is open" in seen.text()
        for typed in ("RM-2", "352.1", "OL", "OL"):
            await seen.type(typed)
        assert "most likely: open circuit in completion wire" in seen.text()
        assert "a broken wire, a lifted tab or a joint that never took" in seen.text()
        await seen.keys("escape")
        assert isinstance(seen.room, StepScreen)
        assert "Why is it measured again?" in seen.text()
        assert head == job.book.head()

    job = at(10)
    run_screen(job.book, job.folder, play, size=LARGE)


def test_a_resistance_that_is_none_is_told(at: At) -> None:
    async def play(seen: Seen) -> None:
        await _failed(seen)
        await seen.keys("f6")
        for typed in ("RM-2", "much"):
            await seen.type(typed)
        assert "“much” is no reading." in seen.text()
        await seen.keys("up", *["backspace"] * 4)
        await seen.type("352.1")
        assert "What it says" in seen.text()

    job = at(10)
    run_screen(job.book, job.folder, play, size=LARGE)


def test_a_failed_check_is_left_with_a_note_for_whoever_takes_it_up(at: At) -> None:
    async def play(seen: Seen) -> None:
        await _failed(seen)
        assert "^l Leave a note" in seen.lines()[-1]
        await seen.keys("ctrl+l")
        await seen.type("damp under the tab")
        assert "stays open, with a note." in seen.text()
        assert "damp under the tab" in seen.text()
        await seen.keys("escape")
        assert "damp under the tab" in seen.text()

    job = at(10)
    run_screen(job.book, job.folder, play, size=LARGE)


def test_without_a_failed_check_the_key_is_not_there(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.type("FB-1")
        await seen.keys("space", "f6")
        assert isinstance(seen.room, StepScreen)
        assert "f6" not in seen.lines()[-1]

    job = at(10)
    run_screen(job.book, job.folder, play)
