"""From strain to reading and back: the two ways undo each other, and each effect has its sign."""

from __future__ import annotations

import math
from dataclasses import replace

import numpy
import pytest
from hypothesis import given
from hypothesis import strategies as st
from uncertainties import ufloat

from gaugelog.physics._maths import Number
from gaugelog.physics.arrangements import ARRANGEMENTS
from gaugelog.physics.circuit import circuit_of
from gaugelog.physics.prediction import strained_output
from gaugelog.physics.reading import (
    TERMS,
    PlannedCircuit,
    estimated_strain,
    expected_reading,
)
from gaugelog.physics.validity import OutOfDomain

PLAN = PlannedCircuit(1000e-6, 60.0, setting=2.1)
SOME = {
    "factor": 2.08,
    "factor_slope": 1e-4,
    "celsius": 61.0,
    "transverse": 0.01,
    "biaxiality": -0.2,
    "misalignment": 0.03,
    "shear": 0.1,
    "thermal": -40e-6,
    "thermal_slope": -1e-6,
    "scatter": 4e-6,
    "resistance": 350.5,
    "wire": 2.0,
    "wire_drift": 0.01,
    "leak": 1e-9,
    "shunt_error": 1e-3,
    "gain": 1.001,
    "zero": 2e-6,
    "resolution": 1e-6,
    "nonlinearity": 0.5e-6,
    "repeatability": -1e-6,
}


def _shown(plan: PlannedCircuit = PLAN, /, **terms: float) -> float:
    return float(expected_reading(plan, {**plan.nominal(), **terms}))


@given(
    st.sampled_from(sorted(ARRANGEMENTS)),
    st.floats(1e-6, 3e-3),
    st.sampled_from([None, 60e3]),
)
def test_every_effect_is_undone_on_the_way_back(
    name: str, strain: float, shunt: float | None
) -> None:
    plan = replace(PLAN, arrangement=name, strain=strain, shunt=shunt)
    reading = expected_reading(plan, SOME)
    assert strain == pytest.approx(estimated_strain(plan, reading, SOME), rel=1e-9)


def test_every_term_has_a_trial_value() -> None:
    assert set(TERMS) == set(SOME)


def test_without_any_effect_the_bridge_alone_bends_the_reading() -> None:
    change = 2.1 * 1000e-6
    assert 1000e-6 / (1 + change / 2) == pytest.approx(_shown())


@pytest.mark.parametrize(
    ("term", "value", "microstrain"),
    [
        ("thermal", -40e-6, -40.0),
        ("scatter", 4e-6, 4.0),
        ("zero", 2e-6, -2.0),
        ("resolution", 1e-6, -1.0),
        ("nonlinearity", 3e-6, -3.0),
        ("repeatability", 4e-6, -4.0),
        ("wire", 3.5, -10.0),
        ("wire_drift", 0.0105, 14.28),
        ("leak", 1e-9, -0.167),
        ("transverse", 0.01, -0.15),
        ("misalignment", math.radians(5), -9.87),
        ("gain", 1.01, -9.9),
        ("factor", 2.121, 10.0),
    ],
)
def test_each_effect_moves_the_reading_its_own_way(
    term: str, value: float, microstrain: float
) -> None:
    moved = (_shown(**{term: value}) - _shown()) * 1e6
    assert microstrain == pytest.approx(moved, rel=0.02)


def test_a_half_bridge_of_two_gauges_feels_no_common_thermal_output() -> None:
    plan = replace(PLAN, arrangement="half bending", layout="half three-wire")
    assert _shown(plan) == pytest.approx(_shown(plan, thermal=-200e-6))
    moved = _shown(plan, scatter=4e-6) - _shown(plan)
    assert 4e-6 * math.sqrt(2) / 2 == pytest.approx(moved, rel=0.01)


def test_a_shunt_a_little_too_large_makes_readings_too_large() -> None:
    """The module takes a smaller step for the nominal one, and so scales by too much."""
    plan = replace(PLAN, shunt=100e3)
    assert 1.001 == pytest.approx(_shown(plan, shunt_error=1e-3) / _shown(plan), abs=1e-5)


@pytest.mark.parametrize("wire", [0.0, 0.5, 5.0])
def test_the_reading_is_what_the_circuit_itself_would_give(wire: float) -> None:
    """Against the circuit solved node by node, to second order of wire over grid."""
    circuit = circuit_of("quarter three-wire", 3, 350.0, 2.1, wire)
    exact = strained_output(circuit, "quarter three-wire", 1000e-6)
    zero = strained_output(circuit, "quarter three-wire", 0.0)
    expected = 4 * (exact - zero) / 2.1
    assert expected == pytest.approx(_shown(wire=wire), rel=1e-4)


def test_arrays_of_terms_give_arrays_of_strain() -> None:
    factors = numpy.array([2.08, 2.1])
    found = estimated_strain(PLAN, 1000e-6, {**SOME, "factor": factors})
    singly = [estimated_strain(PLAN, 1000e-6, {**SOME, "factor": each}) for each in factors]
    assert singly == pytest.approx(list(found))


@pytest.mark.parametrize("term", sorted(SOME))
def test_the_derivative_by_each_term_is_its_finite_difference(term: str) -> None:
    plan = replace(PLAN, shunt=60e3)
    step = 1e-4 * abs(SOME[term])

    def strain(value: Number) -> Number:
        return estimated_strain(plan, 1000e-6, {**SOME, term: value})

    slope = (strain(SOME[term] + step) - strain(SOME[term] - step)) / (2 * step)
    carried = ufloat(SOME[term], step)
    assert slope == pytest.approx(strain(carried).derivatives[carried], rel=1e-5)


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: PlannedCircuit(0.0, 20.0), "strain must not be zero"),
        (lambda: PlannedCircuit(1e-3, math.nan), "celsius must be a finite number"),
        (lambda: PlannedCircuit(1e-3, 20.0, "pentagon"), "arrangement must be one of"),
        (lambda: PlannedCircuit(1e-3, 20.0, setting=0.0), "setting must not be zero"),
        (lambda: PlannedCircuit(1e-3, 20.0, resistance=-1.0), "resistance must be greater"),
        (lambda: PlannedCircuit(1e-3, 20.0, shunt=0.0), "shunt must be greater than zero"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
