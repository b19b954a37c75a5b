"""Estimates: shapes, widths, and means of readings taken alone or together."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics.estimates import (
    Estimate,
    Shape,
    arcsine,
    exactly,
    from_joint_readings,
    from_readings,
    normal,
    rectangular,
    triangular,
)
from gaugelog.physics.validity import OutOfDomain

READINGS = st.lists(st.floats(-1e3, 1e3), min_size=2, max_size=20)


def test_an_exact_value_has_no_uncertainty() -> None:
    assert Estimate(2.0, 0.0) == exactly(2.0)


def test_wider_shapes_leave_more_uncertain() -> None:
    widths = [shape(0.0, 1.0).uncertainty for shape in (triangular, rectangular, arcsine)]
    assert [1 / math.sqrt(6), 1 / math.sqrt(3), 1 / math.sqrt(2)] == pytest.approx(widths)


def test_each_shape_has_its_word() -> None:
    assert ["normal", "rectangular", "triangular", "arcsine"] == [each.word for each in Shape]


@given(READINGS, st.floats(-100, 100))
def test_shifting_all_readings_shifts_their_mean_only(readings: list[float], by: float) -> None:
    plain, moved = from_readings(readings), from_readings([each + by for each in readings])
    assert plain.value + by == pytest.approx(moved.value, abs=1e-9)
    assert plain.uncertainty == pytest.approx(moved.uncertainty, abs=1e-9)
    assert len(readings) - 1 == plain.dof


def test_readings_that_move_together_are_fully_correlated() -> None:
    one = [1.0, 2.0, 4.0]
    found, pairs = from_joint_readings({"a": one, "b": [2 * each for each in one]})
    assert 2 * found["a"].uncertainty == pytest.approx(found["b"].uncertainty)
    assert 1.0 == pytest.approx(pairs["a", "b"])


def test_a_steady_quantity_is_correlated_with_none() -> None:
    _, pairs = from_joint_readings({"a": [1.0, 2.0], "b": [3.0, 3.0]})
    assert {} == pairs


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: Estimate(math.nan, 0.0), "value must be a finite number"),
        (lambda: normal(1.0, -1.0), "uncertainty must not be negative"),
        (lambda: normal(1.0, 1.0, 0.0), "dof must be greater than zero"),
        (lambda: rectangular(1.0, -1.0), "half_width must not be negative"),
        (lambda: arcsine(1.0, -1.0), "amplitude must not be negative"),
        (lambda: from_readings([1.0]), "readings must be two or more"),
        (lambda: from_readings([1.0, math.inf]), "readings must be a finite number"),
        (lambda: from_joint_readings({"a": [1, 2], "b": [1]}), "series must all hold the same"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
