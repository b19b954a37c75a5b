"""Curved surfaces: flat ones do nothing, hollow ones the opposite of convex ones."""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from uncertainties import ufloat

from gaugelog.physics import curvature
from gaugelog.physics.curvature import Layer
from gaugelog.physics.validity import OutOfDomain
from tests.physics.kinds import assert_takes_every_kind

RADIUS = st.floats(1e-3, 10.0)
HEIGHT = st.floats(0.0, 2e-4)
RISE = st.floats(-100.0, 100.0)
ADHESIVE = Layer(25e-6, 80e-6, 0.35)
BACKING = Layer(30e-6, 40e-6, 0.34)


@given(HEIGHT, RISE)
def test_a_flat_surface_does_nothing(height: float, rise: float) -> None:
    assert 0.0 == curvature.bonding_strain(math.inf, height)
    assert 0.0 == curvature.curved_thermal_strain(math.inf, (ADHESIVE, BACKING), 12e-6, rise)
    assert 1.0 == curvature.height_over_curved(math.inf, height)


@given(RADIUS, HEIGHT, RISE)
def test_a_hollow_surface_does_the_opposite(radius: float, height: float, rise: float) -> None:
    convex = curvature.bonding_strain(radius, height)
    assert -convex == curvature.bonding_strain(-radius, height)
    warm = curvature.curved_thermal_strain(radius, (ADHESIVE,), 12e-6, rise)
    assert -warm == curvature.curved_thermal_strain(-radius, (ADHESIVE,), 12e-6, rise)


@given(RISE)
def test_layers_under_a_grid_add_up(rise: float) -> None:
    both = curvature.curved_thermal_strain(0.005, (ADHESIVE, BACKING), 12e-6, rise)
    parts = [
        curvature.curved_thermal_strain(0.005, (each,), 12e-6, rise) for each in (ADHESIVE, BACKING)
    ]
    assert sum(parts) == pytest.approx(both)


@given(st.floats(0.0, 0.49), RISE)
def test_a_layer_that_expands_like_the_part_grows_freely(poisson: float, rise: float) -> None:
    found = curvature.layer_growth(Layer(1e-4, 12e-6, poisson), 12e-6, rise)
    assert 1e-4 * 12e-6 * rise == pytest.approx(found)


@given(RADIUS, HEIGHT)
def test_above_a_swelling_pipe_a_grid_shows_less(radius: float, height: float) -> None:
    found = curvature.height_over_curved(radius, height)
    assert radius / (radius + height) == pytest.approx(found)


def test_a_small_radius_is_noticed() -> None:
    assert () == curvature.bonding_strain_notices(0.010, 15e-6)
    assert "by 1.5%" in curvature.bonding_strain_notices(-0.001, 15e-6)[0].message


def test_every_formula_takes_floats_arrays_and_uncertain_numbers() -> None:
    assert_takes_every_kind(curvature.bonding_strain, 0.01, 15e-6)
    assert_takes_every_kind(curvature.height_over_curved, 0.01, 1e-4)
    rises = np.array([0.0, 20.0, -20.0])
    found = curvature.curved_thermal_strain(0.01, (ADHESIVE,), 12e-6, rises)
    assert [
        curvature.curved_thermal_strain(0.01, (ADHESIVE,), 12e-6, float(each)) for each in rises
    ] == pytest.approx(list(found))
    unsure = curvature.curved_thermal_strain(0.01, (ADHESIVE,), 12e-6, ufloat(20, 1))
    assert found[1] / 20 == pytest.approx(unsure.std_dev)


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: curvature.bonding_strain(0.0, 1e-5), "radius must not be zero"),
        (lambda: curvature.bonding_strain(math.nan, 1e-5), "radius must be a finite number"),
        (lambda: curvature.bonding_strain(1.0, math.inf), "height must be a finite number"),
        (lambda: curvature.height_over_curved(1.0, -1e-5), "height must not be negative"),
        (lambda: curvature.layer_growth(ADHESIVE, math.nan, 1.0), "part_expansion must be a"),
        (lambda: curvature.layer_growth(ADHESIVE, 1e-5, math.nan), "rise must be a finite"),
        (lambda: Layer(-1.0, 1e-5, 0.3), "thickness must not be negative"),
        (lambda: Layer(1e-5, math.nan, 0.3), "expansion must be a finite number"),
        (lambda: Layer(1e-5, 1e-5, 0.5), "poisson must lie between 0 and 0.49"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
