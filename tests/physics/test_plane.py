"""Plane strain: invariants of rotation, directions, kinds of number, bad input."""

from __future__ import annotations

from math import inf, nan, pi

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics import plane
from gaugelog.physics.plane import PlaneStrain
from gaugelog.physics.validity import OutOfDomain
from tests.physics.kinds import assert_takes_every_kind

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


@given(STRAIN)
def test_equal_biaxial_strain_has_no_direction(strain: float) -> None:
    assert plane.principal_strains(PlaneStrain(strain, strain, 0.0)).angle is None


def test_in_an_array_no_direction_is_not_a_number() -> None:
    state = PlaneStrain(np.array([1e-3, 1e-3]), np.array([1e-3, 0.0]), np.array([0.0, 0.0]))
    angle = plane.principal_strains(state).angle
    assert angle is not None
    assert np.isnan(angle[0])
    assert angle[1] == 0.0


def test_half_a_turn_below_is_told_as_the_same_direction_above() -> None:
    for shear in (0.0, -0.0, -1e-300):
        across = plane.principal_strains(PlaneStrain(-1e-3, 1e-3, shear)).angle
        assert pi / 2 == across
    many = plane.principal_strains(
        PlaneStrain(np.full(2, -1e-3), np.full(2, 1e-3), np.array([-0.0, 1e-3]))
    ).angle
    assert many is not None
    assert pi / 2 == many[0]


@given(STRAIN, STRAIN, STRAIN, ANGLE)
def test_strains_at_right_angles_have_one_sum(x: float, y: float, shear: float, way: float) -> None:
    state = PlaneStrain(x, y, shear)
    total = plane.strain_along(state, way) + plane.strain_along(state, way + pi / 2)
    assert x + y == pytest.approx(total, abs=1e-15)


@given(STRAIN, STRAIN, STRAIN, ANGLE, ANGLE)
def test_two_turns_in_a_row_are_their_sum(
    x: float, y: float, shear: float, one: float, other: float
) -> None:
    state = PlaneStrain(x, y, shear)
    whole, parts = plane.turned(state, one + other), plane.turned(plane.turned(state, one), other)
    assert [whole.x, whole.y, whole.shear] == pytest.approx(
        [parts.x, parts.y, parts.shear], abs=1e-14
    )


@given(STRAIN, STRAIN, STRAIN, ANGLE)
def test_every_direction_lies_on_mohrs_circle(x: float, y: float, shear: float, way: float) -> None:
    state = PlaneStrain(x, y, shear)
    circle = plane.mohr_circle(state)
    across = plane.strain_along(state, way) - circle.centre
    up = plane.shear_along(state, way) / 2
    assert circle.radius == pytest.approx((across**2 + up**2) ** 0.5, abs=1e-15)


def test_every_formula_takes_floats_arrays_and_uncertain_numbers() -> None:
    values = 400e-6, -200e-6, 350e-6
    assert_takes_every_kind(lambda *given: plane.strain_along(PlaneStrain(*given), 0.3), *values)
    assert_takes_every_kind(lambda *given: plane.shear_along(PlaneStrain(*given), 0.3), *values)
    for part in ("largest", "smallest", "angle", "max_shear"):
        assert_takes_every_kind(
            lambda *given, part=part: getattr(plane.principal_strains(PlaneStrain(*given)), part),
            *values,
        )


@pytest.mark.parametrize("size", [0.0101, -0.02])
def test_a_notice_tells_of_strain_that_is_not_small(size: float) -> None:
    state = PlaneStrain(size, 0.0, 0.0)
    assert "beyond 1 %," in plane.principal_strains_notices(state)[0].message
    assert "of 9.9 %" in plane.principal_strains_notices(PlaneStrain(0.0, 0.099, 0.0))[0].message
    assert () == plane.principal_strains_notices(PlaneStrain(size / 3, 0.0, 0.0))


@pytest.mark.parametrize(
    ("values", "named"), [((nan, 0, 0), "x"), ((0, inf, 0), "y"), ((0, 0, nan), "shear")]
)
def test_a_state_that_cannot_be_is_named(values: tuple[float, float, float], named: str) -> None:
    with pytest.raises(OutOfDomain, match=f"^{named} must be a finite number"):
        PlaneStrain(*values)
