"""Curved surfaces, held to lengths of arcs and to Hooke's law solved by NumPy."""

from __future__ import annotations

import numpy as np
import pytest

from gaugelog.physics import curvature
from gaugelog.physics.curvature import Layer

CHECKS = (
    curvature.bonding_strain,
    curvature.layer_growth,
    curvature.curved_thermal_strain,
    curvature.height_over_curved,
    curvature.bonding_strain_notices,
)
LAYERS = (Layer(25e-6, 80e-6, 0.35), Layer(30e-6, 40e-6, 0.34))
STEEL = 12e-6


def arc(radius: float, angle: float = 0.3) -> float:
    """Length of an arc, by adding up short chords with NumPy."""
    angles = np.linspace(0, angle, 20_001)
    points = radius * np.array([np.cos(angles), np.sin(angles)])
    return float(np.hypot(*np.diff(points)).sum())


@pytest.mark.parametrize("radius", [0.002, 0.010, 0.5])
def test_bending_stretches_what_lies_outside_the_neutral_line(radius: float) -> None:
    height = 15e-6
    expected = arc(radius + height) / arc(radius) - 1
    assert expected == pytest.approx(curvature.bonding_strain(radius, height), rel=1e-6)
    noticed = bool(curvature.bonding_strain_notices(radius, height))
    assert (expected > 0.005) == noticed


def growth_by_hookes_law(layer: Layer, rise: float) -> float:
    """Thickness strain of a layer held to the part's expansion: six unknowns, by NumPy."""
    modulus, ratio = 3e9, layer.poisson
    compliance = (np.eye(3) * (1 + ratio) - ratio) / modulus
    # Unknown: the two stresses along the surface and the strain across; none presses across.
    matrix = np.column_stack([compliance[:, 0], compliance[:, 1], [0.0, 0.0, -1.0]])
    held = np.array([STEEL, STEEL, 0.0]) * rise
    return float(np.linalg.solve(matrix, held - layer.expansion * rise)[2])


@pytest.mark.parametrize("layer", LAYERS)
def test_a_held_layer_grows_as_hookes_law_says(layer: Layer) -> None:
    expected = layer.thickness * growth_by_hookes_law(layer, 50.0)
    assert expected == pytest.approx(curvature.layer_growth(layer, STEEL, 50.0))


def test_curvature_adds_the_thermal_output_of_the_longer_arc() -> None:
    """The arc under the grid, before and after its layers have grown by Hooke's law."""
    radius, rise = 0.005, 50.0
    under = radius + sum(layer.thickness for layer in LAYERS)
    grown = sum(layer.thickness * growth_by_hookes_law(layer, rise) for layer in LAYERS)
    expected = (arc(under + grown) - arc(under)) / arc(radius)
    found = curvature.curved_thermal_strain(radius, LAYERS, STEEL, rise)
    assert expected == pytest.approx(found, rel=1e-5)


def test_a_grid_above_a_swelling_pipe_shows_the_strain_of_its_own_circle() -> None:
    """Geometry: arcs of concentric circles, each longer by the same displacement."""
    height, radius, moved = 1e-4, 0.005, 1e-6
    shown = arc(radius + height + moved) / arc(radius + height) - 1
    surface = arc(radius + moved) / arc(radius) - 1
    found = curvature.height_over_curved(radius, height)
    assert shown / surface == pytest.approx(found, rel=1e-6)
