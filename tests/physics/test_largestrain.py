"""Large strain: round trips, the small limit, and the words past a limit."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics import largestrain
from gaugelog.physics.bridge import indicated_strain, output_ratio
from gaugelog.physics.strain import relative_change
from gaugelog.physics.validity import OutOfDomain
from tests.physics.kinds import assert_takes_every_kind

FACTOR = st.floats(1.9, 2.3)
STRAIN = st.floats(-0.2, 0.25)


@given(FACTOR, STRAIN)
def test_change_and_strain_go_there_and_back(factor: float, strain: float) -> None:
    change = largestrain.large_change(factor, strain)
    assert strain == pytest.approx(largestrain.large_strain(factor, change), abs=1e-12)


@given(FACTOR, st.floats(-1e-6, 1e-6))
def test_small_strain_knows_nothing_of_it(factor: float, strain: float) -> None:
    small = relative_change(factor, strain)
    assert small == pytest.approx(largestrain.large_change(factor, strain), rel=1e-6, abs=1e-18)


@given(STRAIN, STRAIN)
def test_stretching_twice_multiplies_what_each_stretch_does(one: float, other: float) -> None:
    whole = (1 + one) * (1 + other) - 1
    parts = (1 + largestrain.large_change(2.0, one)) * (1 + largestrain.large_change(2.0, other))
    assert parts - 1 == pytest.approx(largestrain.large_change(2.0, whole), abs=1e-12)


@given(FACTOR, st.floats(1.5, 2.5), STRAIN)
def test_the_instruments_reading_leads_back_to_the_strain(
    factor: float, setting: float, strain: float
) -> None:
    arm = 1 + largestrain.large_change(factor, strain)
    shown = indicated_strain(output_ratio(arm, 1.0, 1.0, 1.0), setting)
    found = largestrain.large_strain_of_indicated(shown, setting, factor)
    assert strain == pytest.approx(found, abs=1e-12)


def test_strain_beyond_the_lots_limit_is_noticed() -> None:
    assert () == largestrain.large_change_notices(0.05, 0.05)
    assert "6.0% is beyond the 5.0%" in largestrain.large_change_notices(-0.06, 0.05)[0].message


def test_a_factor_that_has_grown_is_noticed() -> None:
    assert () == largestrain.factor_at_strain_notices(0.01)
    assert "has grown by 2.5%" in largestrain.factor_at_strain_notices(0.05)[0].message


def test_every_formula_takes_floats_arrays_and_uncertain_numbers() -> None:
    assert_takes_every_kind(largestrain.factor_at_strain, 2.0, 0.1)
    assert_takes_every_kind(largestrain.large_change, 2.05, 0.1)
    assert_takes_every_kind(largestrain.large_strain, 2.05, 0.2)
    assert_takes_every_kind(largestrain.large_strain_of_indicated, 0.09, 2.0, 2.05)


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: largestrain.factor_at_strain(0.0, 0.1), "factor must be greater than zero"),
        (lambda: largestrain.large_change(2.0, -1.0), "strain must be greater than -1"),
        (lambda: largestrain.large_strain(2.0, -1.0), "change must be greater than -1"),
        (lambda: largestrain.large_strain(1.0, -0.5), "factor² \\+ 4 change must be greater"),
        (lambda: largestrain.large_strain_of_indicated(0.1, 0.0, 2.0), "setting must not be"),
        (lambda: largestrain.large_strain_of_indicated(1.0, 2.0, 2.0), "setting times indicated"),
        (lambda: largestrain.large_strain(2.0, math.nan), "change must be a finite number"),
        (lambda: largestrain.large_change_notices(0.1, 0.0), "limit must be greater than zero"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
