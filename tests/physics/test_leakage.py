"""Properties of leakage: limits, round trips, and the places a leak may lie."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics import leakage
from gaugelog.physics.circuit import circuit_of
from gaugelog.physics.prediction import added_strain
from gaugelog.physics.validity import OutOfDomain
from tests.physics.kinds import assert_takes_every_kind

GRID = st.floats(60.0, 5000.0)
INSULATION = st.floats(1e5, 1e13)


@given(GRID, st.floats(1.5, 4.0), st.floats(1e-9, 1e-3))
def test_the_insulation_an_error_needs_makes_that_error(
    grid: float, factor: float, permitted: float
) -> None:
    needed = leakage.insulation_needed(grid, factor, permitted)
    assert -permitted == pytest.approx(leakage.leakage_strain(grid, factor, needed), rel=1e-9)


@given(GRID, INSULATION, st.floats(1.1, 100.0))
def test_worse_insulation_feigns_more_compression(
    grid: float, insulation: float, times: float
) -> None:
    good = leakage.leakage_strain(grid, 2.0, insulation)
    bad = leakage.leakage_strain(grid, 2.0, insulation / times)
    assert bad < good < 0
    drift = leakage.leakage_drift(grid, 2.0, insulation, insulation / times)
    assert bad - good == pytest.approx(drift)
    assert times == pytest.approx(leakage.insulation_fall(insulation, insulation / times))


def test_perfect_insulation_feigns_nothing() -> None:
    assert 0.0 == leakage.leakage_strain(350.0, 2.0, math.inf)
    assert 0.0 == leakage.grid_to_grid_strain(350.0, 2.0, math.inf, 0.5, 0.0)
    assert () == leakage.leakage_strain_notices(math.inf)


@given(GRID, st.floats(1e5, 1e9))
def test_a_leak_to_the_own_supply_tab_is_a_shunt_of_the_whole_circuit(
    grid: float, insulation: float
) -> None:
    wired = circuit_of("quarter three-wire", 3, grid, 2.0)
    whole = added_strain(wired, insulation, ("supply- tab", "signal+ tab"), 2.0)
    found = leakage.grid_to_grid_strain(grid, 2.0, insulation, 0.5, 0.0)
    assert whole == pytest.approx(found, abs=1e-14)


@given(GRID, INSULATION, st.floats(0.0, 1.0))
def test_tabs_at_one_potential_do_not_disturb_each_other(
    grid: float, insulation: float, potential: float
) -> None:
    assert 0.0 == leakage.grid_to_grid_strain(grid, 2.0, insulation, potential, potential)
    assert 0.0 == leakage.shield_leak_strain(grid, 2.0, insulation, potential, potential)


@given(GRID, INSULATION)
def test_a_guarded_shield_is_better_than_a_grounded_one(grid: float, insulation: float) -> None:
    guarded = leakage.shield_leak_strain(grid, 2.0, insulation, 0.5)
    grounded = leakage.shield_leak_strain(grid, 2.0, insulation, 0.0)
    assert abs(guarded) < abs(grounded)


def test_falling_insulation_is_measured_by_how_many_times() -> None:
    """Issue B: 25, 18, then 1.2 GΩ is a fall of 15 times between the last two."""
    assert 15.0 == pytest.approx(leakage.insulation_fall(18e9, 1.2e9))


def test_every_formula_takes_floats_arrays_and_uncertain_numbers() -> None:
    assert_takes_every_kind(leakage.leakage_strain, 350.0, 2.0, 1e7)
    assert_takes_every_kind(leakage.leakage_drift, 350.0, 2.0, 1e9, 1e7)
    assert_takes_every_kind(leakage.insulation_needed, 350.0, 2.0, 1e-5)
    assert_takes_every_kind(leakage.insulation_fall, 1e9, 1e7)
    assert_takes_every_kind(leakage.grid_to_grid_strain, 350.0, 2.0, 1e6, 0.5, 0.2, 100.0)
    assert_takes_every_kind(leakage.shield_leak_strain, 350.0, 2.0, 1e6, 0.2)


@pytest.mark.parametrize(
    ("call", "sentence"),
    [
        (lambda: leakage.leakage_strain(0.0, 2.0, 1e9), "grid must be greater than zero"),
        (lambda: leakage.leakage_strain(350.0, 0.0, 1e9), "factor must not be zero"),
        (lambda: leakage.leakage_strain(350.0, 2.0, 0.0), "insulation must be greater than zero"),
        (lambda: leakage.leakage_strain(350.0, 2.0, math.nan), "insulation must be greater"),
        (lambda: leakage.insulation_needed(350.0, 2.0, 0.0), "permitted must not be zero"),
        (lambda: leakage.insulation_needed(350.0, 2.0, 0.7), "permitted times factor must lie"),
        (
            lambda: leakage.grid_to_grid_strain(350.0, 2.0, 1e9, 1.5, 0.0),
            "own must lie between 0 and 1",
        ),
        (lambda: leakage.insulation_fall(-1.0, 1.0), "before must be greater than zero"),
    ],
)
def test_what_cannot_be_is_refused_by_name(call: object, sentence: str) -> None:
    assert callable(call)
    with pytest.raises(OutOfDomain, match=sentence):
        call()
