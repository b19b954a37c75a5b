"""A grid beside a hole, held to Airy's stress function and to SciPy's integrals."""

from __future__ import annotations

import numpy as np
import pytest
from scipy import integrate

from gaugelog.physics import holeedge

CHECKS = (holeedge.hole_edge_strain, holeedge.hole_edge_average, holeedge.hole_grid_average)


def airy(x: float, y: float, radius: float) -> float:
    """Airy's stress function of the pulled plate with a hole, unit stress along x.

    Timoshenko and Goodier, Theory of Elasticity (from memory): r²/4 − a² ln(r)/2
    − (r²/4 − a²/2 + a⁴/(4r²)) cos 2θ.
    """
    square = x * x + y * y
    double = (x * x - y * y) / square
    straight = square / 4 - radius**2 * np.log(square) / 4
    turning = square / 4 - radius**2 / 2 + radius**4 / (4 * square)
    return float(straight - turning * double)


def strain_along(x: float, y: float, radius: float, poisson: float) -> float:
    """Strain along x by second differences: σx = ∂²φ/∂y², σy = ∂²φ/∂x²."""
    step = 1e-3 * radius
    middle = airy(x, y, radius)
    along = airy(x, y + step, radius) + airy(x, y - step, radius) - 2 * middle
    across = airy(x + step, y, radius) + airy(x - step, y, radius) - 2 * middle
    return (along - poisson * across) / step**2


@pytest.mark.parametrize("distance", [0.0, 0.1, 0.5, 1.0, 4.0])
@pytest.mark.parametrize("poisson", [0.0, 0.285, 0.5])
def test_strain_beside_a_hole_is_that_of_airys_function(distance: float, poisson: float) -> None:
    expected = strain_along(0.0, 1.0 + distance, 1.0, poisson) / 3
    assert expected == pytest.approx(holeedge.hole_edge_strain(1.0, distance, poisson), abs=2e-5)


def test_stress_falls_from_the_edge_as_the_textbook_says() -> None:
    """Timoshenko and Goodier: 3, 1.22 and 1.07 σ at 1, 2 and 3 radii (from memory).

    Without lateral contraction (ν = 0) strain goes as that stress.
    """
    for distance, factor in ((0.0, 3.0), (1.0, 1.22), (2.0, 1.07)):
        found = 3 * holeedge.hole_edge_strain(1.0, distance, 0.0)
        assert factor == pytest.approx(found, abs=0.006)


@pytest.mark.parametrize(("near", "width"), [(0.0, 0.2), (0.1, 0.3), (0.5, 2.0)])
def test_the_mean_over_the_width_is_scipys_integral(near: float, width: float) -> None:
    """scipy.integrate.quad of the strain from Airy's function."""
    area, _ = integrate.quad(
        lambda y: strain_along(0.0, y, 1.0, 0.3), 1 + near, 1 + near + width, epsabs=1e-6
    )
    found = holeedge.hole_edge_average(1.0, near, width, 0.3)
    assert area / width / 3 == pytest.approx(found, abs=2e-5)


@pytest.mark.parametrize("length", [0.3, 1.0, 2.5])
def test_the_mean_over_the_whole_grid_is_scipys_integral(length: float) -> None:
    """scipy.integrate.dblquad of the strain from Airy's function."""
    area, _ = integrate.dblquad(
        lambda x, y: strain_along(x, y, 1.0, 0.3),
        1.05,
        1.45,
        -length / 2,
        length / 2,
        epsabs=1e-5,
    )
    found = holeedge.hole_grid_average(1.0, 0.05, 0.4, length, 0.3)
    assert area / (0.4 * length) / 3 == pytest.approx(found, abs=5e-5)
