"""Semiconductor grids: round trips for either doping, slopes, and what is noticed."""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics import semiconductor
from gaugelog.physics.validity import OutOfDomain
from tests.physics.kinds import assert_takes_every_kind

FACTOR = st.floats(50.0, 200.0) | st.floats(-150.0, -50.0)
SECOND = st.floats(-1000.0, 10_000.0)
STRAIN = st.floats(-0.002, 0.002)
CELSIUS = st.floats(-50.0, 150.0)


@given(FACTOR, SECOND, STRAIN)
def test_change_and_strain_go_there_and_back(factor: float, second: float, strain: float) -> None:
    change = semiconductor.semiconductor_change(factor, second, strain)
    found = semiconductor.semiconductor_strain(factor, second, change)
    assert strain == pytest.approx(found, rel=1e-9, abs=1e-15)


@given(FACTOR, STRAIN)
def test_without_a_second_order_term_the_grid_is_linear(factor: float, strain: float) -> None:
    change = semiconductor.semiconductor_change(factor, 0.0, strain)
    assert factor * strain == change
    assert strain == pytest.approx(semiconductor.semiconductor_strain(factor, 0.0, change))
    assert factor == semiconductor.slope_at(factor, 0.0, strain)


@given(FACTOR, CELSIUS, CELSIUS)
def test_going_by_way_of_another_temperature_changes_nothing(
    factor: float, one: float, other: float
) -> None:
    there = semiconductor.factor_at(factor, one)
    assert factor == pytest.approx(semiconductor.factor_at(there, 25.0, one))
    by_way = semiconductor.factor_at(there, other, one)
    assert semiconductor.factor_at(factor, other) == pytest.approx(by_way)


@given(SECOND, FACTOR, CELSIUS)
def test_the_second_order_term_falls_twice_as_fast(
    second: float, factor: float, celsius: float
) -> None:
    share = semiconductor.factor_at(factor, celsius) / factor
    found = semiconductor.second_order_at(second, celsius)
    assert second * share**2 == pytest.approx(found)


@given(FACTOR, SECOND, STRAIN)
def test_the_slope_is_what_a_little_more_strain_adds(
    factor: float, second: float, strain: float
) -> None:
    ends = [
        semiconductor.semiconductor_change(factor, second, strain + way) for way in (1e-6, -1e-6)
    ]
    expected = (ends[0] - ends[1]) / 2e-6
    assert expected == pytest.approx(semiconductor.slope_at(factor, second, strain), rel=1e-6)


@given(FACTOR, SECOND)
def test_a_grid_without_prestrain_keeps_its_factor(factor: float, second: float) -> None:
    assert factor == semiconductor.factor_for_prestrain(factor, second, 0.0)


def test_each_limit_is_noticed_in_its_own_words() -> None:
    assert () == semiconductor.semiconductor_notices(120.0, 4000.0, 0.001)
    strain = semiconductor.semiconductor_notices(120.0, 4000.0, np.array([0.001, -0.004]))
    assert "Over 3000 µm/m" in strain[0].message
    bent = semiconductor.semiconductor_notices(-110.0, 10_000.0, 0.0029)
    assert "over a quarter of the signal" in bent[0].message
    hot = semiconductor.semiconductor_notices(120.0, 4000.0, 0.001, 200.0)
    assert "from about -50 to 150 °C" in hot[0].message


def test_every_formula_takes_floats_arrays_and_uncertain_numbers() -> None:
    assert_takes_every_kind(semiconductor.factor_at, 120.0, 60.0, 23.0)
    assert_takes_every_kind(semiconductor.second_order_at, 4000.0, 60.0, 23.0)
    assert_takes_every_kind(semiconductor.semiconductor_change, 120.0, 4000.0, 0.001)
    assert_takes_every_kind(semiconductor.semiconductor_strain, -110.0, 10_000.0, 0.1)
    assert_takes_every_kind(semiconductor.factor_for_prestrain, 120.0, 4000.0, 0.001)


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: semiconductor.factor_at(0.0, 20.0), "factor must not be zero"),
        (lambda: semiconductor.factor_at(1.0, -300.0), "celsius must be greater than -273.15"),
        (lambda: semiconductor.factor_at(1.0, 20.0, -300.0), "reference must be greater"),
        (lambda: semiconductor.second_order_at(math.nan, 20.0), "second must be a finite"),
        (lambda: semiconductor.semiconductor_change(1.0, 1.0, math.inf), "strain must be a"),
        (
            lambda: semiconductor.semiconductor_strain(-110.0, 10_000.0, -0.5),
            "change is beyond what this grid can reach",
        ),
        (lambda: semiconductor.slope_at(0.0, 1.0, 0.1), "factor must not be zero"),
        (lambda: semiconductor.factor_for_prestrain(120.0, 0.0, -0.01), "resistance under strain"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
