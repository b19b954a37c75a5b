"""Kirsch's field held to its printed edge stresses, to equilibrium, and to the standard's table."""

from __future__ import annotations

import math

import numpy
import pytest
from scipy.integrate import dblquad

from gaugelog.physics import kirsch
from gaugelog.physics.kirsch import (
    TYPE_A,
    kirsch_stress,
    relieved_strain,
    through_hole_coefficients,
)
from tests.outside.cases import case

CHECKS = (kirsch.kirsch_stress, kirsch.relieved_strain, kirsch.through_hole_coefficients)


def test_the_edge_bears_three_times_the_pull() -> None:
    """Kirsch 1898."""
    hole = case("C14-01")
    stress = hole.value("sigma")
    hole.expect("at_90deg", kirsch_stress(stress, 1.0, math.pi / 2, 1.0)[1])
    hole.expect("at_0deg", kirsch_stress(stress, 1.0, 0.0, 1.0)[1])


def test_a_through_hole_has_the_coefficients_of_the_standard() -> None:
    """ASTM E837, 1999 to 2008, through-hole columns for rosette type A (from memory)."""
    table = case("C14-03")
    assert (TYPE_A.near, TYPE_A.far, TYPE_A.width) == tuple(
        table.value(name) for name in ("R1", "R2", "GW")
    )
    wanted = zip(
        table.value("D0_over_D"),
        table.expected["a_bar"]["value"],
        table.expected["b_bar"]["value"],
        strict=True,
    )
    for hole, a_bar, b_bar in wanted:
        found = through_hole_coefficients(hole, TYPE_A, table.value("nu"))
        assert (a_bar, b_bar) == pytest.approx(found, abs=table.expected["a_bar"]["tol_abs"])


def test_the_average_over_the_grid_is_scipys() -> None:
    """SciPy, dblquad of the relieved strain over the rectangle."""
    area = (TYPE_A.far - TYPE_A.near) * TYPE_A.width
    along, across = (
        dblquad(
            lambda y, x, pull=pull: relieved_strain(x, y, pull, 0.2, 0.3),
            TYPE_A.near,
            TYPE_A.far,
            -TYPE_A.width / 2,
            TYPE_A.width / 2,
        )[0]
        / area
        for pull in (0.0, math.pi / 2)
    )
    expected = -(along + across) / 1.3, -(along - across)
    assert expected == pytest.approx(through_hole_coefficients(0.4, TYPE_A, 0.3), rel=1e-9)


def test_the_field_is_in_equilibrium() -> None:
    """NumPy: both equations of equilibrium in polar coordinates, by central differences."""
    step = 1e-4
    for radius in (0.7, 1.2, 3.0):
        for angle in numpy.linspace(0, math.pi, 9):

            def at(r: float, a: float) -> numpy.ndarray:
                return numpy.array(kirsch_stress(1.0, r, a, 0.5))

            radial, around, shear = at(radius, angle)
            by_radius = (at(radius + step, angle) - at(radius - step, angle)) / (2 * step)
            by_angle = (at(radius, angle + step) - at(radius, angle - step)) / (2 * step)
            first = by_radius[0] + by_angle[2] / radius + (radial - around) / radius
            second = by_radius[2] + by_angle[1] / radius + 2 * shear / radius
            assert (0.0, 0.0) == pytest.approx((first, second), abs=1e-6)


def test_relief_of_an_even_pull_falls_with_the_square_of_the_distance() -> None:
    """Timoshenko and Goodier, plate under even pull (from memory): ε = −(1 + ν) (a/r)² cos 2φ."""
    for x, y in ((0.6, 0.0), (0.5, 0.4), (0.3, 0.9)):
        found = relieved_strain(x, y, 0.0, 0.2, 0.3) + relieved_strain(x, y, math.pi / 2, 0.2, 0.3)
        expected = -1.3 * 0.2**2 * (x**2 - y**2) / (x**2 + y**2) ** 2
        assert expected == pytest.approx(found)
