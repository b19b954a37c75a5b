"""Semiconductor grids, held to handbook curves and to NumPy's roots and SciPy's slopes."""

from __future__ import annotations

import numpy as np
import pytest
from scipy.differentiate import derivative

from gaugelog.physics import semiconductor

CHECKS = (
    semiconductor.factor_at,
    semiconductor.second_order_at,
    semiconductor.semiconductor_change,
    semiconductor.semiconductor_strain,
    semiconductor.slope_at,
    semiconductor.factor_for_prestrain,
    semiconductor.semiconductor_notices,
)
P_DOPED, N_DOPED = (119.5, 4000.0), (-110.0, 10_000.0)
"""Factor and second-order term of the handbooks' two silicon grids (from memory)."""


@pytest.mark.parametrize("grid", [P_DOPED, N_DOPED])
def test_changes_follow_the_handbooks_parabola(grid: tuple[float, float]) -> None:
    """Beckwith and Marangoni: ΔR/R = 119.5 ε + 4000 ε²; n-doped −110 ε + 10 000 ε² (from memory).

    numpy.polynomial computes it.
    """
    strains = np.linspace(-2e-3, 2e-3, 9)
    expected = np.polynomial.Polynomial([0.0, *grid])(strains)
    assert expected == pytest.approx(semiconductor.semiconductor_change(*grid, strains))


@pytest.mark.parametrize("grid", [P_DOPED, N_DOPED])
@pytest.mark.parametrize("change", [-0.2, -1e-4, 1e-4, 0.2])
def test_strain_is_the_root_that_numpy_finds_nearest_to_nothing(
    grid: tuple[float, float], change: float
) -> None:
    factor, second = grid
    roots = np.roots([second, factor, -change])
    expected = roots[np.argmin(abs(roots))].real
    found = semiconductor.semiconductor_strain(factor, second, change)
    assert expected == pytest.approx(found, rel=1e-9)


@pytest.mark.parametrize("grid", [P_DOPED, N_DOPED])
def test_slopes_are_those_scipy_differentiates(grid: tuple[float, float]) -> None:
    """scipy.differentiate.derivative of the parabola, and of its logarithm for the prestrain."""
    factor, second = grid
    slope = derivative(lambda e: factor * e + second * e**2, 1e-3, initial_step=1e-4).df
    assert slope == pytest.approx(semiconductor.slope_at(factor, second, 1e-3))
    relative = derivative(
        lambda e: np.log(1 + factor * e + second * e**2), 1e-3, initial_step=1e-4
    ).df
    found = semiconductor.factor_for_prestrain(factor, second, 1e-3)
    assert relative == pytest.approx(found, rel=1e-6)


def test_the_factor_falls_by_a_third_of_a_per_cent_a_kelvin() -> None:
    """Window and Holister: both terms go with T₀/T, so −1/298 a kelvin at 25 °C (from memory)."""
    ratio = semiconductor.factor_at(120.0, 26.0) / 120.0
    assert -0.00335 == pytest.approx(ratio - 1, abs=2e-5)
    squared = semiconductor.second_order_at(4000.0, 26.0) / 4000.0
    assert -0.0067 == pytest.approx(squared - 1, abs=4e-5)
    assert 240.0 == pytest.approx(semiconductor.factor_at(120.0, -273.15 + 298.15 / 2))


def test_the_limits_are_those_of_use() -> None:
    """Common practice: 3000 µm/m, and −50 to 150 °C for bonded silicon (from memory)."""
    assert () == semiconductor.semiconductor_notices(*P_DOPED, 0.003, 150.0)
    assert 1 == len(semiconductor.semiconductor_notices(*P_DOPED, 0.0031, 150.0))
    assert 1 == len(semiconductor.semiconductor_notices(*P_DOPED, 0.003, 151.0))
