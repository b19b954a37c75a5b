"""A grid turned or beside its place: symmetry, invariants of rotation, round trips."""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import assume, given
from hypothesis import strategies as st

from gaugelog.physics import placement
from gaugelog.physics.validity import OutOfDomain
from tests.physics.kinds import assert_takes_every_kind

STRAIN = st.floats(-5e-3, 5e-3)
ANGLE = st.floats(-math.pi, math.pi)
OFF = st.floats(-0.3, 0.3)
POISSON = st.floats(0.0, 0.5)


@given(STRAIN, STRAIN, ANGLE)
def test_a_grid_that_is_not_turned_errs_in_nothing(
    first: float, second: float, intended: float
) -> None:
    assert 0.0 == placement.misalignment_error(first, second, intended, 0.0)


@given(STRAIN, ANGLE, OFF)
def test_in_equal_biaxial_strain_no_turn_matters(
    strain: float, intended: float, off: float
) -> None:
    assert 0.0 == placement.misalignment_error(strain, strain, intended, off)


@given(STRAIN, STRAIN, ANGLE, OFF, OFF)
def test_two_turns_in_a_row_err_by_their_sum(
    first: float, second: float, intended: float, one: float, other: float
) -> None:
    whole = placement.misalignment_error(first, second, intended, one + other)
    parts = placement.misalignment_error(first, second, intended, one)
    parts += placement.misalignment_error(first, second, intended + one, other)
    assert whole == pytest.approx(parts, abs=1e-15)


@given(STRAIN, STRAIN, ANGLE, OFF)
def test_a_grid_and_its_neighbour_at_right_angles_err_by_opposites(
    first: float, second: float, intended: float, off: float
) -> None:
    """The sum of two strains at right angles is an invariant of rotation."""
    one = placement.misalignment_error(first, second, intended, off)
    other = placement.misalignment_error(first, second, intended + math.pi / 2, off)
    assert 0.0 == pytest.approx(one + other, abs=1e-15)


@given(STRAIN, STRAIN, ANGLE, ANGLE, OFF)
def test_turning_the_axes_changes_nothing(
    first: float, second: float, axes: float, intended: float, off: float
) -> None:
    middle, radius = (first + second) / 2, (first - second) / 2
    x, y = (middle + sign * radius * math.cos(2 * axes) for sign in (1, -1))
    shear = -2 * radius * math.sin(2 * axes)
    found = placement.field_misalignment(x, y, shear, intended + axes, off)
    # The first principal direction lies at −axes from x.
    expected = placement.misalignment_error(first, second, intended + 2 * axes, off)
    assert expected == pytest.approx(found, abs=1e-15)


@given(POISSON, OFF)
def test_along_a_pull_either_side_errs_alike(poisson: float, off: float) -> None:
    right = placement.uniaxial_misalignment(poisson, 0.0, off)
    assert right == pytest.approx(placement.uniaxial_misalignment(poisson, 0.0, -off), abs=1e-15)
    assert -(1 + poisson) * math.sin(off) ** 2 == pytest.approx(right, abs=1e-15)


@given(STRAIN, STRAIN, ANGLE, st.floats(1e-6, 1e-2))
def test_the_largest_turn_keeps_every_smaller_one_within_the_permitted(
    first: float, second: float, intended: float, permitted: float
) -> None:
    turn = placement.largest_misalignment(first, second, intended, permitted)
    smaller = np.linspace(-turn, turn, 101)
    errors = placement.misalignment_error(first, second, intended, smaller)
    assert np.all(abs(errors) <= permitted + 1e-10)
    ends = max(abs(errors[0]), abs(errors[-1]))
    assert turn == math.pi / 2 or permitted == pytest.approx(ends, abs=1e-10)


@given(ANGLE, OFF, st.integers(-3, 3))
def test_an_axis_turned_by_half_a_circle_is_the_same_axis(
    planned: float, off: float, halves: int
) -> None:
    found = placement.axis_error(planned + off + halves * math.pi, planned)
    assert off == pytest.approx(found, abs=1e-9)


@given(st.floats(-1.0, 1.0), st.floats(-1.0, 1.0), st.floats(-0.01, 0.01))
def test_an_error_of_place_goes_with_the_offset(across: float, along: float, off: float) -> None:
    assume(off != 0)
    assert 0.0 == placement.misplacement_error(along, across, 0.0, 0.0)
    once = placement.misplacement_error(along, across, off, off)
    assert 2 * once == pytest.approx(placement.misplacement_error(along, across, 2 * off, 2 * off))


def test_a_grid_far_off_its_direction_is_noticed() -> None:
    assert () == placement.misalignment_notices(math.radians(9.9))
    noticed = placement.misalignment_notices(np.radians([1.0, -12.0]))
    assert "turned by 12.0°; over 10°" in noticed[0].message


def test_every_formula_takes_floats_arrays_and_uncertain_numbers() -> None:
    assert_takes_every_kind(placement.misalignment_error, 1e-3, -3e-4, 0.4, 0.1)
    assert_takes_every_kind(placement.misalignment_share, 1e-3, -3e-4, 0.4, 0.1)
    assert_takes_every_kind(placement.uniaxial_misalignment, 0.3, 0.4, 0.1)
    assert_takes_every_kind(placement.field_misalignment, 1e-3, 2e-4, -4e-4, 0.4, 0.1)
    assert_takes_every_kind(placement.misplacement_error, 0.2, -0.1, 1e-3, 2e-3)
    assert_takes_every_kind(placement.axis_error, 0.5, 0.4)


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: placement.misalignment_error(math.nan, 0.0, 0.0, 0.0), "first must be a finite"),
        (lambda: placement.misalignment_error(0.0, math.inf, 0.0, 0.0), "second must be a finite"),
        (lambda: placement.misalignment_error(0.0, 0.0, math.nan, 0.0), "intended must be a"),
        (lambda: placement.misalignment_error(0.0, 0.0, 0.0, math.nan), "off must be a finite"),
        (lambda: placement.misalignment_share(0.0, 0.0, 0.0, 0.1), "strain in the intended"),
        (lambda: placement.uniaxial_misalignment(0.6, 0.0, 0.1), "poisson must lie between"),
        (lambda: placement.field_misalignment(0.0, 0.0, math.nan, 0.0, 0.0), "shear must be a"),
        (lambda: placement.largest_misalignment(1.0, 0.0, 0.0, 0.0), "permitted must be greater"),
        (lambda: placement.misplacement_error(math.nan, 0.0, 0.0, 0.0), "gradient_x must be a"),
        (lambda: placement.axis_error(math.inf, 0.0), "installed must be a finite number"),
        (lambda: placement.misalignment_notices(math.nan), "off must be a finite number"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
