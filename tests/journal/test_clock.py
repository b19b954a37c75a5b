"""Moments, and clocks that jump."""

from __future__ import annotations

from dataclasses import replace
from datetime import UTC, datetime, timedelta, timezone

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.journal.clock import Moment, SetClock, SystemClock, jump_between
from tests.journal.samples import START


def _later(seconds: float, ran: float, boot: str = START.boot) -> Moment:
    return Moment(
        START.utc + timedelta(seconds=seconds),
        START.offset_minutes,
        boot,
        START.uptime_ms + round(ran * 1000),
    )


def test_a_moment_is_written_in_utc_with_its_offset_beside() -> None:
    assert "2026-12-01T09:00:00.000000Z" == START.text
    assert "+01:00" == START.offset
    assert "-03:30" == replace(START, offset_minutes=-210).offset


def test_the_local_time_is_that_on_the_wall() -> None:
    assert "2026-12-01T10:00:00+01:00" == START.local.isoformat()
    assert START.utc == START.local


def test_a_moment_without_utc_is_refused() -> None:
    for wrong in (
        datetime(2026, 12, 1),
        datetime(2026, 12, 1, tzinfo=timezone(timedelta(hours=1))),
    ):
        with pytest.raises(ValueError, match="not an aware time in UTC"):
            replace(START, utc=wrong)


def test_the_clock_of_the_machine_runs() -> None:
    clock = SystemClock()
    first, second = clock.now(), clock.now()
    assert first.boot == second.boot
    assert first.uptime_ms <= second.uptime_ms
    assert abs(datetime.now(UTC) - second.utc) < timedelta(minutes=1)
    assert jump_between(first, second) is None


def test_a_set_clock_moves_only_when_told() -> None:
    clock = SetClock(START)
    assert START == clock.now()
    clock.advance(1.5)
    assert _later(1.5, 1.5) == clock.now()
    clock.set(START)
    assert START == clock.now()


def test_a_clock_set_back_or_forward_shows_against_the_running_time() -> None:
    assert -3600 == jump_between(START, _later(-3540, 60))
    assert 3600 == jump_between(START, _later(3660, 60))


def test_a_clock_that_is_gently_corrected_did_not_jump() -> None:
    assert jump_between(START, _later(86_405, 86_400)) is None


def test_a_moment_taken_before_waiting_is_no_jump() -> None:
    assert jump_between(START, _later(-20, -20)) is None


def test_across_a_restart_only_a_time_that_goes_back_can_be_told() -> None:
    assert jump_between(START, _later(7200, -3500, "boot-2")) is None
    assert -7200 == jump_between(START, _later(-7200, -3500, "boot-2"))


@given(st.integers(0, 10**7), st.integers(-(10**6), 10**6))
def test_a_jump_is_told_with_its_size(ran: int, jump: int) -> None:
    told = jump_between(START, _later(ran + jump, ran))
    if told is None:
        assert abs(jump) <= 5 + ran / 1e4
    else:
        assert jump == pytest.approx(told)
