"""Properties of leads and their conductors: limits, order, round trips, issue figures."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics import conductors, leads
from gaugelog.physics.circuit import circuit_of
from gaugelog.physics.layouts import LAYOUTS
from gaugelog.physics.prediction import sensitivity
from gaugelog.physics.validity import OutOfDomain
from tests.physics.kinds import assert_takes_every_kind

LAYOUT = st.sampled_from(sorted(LAYOUTS))
GRID = st.floats(60.0, 5000.0)
WIRE = st.floats(0.0, 50.0)
WIRE_OF_THE_ISSUE = 50 * 0.017241 / 0.14
"""50 m of 0.14 mm² at 0.017241 Ω·mm²/m."""


@given(LAYOUT, GRID, WIRE)
def test_loss_and_correction_belong_together(layout: str, grid: float, wire: float) -> None:
    kept = leads.desensitisation(layout, grid, wire)
    assert 0 < kept <= 1
    assert 1.0 == pytest.approx(kept * leads.correction_factor(layout, grid, wire))
    assert 1.0 == pytest.approx(kept + leads.sensitivity_loss(layout, grid, wire))
    assert 2.1 * kept == pytest.approx(leads.effective_factor(layout, grid, wire, 2.1))


@given(LAYOUT, GRID)
def test_wires_without_resistance_take_nothing(layout: str, grid: float) -> None:
    assert 1.0 == leads.desensitisation(layout, grid, 0.0)


@given(GRID, WIRE)
def test_a_third_wire_halves_the_loss_and_more(grid: float, wire: float) -> None:
    three = leads.sensitivity_loss("quarter three-wire", grid, wire)
    assert leads.sensitivity_loss("quarter two-wire", grid, wire) <= 2 * three + 1e-15


@pytest.mark.parametrize(
    ("name", "wires", "layout"),
    [
        ("quarter three-wire", 3, "quarter three-wire"),
        ("half bending", 3, "half three-wire"),
        ("half bending", 5, "half five-wire"),
        ("full bending", 4, "full four-wire"),
        ("full torsion", 6, "full six-wire"),
    ],
)
def test_the_short_formula_is_what_the_whole_circuit_loses(
    name: str, wires: int, layout: str
) -> None:
    whole = sensitivity(circuit_of(name, wires, 350.0, 2.0, 4.0), name)
    assert whole == pytest.approx(leads.desensitisation(layout, 350.0, 4.0), rel=1e-6)


def test_long_thin_wires_lose_and_offset_what_the_issue_says() -> None:
    """Issue B: 6.157 Ω a wire; 4.88 % three-wire, 9.31 % two-wire; 24.40 mV/V two-wire."""
    wire = conductors.from_reel(50.0, conductors.per_metre_of_area(0.14e-6, 0.017241e-6)).resistance
    assert WIRE_OF_THE_ISSUE == pytest.approx(wire)
    assert 6.157 == pytest.approx(wire, abs=1e-3)
    three = leads.sensitivity_loss("quarter three-wire", 120.0, wire)
    two = leads.sensitivity_loss("quarter two-wire", 120.0, wire)
    assert 4.88 == pytest.approx(100 * three, abs=5e-3)
    assert 9.31 == pytest.approx(100 * two, abs=5e-3)
    assert 24.40 == pytest.approx(1e3 * leads.initial_offset(120.0, 2 * wire, 120.0), abs=5e-3)


@given(GRID, WIRE, st.floats(-60.0, 60.0))
def test_equal_wires_in_neighbouring_arms_warm_without_effect(
    grid: float, wire: float, rise: float
) -> None:
    found = leads.temperature_strain(grid, wire, wire, 0.00393, rise, 2.0)
    assert 0.0 == pytest.approx(found, abs=1e-18)


@given(GRID, st.floats(0.1, 50.0), st.floats(0.1, 60.0))
def test_two_wires_that_warm_read_as_tension(grid: float, wires: float, rise: float) -> None:
    shown = leads.temperature_strain(grid, wires, 0.0, 0.00393, rise, 2.0)
    assert 0 < shown < leads.added_gauge_strain(grid, wires, 0.00393, rise, 2.0)


@given(GRID, WIRE, WIRE)
def test_equal_wires_leave_no_offset(grid: float, wire: float, more: float) -> None:
    assert 0.0 == pytest.approx(leads.initial_offset(grid, wire, grid, wire), abs=1e-12)
    assert leads.initial_offset(grid, wire + more, grid, wire) >= -1e-15


@given(LAYOUT, GRID, st.floats(0.1, 50.0), st.floats(0.1, 60.0))
def test_warm_wires_take_more_unless_the_supply_is_sensed(
    layout: str, grid: float, wire: float, rise: float
) -> None:
    drift = leads.sensitivity_drift(layout, grid, wire, 0.00393, rise)
    assert (drift == 0.0) if LAYOUTS[layout].sensed else (-0.2 < drift < 0.0)


def test_only_two_wires_are_noticed() -> None:
    assert () == leads.desensitisation_notices("quarter three-wire", 120.0, 6.0)
    assert () == leads.desensitisation_notices("quarter two-wire", 120.0, 0.0)
    assert 1 == len(leads.desensitisation_notices("quarter two-wire", 120.0, 6.0))


@given(st.integers(-3, 50))
def test_three_gauge_numbers_double_the_resistance(awg: int) -> None:
    """The rule of thumb of the wire tables: three numbers halve the area."""
    if awg <= 47:
        ratio = conductors.awg_per_metre(awg + 3) / conductors.awg_per_metre(awg)
        assert 2.0 == pytest.approx(ratio, rel=0.01)


@given(st.floats(0.1, 100.0), st.floats(-50.0, 150.0))
def test_a_wire_cools_back_to_where_it_was(ohm: float, celsius: float) -> None:
    warm = conductors.at_temperature(ohm, celsius)
    assert ohm == pytest.approx(conductors.at_temperature(ohm, 20.0))
    back = warm / conductors.at_temperature(1.0, celsius)
    assert ohm == pytest.approx(back)


def test_the_two_temperature_forms_of_the_standards_nearly_agree() -> None:
    for celsius in (5.0, 20.0, 40.0):
        warm = conductors.at_temperature(1.0, celsius)
        assert 1.0 == pytest.approx(conductors.iec_60228_to_20_celsius(warm, celsius), abs=2e-3)


def test_every_formula_takes_floats_arrays_and_uncertain_numbers() -> None:
    for layout in LAYOUTS:
        assert_takes_every_kind(
            lambda grid, wire, layout=layout: leads.desensitisation(layout, grid, wire), 350.0, 4.0
        )
    assert_takes_every_kind(leads.added_gauge_strain, 350.0, 4.0, 0.00393, 10.0, 2.0)
    assert_takes_every_kind(leads.temperature_strain, 350.0, 4.0, 3.8, 0.00393, 10.0, 2.0)
    assert_takes_every_kind(
        lambda *given: leads.sensitivity_drift("full four-wire", *given), 350.0, 4.0, 0.00393, 10.0
    )
    assert_takes_every_kind(leads.initial_offset, 351.2, 1.0, 350.0, 1.1)
    assert_takes_every_kind(leads.initial_strain, 351.2, 1.0, 2.0)
    assert_takes_every_kind(conductors.at_temperature, 4.0, 35.0, 0.00393, 20.0)
    assert_takes_every_kind(conductors.iec_60228_to_20_celsius, 4.0, 35.0)
    assert_takes_every_kind(conductors.per_metre_of_area, 0.14e-6)
    assert_takes_every_kind(lambda *given: conductors.from_reel(*given).resistance, 50.0, 0.128)
    assert_takes_every_kind(lambda loop: conductors.from_loop(loop).resistance, 6.4)


@pytest.mark.parametrize(
    ("call", "sentence"),
    [
        (lambda: leads.desensitisation("quarter", 350.0, 1.0), "layout must be one of quarter two"),
        (lambda: leads.desensitisation("full six-wire", 0.0, 1.0), "grid must be greater than"),
        (lambda: leads.desensitisation("full six-wire", 1.0, -1.0), "wire must not be negative"),
        (lambda: leads.effective_factor("full six-wire", 1.0, 1.0, 0.0), "factor must not be zero"),
        (lambda: leads.initial_offset(1.0, math.nan, 1.0), "wires must be a finite number"),
        (lambda: leads.initial_offset(1.0, 1.0, -1.0), "completion must be greater than zero"),
        (lambda: conductors.from_reel(-1.0, 0.1), "length must not be negative"),
        (lambda: conductors.from_loop(-1.0), "loop must not be negative"),
        (lambda: conductors.from_awg(1.0, 60), "awg must lie between -3 and 50"),
        (lambda: conductors.iec_60228_per_metre(0.14), "mm2 must be a size of IEC 60228"),
        (
            lambda: conductors.iec_60228_per_metre(0.5, "class 9"),
            "conductor must be one of class 1",
        ),
        (lambda: conductors.from_mm2(1.0, 0.5, "class 9"), "conductor must be one of class 1"),
        (lambda: conductors.from_mm2(1.0, -0.5), "area must be greater than zero"),
        (lambda: conductors.at_temperature(1.0, -300.0), "celsius must be greater than -273.15"),
    ],
)
def test_what_cannot_be_is_refused_by_name(call: object, sentence: str) -> None:
    assert callable(call)
    with pytest.raises(OutOfDomain, match=sentence):
        call()
