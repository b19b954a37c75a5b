"""Welded carriers, held to springs solved by NumPy and to SciPy's integrals."""

from __future__ import annotations

import numpy as np
import pytest
from scipy import integrate

from gaugelog.physics import weldable

CHECKS = (
    weldable.spot_joint_stiffness,
    weldable.bond_stiffness,
    weldable.lag_length,
    weldable.carrier_strain,
    weldable.grid_transfer,
    weldable.factor_on_part,
    weldable.transfer_of_sample,
    weldable.grid_transfer_notices,
)
MODULUS, THICKNESS, CARRIER = 200e9, 125e-6, 0.020


def strains_of_spots(spot: float, pitch: float, rows: float) -> tuple[np.ndarray, np.ndarray]:
    """Strain between welds of a strip, as a part of the part's strain: springs solved by NumPy.

    Each weld is a spring from the part, which is moved as x; the strip between welds is one too.
    """
    places = np.arange(-CARRIER / 2 + pitch / 2, CARRIER / 2, pitch)
    stretch = MODULUS * THICKNESS * rows / pitch
    count = len(places)
    matrix = np.diag(np.full(count, spot + 2 * stretch))
    matrix[0, 0] = matrix[-1, -1] = spot + stretch
    matrix -= stretch * (np.eye(count, k=1) + np.eye(count, k=-1))
    moved = np.linalg.solve(matrix, spot * places)
    return (places[1:] + places[:-1]) / 2, np.diff(moved) / pitch


def test_strain_enters_a_strip_as_springs_say() -> None:
    """Discrete welds a twentieth of the lag apart, against the formula's even joint."""
    pitch, rows, spot = 1e-4, 1e-3, 6e5
    joint = weldable.spot_joint_stiffness(spot, pitch, rows)
    lag = weldable.lag_length(joint, MODULUS, THICKNESS)
    places, strains = strains_of_spots(spot, pitch, rows)
    found = weldable.carrier_strain(places, CARRIER, lag)
    assert strains == pytest.approx(found, abs=3e-3)
    inside = abs(places) < 0.003
    expected = strains[inside].mean()
    assert expected == pytest.approx(weldable.grid_transfer(0.006, CARRIER, lag), abs=3e-3)


def test_a_bonded_layer_lags_as_volkersen_says() -> None:
    """scipy.integrate.solve_bvp: E t u″ = (G/h)(u − x), both ends free."""
    joint = weldable.bond_stiffness(20e6, 100e-6)
    lag = weldable.lag_length(joint, MODULUS, THICKNESS)
    places = np.linspace(-CARRIER / 2, CARRIER / 2, 201)
    solved = integrate.solve_bvp(
        lambda x, u: np.vstack([u[1], (20e6 / 100e-6) * (u[0] - x) / (MODULUS * THICKNESS)]),
        lambda left, right: np.array([left[1], right[1]]),
        places,
        np.vstack([places, np.ones_like(places)]),
        tol=1e-8,
    )
    expected = solved.sol(places)[1]
    assert expected == pytest.approx(weldable.carrier_strain(places, CARRIER, lag), abs=1e-6)


@pytest.mark.parametrize("grid", [0.001, 0.006, 0.015, 0.020])
@pytest.mark.parametrize("lag", [0.0005, 0.003, 0.02])
def test_the_grid_shows_the_mean_that_scipy_integrates(grid: float, lag: float) -> None:
    """scipy.integrate.quad over numpy.cosh."""
    area, _ = integrate.quad(
        lambda x: 1 - np.cosh(x / lag) / np.cosh(CARRIER / 2 / lag), -grid / 2, grid / 2
    )
    found = weldable.grid_transfer(grid, CARRIER, lag)
    assert area / grid == pytest.approx(found, abs=1e-9)
    assert (area / grid < 0.99) == bool(weldable.grid_transfer_notices(grid, CARRIER, lag))


def test_sixty_three_per_cent_come_across_in_a_lag_length() -> None:
    """Definition of a decay length: 1 − 1/e."""
    found = weldable.carrier_strain(0.010 - 0.0005, CARRIER, 0.0005)
    assert 1 - np.exp(-1) == pytest.approx(found, abs=1e-9)


def test_a_sample_gives_the_factor_by_its_definition() -> None:
    """ASTM E251 (from memory): the factor is ΔR/R over the strain applied to the sample."""
    change, applied, bare = 2.0 * 940e-6, 1000e-6, 2.0
    transfer = weldable.transfer_of_sample(change / bare, applied)
    assert change / applied == pytest.approx(weldable.factor_on_part(bare, transfer))
