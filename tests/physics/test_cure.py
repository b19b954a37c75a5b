"""Cure and working times: the safe side of what a consumable's sheet lists."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics.cure import (
    activation_temperature,
    arrhenius_time,
    cure_time,
    cure_time_notices,
    time_left,
    working_time,
)
from gaugelog.physics.validity import OutOfDomain

HOUR = 3600.0
EPOXY = ((24.0, 24 * HOUR), (50.0, 4 * HOUR), (75.0, 2 * HOUR))
POT = ((20.0, 1800.0), (25.0, 1200.0), (30.0, 600.0))
INSIDE = st.floats(24.0, 75.0)


@pytest.mark.parametrize(
    ("celsius", "hours"), [(24.0, 24), (49.9, 24), (50.0, 4), (60.0, 4), (75.0, 2), (90.0, 2)]
)
def test_the_next_lower_listed_temperature_gives_the_time(celsius: float, hours: float) -> None:
    assert hours * HOUR == cure_time(celsius, EPOXY)


def test_the_order_of_the_list_does_not_matter() -> None:
    assert 4 * HOUR == cure_time(60.0, EPOXY[::-1])


def test_a_cure_colder_than_listed_is_never_extrapolated() -> None:
    for interpolate in (False, True):
        with pytest.raises(OutOfDomain, match="celsius must be at least 24"):
            cure_time(20.0, EPOXY, interpolate)


def test_a_cure_hotter_than_listed_takes_the_last_time_and_says_so() -> None:
    assert 2 * HOUR == cure_time(100.0, EPOXY, interpolate=True)
    assert "No cure is listed above 75 °C" in cure_time_notices(100.0, EPOXY)[0].message
    assert () == cure_time_notices(75.0, EPOXY)


@given(INSIDE)
def test_interpolation_never_asks_for_more_than_the_next_lower_listed(celsius: float) -> None:
    between = cure_time(celsius, EPOXY, interpolate=True)
    assert between <= cure_time(celsius, EPOXY) * (1 + 1e-12)
    assert between >= 2 * HOUR * (1 - 1e-12)


@pytest.mark.parametrize(("celsius", "time"), EPOXY)
def test_interpolation_meets_each_listed_time(celsius: float, time: float) -> None:
    assert time == pytest.approx(cure_time(celsius, EPOXY, interpolate=True))


@given(INSIDE, INSIDE)
def test_hotter_never_takes_longer(one: float, other: float) -> None:
    cold, hot = sorted((one, other))
    assert cure_time(hot, EPOXY, True) <= cure_time(cold, EPOXY, True) * (1 + 1e-12)


@given(st.floats(50.0, 75.0))
def test_one_activation_energy_holds_between_two_listed_times(celsius: float) -> None:
    time = arrhenius_time(celsius, EPOXY[1], EPOXY[2])
    rate = activation_temperature(EPOXY[1], EPOXY[2])
    assert 4 * HOUR == pytest.approx(time * math.exp(rate * (1 / 323.15 - 1 / (celsius + 273.15))))


@pytest.mark.parametrize(
    ("celsius", "seconds"), [(10.0, 1800), (20.0, 1800), (21.0, 1200), (25.1, 600), (30.0, 600)]
)
def test_the_next_higher_listed_temperature_limits_the_work(celsius: float, seconds: float) -> None:
    assert seconds == working_time(celsius, POT)


def test_two_temperatures_may_take_the_same_time() -> None:
    assert 7200.0 == cure_time(30.0, ((24.0, 7200.0), (30.0, 7200.0)))


def test_time_left_turns_negative_when_it_is_over() -> None:
    assert 300.0 == time_left(1800.0, 1500.0)
    assert -300.0 == time_left(1200.0, 1500.0)


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: cure_time(24.0, ()), "schedule must list at least one"),
        (lambda: cure_time(math.nan, EPOXY), "celsius must be a finite number"),
        (lambda: cure_time(24.0, ((20.0, -1.0),)), "schedule time must be greater than zero"),
        (lambda: cure_time(24.0, ((-300.0, 1.0),)), "schedule temperature must be greater"),
        (lambda: cure_time(24.0, ((20.0, 1.0), (30.0, 2.0))), "must not take longer at 30"),
        (lambda: cure_time(24.0, ((20.0, 1.0), (20.0, 2.0))), "must list each temperature once"),
        (lambda: arrhenius_time(80.0, EPOXY[1], EPOXY[2]), "celsius must lie between 50 and 75"),
        (lambda: working_time(40.0, POT), "celsius must be at most 30"),
        (lambda: time_left(-1.0, 0.0), "allowed must not be negative"),
        (lambda: time_left(1.0, math.nan), "elapsed must be a finite number"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
