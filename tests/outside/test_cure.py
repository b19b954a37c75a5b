"""Cure times held to Arrhenius' law as textbooks print it and to NumPy's interpolation."""

from __future__ import annotations

import math

import numpy
import pytest

from gaugelog.physics import cure
from gaugelog.physics.cure import (
    activation_temperature,
    arrhenius_time,
    cure_time,
    cure_time_notices,
    time_left,
    working_time,
)

CHECKS = (
    cure.cure_time,
    cure.cure_time_notices,
    cure.arrhenius_time,
    cure.activation_temperature,
    cure.working_time,
    cure.time_left,
)
LISTED = ((24.0, 86400.0), (50.0, 14400.0), (75.0, 7200.0), (100.0, 3600.0))
GAS_CONSTANT = 8.314462618


def test_a_rate_that_doubles_over_ten_kelvin_has_the_textbook_energy() -> None:
    """Atkins, Physical Chemistry: doubling from 25 to 35 °C means about 53 kJ/mol (from memory)."""
    energy = GAS_CONSTANT * activation_temperature((25.0, 2.0), (35.0, 1.0))
    assert 53e3 == pytest.approx(energy, rel=0.01)


@pytest.mark.parametrize("celsius", [24.0, 31.0, 50.0, 63.0, 99.0])
def test_interpolation_is_numpys_in_the_arrhenius_plane(celsius: float) -> None:
    """NumPy, numpy.interp of ln t over 1/T."""
    inverse = [-1 / (each + 273.15) for each, _ in LISTED]
    logs = [math.log(time) for _, time in LISTED]
    expected = math.exp(numpy.interp(-1 / (celsius + 273.15), inverse, logs))
    assert expected == pytest.approx(cure_time(celsius, LISTED, interpolate=True))


def test_a_time_between_two_follows_one_exponential() -> None:
    """Arrhenius' law k = A exp(−E/RT), with a pre-factor and an energy of our choosing."""

    def time(celsius: float) -> float:
        return 1e-6 * math.exp(60e3 / GAS_CONSTANT / (celsius + 273.15))

    found = arrhenius_time(40.0, (25.0, time(25.0)), (60.0, time(60.0)))
    assert time(40.0) == pytest.approx(found)


def test_listed_steps_are_numpys_search() -> None:
    """NumPy, searchsorted: the listed temperature at or below, or at or above."""
    temperatures = numpy.array([each for each, _ in LISTED])
    times = [time for _, time in LISTED]
    for celsius in (24.0, 49.0, 50.0, 80.0, 100.0):
        below = numpy.searchsorted(temperatures, celsius, side="right") - 1
        upward = numpy.searchsorted(temperatures, celsius, side="left")
        assert times[below] == cure_time(celsius, LISTED)
        assert times[upward] == working_time(celsius, LISTED)


def test_only_a_cure_beyond_the_schedule_is_noticed() -> None:
    """Common practice: a consumable's schedule is not stretched beyond what it lists."""
    assert () == cure_time_notices(100.0, LISTED)
    assert 1 == len(cure_time_notices(101.0, LISTED))


def test_what_is_left_is_the_difference() -> None:
    """Arithmetic: twenty minutes allowed, a quarter of an hour gone."""
    assert 5 * 60 == time_left(20 * 60, 15 * 60)
