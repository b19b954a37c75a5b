"""Properties of strain and gauge factor: round trips, kinds of number, bad input."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics import strain
from gaugelog.physics.validity import OutOfDomain
from tests.physics.kinds import assert_takes_every_kind

OHM = st.floats(1.0, 1e5)
STRAIN = st.floats(-0.02, 0.02)


@given(OHM, st.floats(0.5, 4.0), STRAIN)
def test_strain_comes_back_from_the_resistance_it_made(
    resistance: float, factor: float, wanted: float
) -> None:
    after = resistance + strain.resistance_change(resistance, factor, wanted)
    found = strain.strain_from_resistances(resistance, after, factor)
    assert wanted == pytest.approx(found, abs=1e-13)


@given(st.floats(-0.9, 10.0))
def test_true_and_engineering_strain_undo_each_other(wanted: float) -> None:
    found = strain.engineering_strain(strain.true_strain(wanted))
    assert wanted == pytest.approx(found, rel=1e-12, abs=1e-15)


@given(st.floats(1e-12, 1e-6))
def test_small_strains_are_the_same_either_way(wanted: float) -> None:
    assert wanted == pytest.approx(strain.true_strain(wanted), rel=1e-6)


@given(st.floats(-1e5, 1e5))
def test_micrometres_per_metre_go_there_and_back(value: float) -> None:
    back = strain.micrometres_per_metre(strain.from_micrometres_per_metre(value))
    assert value == pytest.approx(back, rel=1e-14)


def test_a_semiconductor_grid_may_have_a_negative_factor() -> None:
    assert -0.1 == pytest.approx(strain.relative_change(-100.0, 0.001))


def test_every_formula_takes_floats_arrays_and_uncertain_numbers() -> None:
    assert_takes_every_kind(strain.resistance_change, 350.0, 2.1, 0.001)
    assert_takes_every_kind(strain.strain_from_resistances, 350.0, 350.7, 2.1)
    assert_takes_every_kind(strain.resistance_shift, 350.4, 351.2)
    assert_takes_every_kind(strain.true_strain, 0.02)
    assert_takes_every_kind(strain.engineering_strain, 0.02)
    assert_takes_every_kind(strain.micrometres_per_metre, 0.001)


@pytest.mark.parametrize(
    ("call", "sentence"),
    [
        (lambda: strain.resistance_change(-350.0, 2.0, 0.0), "resistance must be greater than"),
        (lambda: strain.relative_change(0.0, 0.001), "factor must not be zero"),
        (lambda: strain.relative_change(2.0, math.nan), "strain must be a finite number"),
        (lambda: strain.strain_from_resistances(0.0, 1.0, 2.0), "before must be greater than"),
        (lambda: strain.strain_from_resistances(1.0, -1.0, 2.0), "after must be greater than"),
        (lambda: strain.true_strain(-1.0), "strain must be greater than -1"),
    ],
)
def test_what_cannot_be_is_refused_by_name(call: object, sentence: str) -> None:
    assert callable(call)
    with pytest.raises(OutOfDomain, match=sentence):
        call()
