"""Help that knows where you are, and the palette: only what works now is told or offered."""

from __future__ import annotations

import pytest
from textual.command import CommandPalette
from textual.widgets import Input

from gaugelog.screens.evidence import EvidenceScreen
from gaugelog.screens.help import HelpDialog
from gaugelog.screens.step import StepScreen
from gaugelog.screens.worklist import WorklistScreen
from tests.screens.conftest import At
from tests.screens.pilot import LARGE, SMALL, Seen, run_screen

PLACES = {
    "f3": "Records that wait for a second person.",
    "f4": "Circuits in the order of their channels",
    "f10": "Gauge lots, consumables and instruments.",
    "f12": "What the plan check found",
}


@pytest.mark.parametrize("size", [SMALL, LARGE])
def test_help_tells_of_the_screen_it_is_asked_on(at: At, size: tuple[int, int]) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.keys("f1")
        assert "Every point by its zone" in seen.text()
        assert "Keys that work here now" in seen.text()
        await seen.keys("escape")
        for key, told in PLACES.items():
            await seen.keys(key, "question_mark")
            assert told in seen.text()
            await seen.keys("escape")

    job = at(0)
    run_screen(job.book, job.folder, play, size=size)


def test_help_names_the_keys_that_work_now_and_no_others(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.type("FB-1")
        assert isinstance(seen.room, StepScreen)
        await seen.keys("f1")
        assert "Cautions read" in seen.text()
        assert "Decide the hold" not in seen.text()
        assert "Submit the record" not in seen.text()
        await seen.keys("escape", "space", "f1")
        assert "Cautions read" not in seen.text()

    job = at(10)
    run_screen(job.book, job.folder, play, size=LARGE)


def test_a_question_mark_in_a_field_that_is_filled_stays_one(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.type("which", enter=False)
        await seen.keys("question_mark")
        assert not isinstance(seen.app.screen, HelpDialog)
        assert "which?" == seen.app.screen.query_one("#find", Input).value

    job = at(0)
    run_screen(job.book, job.folder, play)


def test_a_secret_may_begin_with_a_question_mark(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.type("t.okoro")
        await seen.keys("question_mark")
        assert "?" == seen.app.screen.query_one("#secret", Input).value

    job = at(0)
    run_screen(job.book, job.folder, play)


def test_help_is_had_at_the_sign_on_and_leads_past_nothing(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.keys("f1")
        assert "Enter goes to the next one" in seen.text()
        await seen.keys("f2", "f8", "f1", "escape")
        assert [] == seen.app.rooms()
        await seen.sign_on()
        assert isinstance(seen.room, WorklistScreen)

    job = at(0)
    run_screen(job.book, job.folder, play)


def test_an_idle_desk_is_locked_over_the_help(at: At) -> None:
    now = [0.0]

    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.keys("f1")
        now[0] = 200.0
        seen.app.tick()
        await seen.rest()
        assert "Locked: nobody typed" in seen.text()
        await seen.type("long enough")
        assert isinstance(seen.app.screen, WorklistScreen)

    job = at(0)
    run_screen(job.book, job.folder, play, idle_seconds=60.0, ticks=lambda: now[0])


async def _palette(seen: Seen, typed: str) -> None:
    await seen.keys("ctrl+p")
    assert isinstance(seen.app.screen, CommandPalette)
    await seen.type(typed, enter=False)
    for _ in range(50):
        await seen.pilot.pause(0.02)
    await seen.keys("enter")
    if isinstance(seen.app.screen, CommandPalette):
        await seen.keys("enter")


def test_the_palette_opens_a_point_by_its_label(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await _palette(seen, "FB-2: the ev")
        assert isinstance(seen.room, EvidenceScreen)
        assert "FB-2" in seen.lines()[0]

    job = at(0)
    run_screen(job.book, job.folder, play)


def test_the_palette_does_what_a_key_of_the_screen_does(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.type("FB-1")
        assert "CAUTION" in seen.text()
        await _palette(seen, "Cautions read")
        assert "CAUTION" not in seen.text()

    job = at(0)
    run_screen(job.book, job.folder, play)


def test_the_palette_offers_no_point_before_somebody_signs_on(at: At) -> None:
    async def play(seen: Seen) -> None:
        await _palette(seen, "FB-2: the ev")
        assert [] == seen.app.rooms()

    job = at(0)
    run_screen(job.book, job.folder, play)
