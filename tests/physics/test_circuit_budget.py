"""The budget of a circuit's strain: complete, sorted, and in agreement with its simulation."""

from __future__ import annotations

import math
from dataclasses import replace

import pytest

from gaugelog.physics.circuit_budget import (
    all_inputs,
    circuit_budget,
    shared_correlation,
    strain_model,
)
from gaugelog.physics.estimates import Estimate, exactly, normal, rectangular
from gaugelog.physics.montecarlo import agreement_notices, simulate
from gaugelog.physics.reading import TERMS, PlannedCircuit
from gaugelog.physics.validity import OutOfDomain

PLAN = PlannedCircuit(1000e-6, 80.0, setting=2.1, shunt=100e3)
INPUTS = {
    "factor": rectangular(2.1, 0.021),
    "factor_slope": rectangular(1e-4, 2e-5),
    "celsius": rectangular(80.0, 2.0),
    "transverse": rectangular(0.006, 0.002),
    "biaxiality": rectangular(-0.3, 0.03),
    "misalignment": rectangular(0.0, math.radians(2)),
    "thermal": normal(-30e-6, 5e-6),
    "thermal_slope": exactly(-0.5e-6),
    "scatter": normal(0.0, 7.7e-6),
    "resistance": rectangular(350.0, 0.5),
    "wire": rectangular(2.0, 0.1),
    "wire_drift": rectangular(0.0, 0.002),
    "leak": rectangular(0.5e-9, 0.5e-9),
    "shunt_error": rectangular(0.0, 0.001),
    "gain": rectangular(1.0, 0.001),
    "zero": rectangular(0.0, 2e-6),
    "resolution": rectangular(0.0, 0.5e-6),
    "nonlinearity": rectangular(0.0, 0.2e-6),
    "repeatability": normal(0.0, 1e-6, dof=4),
}


def test_the_budget_is_about_the_planned_strain() -> None:
    assert 1000e-6 == pytest.approx(circuit_budget(PLAN, INPUTS).value)


def test_every_uncertain_input_has_its_part_and_the_largest_stands_first() -> None:
    found = circuit_budget(PLAN, INPUTS)
    uncertain = {name for name, each in INPUTS.items() if each.uncertainty}
    assert uncertain == {part.name for part in found.parts}
    assert "scatter" == found.parts[0].name
    assert 1.0 == pytest.approx(sum(part.share for part in found.parts))


def test_the_budget_agrees_with_its_simulation() -> None:
    found = circuit_budget(PLAN, INPUTS)
    simulated = simulate(strain_model(PLAN, INPUTS), all_inputs(PLAN, INPUTS), draws=200_000)
    assert found.uncertainty == pytest.approx(simulated.uncertainty, rel=0.01)
    assert () == agreement_notices(found, simulated)


def test_a_budget_ruled_by_misalignment_disagrees_and_says_so() -> None:
    inputs = {"misalignment": rectangular(0.0, math.radians(10))}
    found = circuit_budget(PLAN, inputs)
    simulated = simulate(strain_model(PLAN, inputs), all_inputs(PLAN, inputs), draws=50_000)
    assert found.uncertainty == pytest.approx(simulated.uncertainty, rel=0.05)
    assert 1 == len(agreement_notices(found, simulated))


def test_without_uncertain_inputs_nothing_is_uncertain() -> None:
    assert 0.0 == circuit_budget(PLAN, {}).uncertainty


def test_an_input_left_out_counts_as_planned() -> None:
    whole = all_inputs(PLAN, {"factor": normal(2.1, 0.01)})
    assert set(TERMS) == set(whole)
    assert exactly(-0.3) == whole["biaxiality"]


def test_remote_sense_makes_wires_harmless() -> None:
    plan = replace(PLAN, arrangement="full bending", layout="full six-wire", shunt=None)
    inputs = {"wire": rectangular(2.0, 1.0)}
    assert 0.0 == circuit_budget(plan, inputs).uncertainty
    four = replace(plan, layout="full four-wire")
    assert circuit_budget(four, inputs).uncertainty > 0


def test_circuits_that_share_a_lot_and_a_module_are_correlated() -> None:
    alone: dict[str, Estimate] = {"scatter": normal(0.0, 5e-6), "factor": normal(2.1, 0.02)}
    one = circuit_budget(PLAN, alone)
    other = circuit_budget(replace(PLAN, strain=-500e-6), alone)
    r = shared_correlation(one, other, ("factor", "gain"))
    assert -1.0 < r < 0.0
    assert 0.0 == shared_correlation(one, other, ("gain",))
    everything = circuit_budget(PLAN, {"factor": normal(2.1, 0.02)})
    assert 1.0 == pytest.approx(shared_correlation(everything, everything, ("factor",)), abs=1e-3)
    assert 0.0 == shared_correlation(circuit_budget(PLAN, {}), everything, ("factor",))


def test_an_unknown_input_is_named_with_those_there_are() -> None:
    with pytest.raises(OutOfDomain, match=r"input must be one of factor, .*, not weather"):
        circuit_budget(PLAN, {"weather": exactly(1.0)})
