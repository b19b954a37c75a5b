"""Times as read off the wall where the work is done, across the end of summer time."""

from __future__ import annotations

import time
from collections.abc import Iterator
from dataclasses import replace
from datetime import UTC, date, datetime

import pytest

from gaugelog.errors import Faulty
from gaugelog.journal.clock import Moment, SystemClock
from gaugelog.rules.windows import judge_window
from gaugelog.work.doing import day_of, observed_at
from tests.rules.test_windows import BOOT_AT_NOON_MS, NOON, _row, _window

# Central European Time by POSIX.1: summer time ends on the last Sunday of October at 03:00
# (Directive 2000/84/EC), in 2026 on the 25th.
BERLIN = "CET-1CEST,M3.5.0,M10.5.0/3"
AFTER = Moment(datetime(2026, 10, 26, 9, 0, tzinfo=UTC), 60, "b", 0, zoned=True)


@pytest.fixture(autouse=True)
def berlin(monkeypatch: pytest.MonkeyPatch) -> Iterator[None]:
    monkeypatch.setenv("TZ", BERLIN)
    time.tzset()
    yield
    monkeypatch.undo()
    time.tzset()


@pytest.mark.parametrize(
    ("typed", "utc"),
    [
        ("2026-10-24 14:00", datetime(2026, 10, 24, 12, 0, tzinfo=UTC)),
        ("2026-10-25 14:00", datetime(2026, 10, 25, 13, 0, tzinfo=UTC)),
        ("2026-10-25 01:30", datetime(2026, 10, 24, 23, 30, tzinfo=UTC)),
        ("2026-10-25 02:30", datetime(2026, 10, 25, 0, 30, tzinfo=UTC)),
        ("2026-01-10 14:00", datetime(2026, 1, 10, 13, 0, tzinfo=UTC)),
        ("09:30", datetime(2026, 10, 26, 8, 30, tzinfo=UTC)),
        ("2026-10-24 14:00+01:00", datetime(2026, 10, 24, 13, 0, tzinfo=UTC)),
    ],
)
def test_a_time_typed_later_has_the_offset_of_its_own_day(typed: str, utc: datetime) -> None:
    assert utc == observed_at(typed, AFTER)


def test_a_clock_that_is_set_keeps_its_offset() -> None:
    fixed = replace(AFTER, zoned=False)
    assert datetime(2026, 10, 24, 13, 0, tzinfo=UTC) == observed_at("2026-10-24 14:00", fixed)
    assert datetime(2026, 10, 24, 14, 0) == fixed.wall(
        datetime(2026, 10, 24, 13, 0, tzinfo=UTC)
    ).replace(tzinfo=None)


def test_a_day_in_summer_ends_at_summers_midnight() -> None:
    late = datetime(2026, 10, 23, 22, 30, tzinfo=UTC)  # 00:30 on the 24th, summer time
    assert date(2026, 10, 24) == day_of(late, AFTER)
    assert date(2026, 10, 23) == day_of(late, replace(AFTER, zoned=False))


def test_the_clock_of_the_machine_knows_its_zone() -> None:
    now = SystemClock().now()
    assert now.zoned
    assert now.local == now.wall(now.utc)
    assert now.local.utcoffset() == now.wall(now.utc).utcoffset()


def test_a_window_is_told_in_the_time_of_its_own_day() -> None:
    summer = NOON.replace(month=7, day=1)
    now = Moment(NOON, 60, "b1", BOOT_AT_NOON_MS, zoned=True)
    earlier = _row(f"{summer:%Y-%m-%dT%H:%M:%SZ}")
    found = judge_window(_window("within"), "Clean", earlier, summer, now)
    assert "within 30 min of “Clean”, until 2026-07-01 14:30: 30 min left" == found.sentence


def test_a_time_at_the_edge_of_the_calendar_is_told() -> None:
    for typed in ("0001-01-01 00:00", "9999-12-31 23:59"):
        with pytest.raises(Faulty):
            observed_at(typed, AFTER)
