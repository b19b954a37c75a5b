"""Stiffening: nothing from nothing, more from more, and round trips."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics import stiffening
from gaugelog.physics.validity import OutOfDomain
from tests.physics.kinds import assert_takes_every_kind

MODULUS = st.floats(1e8, 3e11)
THICKNESS = st.floats(1e-4, 0.05)
LAYER = st.floats(1e-6, 2e-4)
SHARES = (stiffening.held_tension_share, stiffening.free_tension_share)


@given(MODULUS, THICKNESS)
def test_a_layer_of_nothing_stiffens_nothing(modulus: float, thickness: float) -> None:
    for share in (*SHARES, stiffening.bending_share):
        assert 1.0 == pytest.approx(share(modulus, thickness, 3e9, 0.0))
    assert 1.0 == stiffening.height_share(thickness, 0.0)


@given(MODULUS, THICKNESS, MODULUS, LAYER)
def test_in_tension_a_stiffer_layer_takes_more(
    modulus: float, thickness: float, layer: float, depth: float
) -> None:
    for share in SHARES:
        found = share(modulus, thickness, layer, depth)
        assert share(modulus, thickness, 2 * layer, depth) < found < 1


@given(MODULUS, THICKNESS, MODULUS, LAYER)
def test_a_strip_free_to_bend_loses_more_than_one_kept_straight(
    modulus: float, thickness: float, layer: float, depth: float
) -> None:
    held, free = (share(modulus, thickness, layer, depth) for share in SHARES)
    assert free < held


@given(MODULUS, THICKNESS, MODULUS, LAYER, st.floats(0.1, 10.0))
def test_only_ratios_of_moduli_and_thicknesses_count(
    modulus: float, thickness: float, layer: float, depth: float, scale: float
) -> None:
    for share in (*SHARES, stiffening.bending_share):
        once = share(modulus, thickness, layer, depth)
        assert once == pytest.approx(
            share(scale * modulus, 2 * thickness, scale * layer, 2 * depth)
        )


@given(THICKNESS, LAYER)
def test_a_layer_without_stiffness_is_only_height(thickness: float, depth: float) -> None:
    found = stiffening.bending_share(2e11, thickness, 0.0, depth)
    assert stiffening.height_share(thickness, depth / 2) == pytest.approx(found)


@given(st.floats(-0.01, 0.01), THICKNESS, LAYER)
def test_the_surfaces_strain_comes_back_from_the_grids(
    strain: float, thickness: float, height: float
) -> None:
    shown = strain * stiffening.height_share(thickness, height)
    assert strain == pytest.approx(stiffening.surface_strain(shown, thickness, height))


@given(MODULUS, MODULUS, LAYER, st.floats(1e-4, 0.5))
def test_the_thinnest_part_loses_just_the_permitted(
    modulus: float, layer: float, depth: float, permitted: float
) -> None:
    thickness = stiffening.thinnest_part(modulus, layer, depth, permitted)
    share = stiffening.held_tension_share(modulus, thickness, layer, depth)
    assert permitted == pytest.approx(1 - share, rel=1e-6)


def test_a_soft_thin_part_is_noticed_and_thick_steel_is_not() -> None:
    assert () == stiffening.held_tension_share_notices(206e9, 0.005, 4e9, 60e-6)
    noticed = stiffening.held_tension_share_notices(3e9, 0.002, 4e9, 60e-6)
    assert "more than 1 % of the strain is lost" in noticed[0].message


def test_every_formula_takes_floats_arrays_and_uncertain_numbers() -> None:
    for share in (*SHARES, stiffening.bending_share):
        assert_takes_every_kind(share, 3e9, 0.001, 4e9, 6e-5)
    assert_takes_every_kind(stiffening.height_share, 0.001, 5e-5)
    assert_takes_every_kind(stiffening.surface_strain, 1e-3, 0.001, 5e-5)
    assert_takes_every_kind(stiffening.thinnest_part, 3e9, 4e9, 6e-5, 0.02)


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: stiffening.held_tension_share(0.0, 1.0, 1.0, 1.0), "modulus must be greater"),
        (lambda: stiffening.held_tension_share(1.0, 1.0, -1.0, 1.0), "layer_modulus must not be"),
        (lambda: stiffening.free_tension_share(1.0, 0.0, 1.0, 1.0), "thickness must be greater"),
        (lambda: stiffening.bending_share(1.0, 1.0, 1.0, -1.0), "layer_thickness must not be"),
        (lambda: stiffening.height_share(1.0, -1.0), "height must not be negative"),
        (lambda: stiffening.height_share(0.0, 1.0), "thickness must be greater than zero"),
        (lambda: stiffening.surface_strain(math.nan, 1.0, 1.0), "indicated must be a finite"),
        (lambda: stiffening.thinnest_part(1.0, 1.0, 1.0, 1.0), "permitted must lie between"),
        (lambda: stiffening.thinnest_part(0.0, 1.0, 1.0, 0.1), "modulus must be greater"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
