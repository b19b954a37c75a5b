"""Windows between steps: open from the very minute to the very minute; not across a set clock."""

from __future__ import annotations

from dataclasses import replace
from datetime import UTC, datetime, timedelta

import pytest

from gaugelog.journal.clock import Moment
from gaugelog.ledger.base import Quantity
from gaugelog.ledger.routes import Window
from gaugelog.ledger.steps import StepRow
from gaugelog.rules.windows import WindowFound, clock_jumped, judge_window

NOON = datetime(2026, 11, 17, 12, 0, tzinfo=UTC)
BOOT_AT_NOON_MS = 3_600_000


def _row(observed: str = "2026-11-17T12:00:00Z") -> StepRow:
    return StepRow(
        id="p/clean/p",
        point="p",
        subject="p",
        step="clean",
        outcome="done",
        by="t.okoro",
        observed_at=observed,
        entered_at="2026-11-17T12:00:00.000000Z",
        boot="b1",
        uptime_ms=BOOT_AT_NOON_MS,
        note="",
        data="{}",
        flags="[]",
        seq=1,
    )


def _now(minutes: float, offset: int = 0) -> Moment:
    return Moment(
        NOON + timedelta(minutes=minutes), offset, "b1", BOOT_AT_NOON_MS + round(minutes * 60_000)
    )


def _window(bound: str, value: str = "30", unit: str = "min") -> Window:
    return Window(
        bound=bound,  # type: ignore[arg-type]
        duration=Quantity(value=value, unit=unit),
        after="clean",
    )


def _judged(window: Window, minutes: float, **row: str) -> WindowFound:
    now = _now(minutes)
    return judge_window(window, "Clean", _row(**row), now.utc, now)


@pytest.mark.parametrize(
    ("bound", "minutes", "open_", "told"),
    [
        ("within", 0, True, "30 min left"),
        ("within", 29.9, True, "less than 1 min left"),
        ("within", 30, True, "0 min left"),
        ("within", 30.1, False, "less than 1 min too late"),
        ("within", 150, False, "2.0 h too late"),
        ("not before", 0, False, "30 min to wait"),
        ("not before", 29.9, False, "less than 1 min to wait"),
        ("not before", 30, True, "reached"),
        ("not before", 6000, True, "reached"),
    ],
)
def test_a_window_is_open_to_its_very_end(
    bound: str, minutes: float, open_: bool, told: str
) -> None:
    found = _judged(_window(bound), minutes)
    assert (open_, True) == (found.open, found.judged)
    assert told in found.sentence
    assert "“Clean”" in found.sentence


def test_an_observation_before_the_earlier_step_is_outside() -> None:
    now = _now(10)
    found = judge_window(_window("within"), "Clean", _row(), NOON - timedelta(minutes=1), now)
    assert (False, True) == (found.open, found.judged)
    assert "lies before that step" in found.sentence


def test_a_window_counts_from_when_the_step_was_observed_not_entered() -> None:
    assert not _judged(_window("within"), 10, observed="2026-11-17T11:30:00Z").open
    assert _judged(_window("not before"), 10, observed="2026-11-17T11:30:00Z").open


@pytest.mark.parametrize(
    ("value", "unit", "minutes"), [("1800", "s", 30), ("2", "h", 120), ("1", "d", 1440)]
)
def test_a_duration_may_be_in_any_unit_of_time(value: str, unit: str, minutes: int) -> None:
    window = _window("within", value, unit)
    assert _judged(window, minutes).open
    assert not _judged(window, minutes + 1).open


def test_the_bound_is_told_on_the_wall_clock_of_the_place() -> None:
    now = _now(10, offset=-210)
    found = judge_window(_window("within"), "Clean", _row(), now.utc, now)
    assert "until 2026-11-17 09:00" in found.sentence


@pytest.mark.parametrize("bound", ["within", "not before"])
@pytest.mark.parametrize("set_by", [-3600, -6, 6, 86400])
def test_no_window_is_judged_across_a_clock_that_was_set(bound: str, set_by: int) -> None:
    now = _now(10)
    moved = replace(now, utc=now.utc + timedelta(seconds=set_by))
    found = judge_window(_window(bound), "Clean", _row(), moved.utc, moved)
    assert (True, False) == (found.open, found.judged)
    assert "is not judged" in found.sentence


def test_a_healthy_clock_and_a_restart_are_no_jump() -> None:
    slow = replace(_now(600), utc=_now(600).utc - timedelta(seconds=4))
    assert not clock_jumped(_row(), slow)
    assert not clock_jumped(_row(), Moment(NOON + timedelta(hours=2), 0, "b2", 5))


def test_a_clock_that_went_back_over_a_restart_shows() -> None:
    assert clock_jumped(_row(), Moment(NOON - timedelta(minutes=1), 0, "b2", 5))
