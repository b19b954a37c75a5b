"""Hole drilling held to the form of the standard, NumPy's eigenvalues and a drilled plate."""

from __future__ import annotations

import math

import numpy
import pytest

from gaugelog.physics import holedrill
from gaugelog.physics.holedrill import (
    combination_strains,
    eccentricity_notices,
    hole_size_notices,
    near_yield_notices,
    uniform_stress,
)
from gaugelog.physics.kirsch import TYPE_A, relieved_strain, through_hole_coefficients
from tests.outside.cases import case

CHECKS = (
    holedrill.combination_strains,
    holedrill.uniform_stress,
    holedrill.eccentricity_notices,
    holedrill.hole_size_notices,
    holedrill.near_yield_notices,
)


def test_three_strains_give_the_stresses_of_the_standards_form() -> None:
    """ASTM E837, uniform stress (from memory)."""
    hole = case("C14-05")
    e1, e2, e3 = (hole.value(name) * 1e-6 for name in ("e1", "e2", "e3"))
    found = uniform_stress(
        e1,
        e2,
        e3,
        hole.value("a_bar"),
        hole.value("b_bar"),
        hole.value("E") * 1e9,
        hole.value("nu"),
    )
    hole.expect("P", found.mean * 1e-6)
    hole.expect("Q", found.difference * 1e-6)
    hole.expect("T", found.shear * 1e-6)
    hole.expect("s_max", found.largest * 1e-6)
    hole.expect("s_min", found.smallest * 1e-6)


def test_combination_strains_solve_the_three_equations_of_the_grids() -> None:
    """NumPy, linalg.solve: ε1 = p − q, ε3 = p + q, ε2 = p − t."""
    strains = numpy.array([-180e-6, -150e-6, -60e-6])
    equations = numpy.array([[1.0, -1.0, 0.0], [1.0, 0.0, -1.0], [1.0, 1.0, 0.0]])
    expected = numpy.linalg.solve(equations, strains)
    assert list(expected) == pytest.approx(combination_strains(*strains))


def test_principal_stresses_and_direction_are_numpys_eigenvalues() -> None:
    """NumPy, linalg.eigh of a random stress; its relief drilled by Kirsch's field over the grids.

    Axes lie along grid 1 and towards the line of grid 2; each grid is seen along itself.
    """
    random = numpy.random.default_rng(837)
    a_bar, b_bar = through_hole_coefficients(0.4, TYPE_A, 0.3)
    for _ in range(50):
        sxx, syy, sxy = random.normal(0, 1e8, 3)
        values, vectors = numpy.linalg.eigh(numpy.array([[sxx, sxy], [sxy, syy]]))
        direction = math.atan2(vectors[1, 1], vectors[0, 1])
        e1, e2, e3 = (
            sum(
                stress / 200e9 * _drilled(direction + turn - grid)
                for stress, turn in ((values[1], 0.0), (values[0], math.pi / 2))
            )
            for grid in (0.0, math.pi / 4, math.pi / 2)
        )
        found = uniform_stress(e1, e2, e3, a_bar, b_bar, 200e9, 0.3)
        assert values[1] == pytest.approx(found.largest, abs=2e4)
        assert values[0] == pytest.approx(found.smallest, abs=2e4)
        assert found.angle is not None
        turn = (found.angle - direction + math.pi / 2) % math.pi - math.pi / 2
        assert 0.0 == pytest.approx(turn, abs=1e-3)


def _drilled(pull: float) -> float:
    """Relief of a grid of type A by a pull at an angle to it, averaged by a fine midpoint rule."""
    count = 60
    steps = (numpy.arange(count) + 0.5) / count
    x = TYPE_A.near + (TYPE_A.far - TYPE_A.near) * steps
    y = TYPE_A.width * (steps - 0.5)
    return float(relieved_strain(x[:, None], y[None, :], pull, 0.2, 0.3).mean())


def test_the_warnings_stand_where_the_standard_draws_them() -> None:
    """ASTM E837 (from memory): centred to 0.004 D, 0.3 to 0.5 D, 80 % and 50 % of yield."""
    assert () == eccentricity_notices(0.0039, 1.0)
    assert eccentricity_notices(0.0041, 1.0)
    assert () == hole_size_notices(0.3, 1.0) + hole_size_notices(0.5, 1.0)
    assert hole_size_notices(0.29, 1.0)
    assert hole_size_notices(0.51, 1.0)
    stress = uniform_stress(-180e-6, -150e-6, -60e-6, 0.158, 0.454, 200e9, 0.3)
    assert () == near_yield_notices(stress, stress.largest / 0.79)
    assert near_yield_notices(stress, stress.largest / 0.81)
    assert () == near_yield_notices(stress, stress.largest / 0.49, through=True)
    assert near_yield_notices(stress, stress.largest / 0.51, through=True)
