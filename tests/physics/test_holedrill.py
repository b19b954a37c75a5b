"""Residual stress from three relieved strains, and the warnings about the hole."""

from __future__ import annotations

import math

import numpy
import pytest
from hypothesis import given
from hypothesis import strategies as st
from uncertainties import ufloat

from gaugelog.physics._maths import Number
from gaugelog.physics.holedrill import (
    DrilledStress,
    combination_strains,
    eccentricity_notices,
    hole_size_notices,
    near_yield_notices,
    uniform_stress,
)
from gaugelog.physics.validity import OutOfDomain

A_BAR, B_BAR, E, NU = 0.158, 0.454, 200e9, 0.3
STRESS = st.floats(-5e8, 5e8)


def _relieved(largest: float, smallest: float, angle: float) -> tuple[float, float, float]:
    """Strains that a known stress releases; grid 2 lies at 45° in the sense of `angle`."""
    mean = (largest + smallest) / 2 * A_BAR * (1 + NU)
    half = (largest - smallest) / 2 * B_BAR
    one, two, three = (
        -(mean + half * math.cos(2 * (angle - grid))) / E for grid in (0, math.pi / 4, math.pi / 2)
    )
    return one, two, three


def _solve(e1: Number, e2: Number, e3: Number) -> DrilledStress:
    return uniform_stress(e1, e2, e3, A_BAR, B_BAR, E, NU)


@given(STRESS, STRESS, st.floats(-1.57, 1.57))
def test_a_known_stress_comes_back_with_its_direction(
    one: float, other: float, angle: float
) -> None:
    largest, smallest = max(one, other), min(one, other)
    found = _solve(*_relieved(largest, smallest, angle))
    assert largest == pytest.approx(found.largest, rel=1e-9, abs=1)
    assert smallest == pytest.approx(found.smallest, rel=1e-9, abs=1)
    if largest - smallest > 1e4:
        assert found.angle is not None
        turn = (found.angle - angle + math.pi / 2) % math.pi - math.pi / 2
        assert 0.0 == pytest.approx(turn, abs=1e-6)


def test_tension_along_each_grid_is_found_along_it() -> None:
    for angle in (0.0, math.pi / 4, math.pi / 2):
        assert angle == pytest.approx(_solve(*_relieved(1e8, 0.0, angle)).angle)


def test_equal_strains_have_no_direction() -> None:
    found = _solve(-1e-4, -1e-4, -1e-4)
    assert found.angle is None
    assert found.largest == found.smallest


def test_a_direction_across_grid_one_is_a_positive_right_angle() -> None:
    assert math.pi / 2 == uniform_stress(0.0, -1e-4, -2e-4, A_BAR, B_BAR, E, NU).angle


def test_arrays_solve_each_hole_and_leave_out_directions_that_are_none() -> None:
    one, two, three = numpy.array([[-1e-4, -1e-4], [-1e-4, -2e-4], [-1e-4, 0.0]])
    found = _solve(one, two, three)
    assert found.angle is not None
    assert numpy.isnan(found.angle[0])
    assert _solve(-1e-4, -2e-4, 0.0).angle == pytest.approx(found.angle[1])
    assert _solve(-1e-4, -2e-4, 0.0).largest == pytest.approx(found.largest[1])


def test_uncertain_strains_carry_through_to_the_principal_stress() -> None:
    strains = [ufloat(value, 1e-6) for value in (-180e-6, -150e-6, -60e-6)]
    found = _solve(*strains).largest
    nominal = [each.nominal_value for each in strains]
    square = 0.0
    for index in range(3):
        up, down = list(nominal), list(nominal)
        up[index] += 1e-9
        down[index] -= 1e-9
        square += ((_solve(*up).largest - _solve(*down).largest) / 2e-9 * 1e-6) ** 2
    assert math.sqrt(square) == pytest.approx(found.std_dev, rel=1e-5)


def test_equal_uncertain_strains_do_not_divide_by_zero() -> None:
    strains = [ufloat(-1e-4, 1e-6)] * 3
    assert _solve(*strains).angle is None


def test_a_hole_off_the_middle_is_noticed() -> None:
    assert () == eccentricity_notices(0.02e-3, 5e-3)
    assert "misses the middle by 0.0050" in eccentricity_notices(0.025e-3, 5e-3)[0].message


def test_a_hole_of_unusual_size_is_noticed() -> None:
    assert () == hole_size_notices(2e-3, 5e-3)
    assert hole_size_notices(1e-3, 5e-3)
    assert hole_size_notices(3e-3, 5e-3)


def test_stress_near_yield_is_noticed_sooner_for_a_through_hole() -> None:
    found = _solve(*_relieved(150e6, 0.0, 0.3))
    assert () == near_yield_notices(found, 250e6)
    assert "60% of the yield strength" in near_yield_notices(found, 250e6, through=True)[0].message


def test_opposite_stresses_count_by_their_von_mises_stress() -> None:
    found = _solve(*_relieved(120e6, -120e6, 0.3))
    assert near_yield_notices(found, 250e6)


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: combination_strains(math.nan, 0.0, 0.0), "e1 must be a finite number"),
        (lambda: combination_strains(0.0, 0.0, math.inf), "e3 must be a finite number"),
        (lambda: uniform_stress(0, 0, 0, 0.0, 1.0, E, NU), "a_bar must be greater than zero"),
        (lambda: uniform_stress(0, 0, 0, 1.0, -1.0, E, NU), "b_bar must be greater than zero"),
        (lambda: uniform_stress(0, 0, 0, 1.0, 1.0, 0.0, NU), "modulus must be greater than zero"),
        (lambda: eccentricity_notices(0.1, 0.0), "circle must be greater than zero"),
        (lambda: near_yield_notices(_solve(0, 0, 0), 0.0), "yield_strength must be greater"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
