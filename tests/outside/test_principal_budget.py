"""Budgets of principal strains held to GTC, and to NumPy's eigenvalues of drawn states."""

from __future__ import annotations

from math import pi

import GTC
import numpy
import pytest

from gaugelog.physics import principal_budget
from gaugelog.physics.circuit_budget import circuit_budget
from gaugelog.physics.estimates import normal
from gaugelog.physics.principal_budget import (
    direction_model,
    grid_names,
    principal_budgets,
    principal_budgets_notices,
    principal_model,
    rosette_correlations,
    rosette_estimates,
)
from gaugelog.physics.reading import PlannedCircuit

CHECKS = (
    principal_budget.grid_names,
    principal_budget.principal_budgets,
    principal_budget.principal_model,
    principal_budget.direction_model,
    principal_budget.rosette_correlations,
    principal_budget.rosette_estimates,
    principal_budget.principal_budgets_notices,
)
ANGLES = (0.0, pi / 4, pi / 2)
VALUES, SPREADS = (400e-6, 300e-6, -200e-6), (3e-6, 2e-6, 4e-6)
R = {(0, 1): 0.6, (0, 2): -0.3, (1, 2): 0.2}
PAIRS = {(f"grid {i + 1}", f"grid {j + 1}"): r for (i, j), r in R.items()}
STRAINS = [normal(value, u) for value, u in zip(VALUES, SPREADS, strict=True)]


def test_principal_budgets_agree_with_gtc() -> None:
    """GTC: the printed formulas of ASTM E1561 on three correlated uncertain reals."""
    one, two, three = (
        GTC.ureal(value, u, independent=False) for value, u in zip(VALUES, SPREADS, strict=True)
    )
    reals = (one, two, three)
    for (i, j), r in R.items():
        GTC.set_correlation(r, reals[i], reals[j])
    mean, shear = (one + three) / 2, 2 * two - one - three
    radius = GTC.sqrt((one - three) ** 2 + shear**2) / 2
    angle = GTC.atan2(shear, one - three) / 2
    found = principal_budgets(STRAINS, ANGLES, PAIRS)
    assert found.angle is not None
    for expected, ours in (
        (mean + radius, found.largest),
        (mean - radius, found.smallest),
        (radius, found.radius),
        (angle, found.angle),
    ):
        assert GTC.value(expected) == pytest.approx(ours.value)
        assert GTC.uncertainty(expected) == pytest.approx(ours.linear, rel=1e-8)


def test_the_models_are_numpys_eigenvalues_of_each_drawn_state() -> None:
    """NumPy, linalg.eigh of 2000 states drawn about the planned one."""
    random = numpy.random.default_rng(1561)
    one, two, three = random.normal(VALUES, 30e-6, (2000, 3)).T
    half = (2 * two - one - three) / 2
    tensors = numpy.stack([numpy.stack([one, half], -1), numpy.stack([half, three], -1)], -1)
    values, vectors = numpy.linalg.eigh(tensors)
    grids = dict(zip(grid_names(3), (one, two, three), strict=True))
    assert numpy.allclose(values[:, 1], principal_model(ANGLES, "largest")(**grids), atol=1e-12)
    assert numpy.allclose(values[:, 0], principal_model(ANGLES, "smallest")(**grids), atol=1e-12)
    radius = principal_model(ANGLES, "radius")(**grids)
    assert numpy.allclose((values[:, 1] - values[:, 0]) / 2, radius, atol=1e-12)
    direction = numpy.arctan2(vectors[:, 1, 1], vectors[:, 0, 1])
    turn = (direction_model(ANGLES, 0.3)(**grids) - direction + pi / 2) % pi - pi / 2
    assert 1e-9 > numpy.abs(turn).max()


def test_grids_that_share_a_factor_are_correlated_as_gtc_has_it() -> None:
    """GTC, get_correlation of three strains with one factor in common and a scatter each."""
    factor = GTC.ureal(2.1, 0.02)
    strains = [GTC.ureal(0.0, 4e-6) + value * 2.1 / factor for value in VALUES]
    inputs = {"factor": normal(2.1, 0.02), "scatter": normal(0.0, 4e-6)}
    budgets = [circuit_budget(PlannedCircuit(value, 23.0, setting=2.1), inputs) for value in VALUES]
    found = rosette_correlations(budgets, ("factor",))
    for (i, j), pair in zip(R, PAIRS, strict=True):
        assert GTC.get_correlation(strains[i], strains[j]) == pytest.approx(found[pair], abs=2e-3)
    for strain, estimate in zip(strains, rosette_estimates(budgets), strict=True):
        assert GTC.uncertainty(strain) == pytest.approx(estimate.uncertainty, rel=2e-3)


def test_a_circle_within_its_uncertainty_reads_too_large() -> None:
    """NumPy: the mean of drawn radii lies far above the planned one, so a notice is due."""
    planned = (101e-6, 100e-6, 99e-6)
    strains = [normal(value, 5e-6) for value in planned]
    found = principal_budgets(strains, ANGLES)
    drawn = numpy.random.default_rng(2).normal(planned, 5e-6, (20_000, 3)).T
    radius = numpy.hypot(drawn[0] - drawn[2], 2 * drawn[1] - drawn[0] - drawn[2]) / 2
    assert radius.mean() > 2 * found.radius.value
    assert 1 == len(principal_budgets_notices(found))
