"""How the main states look, as text at both sizes: drawn again, they must look the same.

To draw them anew after a change that was meant:
`GAUGELOG_DRAW_DUMPS=1 pytest tests/screens/test_dumps.py`, then look at what changed.
"""

from __future__ import annotations

import os
import re
from collections.abc import Awaitable, Callable
from pathlib import Path

import pytest

from tests.screens.conftest import At
from tests.screens.pilot import LARGE, SMALL, Seen, run_screen

DUMPS = Path(__file__).parent / "dumps"


async def _sign_on(seen: Seen) -> None:
    await seen.rest()


async def _worklist(seen: Seen) -> None:
    await seen.sign_on()


async def _step(seen: Seen) -> None:
    await seen.sign_on()
    await seen.type("FB-1")


async def _failed(seen: Seen) -> None:
    await _step(seen)
    await seen.keys("space")
    for typed in ("yes", "yes", "yes", "IT-5", "yes", "0.4 GΩ", "yes"):
        await seen.type(typed)


async def _hold(seen: Seen) -> None:
    await _step(seen)
    await seen.keys("f5")


def _opened(who: str, *keys: str) -> Callable[[Seen], Awaitable[None]]:
    async def go(seen: Seen) -> None:
        await seen.sign_on(who)
        await seen.keys(*keys)

    return go


STATES: dict[str, tuple[int, Callable[[Seen], Awaitable[None]]]] = {
    "sign-on": (0, _sign_on),
    "worklist": (7, _worklist),
    "step-first": (0, _step),
    "step-bond": (6, _step),
    "step-waits": (7, _step),
    "step-failed": (10, _failed),
    "step-wires": (9, _step),
    "hold": (11, _hold),
    "end": (23, _step),
    "wiring": (2, _opened("q.reyes", "f4")),
    "stock": (2, _opened("q.reyes", "f10")),
    "plan": (2, _opened("q.reyes", "f12")),
    "help": (2, _opened("q.reyes", "f4", "f1")),
    "queue": (23, _opened("q.reyes", "f3")),
    "evidence": (23, _opened("q.reyes", "f3", "enter")),
    "evidence-not-yours": (23, _opened("t.okoro", "f3", "enter")),
    "return": (23, _opened("q.reyes", "f3", "enter", "f7")),
}
SUBMITTED = {"queue", "evidence", "evidence-not-yours", "return"}
"""States in which the point awaits review."""

MOST_LOOKS = 20
"""How often a screen is looked at, a tenth of a second apart, until it is as it was drawn."""

_HEAD = re.compile(r"\b\d+:[A-Z2-7]{26}|(?<=[│╮╯])[A-Z2-7]{8,}")
"""A head as printed, or what a dialog leaves of it; it is another one in each run."""


def _drawn(seen: Seen) -> str:
    """The screen as text, with a printed head masked."""
    return _HEAD.sub("HEAD", seen.text()) + "\n"


@pytest.mark.parametrize("size", [SMALL, LARGE], ids=["80x24", "120x40"])
@pytest.mark.parametrize("state", STATES)
def test_the_screen_looks_as_it_was_drawn(at: At, state: str, size: tuple[int, int]) -> None:
    count, go = STATES[state]
    kept = DUMPS / f"{state}-{size[0]}x{size[1]}.txt"

    async def play(seen: Seen) -> None:
        await go(seen)
        assert max(len(line) for line in seen.lines()) <= size[0]
        if os.environ.get("GAUGELOG_DRAW_DUMPS"):
            kept.write_text(_drawn(seen), encoding="utf-8")
        wanted = kept.read_text(encoding="utf-8")
        # On a busy machine what lies behind a dialog may be drawn a moment after the dialog.
        for _ in range(MOST_LOOKS):
            if wanted == _drawn(seen):
                break
            await seen.pilot.pause(0.1)
        assert wanted == _drawn(seen)

    job = at(count)
    if state in SUBMITTED:
        job.submit()
    run_screen(job.book, job.folder, play, size=size)
