"""Simulations: repeatable, true to each shape, and at odds with a budget where that fails."""

from __future__ import annotations

import math

import numpy
import pytest

from gaugelog.physics._maths import Number, cos
from gaugelog.physics.draws import Sampler, draw
from gaugelog.physics.estimates import (
    Estimate,
    Shape,
    arcsine,
    exactly,
    normal,
    rectangular,
    triangular,
)
from gaugelog.physics.montecarlo import (
    Simulation,
    agreement_notices,
    draw_outputs,
    numerical_tolerance,
    simulate,
)
from gaugelog.physics.uncertainty import budget
from gaugelog.physics.validity import OutOfDomain


def _sum(a: Number, b: Number) -> Number:
    return a + b


TWO = {"a": normal(1.0, 0.3), "b": rectangular(2.0, 0.4)}


def test_a_seed_makes_a_simulation_repeatable() -> None:
    assert simulate(_sum, TWO, draws=2000, seed=5) == simulate(_sum, TWO, draws=2000, seed=5)
    assert simulate(_sum, TWO, draws=2000, seed=5) != simulate(_sum, TWO, draws=2000, seed=6)


def test_a_simulation_of_a_sum_agrees_with_its_budget() -> None:
    simulated, found = simulate(_sum, TWO, draws=200_000), budget(_sum, TWO)
    assert found.value == pytest.approx(simulated.mean, abs=0.005)
    assert found.uncertainty == pytest.approx(simulated.uncertainty, rel=0.01)
    assert () == agreement_notices(found, simulated)


@pytest.mark.parametrize(
    "estimate",
    [normal(3.0, 0.5), rectangular(3.0, 0.5), triangular(3.0, 0.5), arcsine(3.0, 0.5)],
)
def test_draws_have_the_mean_spread_and_kurtosis_of_their_shape(estimate: Estimate) -> None:
    drawn = draw(estimate, numpy.random.default_rng(2), 400_000)
    centred = (drawn - estimate.value) / estimate.uncertainty
    assert 0.0 == pytest.approx(centred.mean(), abs=0.01)
    assert 1.0 == pytest.approx(centred.std(), abs=0.01)
    assert estimate.shape.kurtosis == pytest.approx((centred**4).mean(), rel=0.02)


def test_few_degrees_of_freedom_widen_the_tails() -> None:
    random = numpy.random.default_rng(3)
    few = draw(normal(0.0, 1.0, dof=4), random, 100_000)
    assert 2.776 == pytest.approx(numpy.quantile(few, 0.975), abs=0.06)


def test_correlated_draws_have_their_correlation() -> None:
    inputs = {"a": normal(1.0, 0.3), "b": normal(2.0, 0.4), "c": rectangular(0.0, 1.0)}
    drawn = Sampler(inputs, {("a", "b"): 0.8}).draw(numpy.random.default_rng(4), 200_000)
    found = numpy.corrcoef([drawn[name] for name in "abc"])
    assert 0.8 == pytest.approx(found[0, 1], abs=0.01)
    assert 0.0 == pytest.approx(found[0, 2], abs=0.01)
    assert 0.3 == pytest.approx(drawn["a"].std(), rel=0.01)


def test_fully_correlated_inputs_cancel() -> None:
    inputs = {"a": normal(1.0, 0.3), "b": normal(2.0, 0.3)}
    found = simulate(lambda a, b: a - b, inputs, {("a", "b"): 1.0}, draws=5000)
    assert 0.0 == pytest.approx(found.uncertainty, abs=1e-9)


def test_exact_inputs_are_handed_on_as_they_are() -> None:
    outputs = draw_outputs(_sum, {"a": exactly(1.0), "b": exactly(2.0)}, draws=1000)
    assert [3.0] == list(set(outputs))


def test_a_dominant_rectangle_makes_the_budget_disagree() -> None:
    inputs = {"a": normal(0.0, 1.0), "b": Estimate(0.0, 10.0, Shape.RECTANGULAR)}
    notices = agreement_notices(budget(_sum, inputs), simulate(_sum, inputs, draws=200_000))
    assert "trust the simulation" in notices[0].message


@pytest.mark.parametrize(("scatters", "notices"), [(2.9, 0), (3.1, 1)])
def test_the_scatter_of_a_simulations_ends_is_allowed_for(scatters: float, notices: int) -> None:
    """Its ends scatter by √(p(1 − p)/n)/f, some 2.67 u/√n at 95 % (order statistics)."""
    found = budget(lambda a: a, {"a": normal(0.0, 1.0)})
    half = found.expanded(0.95)
    end = half + 0.05 + scatters * 2.671 / math.sqrt(10_000)
    told = agreement_notices(found, Simulation(0.0, 1.0, -half, end, 0.95, 10_000, 1))
    assert notices == len(told)
    if told:
        assert "-1.96 to 1.96 against -1.96 to 2.09" in told[0].message


def test_a_misaligned_grid_shifts_as_its_budget_says() -> None:
    inputs = {"angle": rectangular(0.0, math.radians(5))}

    def model(angle: Number) -> Number:
        return cos(angle) ** 2

    simulated, found = simulate(model, inputs, draws=100_000), budget(model, inputs)
    assert found.value + found.shift == pytest.approx(simulated.mean, abs=2e-5)
    assert found.uncertainty == pytest.approx(simulated.uncertainty, rel=0.01)


def test_nothing_uncertain_has_no_tolerance() -> None:
    assert 0.0 == numerical_tolerance(0.0)


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: simulate(_sum, TWO, draws=10), "draws must be at least 1000"),
        (lambda: simulate(_sum, TWO, confidence=1.0), "confidence must lie between"),
        (lambda: simulate(_sum, TWO, {("a", "b"): 0.5}), "b must be normal"),
        (lambda: numerical_tolerance(1.0, 7), "digits must be one of"),
        (
            lambda: Sampler(
                {name: normal(0, 1) for name in "abc"},
                {("a", "b"): 0.9, ("b", "c"): 0.9, ("a", "c"): -0.9},
            ),
            "correlations must be possible together",
        ),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
