"""Air and surface while people bond: dew point, humidity, and the window an adhesive allows.

Relative humidity is a ratio (0.5 for 50 %). The Magnus form with the constants of the WMO guide
holds over water, from −45 to 60 °C.
"""

from __future__ import annotations

from dataclasses import dataclass
from math import ceil

from gaugelog.physics._maths import Number, exp, log, nominal
from gaugelog.physics._order import any_of
from gaugelog.physics.validity import Notice, OutOfDomain, above, between, finite, positive

MAGNUS_SOURCE = "WMO-No. 8, Guide to instruments, Magnus form over water (6.112, 17.62, 243.12)"
MAGNUS_PRESSURE = 611.2
"""Saturation pressure at 0 °C, pascal."""
MAGNUS_SLOPE, MAGNUS_OFFSET = 17.62, 243.12
"""Constants of the exponent: none, and °C."""
MAGNUS_RANGE = (-45.0, 60.0)
"""Air temperatures, °C, for which the constants are given."""

DEW_MARGIN = 3.0
"""Kelvin that a surface should lie above the dew point before it is coated (ISO 8502-4)."""


@dataclass(frozen=True, slots=True)
class Window:
    """What an adhesive or coating allows: °C and relative humidity as a ratio; None is open."""

    coldest: float | None = None
    hottest: float | None = None
    driest: float | None = None
    dampest: float | None = None

    def __post_init__(self) -> None:
        _in_order("coldest", self.coldest, "hottest", self.hottest)
        _in_order("driest", self.driest, "dampest", self.dampest)


def saturation_pressure(celsius: Number) -> Number:
    """Pressure of saturated water vapour over water: 611.2 exp(17.62 t/(243.12 + t)).

    Units: °C in, pascal out; from −45 to 60 °C.
    Source: WMO-No. 8, Guide to instruments, annex on humidity formulas (Magnus form).

    >>> saturation_pressure(0.0)
    611.2
    """
    above("celsius", celsius, -MAGNUS_OFFSET)
    return MAGNUS_PRESSURE * exp(MAGNUS_SLOPE * celsius / (MAGNUS_OFFSET + celsius))


def dew_point(celsius: Number, humidity: Number) -> Number:
    """Temperature at which air begins to wet a surface: 243.12 γ/(17.62 − γ).

    γ = ln(φ) + 17.62 t/(243.12 + t). Units: °C and ratio in, °C out; from −45 to 60 °C.
    Source: WMO-No. 8, Guide to instruments, annex on humidity formulas (Magnus form).

    >>> round(dew_point(20.0, 0.5), 2)
    9.26
    """
    above("celsius", celsius, -MAGNUS_OFFSET)
    between("humidity", positive("humidity", humidity), 0.0, 1.0)
    power = log(humidity) + MAGNUS_SLOPE * celsius / (MAGNUS_OFFSET + celsius)
    return MAGNUS_OFFSET * power / (MAGNUS_SLOPE - power)


def humidity_at(celsius: Number, dew_celsius: Number) -> Number:
    """Relative humidity of air with a known dew point: p(dew point)/p(air).

    At a surface colder than the air, give the surface's temperature. Units: °C in, ratio out.
    Source: definition; WMO-No. 8, Guide to instruments (Magnus form).
    """
    return saturation_pressure(dew_celsius) / saturation_pressure(celsius)


def dew_margin(surface_celsius: Number, air_celsius: Number, humidity: Number) -> Number:
    """How far a surface lies above the dew point of the air about it, in kelvin.

    Negative means that the surface is wet. Source: ISO 8502-4 (asks for 3 K before coating).
    """
    return finite("surface_celsius", surface_celsius) - dew_point(air_celsius, humidity)


def dew_point_notices(celsius: Number) -> tuple[Notice, ...]:
    """A notice for air outside the range for which the constants are given."""
    low, high = MAGNUS_RANGE
    plain = nominal(celsius)
    if not any_of((plain < low) | (plain > high)):
        return ()
    message = f"The Magnus form over water is given from {low:g} to {high:g} °C only."
    return (Notice("dew point", message, MAGNUS_SOURCE),)


def window_troubles(
    window: Window, celsius: float | None, humidity: float | None
) -> tuple[str, ...]:
    """Every way in which the air lies outside a window; nothing when work may go on.

    Units: °C and ratio; None is not measured, and only what is measured is judged.
    Source: the consumable's own sheet; that it rules is common practice.

    >>> window_troubles(Window(dampest=0.65), 23.0, 0.7)
    ('The relative humidity of 70 % is above the 65 % allowed.',)
    """
    troubles: tuple[str, ...] = ()
    if celsius is not None:
        finite("celsius", celsius)
        troubles += _outside("temperature", celsius, window.coldest, window.hottest, "°C")
    if humidity is not None:
        between("humidity", humidity, 0.0, 1.0)
        troubles += _outside("relative humidity", humidity, window.driest, window.dampest, "%")
    return troubles


def dew_troubles(
    surface_celsius: float, air_celsius: float, humidity: float, least: float = DEW_MARGIN
) -> tuple[str, ...]:
    """Says so when a surface is too near the dew point to bond or coat on.

    `least` is the distance asked for, kelvin; the temperature it asks of the surface is told,
    rounded up. Source: ISO 8502-4; 3 K is common practice.
    """
    margin = float(dew_margin(surface_celsius, air_celsius, humidity))
    if margin >= least:
        return ()
    dew = surface_celsius - margin
    needed = f"it needs at least {ceil((dew + least) * 10) / 10:.1f} °C"
    if margin <= 0:
        return (
            f"The surface lies {-margin:.1f} K below the dew point of {dew:.1f} °C: it is wet; "
            f"{needed}.",
        )
    return (
        f"The surface lies {margin:.1f} K above the dew point of {dew:.1f} °C; {least:g} K are "
        f"asked for: {needed}.",
    )


def _outside(
    name: str, value: float, low: float | None, high: float | None, unit: str
) -> tuple[str, ...]:
    if low is not None and value < low:
        side, limit = "below", low
    elif high is not None and value > high:
        side, limit = "above", high
    else:
        return ()
    found, allowed = _with_unit(value, unit), _with_unit(limit, unit)
    return (f"The {name} of {found} is {side} the {allowed} allowed.",)


def _with_unit(value: float, unit: str) -> str:
    return f"{value * 100:.4g} %" if unit == "%" else f"{value:g} {unit}"


def _in_order(low_name: str, low: float | None, high_name: str, high: float | None) -> None:
    for name, value in ((low_name, low), (high_name, high)):
        if value is not None:
            finite(name, value)
    if low is not None and high is not None and low > high:
        raise OutOfDomain(low_name, f"must not exceed {high_name}, not {low:g} over {high:g}.")
