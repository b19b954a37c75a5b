"""Check loads: every exchange is found, what cannot be told is said, bad input is named."""

from __future__ import annotations

from math import nan, pi

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics import checkload
from gaugelog.physics.rosette import grid_angles
from gaugelog.physics.validity import OutOfDomain

DISTINCT = [300.0, 105.0, -90.0, 20.0]


@given(st.permutations([1, 2, 3, 4]), st.lists(st.floats(-9.0, 9.0), min_size=4, max_size=4))
def test_any_exchange_is_found_through_readings_that_stray(
    order: list[int], stray: list[float]
) -> None:
    readings = [DISTINCT[grid - 1] + off for grid, off in zip(order, stray, strict=True)]
    assert (tuple(order),) == checkload.explaining_orders(readings, DISTINCT, 10.0)
    moved = order != [1, 2, 3, 4]
    found = checkload.exchanged_grids(readings, DISTINCT, 10.0)
    assert (tuple(order) if moved else None) == found


@given(st.floats(-2e-3, 2e-3), st.floats(0.0, 0.5), st.floats(-pi, pi))
def test_turning_load_and_grids_together_changes_no_reading(
    strain: float, poisson: float, turn: float
) -> None:
    angles = grid_angles("rectangular")
    here = checkload.uniaxial_readings(strain, poisson, angles)
    there = checkload.uniaxial_readings(strain, poisson, [each + turn for each in angles], turn)
    assert list(here) == pytest.approx(list(there), abs=1e-15)


def test_a_load_along_grid_1_cannot_tell_the_other_two_of_a_delta() -> None:
    expected = checkload.uniaxial_readings(300.0, 0.3, grid_angles("delta"))
    orders = checkload.explaining_orders(list(expected), list(expected), 10.0)
    assert ((1, 2, 3), (1, 3, 2)) == orders
    assert checkload.exchanged_grids(list(expected), list(expected), 10.0) is None
    told = "grids as planned, or grids 2 and 3 exchanged: this load cannot tell"
    assert told == checkload.order_sentence(orders)


@pytest.mark.parametrize(
    ("orders", "told"),
    [
        ([], "no exchange of grids explains the readings"),
        ([(1, 2, 3)], "grids as planned"),
        ([(1, 3, 2)], "grids 2 and 3 exchanged"),
        ([(2, 3, 1)], "grids 2, 3 and 1 wired at 1, 2 and 3"),
    ],
)
def test_an_answer_is_told_in_words(orders: list[tuple[int, ...]], told: str) -> None:
    assert told == checkload.order_sentence(orders)


def test_a_reading_just_as_far_off_as_allowed_still_fits() -> None:
    assert ((1, 2),) == checkload.explaining_orders([310.0, -90.0], [300.0, -90.0], 10.0)
    assert () == checkload.explaining_orders([310.5, -90.0], [300.0, -90.0], 10.0)


def test_twelve_grids_alike_are_answered_at_once() -> None:
    orders = checkload.explaining_orders([1.0] * 12, [1.0] * 12, 0.1)
    assert tuple(range(1, 13)) == orders[0]


@pytest.mark.parametrize(
    ("readings", "expected", "tolerance", "sentence"),
    [
        ([1.0, nan], [1.0, 2.0], 0.1, "reading 2 must be a finite number"),
        ([1.0, 2.0], [nan, 2.0], 0.1, "expected 1 must be a finite number"),
        ([1.0, 2.0], [1.0, 2.0], -0.1, "tolerance must not be negative"),
        ([1.0, 2.0], [1.0], 0.1, "expected must have as many strains"),
    ],
)
def test_bad_readings_are_named(
    readings: list[float], expected: list[float], tolerance: float, sentence: str
) -> None:
    with pytest.raises(OutOfDomain, match=sentence):
        checkload.explaining_orders(readings, expected, tolerance)


@pytest.mark.parametrize(
    ("strain", "poisson", "angle", "axis", "sentence"),
    [
        (nan, 0.3, 0.0, 0.0, "strain must be a finite"),
        (1e-4, 0.7, 0.0, 0.0, "poisson must lie between -1 and 0.5"),
        (1e-4, 0.3, nan, 0.0, "angle 1 must be a finite"),
        (1e-4, 0.3, 0.0, nan, "axis must be a finite"),
    ],
)
def test_a_check_load_that_cannot_be_is_named(
    strain: float, poisson: float, angle: float, axis: float, sentence: str
) -> None:
    with pytest.raises(OutOfDomain, match=sentence):
        checkload.uniaxial_readings(strain, poisson, [angle], axis)
