"""A whole installation on the screen, without a mouse: keys counted, from sign-on to submission."""

from __future__ import annotations

from dataclasses import dataclass, field

import pytest

from gaugelog.screens.step import StepScreen
from tests.screens.conftest import At
from tests.screens.pilot import Job, Seen, run_screen
from tests.work.job import MINUTES, WALK, WORD


@dataclass
class Counted:
    """Keys beyond typing values (a value is its characters and Enter), by what they are for."""

    steps: list[int] = field(default_factory=list)
    cautions: int = 0
    holds: int = 0


async def _walk(seen: Seen, job: Job, counted: Counted) -> None:
    for who, typed in WALK:
        job.clock.advance(60 * MINUTES)
        seen.room.facts_changed()
        await seen.rest()
        if who == "t.okoro":
            await _do(seen, typed, counted)
        else:
            await _decide(seen, who, counted)


async def _do(seen: Seen, values: dict[str, str], counted: Counted) -> None:
    assert isinstance(seen.room, StepScreen)
    before = _number(seen)
    if "Cautions read" in seen.lines()[-1]:
        await seen.keys("space")
        counted.cautions += 1
    for _ in range(len(values)):
        focused = next(row for row in seen.room.entry.live if row.input.has_focus)
        if focused.item.name not in values:
            break
        await seen.type(values[focused.item.name])
        if _number(seen) != before:
            break
    extra = 0
    while _number(seen) == before:
        await seen.keys("enter")
        extra += 1
        assert extra < 5, seen.text()
    counted.steps.append(extra)


def _number(seen: Seen) -> int:
    hand = seen.room.hand if isinstance(seen.room, StepScreen) else None
    assert hand is not None
    return hand.next.number if hand.next.step is not None else 0


async def _decide(seen: Seen, who: str, counted: Counted) -> None:
    await seen.keys("f5")
    await seen.type(who)
    await seen.type(WORD)
    await seen.keys("enter")
    counted.holds += 2


@pytest.mark.slow
def test_a_quarter_bridge_is_installed_with_at_most_one_key_a_step_beyond_its_values(
    at: At, capsys: pytest.CaptureFixture[str]
) -> None:
    counted = Counted()

    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.type("FB-1")
        await _walk(seen, job, counted)
        assert "Every step is done." in seen.text()
        await seen.keys("f5")
        await seen.type(WORD)
        assert "awaiting review" in seen.text()

    job = at(0)
    run_screen(job.book, job.folder, play)
    assert "awaiting review" == job.state()
    assert 21 == len(counted.steps)
    assert max(counted.steps) <= 1
    with capsys.disabled():
        print(
            f"\nkeys beyond the values: {sum(counted.steps)} in {len(counted.steps)} steps, "
            f"{counted.cautions} for cautions, {counted.holds} for 2 holds"
        )
