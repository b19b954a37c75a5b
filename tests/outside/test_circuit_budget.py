"""The budget of a circuit held to GTC and to NumPy, each with the reading worked out anew.

The measurement is written again here from its textbook parts, in another order than the
program's: the four arms' resistances first, then the bridge, then the corrections.
"""

from __future__ import annotations

import math
from typing import Any

import GTC
import numpy
import pytest

from gaugelog.physics import circuit_budget as room
from gaugelog.physics import reading
from gaugelog.physics.circuit_budget import (
    all_inputs,
    circuit_budget,
    shared_correlation,
    strain_model,
)
from gaugelog.physics.estimates import normal, rectangular
from gaugelog.physics.montecarlo import simulate
from gaugelog.physics.reading import PlannedCircuit, estimated_strain, expected_reading

CHECKS = (
    room.circuit_budget,
    room.strain_model,
    room.all_inputs,
    room.shared_correlation,
    reading.expected_reading,
    reading.estimated_strain,
)
PLAN = PlannedCircuit(800e-6, 50.0, layout="quarter two-wire", setting=2.1)
SPREADS = {
    "factor": (2.1, 0.012),
    "factor_slope": (1e-4, 1e-5),
    "celsius": (50.0, 1.0),
    "transverse": (0.008, 0.001),
    "biaxiality": (-0.28, 0.02),
    "misalignment": (0.02, 0.005),
    "shear": (0.2, 0.02),
    "thermal": (-25e-6, 4e-6),
    "scatter": (0.0, 5e-6),
    "resistance": (350.0, 0.3),
    "wire": (1.5, 0.05),
    "wire_drift": (0.004, 0.001),
    "leak": (2e-9, 5e-10),
    "gain": (1.0, 0.0006),
    "zero": (0.0, 1e-6),
}
INPUTS = {name: normal(value, u) for name, (value, u) in SPREADS.items()}


def _shown(strain: Any, x: dict[str, Any], cos: Any, sin: Any) -> Any:
    """Textbook chain from surface to display, a two-wire quarter bridge (Dally and Riley)."""
    cosine, sine = cos(x["misalignment"]), sin(x["misalignment"])
    slide = x["shear"] * sine * cosine
    along = strain * (cosine**2 + x["biaxiality"] * sine**2 + slide)
    across = strain * (sine**2 + x["biaxiality"] * cosine**2 - slide)
    sensed = (along + x["transverse"] * across) / (1 - 0.285 * x["transverse"])
    grid, factor = x["resistance"], x["factor"]
    warm = factor * (1 + x["factor_slope"] * (x["celsius"] - 23.0))
    feigned = (
        x["thermal"] * 2.1 / warm
        + x["scatter"]
        + x["wire_drift"] / grid / factor
        - grid * x["leak"] / (1 + grid * x["leak"]) / factor
    )
    change = warm * (sensed + feigned) * grid / (grid + 2 * x["wire"])
    output = (1 + change) / (2 + change) - 1 / 2
    return (4 * output / 2.1 - x["zero"]) / x["gain"]


def _solved(shown: float, x: dict[str, Any], cos: Any, sin: Any) -> Any:
    """The strain that shows so much: two secant steps, the chain being all but straight."""
    low, high = 700e-6, 900e-6
    guess: Any = low
    for _ in range(3):
        below, above = _shown(low, x, cos, sin), _shown(high, x, cos, sin)
        guess = low + (shown - below) * (high - low) / (above - below)
        low, high = guess - 1e-7, guess + 1e-7
    return guess


def _nominal() -> dict[str, Any]:
    return {name: value for name, (value, _) in SPREADS.items()}


def test_a_reading_is_that_of_the_textbook_chain() -> None:
    """Dally and Riley, Wheatstone bridge, lead wires, transverse sensitivity (from memory)."""
    terms = {**PLAN.nominal(), **_nominal()}
    found = expected_reading(PLAN, terms)
    assert _shown(800e-6, _nominal(), math.cos, math.sin) == pytest.approx(found, rel=1e-12)
    assert 800e-6 == pytest.approx(estimated_strain(PLAN, found, terms), rel=1e-12)


def test_the_budget_agrees_with_gtc() -> None:
    """GTC: the textbook chain on uncertain reals, turned round by secants."""
    reals = {name: GTC.ureal(value, u, label=name) for name, (value, u) in SPREADS.items()}
    shown = _shown(800e-6, _nominal(), math.cos, math.sin)
    expected = _solved(shown, reals, GTC.cos, GTC.sin)
    found = circuit_budget(PLAN, INPUTS)
    assert GTC.value(expected) == pytest.approx(found.value, rel=1e-9)
    assert GTC.uncertainty(expected) == pytest.approx(found.linear, rel=1e-5)
    for name, real in reals.items():
        part = found.part(name)
        expected_part = abs(GTC.rp.u_component(expected, real))
        assert expected_part == pytest.approx(
            abs(part.sensitivity) * part.estimate.uncertainty, rel=1e-4, abs=1e-12
        )


def test_the_simulation_agrees_with_numpys_own_draws() -> None:
    """NumPy: the textbook chain on arrays of its own draws, turned round by secants."""
    random = numpy.random.default_rng(101)
    drawn = {name: random.normal(value, u, 200_000) for name, (value, u) in SPREADS.items()}
    shown = _shown(800e-6, _nominal(), math.cos, math.sin)
    expected = _solved(shown, drawn, numpy.cos, numpy.sin)
    found = simulate(strain_model(PLAN, INPUTS), all_inputs(PLAN, INPUTS), draws=200_000)
    assert expected.std() == pytest.approx(found.uncertainty, rel=0.01)
    ends = numpy.quantile(expected, (0.025, 0.975))
    assert list(ends) == pytest.approx([found.low, found.high], abs=0.02 * found.uncertainty)


def test_the_correlation_of_two_circuits_is_gtcs() -> None:
    """GTC, get_correlation of two strains that share one lot's factor and one module's gain."""
    plans = PLAN, PlannedCircuit(-300e-6, 50.0, layout="quarter two-wire", setting=2.1)
    shared = {"factor": GTC.ureal(2.1, 0.012), "gain": GTC.ureal(1.0, 0.001)}
    strains = [
        GTC.ureal(0.0, 5e-6) + plan.strain * shared["gain"] * 2.1 / shared["factor"]
        for plan in plans
    ]
    budgets = [
        circuit_budget(
            plan,
            {
                "factor": normal(2.1, 0.012),
                "gain": normal(1.0, 0.001),
                "scatter": normal(0.0, 5e-6),
            },
        )
        for plan in plans
    ]
    found = shared_correlation(budgets[0], budgets[1], ("factor", "gain"))
    assert GTC.get_correlation(*strains) == pytest.approx(found, abs=2e-3)


def test_one_rectangular_input_gives_the_gums_closed_form() -> None:
    """JCGM 100:2008, 4.3.7: a factor within ±1 % leaves 1 %/√3 of the strain, near enough."""
    found = circuit_budget(PLAN, {"factor": rectangular(2.1, 0.021)})
    assert 0.01 / math.sqrt(3) * 800e-6 == pytest.approx(found.uncertainty, rel=2e-3)
