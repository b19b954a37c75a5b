"""Stiffening, held to fibres summed by NumPy and to a textbook beam."""

from __future__ import annotations

import numpy as np
import pytest
from scipy import optimize

from gaugelog.physics import stiffening

CHECKS = (
    stiffening.held_tension_share,
    stiffening.free_tension_share,
    stiffening.bending_share,
    stiffening.height_share,
    stiffening.surface_strain,
    stiffening.thinnest_part,
    stiffening.held_tension_share_notices,
)
LAYUPS = [(3e9, 1e-3, 4e9, 60e-6), (206e9, 2e-3, 3e9, 100e-6), (70e9, 2e-4, 20e9, 80e-6)]
FIBRES = 4000


def fibres(layup: tuple[float, float, float, float]) -> tuple[np.ndarray, np.ndarray]:
    """Heights above the part's middle, and stiffness (E times thickness) of each fibre."""
    modulus, thickness, layer, depth = layup
    part = (np.arange(FIBRES) + 0.5) / FIBRES * thickness - thickness / 2
    above = (np.arange(FIBRES) + 0.5) / FIBRES * depth + thickness / 2
    stiffness = np.concatenate(
        [
            np.full(FIBRES, modulus * thickness / FIBRES),
            np.full(FIBRES, layer * depth / FIBRES),
        ]
    )
    return np.concatenate([part, above]), stiffness


def response(
    layup: tuple[float, float, float, float], force: float, moment: float
) -> tuple[float, float]:
    """Strain at the part's middle and curvature, by equilibrium of the fibres (NumPy)."""
    height, stiffness = fibres(layup)
    first = stiffness @ height
    matrix = np.array([[stiffness.sum(), first], [first, stiffness @ height**2]])
    middle, curvature = np.linalg.solve(matrix, [force, moment])
    return float(middle), float(curvature)


@pytest.mark.parametrize("layup", LAYUPS)
def test_a_pulled_strip_is_stiffened_as_its_fibres_say(
    layup: tuple[float, float, float, float],
) -> None:
    modulus, thickness, _, depth = layup
    middle, curvature = response(layup, modulus * thickness, 0.0)
    expected = middle + curvature * (thickness + depth) / 2
    assert expected == pytest.approx(stiffening.free_tension_share(*layup), rel=1e-6)
    _, stiffness = fibres(layup)
    straight = modulus * thickness / stiffness.sum()
    assert straight == pytest.approx(stiffening.held_tension_share(*layup))
    noticed = bool(stiffening.held_tension_share_notices(*layup))
    assert (straight < 0.99) == noticed


@pytest.mark.parametrize("layup", LAYUPS)
def test_a_bent_strip_is_stiffened_as_its_fibres_say(
    layup: tuple[float, float, float, float],
) -> None:
    modulus, thickness, _, depth = layup
    moment = modulus * thickness**2 / 6  # strains the bare surface by 1
    middle, curvature = response(layup, 0.0, moment)
    expected = middle + curvature * (thickness + depth) / 2
    assert expected == pytest.approx(stiffening.bending_share(*layup), rel=1e-6)


def test_equal_layers_make_a_strip_twice_as_thick() -> None:
    """Timoshenko, Strength of Materials: bending stiffness goes with the cube (from memory).

    The layer's middle lies t/2 off the new middle, as the bare surface did: 1/8 of its strain.
    """
    assert 1 / 8 == pytest.approx(stiffening.bending_share(1e9, 1e-3, 1e9, 1e-3))


@pytest.mark.parametrize("height", [10e-6, 50e-6, 200e-6])
def test_height_above_a_bent_surface_is_similar_triangles(height: float) -> None:
    """numpy.interp through middle and surface, continued: plane sections stay plane."""
    line = np.polyfit([0.0, 0.0005], [0.0, 1e-3], 1)
    shown = float(np.polyval(line, 0.0005 + height))
    assert shown / 1e-3 == pytest.approx(stiffening.height_share(0.001, height))
    assert 1e-3 == pytest.approx(stiffening.surface_strain(shown, 0.001, height))


def test_the_thinnest_part_is_where_scipy_finds_the_loss() -> None:
    """scipy.optimize.brentq on springs side by side."""
    expected = optimize.brentq(
        lambda t: 1 - 3e9 * t / (3e9 * t + 4e9 * 60e-6) - 0.02, 1e-5, 1.0, xtol=1e-15
    )
    assert expected == pytest.approx(stiffening.thinnest_part(3e9, 4e9, 60e-6, 0.02), rel=1e-9)
