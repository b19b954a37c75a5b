"""Changes between two readings, and what one meter or two leave uncertain in them."""

from __future__ import annotations

import math

import numpy
import pytest
from hypothesis import given
from hypothesis import strategies as st
from uncertainties import ufloat

from gaugelog.physics.change import (
    Accuracy,
    difference_uncertainty,
    instrument_uncertainty,
    rectangular,
    relative_change,
    resolution_uncertainty,
    triangular,
)
from gaugelog.physics.validity import OutOfDomain

OHMMETER = Accuracy(0.0005, 0.1, 0.01)
OHMS = st.floats(1.0, 1e6)


def test_a_bonded_gauge_changed_by_its_part_of_the_received_value() -> None:
    assert 0.00228 == round(relative_change(350.4, 351.2), 5)


def test_one_meter_on_one_range_leaves_only_its_display() -> None:
    found = difference_uncertainty(350.4, 351.2, True, 0.0005, 0.1, 0.01)
    assert 0.004 == round(found, 3)


def test_two_meters_leave_both_their_errors() -> None:
    found = difference_uncertainty(350.4, 351.2, False, 0.0005, 0.1, 0.01)
    assert 0.225 == round(found, 3)


def test_the_second_of_two_meters_may_be_better() -> None:
    found = difference_uncertainty(
        350.4, 351.2, False, 0.0005, 0.1, 0.01, other=Accuracy(0.0, 0.0, 0.0)
    )
    assert OHMMETER.uncertainty(350.4) == found


@given(OHMS, OHMS)
def test_one_meter_never_leaves_more_than_two(before: float, after: float) -> None:
    one = difference_uncertainty(before, after, True, 0.0005, 0.1, 0.01)
    assert one <= difference_uncertainty(before, after, False, 0.0005, 0.1, 0.01)


@given(OHMS, OHMS, st.booleans())
def test_the_order_of_the_readings_does_not_matter(before: float, after: float, same: bool) -> None:
    forth = difference_uncertainty(before, after, same, 0.0005, 0.1, 0.01)
    assert forth == pytest.approx(difference_uncertainty(after, before, same, 0.0005, 0.1, 0.01))


@given(OHMS, OHMS)
def test_a_change_applied_leads_back_to_the_later_value(before: float, after: float) -> None:
    assert after == pytest.approx(before * (1 + relative_change(before, after)))


@given(st.floats(0, 1e6))
def test_a_triangle_is_narrower_than_its_rectangle(half_width: float) -> None:
    assert rectangular(half_width) == pytest.approx(triangular(half_width) * math.sqrt(2))


def test_a_whole_column_is_computed_at_once() -> None:
    values = numpy.array([350.4, 120.0])
    found = OHMMETER.uncertainty(values)
    assert [OHMMETER.uncertainty(350.4), OHMMETER.uncertainty(120.0)] == list(found)


def test_uncertain_readings_carry_through_a_change() -> None:
    found = relative_change(ufloat(350.4, 0.1), ufloat(351.2, 0.2))
    expected = math.hypot(0.2 / 350.4, 0.1 * 351.2 / 350.4**2)
    assert expected == pytest.approx(found.std_dev)


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: relative_change(0.0, 1.0), "before must be greater than zero"),
        (lambda: relative_change(1.0, math.nan), "after must be a finite number"),
        (lambda: instrument_uncertainty(1.0, -0.1, 0.0, 0.0), "gain_fraction must not be neg"),
        (lambda: instrument_uncertainty(math.inf, 0.1, 0.0, 0.0), "value must be a finite"),
        (lambda: Accuracy(0.1, -1.0, 0.0), "offset must not be negative"),
        (lambda: resolution_uncertainty(-1.0), "resolution must not be negative"),
        (lambda: rectangular(-1.0), "half_width must not be negative"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
