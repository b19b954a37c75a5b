"""Watching the zero as the supply rises: planted heating is found."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics import zerowatch
from gaugelog.physics.validity import OutOfDomain
from gaugelog.physics.zerowatch import ZeroStep, ZeroVerdict, judge_steps
from tests.physics.kinds import assert_takes_every_kind

SLOPE = st.floats(1e-9, 1e-6)


def heated(slope: float, supplies: tuple[float, ...], zero: float = 2e-4) -> tuple[ZeroStep, ...]:
    """Steps whose zero walks by `slope` times the supply squared."""
    return tuple(ZeroStep(each, zero, zero + slope * each**2) for each in supplies)


@given(SLOPE, st.floats(-1e-3, 1e-3))
def test_planted_heating_is_found_whatever_the_zero(slope: float, zero: float) -> None:
    steps = heated(slope, (2.5, 5.0, 7.5, 10.0), zero)
    assert slope == pytest.approx(zerowatch.heating_slope(steps), rel=1e-6)


@given(SLOPE, st.floats(1e-7, 1e-4))
def test_the_verdict_brackets_the_supply_that_heats_just_as_much(
    slope: float, permitted: float
) -> None:
    verdict = judge_steps(heated(slope, (1.0, 2.0, 5.0, 10.0, 20.0)), permitted)
    limit = zerowatch.supply_for_shift(slope, permitted)
    assert (verdict.steady or 0.0) <= limit * (1 + 1e-9)
    assert limit <= (verdict.unsteady or math.inf) * (1 + 1e-9)


@given(st.permutations([1.0, 2.0, 5.0, 10.0]))
def test_the_order_of_the_steps_does_not_matter(order: list[float]) -> None:
    verdict = judge_steps(heated(1e-7, tuple(order)), 3e-6)
    assert ZeroVerdict(5.0, 10.0) == verdict


def test_a_quiet_step_above_a_restless_one_does_not_count() -> None:
    steps = (ZeroStep(2.0, 0.0, 0.0), ZeroStep(4.0, 0.0, 9e-6), ZeroStep(6.0, 0.0, 0.0))
    assert ZeroVerdict(2.0, 4.0) == judge_steps(steps, 5e-6)


def test_nothing_restless_leaves_the_upper_end_open() -> None:
    assert ZeroVerdict(10.0, None) == judge_steps(heated(1e-12, (5.0, 10.0)), 1e-6)
    assert ZeroVerdict(None, 5.0) == judge_steps(heated(1e-6, (5.0, 10.0)), 1e-6)


def test_a_walk_down_counts_like_a_walk_up() -> None:
    assert ZeroVerdict(None, 5.0) == judge_steps((ZeroStep(5.0, 1e-5, 0.0),), 5e-6)
    assert 2.0 == pytest.approx(zerowatch.supply_for_shift(-1e-6, 4e-6))


def test_the_supply_for_a_shift_takes_floats_arrays_and_uncertain_numbers() -> None:
    assert_takes_every_kind(zerowatch.supply_for_shift, 1e-7, 3e-6)


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: ZeroStep(0.0, 0.0, 0.0), "supply must be greater than zero"),
        (lambda: ZeroStep(1.0, math.nan, 0.0), "at_once must be a finite number"),
        (lambda: ZeroStep(1.0, 0.0, math.inf), "after_dwell must be a finite number"),
        (lambda: judge_steps((), 1e-6), "steps must hold at least one step"),
        (lambda: judge_steps(heated(1e-7, (5.0,)), 0.0), "permitted must be greater than zero"),
        (lambda: zerowatch.heating_slope(heated(1e-7, (5.0, 5.0))), "two different supplies"),
        (lambda: zerowatch.supply_for_shift(0.0, 1e-6), "slope must not be zero"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
