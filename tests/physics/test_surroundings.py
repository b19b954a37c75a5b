"""Dew point and adhesive windows: what wet air does to a bond before it is made."""

from __future__ import annotations

import math

import numpy
import pytest
from hypothesis import given
from hypothesis import strategies as st
from uncertainties import ufloat

from gaugelog.physics.surroundings import (
    Window,
    dew_margin,
    dew_point,
    dew_point_notices,
    dew_troubles,
    humidity_at,
    saturation_pressure,
    window_troubles,
)
from gaugelog.physics.validity import OutOfDomain

AIR = st.floats(-45.0, 60.0)
HUMIDITY = st.floats(0.01, 1.0)


@given(AIR)
def test_saturated_air_is_at_its_dew_point(celsius: float) -> None:
    assert celsius == pytest.approx(dew_point(celsius, 1.0), abs=1e-9)


@given(AIR, HUMIDITY)
def test_the_dew_point_gives_the_humidity_back(celsius: float, humidity: float) -> None:
    assert humidity == pytest.approx(humidity_at(celsius, dew_point(celsius, humidity)))


@given(AIR, HUMIDITY, HUMIDITY)
def test_damper_air_has_the_higher_dew_point(celsius: float, one: float, other: float) -> None:
    dry, damp = sorted((one, other))
    assert dew_point(celsius, dry) <= dew_point(celsius, damp) <= celsius + 1e-9


def test_a_surface_as_warm_as_the_air_lies_above_the_dew_point_by_the_spread() -> None:
    assert 20 - dew_point(20.0, 0.5) == dew_margin(20.0, 20.0, 0.5)


def test_a_cold_surface_in_damp_air_is_called_wet() -> None:
    assert () == dew_troubles(20.0, 20.0, 0.5)
    assert "3 K are asked for" in dew_troubles(11.0, 20.0, 0.5)[0]
    assert "4.3 K below the dew point of 9.3 °C: it is wet" in dew_troubles(5.0, 20.0, 0.5)[0]


def test_each_side_of_a_window_is_named() -> None:
    window = Window(18.0, 30.0, 0.3, 0.65)
    assert () == window_troubles(window, 23.0, 0.5)
    assert (
        "The temperature of 15 °C is below the 18 °C allowed.",
        "The relative humidity of 20 % is below the 30 % allowed.",
    ) == window_troubles(window, 15.0, 0.2)
    assert (
        "The temperature of 35 °C is above the 30 °C allowed.",
        "The relative humidity of 70 % is above the 65 % allowed.",
    ) == window_troubles(window, 35.0, 0.7)


def test_a_window_that_is_open_allows_everything() -> None:
    assert () == window_troubles(Window(), -40.0, 1.0)


def test_air_beyond_the_magnus_constants_is_noticed() -> None:
    assert () == dew_point_notices(20.0)
    assert "−45" in dew_point_notices(-50.0)[0].message.replace("-45", "−45")
    assert 1 == len(dew_point_notices(numpy.array([20.0, 70.0])))


def test_an_array_and_an_uncertain_reading_go_through_the_same_formula() -> None:
    found = dew_point(numpy.array([20.0, 30.0]), 0.5)
    assert [dew_point(20.0, 0.5), dew_point(30.0, 0.5)] == pytest.approx(list(found))
    slope = (dew_point(20.001, 0.5) - dew_point(19.999, 0.5)) / 0.002
    assert slope * 0.3 == pytest.approx(dew_point(ufloat(20, 0.3), 0.5).std_dev, rel=1e-6)


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: dew_point(20.0, 0.0), "humidity must be greater than zero"),
        (lambda: dew_point(20.0, 50.0), "humidity must lie between 0 and 1"),
        (lambda: dew_point(-300.0, 0.5), "celsius must be greater than -243.12"),
        (lambda: dew_margin(math.nan, 20.0, 0.5), "surface_celsius must be a finite number"),
        (lambda: saturation_pressure(math.nan), "celsius must be a finite number"),
        (lambda: Window(coldest=30.0, hottest=20.0), "coldest must not exceed hottest"),
        (lambda: Window(driest=math.nan), "driest must be a finite number"),
        (lambda: window_troubles(Window(), 20.0, 1.1), "humidity must lie between"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
