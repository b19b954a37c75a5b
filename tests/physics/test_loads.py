"""Bars and beams: loads to strain and back, and where the formulas stop."""

from __future__ import annotations

import numpy
import pytest
from hypothesis import given
from hypothesis import strategies as st
from uncertainties import ufloat

from gaugelog.physics.loads import (
    bar_force,
    bar_modulus,
    bar_strain,
    bending_moment,
    bending_notices,
    bending_strain,
    bending_stress,
    cantilever_load,
    cantilever_moment,
    four_point_moment,
    lateral_strain,
    rectangle_modulus,
    round_modulus,
    simply_supported_moment,
)
from gaugelog.physics.validity import OutOfDomain

FORCE = st.floats(-1e6, 1e6)
LENGTH = st.floats(1e-3, 10.0)
STEEL = 206e9


@given(FORCE, LENGTH)
def test_the_strain_of_a_bar_gives_its_force_back(force: float, side: float) -> None:
    strain = bar_strain(force, STEEL, side**2)
    assert force == pytest.approx(bar_force(strain, STEEL, side**2))


@given(st.floats(1.0, 1e6), LENGTH)
def test_the_strain_of_a_bar_gives_its_modulus_back(force: float, side: float) -> None:
    assert STEEL == pytest.approx(bar_modulus(force, bar_strain(force, STEEL, side**2), side**2))


@given(FORCE, LENGTH, LENGTH)
def test_the_strain_of_a_beam_gives_its_moment_back(
    moment: float, width: float, depth: float
) -> None:
    section = rectangle_modulus(width, depth)
    assert moment == pytest.approx(
        bending_moment(bending_strain(moment, STEEL, section), STEEL, section)
    )


@given(FORCE, LENGTH, LENGTH)
def test_two_gauges_find_the_tip_load_wherever_it_sits(
    load: float, distance: float, spacing: float
) -> None:
    section = rectangle_modulus(0.03, 0.005)
    near, far = (
        bending_strain(cantilever_moment(load, place), STEEL, section)
        for place in (distance + spacing, distance)
    )
    found = cantilever_load(near, far, spacing, STEEL, section)
    assert load == pytest.approx(found, rel=1e-6 * (1 + distance / spacing), abs=1e-6)


@given(FORCE, st.floats(0, 1), st.floats(0, 1))
def test_load_and_gauge_may_change_places_on_a_beam(
    load: float, load_at: float, gauge_at: float
) -> None:
    """Maxwell's theorem of reciprocity."""
    forth = simply_supported_moment(load, 1.0, load_at, gauge_at)
    assert forth == pytest.approx(simply_supported_moment(load, 1.0, gauge_at, load_at))


def test_a_load_in_the_middle_gives_a_quarter_of_load_times_span() -> None:
    assert 250.0 == simply_supported_moment(1000.0, 1.0, 0.5, 0.5)
    assert 0.0 == simply_supported_moment(1000.0, 1.0, 0.5, 1.0)


def test_two_half_loads_on_a_beam_are_four_point_bending() -> None:
    halves = sum(simply_supported_moment(500.0, 1.0, place, 0.4) for place in (0.3, 0.7))
    assert four_point_moment(1000.0, 0.3) == pytest.approx(halves)


@given(st.floats(0.0, 0.49))
def test_a_bar_under_tension_grows_narrower(poisson: float) -> None:
    assert lateral_strain(0.001, poisson) <= 0.0


def test_a_tube_without_bore_is_a_solid_bar() -> None:
    assert round_modulus(0.05) == round_modulus(0.05, 0.0)
    assert round_modulus(0.05) > round_modulus(0.05, 0.03)


def test_a_stubby_beam_is_noticed() -> None:
    assert () == bending_notices(1.0, 0.1)
    assert "only 5.0 times" in bending_notices(0.5, 0.1)[0].message


def test_arrays_and_uncertain_numbers_go_through_the_same_formulas() -> None:
    forces = numpy.array([10e3, 20e3])
    assert [bar_strain(each, STEEL, 1e-4) for each in forces] == list(
        bar_strain(forces, STEEL, 1e-4)
    )
    found = bending_strain(ufloat(10, 0.1), ufloat(STEEL, 2e9), rectangle_modulus(0.03, 0.006))
    relative = numpy.hypot(0.1 / 10, 2e9 / STEEL)
    assert found.nominal_value * relative == pytest.approx(found.std_dev)


def test_an_array_of_loads_along_a_beam_has_the_moments_of_each() -> None:
    places = numpy.array([0.2, 0.5, 0.9])
    found = simply_supported_moment(100.0, 1.0, places, 0.5)
    assert [simply_supported_moment(100.0, 1.0, each, 0.5) for each in places] == list(found)


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: bar_strain(1.0, 0.0, 1.0), "modulus must be greater than zero"),
        (lambda: bar_strain(1.0, 1.0, -1.0), "area must be greater than zero"),
        (lambda: bar_force(float("nan"), 1.0, 1.0), "strain must be a finite number"),
        (lambda: bar_modulus(1.0, 0.0, 1.0), "strain must not be zero"),
        (lambda: lateral_strain(0.001, 0.6), "poisson must lie between -1 and 0.5"),
        (lambda: rectangle_modulus(1.0, 0.0), "depth must be greater than zero"),
        (lambda: round_modulus(0.05, 0.05), "inner must be smaller than outer"),
        (lambda: bending_stress(1.0, 0.0), "section_modulus must be greater than zero"),
        (lambda: cantilever_moment(1.0, -0.1), "distance must not be negative"),
        (lambda: simply_supported_moment(1.0, 1.0, 1.5, 0.5), "load_at must not exceed the span"),
        (lambda: simply_supported_moment(1.0, 1.0, 0.5, 1.5), "gauge_at must not exceed the span"),
        (lambda: four_point_moment(1.0, 0.0), "arm must be greater than zero"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
