"""Properties of shunts and of the resistors to make them: round trips, limits, three readings."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics import resistors, shunt
from gaugelog.physics.bridge import indicated_strain, strain_output
from gaugelog.physics.circuit import circuit_of
from gaugelog.physics.prediction import added_strain
from gaugelog.physics.validity import OutOfDomain
from tests.physics.kinds import assert_takes_every_kind

GRID = st.floats(60.0, 5000.0)
ACROSS = st.floats(1e3, 1e8)
QUARTER = "quarter three-wire"


@given(GRID, st.floats(1.5, 4.0), st.floats(1e-6, 0.02))
def test_a_shunt_for_a_strain_simulates_that_strain(
    grid: float, factor: float, strain: float
) -> None:
    across = shunt.shunt_for_strain(grid, factor, strain)
    assert -strain == pytest.approx(shunt.simulated_strain(grid, factor, across), rel=1e-9)
    assert across == pytest.approx(shunt.shunt_for_strain(grid, factor, -strain))


@given(GRID, ACROSS)
def test_the_three_readings_of_a_shunt_are_in_order(grid: float, across: float) -> None:
    """Indicated over simulated; a real strain of the simulated size reads less (tension)."""
    simulated = -shunt.simulated_strain(grid, 2.0, across)
    indicated = -shunt.shunt_indicated_strain(grid, across, 2.0)
    real = indicated_strain(strain_output(simulated, 2.0, QUARTER), 2.0)
    assert real < simulated < indicated


def test_the_three_readings_of_a_shunt_are_those_of_the_trap() -> None:
    """174 650 Ω on 350 Ω, factor 2: 1000 simulated, 1001.0 indicated, a real 1000 reads 999.0."""
    assert -1000 == pytest.approx(1e6 * shunt.simulated_strain(350.0, 2.0, 174650.0))
    assert -1001.0 == pytest.approx(
        1e6 * shunt.shunt_indicated_strain(350.0, 174650.0, 2.0), abs=0.05
    )
    real = indicated_strain(strain_output(0.001, 2.0, QUARTER), 2.0)
    assert 999.0 == pytest.approx(1e6 * real, abs=0.05)


@given(GRID, ACROSS, st.sampled_from([(1, 2), (3, 4)]))
def test_neighbouring_arms_step_equally_either_way(
    grid: float, across: float, arms: tuple[int, int]
) -> None:
    one, other = (shunt.shunt_output(grid, across, arm) for arm in arms)
    assert one == -other < 0


@given(GRID, ACROSS)
def test_the_shunted_arm_is_smaller_than_either(grid: float, across: float) -> None:
    found = shunt.shunted(grid, across)
    assert 0 < found < min(grid, across)
    step = shunt.relative_step(grid, across)
    assert grid * (1 - step) == pytest.approx(found, rel=1e-9)


@given(GRID, st.floats(0.0, 20.0), ACROSS)
def test_the_short_formula_at_the_module_is_the_whole_circuit(
    grid: float, wire: float, across: float
) -> None:
    wired = circuit_of(QUARTER, 3, grid, 2.0, wire)
    whole = added_strain(wired, across, ("supply-", "signal+"), 2.0)
    found = shunt.shunt_at_module_strain(grid, wire, across, 2.0)
    assert whole == pytest.approx(found, abs=1e-12)


@pytest.mark.parametrize("arm", [1, 2, 3, 4])
def test_without_wires_the_whole_circuit_shows_the_short_formula(arm: int) -> None:
    wired = circuit_of("full bending", 4, 350.0, 2.0)
    ends = wired.layout.arm_ends[arm - 1]
    whole = added_strain(wired, 1e5, ends, 2.0, "full bending")
    found = shunt.shunt_indicated_strain(350.0, 1e5, 2.0, arm, "full bending")
    assert whole == pytest.approx(found, abs=1e-15)


@given(st.floats(1e-2, 1e9))
def test_no_e96_value_is_further_than_one_and_a_half_percent(ohm: float) -> None:
    nearest = resistors.nearest_e96(ohm)
    assert ohm == pytest.approx(nearest, rel=0.015)
    assert nearest == resistors.nearest_e96(nearest)


@given(st.floats(1e-2, 1e9), st.sampled_from(resistors.E96))
def test_no_other_e96_value_is_nearer(ohm: float, value: float) -> None:
    nearest = resistors.nearest_e96(ohm)
    other = value * 10.0 ** math.floor(math.log10(ohm))
    assert abs(math.log(nearest / ohm)) <= abs(math.log(other / ohm)) + 1e-12


def test_a_wanted_strain_is_had_with_the_nearest_resistor_to_buy() -> None:
    wanted = shunt.shunt_for_strain(350.0, 2.0, 0.001)
    bought = resistors.nearest_e96(wanted)
    assert 174e3 == bought
    assert -1003.7 == pytest.approx(1e6 * shunt.simulated_strain(350.0, 2.0, bought), abs=0.05)


@given(st.floats(1.0, 1e7), st.floats(0.0, 0.1), st.floats(-1e-4, 1e-4), st.floats(-60.0, 60.0))
def test_a_resistor_stays_in_its_span(
    ohm: float, tolerance: float, coefficient: float, rise: float
) -> None:
    span = resistors.resistor_span(ohm, tolerance, coefficient, rise)
    assert span.least <= ohm <= span.most
    edge = resistors.warmed(ohm * (1 + tolerance), coefficient, rise)
    assert span.least * (1 - 1e-12) <= edge <= span.most * (1 + 1e-12)


def test_every_formula_takes_floats_arrays_and_uncertain_numbers() -> None:
    assert_takes_every_kind(shunt.shunted, 350.0, 1e5)
    assert_takes_every_kind(shunt.simulated_strain, 350.0, 2.0, 1e5)
    assert_takes_every_kind(shunt.shunt_for_strain, 350.0, 2.0, 0.001)
    assert_takes_every_kind(shunt.shunt_output, 350.0, 1e5)
    assert_takes_every_kind(shunt.shunt_indicated_strain, 350.0, 1e5, 2.0)
    assert_takes_every_kind(shunt.shunt_at_module_strain, 350.0, 1.5, 1e5, 2.0)
    assert_takes_every_kind(resistors.warmed, 1e5, 25e-6, 10.0)


@pytest.mark.parametrize(
    ("call", "sentence"),
    [
        (lambda: shunt.shunted(350.0, 0.0), "shunt must be greater than zero"),
        (lambda: shunt.simulated_strain(-350.0, 2.0, 1e5), "resistance must be greater than zero"),
        (lambda: shunt.simulated_strain(350.0, 0.0, 1e5), "factor must not be zero"),
        (lambda: shunt.shunt_for_strain(350.0, 2.0, 0.0), "strain must not be zero"),
        (lambda: shunt.shunt_for_strain(350.0, 2.0, 0.6), "strain times factor must lie between"),
        (lambda: shunt.shunt_output(350.0, 1e5, 0), "arm must be one of 1, 2, 3, 4, not 0"),
        (lambda: shunt.shunt_at_module_strain(350.0, -1.0, 1e5, 2.0), "wire must not be negative"),
        (lambda: resistors.nearest_e96(math.nan), "resistance must be a finite number"),
        (lambda: resistors.resistor_span(1e5, -0.1), "tolerance must not be negative"),
        (lambda: resistors.resistor_span(1e5, 1.0), "tolerance below one must be greater than 0"),
    ],
)
def test_what_cannot_be_is_refused_by_name(call: object, sentence: str) -> None:
    assert callable(call)
    with pytest.raises(OutOfDomain, match=sentence):
        call()
