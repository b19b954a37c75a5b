"""Simulations held to the worked examples of JCGM 101 and to SciPy's distributions."""

from __future__ import annotations

import numpy
import pytest
from scipy import stats

from gaugelog.physics import draws, montecarlo
from gaugelog.physics._maths import Number
from gaugelog.physics.draws import draw
from gaugelog.physics.estimates import Estimate, Shape, arcsine, normal, rectangular, triangular
from gaugelog.physics.montecarlo import (
    agreement_notices,
    draw_outputs,
    numerical_tolerance,
    simulate,
)
from gaugelog.physics.uncertainty import budget
from tests.outside.cases import Case, case

CHECKS = (
    montecarlo.simulate,
    montecarlo.draw_outputs,
    montecarlo.numerical_tolerance,
    montecarlo.agreement_notices,
    draws.draw,
)
SHAPES = {"normal": Shape.NORMAL, "rectangular": Shape.RECTANGULAR}


def _four(a: Number, b: Number, c: Number, d: Number) -> Number:
    return a + b + c + d


def _inputs(additive: Case) -> dict[str, Estimate]:
    shape = SHAPES[additive.value("kind")]
    return {
        name: Estimate(0.0, u, shape) for name, u in zip("abcd", additive.value("sd"), strict=True)
    }


def test_four_normal_inputs_add_up_as_jcgm_101_prints() -> None:
    """JCGM 101:2008, 9.2.2 (from memory)."""
    additive = case("C13-06")
    found = simulate(_four, _inputs(additive), draws=4_000_000)
    additive.expect("u", found.uncertainty)
    additive.expect("low", found.low)
    additive.expect("high", found.high)


def test_one_dominant_rectangle_gives_the_printed_interval_and_a_warning() -> None:
    """JCGM 101:2008, 9.2.4 (from memory): the GUM's interval is not validated."""
    additive = case("C13-08")
    inputs = _inputs(additive)
    simulated, found = simulate(_four, inputs), budget(_four, inputs)
    additive.expect("u", simulated.uncertainty)
    additive.expect("low", simulated.low)
    additive.expect("high", simulated.high)
    additive.expect("GUF_half_width", found.expanded(0.95))
    assert 1 == len(agreement_notices(found, simulated))


def test_a_weight_in_air_is_calibrated_as_jcgm_101_prints() -> None:
    """JCGM 101:2008, 9.3 (from memory): 0.0539 mg by first order, 0.0754 mg by simulation."""

    def mass(m: Number, dm: Number, air: Number, weight: Number, reference: Number) -> Number:
        return (m + dm) * (1 + (air - 1.2) * (1 / weight - 1 / reference)) - 100_000

    inputs = {
        "m": normal(100_000.0, 0.050),
        "dm": normal(1.234, 0.020),
        "air": rectangular(1.20, 0.10),
        "weight": rectangular(8000.0, 1000.0),
        "reference": rectangular(8000.0, 50.0),
    }
    found, simulated = budget(mass, inputs), simulate(mass, inputs)
    assert 0.0539 == pytest.approx(found.uncertainty, abs=5e-5)
    assert 0.0754 == pytest.approx(simulated.uncertainty, abs=3e-4)
    assert (1.0834, 1.3825) == pytest.approx((simulated.low, simulated.high), abs=2e-3)
    assert 1 == len(agreement_notices(found, simulated))


@pytest.mark.parametrize(
    ("estimate", "wanted"),
    [
        (normal(2.0, 0.5), stats.norm(2.0, 0.5)),
        (normal(2.0, 0.5, dof=5), stats.t(5, 2.0, 0.5)),
        (rectangular(2.0, 0.5), stats.uniform(1.5, 1.0)),
        (triangular(2.0, 0.5), stats.triang(0.5, 1.5, 1.0)),
        (arcsine(2.0, 0.5), stats.arcsine(1.5, 1.0)),
    ],
)
def test_draws_follow_scipys_distributions(estimate: Estimate, wanted: object) -> None:
    """SciPy, Kolmogorov–Smirnov test of 20 000 draws."""
    drawn = draw(estimate, numpy.random.default_rng(9), 20_000)
    assert stats.kstest(drawn, wanted.cdf).pvalue > 0.01  # type: ignore[attr-defined]


def test_the_outputs_of_a_quotient_follow_scipys_ratio() -> None:
    """SciPy, stats.cauchy: the quotient of two standard normal values."""
    outputs = draw_outputs(
        lambda a, b: a / b, {"a": normal(0, 1), "b": normal(0, 1)}, draws=20_000, seed=4
    )
    assert stats.kstest(outputs, stats.cauchy().cdf).pvalue > 0.01


def test_tolerances_are_those_printed() -> None:
    """JCGM 101:2008, 7.9.2, examples: 0.000 35 g and 2 K (from memory)."""
    assert 0.000_005 == pytest.approx(numerical_tolerance(0.000_35, digits=2))
    assert 0.5 == numerical_tolerance(2.0, digits=1)
