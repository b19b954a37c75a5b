"""Pressure vessels: thin and thick walls agree where they should, and pressures come back."""

from __future__ import annotations

import numpy
import pytest
from hypothesis import given
from hypothesis import strategies as st
from uncertainties import ufloat

from gaugelog.physics.validity import OutOfDomain
from gaugelog.physics.vessels import (
    WallStress,
    pressure_from_axial,
    pressure_from_hoop,
    thick_cylinder_stress,
    thin_cylinder_stress,
    thin_sphere_stress,
    thin_wall_notices,
    wall_strain,
)

STEEL, POISSON = 206e9, 0.3
PRESSURE = st.floats(-1e8, 1e8)
RADIUS = st.floats(0.01, 10.0)


@given(PRESSURE, RADIUS, st.floats(0.001, 0.1), st.booleans())
def test_the_hoop_strain_gives_the_pressure_back(
    pressure: float, radius: float, share: float, closed: bool
) -> None:
    stress = thin_cylinder_stress(pressure, radius, share * radius, closed)
    strain = wall_strain(stress, STEEL, POISSON).hoop
    found = pressure_from_hoop(strain, STEEL, POISSON, radius, share * radius, closed)
    assert pressure == pytest.approx(found)


@given(PRESSURE, RADIUS, st.floats(0.001, 0.1))
def test_the_axial_strain_gives_the_pressure_back(
    pressure: float, radius: float, share: float
) -> None:
    strain = wall_strain(
        thin_cylinder_stress(pressure, radius, share * radius), STEEL, POISSON
    ).axial
    assert pressure == pytest.approx(
        pressure_from_axial(strain, STEEL, POISSON, radius, share * radius)
    )


@given(st.floats(1e5, 1e7), RADIUS)
def test_a_thick_cylinder_of_thin_wall_is_a_thin_cylinder(pressure: float, radius: float) -> None:
    wall = radius / 1000
    thick = thick_cylinder_stress(pressure, radius, radius + wall, radius + wall)
    thin = thin_cylinder_stress(pressure, radius, wall)
    assert thin.hoop == pytest.approx(thick.hoop, rel=2e-3)
    assert thin.axial == pytest.approx(thick.axial, rel=2e-3)


@given(PRESSURE, PRESSURE, RADIUS, st.floats(1.1, 5.0))
def test_the_pressures_stand_at_the_walls_of_a_thick_cylinder(
    inside: float, outside: float, inner: float, share: float
) -> None:
    outer = inner * share
    bore, skin = (
        thick_cylinder_stress(inside, inner, outer, at, outside_pressure=outside).radial
        for at in (inner, outer)
    )
    scale = 1e-9 * (abs(inside) + abs(outside))
    assert -inside == pytest.approx(bore, abs=scale)
    assert -outside == pytest.approx(skin, abs=scale)


def test_equal_pressures_in_and_out_squeeze_evenly() -> None:
    found = thick_cylinder_stress(5e6, 0.1, 0.2, 0.15, outside_pressure=5e6)
    assert [-5e6] * 3 == pytest.approx([found.hoop, found.axial, found.radial])


def test_an_open_cylinder_has_no_stress_along_it() -> None:
    assert 0.0 == thin_cylinder_stress(1e6, 0.5, 0.01, closed=False).axial
    assert 0.0 == thick_cylinder_stress(1e6, 0.1, 0.2, 0.2, closed=False).axial


def test_a_sphere_bears_half_of_a_cylinder() -> None:
    assert thin_cylinder_stress(1e6, 0.5, 0.01).hoop == 2 * thin_sphere_stress(1e6, 0.5, 0.01).hoop


def test_a_wall_over_a_tenth_of_the_radius_is_noticed() -> None:
    assert () == thin_wall_notices(1.0, 0.1)
    assert "use the thick cylinder" in thin_wall_notices(1.0, 0.11)[0].message
    assert thin_wall_notices(1.0, numpy.array([0.05, 0.2]))


def test_arrays_and_uncertain_numbers_go_through_the_same_formula() -> None:
    found = thick_cylinder_stress(1e6, 0.1, 0.2, numpy.array([0.1, 0.2]))
    expected = [thick_cylinder_stress(1e6, 0.1, 0.2, at).hoop for at in (0.1, 0.2)]
    assert expected == list(found.hoop)
    uncertain = thin_cylinder_stress(ufloat(1e6, 1e4), 0.5, 0.01)
    assert 0.01 == pytest.approx(uncertain.hoop.std_dev / uncertain.hoop.nominal_value)


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: thin_cylinder_stress(1.0, 0.5, 0.0), "wall must be greater than zero"),
        (lambda: thin_sphere_stress(1.0, -0.5, 0.1), "radius must be greater than zero"),
        (lambda: thick_cylinder_stress(1.0, 0.2, 0.1, 0.15), "inner must be smaller than outer"),
        (lambda: thick_cylinder_stress(1.0, 0.1, 0.2, 0.3), "at must not exceed outer"),
        (lambda: thick_cylinder_stress(1.0, 0.1, 0.2, 0.05), "inner must not exceed at"),
        (lambda: wall_strain(WallStress(1.0, 1.0, 0.0), 1.0, 0.7), "poisson must lie between"),
        (lambda: pressure_from_axial(1e-4, 1.0, 0.5, 1.0, 0.01), "poisson must be smaller than"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
