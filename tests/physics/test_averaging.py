"""A grid's mean: limits, order, round trips, and the words for a grid too long."""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics import averaging
from gaugelog.physics.validity import OutOfDomain
from tests.physics.kinds import assert_takes_every_kind

LENGTH = st.floats(1e-4, 0.1)
LOSS = st.floats(1e-6, 0.999)


@given(LENGTH)
def test_a_point_shows_the_wave_whole(wavelength: float) -> None:
    assert 1.0 == averaging.sine_average(0.0, wavelength)
    assert 1.0 == pytest.approx(averaging.sine_average(1e-9 * wavelength, wavelength))


@given(LENGTH, st.floats(0.01, 0.99))
def test_a_longer_grid_shows_less_of_a_wave(wavelength: float, part: float) -> None:
    short = averaging.sine_average(part / 2 * wavelength, wavelength)
    assert 0 < averaging.sine_average(part * wavelength, wavelength) < short < 1


@given(LOSS)
def test_the_length_for_a_loss_makes_that_loss(loss: float) -> None:
    length = averaging.length_for_loss(loss)
    assert 0 < length < 1
    assert loss == pytest.approx(1 - averaging.sine_average(length, 1.0), rel=1e-8, abs=1e-13)


@given(LENGTH, LOSS)
def test_the_longest_grid_goes_with_the_wavelength(wavelength: float, loss: float) -> None:
    found = averaging.longest_grid(wavelength, loss)
    assert wavelength * averaging.length_for_loss(loss) == pytest.approx(found)


def test_no_angle_is_too_small_and_the_series_joins_the_quotient() -> None:
    lengths = np.array([0.0, 3.1e-5, 3.2e-5, 0.5])
    found = averaging.sine_average(lengths, 1.0)
    assert [averaging.sine_average(float(each), 1.0) for each in lengths] == pytest.approx(
        list(found), rel=1e-15
    )
    assert 1.0 >= found[1] >= found[2]


@given(LENGTH, st.floats(0.15, 1.0), st.floats(-1e-2, 1e-2))
def test_off_the_peak_a_grid_shows_less(length: float, reach: float, offset: float) -> None:
    middle = averaging.parabola_average(length, reach)
    assert averaging.parabola_average(length, reach, offset) <= middle < 1
    found = averaging.parabola_average(length, reach, -offset)
    assert averaging.parabola_average(length, reach, offset) == found


@given(LENGTH, st.floats(0.15, 1.0))
def test_the_reach_of_a_peak_is_found_from_one_fall(distance: float, reach: float) -> None:
    fallen = 1 - (distance / reach) ** 2
    if fallen < 1:
        assert reach == pytest.approx(averaging.reach_of_peak(distance, fallen), rel=1e-5)


@given(st.floats(-1e-3, 1e-3), st.floats(-1.0, 1.0))
def test_in_an_even_gradient_only_the_middle_counts(strain: float, gradient: float) -> None:
    assert strain == averaging.linear_average(strain, gradient, 0.0)
    up, down = (averaging.linear_average(strain, gradient, way) for way in (0.001, -0.001))
    assert 2 * strain == pytest.approx(up + down, abs=1e-12)


def test_a_grid_of_more_than_half_a_wave_is_noticed() -> None:
    assert () == averaging.sine_average_notices(0.5, 1.0)
    assert "0.6 of the wavelength" in averaging.sine_average_notices(0.6, 1.0)[0].message


def test_a_peak_lost_by_more_than_a_hundredth_is_noticed() -> None:
    assert () == averaging.parabola_average_notices(0.006, 0.020)
    assert "4.7% of the peak" in averaging.parabola_average_notices(0.015, 0.020)[0].message


def test_every_formula_takes_floats_arrays_and_uncertain_numbers() -> None:
    assert_takes_every_kind(averaging.sine_average, 0.3, 1.1)
    assert_takes_every_kind(averaging.length_for_loss, 0.05)
    assert_takes_every_kind(averaging.longest_grid, 0.1, 0.2)
    assert_takes_every_kind(averaging.parabola_average, 0.006, 0.02, 0.001)
    assert_takes_every_kind(averaging.reach_of_peak, 0.006, 0.7)
    assert_takes_every_kind(averaging.linear_average, 1e-3, 0.2, 0.001)


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: averaging.sine_average(-1.0, 1.0), "length must not be negative"),
        (lambda: averaging.sine_average(1.0, 0.0), "wavelength must be greater than zero"),
        (lambda: averaging.length_for_loss(1.0), "loss must lie between"),
        (lambda: averaging.length_for_loss(0.0), "loss must lie between"),
        (lambda: averaging.longest_grid(0.0, 0.1), "wavelength must be greater than zero"),
        (lambda: averaging.parabola_average(0.0, 1.0), "length must be greater than zero"),
        (lambda: averaging.parabola_average(1.0, 0.0), "reach must be greater than zero"),
        (lambda: averaging.parabola_average(1.0, 1.0, math.nan), "offset must be a finite"),
        (lambda: averaging.reach_of_peak(0.0, 0.5), "distance must be greater than zero"),
        (lambda: averaging.reach_of_peak(1.0, 1.0), "fallen must lie between -1 and 1"),
        (lambda: averaging.linear_average(math.nan, 1.0, 1.0), "strain must be a finite"),
        (lambda: averaging.linear_average(1.0, math.inf, 1.0), "gradient must be a finite"),
        (lambda: averaging.sine_average_notices(0.0, 1.0), "length must be greater than zero"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
