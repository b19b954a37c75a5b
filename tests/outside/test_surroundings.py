"""Dew points held to steam tables and to a printed dew-point table."""

from __future__ import annotations

import math

import pytest
from scipy.optimize import brentq

from gaugelog.physics import surroundings
from gaugelog.physics.surroundings import (
    DEW_MARGIN,
    Window,
    dew_margin,
    dew_point,
    dew_point_notices,
    dew_troubles,
    humidity_at,
    saturation_pressure,
    window_troubles,
)

CHECKS = (
    surroundings.saturation_pressure,
    surroundings.dew_point,
    surroundings.humidity_at,
    surroundings.dew_margin,
    surroundings.dew_point_notices,
    surroundings.window_troubles,
    surroundings.dew_troubles,
)


@pytest.mark.parametrize(
    ("celsius", "pascal"),
    [(0.01, 611.7), (10.0, 1228.2), (20.0, 2339.3), (30.0, 4247.0), (40.0, 7384.9), (50.0, 12352)],
)
def test_saturation_pressures_are_those_of_the_steam_tables(celsius: float, pascal: float) -> None:
    """Steam tables (from memory); the Magnus form is good to half a per cent."""
    assert pascal == pytest.approx(saturation_pressure(celsius), rel=5e-3)


@pytest.mark.parametrize("celsius", [1.0, 15.0, 25.0, 35.0, 55.0])
def test_saturation_pressures_follow_the_wagner_equation(celsius: float) -> None:
    """Wagner and Pruss 1993, J. Phys. Chem. Ref. Data 22, equation 1 (from memory)."""
    kelvin = celsius + 273.15
    x = 1 - kelvin / 647.096
    series = (
        -7.85951783 * x
        + 1.84408259 * x**1.5
        - 11.7866497 * x**3
        + 22.6807411 * x**3.5
        - 15.9618719 * x**4
        + 1.80122502 * x**7.5
    )
    expected = 22.064e6 * math.exp(647.096 / kelvin * series)
    assert expected == pytest.approx(saturation_pressure(celsius), rel=5e-3)


@pytest.mark.parametrize(
    ("celsius", "humidity", "dew"),
    [(20.0, 0.5, 9.3), (20.0, 0.7, 14.4), (25.0, 0.6, 16.7), (30.0, 0.4, 14.9), (10.0, 0.8, 6.7)],
)
def test_dew_points_are_those_of_the_printed_table(
    celsius: float, humidity: float, dew: float
) -> None:
    """Table of dew points of moist air in DIN 4108 (from memory), printed to 0.1 °C."""
    assert dew == pytest.approx(dew_point(celsius, humidity), abs=0.06)


def test_the_dew_point_is_where_scipy_finds_saturation() -> None:
    """SciPy, brentq on the definition of the dew point."""
    vapour = 0.65 * saturation_pressure(23.0)
    expected = brentq(lambda t: saturation_pressure(t) - vapour, -40, 60, xtol=1e-10)
    assert expected == pytest.approx(dew_point(23.0, 0.65), abs=1e-8)
    assert 0.65 == pytest.approx(humidity_at(23.0, expected))
    assert 18.0 - expected == pytest.approx(dew_margin(18.0, 23.0, 0.65), abs=1e-8)


def test_three_kelvin_above_the_dew_point_are_asked_for() -> None:
    """ISO 8502-4: the surface at least 3 °C above the dew point (common practice)."""
    assert 3.0 == DEW_MARGIN
    assert () == dew_troubles(dew_point(20.0, 0.5) + 3.01, 20.0, 0.5)
    assert 1 == len(dew_troubles(dew_point(20.0, 0.5) + 2.99, 20.0, 0.5))


def test_the_range_of_the_formula_is_that_of_the_wmo_guide() -> None:
    """WMO-No. 8, annex on humidity formulas: −45 to 60 °C over water."""
    assert () == dew_point_notices(-45.0) + dew_point_notices(60.0)
    assert dew_point_notices(-45.1)
    assert dew_point_notices(60.1)


def test_the_usual_window_of_a_cyanoacrylate_holds() -> None:
    """Common practice: cyanoacrylate is worked at about 30 to 65 % relative humidity."""
    window = Window(driest=0.30, dampest=0.65)
    assert () == window_troubles(window, 23.0, 0.5)
    assert window_troubles(window, 23.0, 0.25)
    assert window_troubles(window, 23.0, 0.70)
