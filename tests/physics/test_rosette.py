"""Plane strain and rosettes: invariants of rotation, round trips, symmetry, bad input."""

from __future__ import annotations

from math import pi

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from uncertainties import ufloat

from gaugelog.physics import plane, rosette
from gaugelog.physics.plane import PlaneStrain
from gaugelog.physics.validity import OutOfDomain

STRAIN = st.floats(min_value=-2e-3, max_value=2e-3)
ANGLE = st.floats(min_value=-pi, max_value=pi)


@given(STRAIN, STRAIN, STRAIN, ANGLE)
def test_principal_strains_do_not_turn_with_the_axes(
    x: float, y: float, shear: float, angle: float
) -> None:
    state = PlaneStrain(x, y, shear)
    here = plane.principal_strains(state)
    there = plane.principal_strains(plane.turned(state, angle))
    assert here.largest == pytest.approx(there.largest, abs=1e-15)
    assert here.smallest == pytest.approx(there.smallest, abs=1e-15)


@given(STRAIN, STRAIN, STRAIN)
def test_the_direction_told_is_that_of_the_largest_strain(x: float, y: float, shear: float) -> None:
    state = PlaneStrain(x, y, shear)
    found = plane.principal_strains(state)
    if found.angle is not None:
        assert -pi / 2 < found.angle <= pi / 2
        assert plane.strain_along(state, found.angle) == pytest.approx(found.largest, abs=1e-15)


@given(STRAIN, STRAIN, STRAIN, st.sampled_from(["rectangular", "delta"]))
def test_a_state_comes_back_from_its_readings(
    x: float, y: float, shear: float, pattern: str
) -> None:
    state, angles = PlaneStrain(x, y, shear), rosette.grid_angles(pattern)
    readings = [plane.strain_along(state, angle) for angle in angles]
    found = rosette.rosette_state(readings, angles)
    assert [x, y, shear] == pytest.approx([found.x, found.y, found.shear], abs=1e-14)


@given(STRAIN, STRAIN, STRAIN)
def test_the_closed_forms_agree_with_least_squares(one: float, two: float, three: float) -> None:
    for state, pattern in (
        (rosette.rectangular_state(one, two, three), "rectangular"),
        (rosette.delta_state(one, two, three), "delta"),
    ):
        found = rosette.rosette_state([one, two, three], rosette.grid_angles(pattern))
        assert [state.x, state.y, state.shear] == pytest.approx(
            [found.x, found.y, found.shear], abs=1e-14
        )


@given(STRAIN)
def test_equal_biaxial_strain_has_no_direction(strain: float) -> None:
    assert plane.principal_strains(PlaneStrain(strain, strain, 0.0)).angle is None


def test_in_an_array_no_direction_is_not_a_number() -> None:
    state = PlaneStrain(np.array([1e-3, 1e-3]), np.array([1e-3, 0.0]), np.array([0.0, 0.0]))
    angle = plane.principal_strains(state).angle
    assert angle is not None
    assert np.isnan(angle[0])
    assert angle[1] == 0.0


def test_uncertain_readings_pass_through_the_same_formula() -> None:
    readings = [ufloat(400e-6, 4e-6), ufloat(300e-6, 3e-6), ufloat(-200e-6, 2e-6)]
    found = plane.principal_strains(rosette.rectangular_state(*readings))
    step = 1e-9

    def largest(values: list[float]) -> float:
        return float(plane.principal_strains(rosette.rectangular_state(*values)).largest)

    plain = [reading.nominal_value for reading in readings]
    slopes = [
        (
            largest([v + step * (i == j) for j, v in enumerate(plain)])
            - largest([v - step * (i == j) for j, v in enumerate(plain)])
        )
        / (2 * step)
        for i in range(3)
    ]
    wanted = sum((slope * r.std_dev) ** 2 for slope, r in zip(slopes, readings, strict=True)) ** 0.5
    assert wanted == pytest.approx(found.largest.std_dev, rel=1e-6)


@pytest.mark.parametrize(
    ("readings", "angles", "named"),
    [
        ([1e-4, 2e-4, 3e-4], [0.0, 0.0, 1.0], "angles"),
        ([1e-4, 2e-4, 3e-4], [0.0, pi, 1.0], "angles"),
        ([1e-4, 2e-4], [0.0, 1.0], "angles"),
        ([1e-4, 2e-4, 3e-4], [0.0, 1.0], "angles"),
        ([1e-4, float("nan"), 3e-4], [0.0, 1.0, 2.0], "reading 2"),
        ([1e-4, 2e-4, 3e-4], [0.0, float("inf"), 2.0], "angle 2"),
    ],
)
def test_bad_input_names_its_argument(
    readings: list[float], angles: list[float], named: str
) -> None:
    with pytest.raises(OutOfDomain, match=named):
        rosette.rosette_state(readings, angles)
