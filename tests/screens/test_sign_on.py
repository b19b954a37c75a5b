"""Signing on: who, the secret, the idle limit, and the next person."""

from __future__ import annotations

from gaugelog.screens.step import StepScreen
from gaugelog.screens.worklist import WorklistScreen
from tests.screens.conftest import At
from tests.screens.pilot import Seen, run_screen


def test_a_person_signs_on_and_sees_the_worklist(at: At) -> None:
    async def play(seen: Seen) -> None:
        assert "Keys on this machine: c.ward, q.reyes, t.okoro." in seen.text()
        await seen.sign_on()
        assert isinstance(seen.room, WorklistScreen)
        assert "Tobe Okoro (TO)" in seen.lines()[0]

    job = at(0)
    run_screen(job.book, job.folder, play)


def test_a_wrong_secret_is_said_plainly_and_asked_again(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on(word="not the word")
        assert "✗" in seen.text()
        assert "passphrase" in seen.text().casefold()
        assert seen.app.desk.seat is None
        await seen.type("long enough")
        assert isinstance(seen.room, WorklistScreen)

    job = at(0)
    run_screen(job.book, job.folder, play)


def test_someone_who_is_not_enrolled_is_told_so(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on("nobody")
        assert "Nobody is enrolled as nobody." in seen.text()
        await seen.keys("escape")
        await seen.sign_on()
        assert isinstance(seen.room, WorklistScreen)

    job = at(0)
    run_screen(job.book, job.folder, play)


def test_no_key_leads_past_the_sign_on(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.keys("escape", "f2", "f3", "f8", "f5", "enter")
        assert [] == seen.app.rooms()

    job = at(0)
    run_screen(job.book, job.folder, play)


def test_an_idle_desk_is_locked_and_opens_where_it_was(at: At) -> None:
    now = [0.0]

    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.keys("enter", "space")
        await seen.type("ye", enter=False)
        now[0] = 59.0
        seen.app.tick()
        assert seen.app.desk.seat is not None
        now[0] = 200.0
        seen.app.tick()
        await seen.rest()
        assert seen.app.desk.seat is None
        assert "Locked: nobody typed for 1 min." in seen.text()
        assert "Permits" not in seen.text()
        await seen.type("long enough")
        assert isinstance(seen.room, StepScreen)
        assert "[ye " in seen.text()

    job = at(0)
    run_screen(job.book, job.folder, play, idle_seconds=60.0, ticks=lambda: now[0])


def test_another_person_takes_over_with_one_key_and_finds_nothing_half_typed(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.keys("enter", "space")
        await seen.type("ye", enter=False)
        await seen.keys("f8")
        assert "Who takes over?" in seen.text()
        await seen.sign_on("q.reyes")
        assert "Quilla Reyes (QR)" in seen.lines()[0]
        assert "[ye " not in seen.text()
        await seen.keys("f8")
        await seen.sign_on()
        assert "[ye " in seen.text()

    job = at(0)
    run_screen(job.book, job.folder, play)
