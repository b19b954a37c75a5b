"""The last line: the keys that work now; a click on one does what it does."""

from __future__ import annotations

from gaugelog.screens.sign_on import SignOn
from tests.screens.conftest import At
from tests.screens.pilot import Seen, run_screen


def test_a_click_does_what_the_key_does(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on()
        place = seen.lines()[-1].index("f8")
        await seen.pilot.click("#keys", offset=(place, 0))
        await seen.rest()
        assert isinstance(seen.app.screen, SignOn)

    job = at(0)
    run_screen(job.book, job.folder, play)


def test_the_keys_follow_what_is_asked(at: At) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.type("FB-1")
        assert "space Cautions read" in seen.lines()[-1]
        await seen.keys("space")
        assert "space" not in seen.lines()[-1]
        await seen.keys("f7")
        assert "esc Back" == seen.lines()[-1].strip()
        await seen.keys("escape")
        assert "f7 Earlier step" in seen.lines()[-1]

    job = at(0)
    run_screen(job.book, job.folder, play)
