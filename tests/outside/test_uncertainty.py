"""Budgets held to the GUM's end gauge, and to GTC over random models of this room's formulas."""

from __future__ import annotations

import math
from collections.abc import Callable

import GTC
import numpy
import pytest

from gaugelog.physics import uncertainty
from gaugelog.physics._maths import Number
from gaugelog.physics.estimates import Estimate, normal
from gaugelog.physics.uncertainty import budget, checked_correlations, effective_dof
from tests.outside.cases import Case, case

CHECKS = (
    uncertainty.budget,
    uncertainty.effective_dof,
    uncertainty.checked_correlations,
)


def _length(
    ls: Number, d: Number, alpha: Number, theta: Number, dalpha: Number, dtheta: Number
) -> Number:
    return ls + d - ls * (dalpha * theta + alpha * dtheta)


def _gauge_block(block: Case) -> dict[str, Estimate]:
    u_d = math.hypot(*block.value("u_d"))
    parts = zip(block.value("u_d"), block.value("nu_d"), strict=True)
    nu_d = u_d**4 / sum(u**4 / nu for u, nu in parts)
    return {
        "ls": normal(block.value("ls"), block.value("u_ls"), block.value("nu_ls")),
        "d": normal(block.value("d"), u_d, nu_d),
        "alpha": normal(block.value("alpha_s") * 1e-6, block.value("u_alpha") * 1e-6),
        "theta": normal(block.value("theta"), block.value("u_theta")),
        "dalpha": normal(0.0, block.value("u_dalpha") * 1e-6, block.value("nu_dalpha")),
        "dtheta": normal(0.0, block.value("u_dtheta"), block.value("nu_dtheta")),
    }


def test_the_end_gauge_has_the_printed_budget() -> None:
    """JCGM 100:2008, H.1."""
    block = case("C13-01")
    found = budget(_length, _gauge_block(block))
    block.expect("l", found.value)
    block.expect("u_c", found.uncertainty)
    block.expect("nu_eff", math.floor(found.dof))
    block.expect("k99", found.coverage(0.99))
    block.expect("U99", found.expanded(0.99))


def test_the_end_gauges_parts_are_those_printed() -> None:
    """JCGM 100:2008, table H.1: 25, 9.7, 2.9 and 16.6 nm (16.675 is printed cut, not rounded)."""
    found = budget(_length, _gauge_block(case("C13-01")))
    for name, printed in (("ls", 25.0), ("d", 9.7), ("dalpha", 2.9), ("dtheta", 16.6)):
        assert printed == pytest.approx(found.part(name).contribution, abs=0.08)


def test_effective_freedom_is_that_of_the_printed_example() -> None:
    """JCGM 100:2008, G.4.1, example: parts of 0.25, 0.57 and 0.82 % with 9, 4, 14 give 19.0."""
    assert 19.0 == pytest.approx(effective_dof([(0.25, 9), (0.57, 4), (0.82, 14)]), abs=0.05)


MODELS: tuple[Callable[..., Number], ...] = (
    lambda a, b, c: a * b / c,
    lambda a, b, c: a**2 - b / (a + c),
    lambda a, b, c: (a - b) / (1 + c * a),
    lambda a, b, c: a / (a + b) - c / (b + c),
)


@pytest.mark.parametrize("index", range(len(MODELS)))
def test_budgets_agree_with_gtc(index: int) -> None:
    """GTC: the same models on uncertain reals, with degrees of freedom."""
    model = MODELS[index]
    random = numpy.random.default_rng(index)
    for _ in range(50):
        values, spreads = random.uniform(1, 5, 3), random.uniform(0.001, 0.01, 3)
        freedom = random.integers(3, 40, 3)
        expected = model(*(GTC.ureal(*row) for row in zip(values, spreads, freedom, strict=True)))
        inputs = {
            name: normal(float(value), float(u), float(dof))
            for name, value, u, dof in zip("abc", values, spreads, freedom, strict=True)
        }
        found = budget(model, inputs)
        assert expected.x == pytest.approx(found.value, rel=1e-12)
        assert expected.u == pytest.approx(found.linear, rel=1e-9)
        assert expected.df == pytest.approx(found.dof, rel=1e-2)


@pytest.mark.parametrize("index", range(len(MODELS)))
def test_correlated_budgets_agree_with_gtc(index: int) -> None:
    """GTC: two of three inputs correlated."""
    model = MODELS[index]
    random = numpy.random.default_rng(100 + index)
    for _ in range(50):
        values, spreads = random.uniform(1, 5, 3), random.uniform(0.001, 0.01, 3)
        r = float(random.uniform(-1, 1))
        reals = [
            GTC.ureal(float(x), float(u), independent=False)
            for x, u in zip(values, spreads, strict=True)
        ]
        GTC.set_correlation(r, reals[0], reals[2])
        inputs = {
            name: normal(float(x), float(u))
            for name, x, u in zip("abc", values, spreads, strict=True)
        }
        found = budget(model, inputs, {("a", "c"): r})
        assert GTC.uncertainty(model(*reals)) == pytest.approx(found.linear, rel=1e-8, abs=1e-12)


def test_curvature_counts_as_the_gum_adds_higher_terms() -> None:
    """JCGM 100:2008, 5.1.2, note: ½ (∂²f/∂x²)² u⁴ for a normal input."""
    found = budget(lambda x: x**2, {"x": normal(1.0, 0.3)})
    assert (2 * 0.3) ** 2 + 0.5 * 2**2 * 0.3**4 == pytest.approx(found.uncertainty**2)
    assert 0.3**2 == pytest.approx(found.shift)


def test_correlations_are_kept_by_unordered_pair() -> None:
    """JCGM 100:2008, 5.2.2: r(xi, xj) = r(xj, xi)."""
    inputs = {"a": normal(1, 1), "b": normal(1, 1)}
    assert checked_correlations(inputs, {("a", "b"): 0.3}) == checked_correlations(
        inputs, {("b", "a"): 0.3}
    )
