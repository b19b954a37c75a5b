"""Quantities people type at the bench, "350 ohm" or "28 AWG", understood in SI units."""

from __future__ import annotations

import math
import re
from dataclasses import dataclass
from functools import cache
from typing import Any


@dataclass(frozen=True)
class Dimension:
    """A kind of quantity: the SI unit it is kept in, the unit it is shown in, an example.

    `base` and `shown` are unit names of the pint registry; `symbol` is how people write `shown`.
    """

    name: str
    base: str
    shown: str
    symbol: str
    example: str


RESISTANCE = Dimension("resistance", "ohm", "ohm", "Ω", "350 ohm")
INSULATION = Dimension("insulation", "ohm", "megaohm", "MΩ", "12.5 Gohm")
RESISTANCE_PER_LENGTH = Dimension("resistance per length", "ohm/m", "ohm/m", "Ω/m", "0.123 ohm/m")
STRAIN = Dimension("strain", "", "micrometer/meter", "µm/m", "350 ue")
LENGTH = Dimension("length", "m", "mm", "mm", "3 mm")
DISTANCE = Dimension("distance", "m", "m", "m", "50 m")
AREA = Dimension("area", "m^2", "mm^2", "mm²", "0.5 mm2 or 28 AWG")
VOLTAGE = Dimension("voltage", "V", "V", "V", "5 V")
RATIO = Dimension("ratio", "", "", "", "2.1 or 5 %")
OUTPUT = Dimension("bridge output", "", "millivolt/volt", "mV/V", "0.85 mV/V")
TEMPERATURE = Dimension("temperature", "degC", "degC", "°C", "20 degC or 68 degF")
DIFFERENCE = Dimension("temperature difference", "kelvin", "kelvin", "K", "35 K")
EXPANSION = Dimension("expansion", "1/kelvin", "ppm/kelvin", "ppm/K", "11.7 ppm/K")
ANGLE = Dimension("angle", "radian", "degree", "°", "45 deg")
STRESS = Dimension("stress", "pascal", "megapascal", "MPa", "206 GPa")
FORCE = Dimension("force", "newton", "newton", "N", "30 kN")
TORQUE = Dimension("torque", "newton*meter", "newton*meter", "N·m", "500 N*m")
POWER_DENSITY = Dimension("power density", "W/m^2", "kW/m^2", "kW/m²", "2 W/in^2")
POWER = Dimension("power", "watt", "milliwatt", "mW", "20 mW")
FREQUENCY = Dimension("frequency", "hertz", "hertz", "Hz", "10 kHz")
SPEED = Dimension("speed", "m/s", "m/s", "m/s", "5000 m/s")
DENSITY = Dimension("density", "kg/m^3", "kg/m^3", "kg/m³", "7850 kg/m^3")
TIME = Dimension("time", "second", "minute", "min", "30 min")
HUMIDITY = Dimension("relative humidity", "", "percent", "%", "55 %")

_ALIASES: dict[str, str] = {
    "ue": "micrometer/meter",
    "µe": "micrometer/meter",
    "με": "micrometer/meter",
    "µε": "micrometer/meter",
    "ustrain": "micrometer/meter",
    "microstrain": "micrometer/meter",
    "mm2": "mm^2",
    "mm²": "mm^2",
    "in2": "inch^2",
    "W/in2": "W/in^2",
    "W/m2": "W/m^2",
    "kg/m3": "kg/m^3",
    "°C": "degC",
    "°F": "degF",
    "C": "degC",
    "F": "degF",
    "°": "degree",
    "Ohm": "ohm",
    "% RH": "percent",
    "%RH": "percent",
    "%rh": "percent",
    "Nm": "newton*meter",
    "N·m": "newton*meter",
}
_NUMBER = re.compile(r"^\s*([+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?)\s*(.*?)\s*$")
_WIRE = re.compile(r"^AWG$", re.IGNORECASE)
_UNSAID_PREFIX = re.compile(r"^(mohm|mOhm|MOHM)$")


class NotUnderstood(ValueError):
    """A typed quantity could not be understood; says why and what would be."""


@dataclass(frozen=True)
class Understood:
    """A typed quantity as understood: `value` in the dimension's base unit, and how to show it."""

    typed: str
    value: float
    shown: str


def understand(text: str, dimension: Dimension) -> Understood:
    """Read `text` as a quantity of `dimension`.

    Raises NotUnderstood for a missing, wrong or ambiguous unit, or a number that is none.
    """
    match = _NUMBER.match(text.replace("−", "-"))
    if match is None:
        raise NotUnderstood(
            f"“{text}” is not a number with a unit; type it like {dimension.example}"
        )
    value = _value(float(match[1]), match[2], dimension)
    if not math.isfinite(value):
        raise NotUnderstood(f"“{text}” is too large a number")
    return Understood(text, value, show(value, dimension))


def show(value: float, dimension: Dimension, digits: int = 6) -> str:
    """`value` (base unit) in the dimension's shown unit, to `digits` significant digits."""
    number = value * _scale(dimension)
    return f"{number:.{digits}g} {dimension.symbol}".strip()


@cache
def _scale(dimension: Dimension) -> float:
    if dimension.base == dimension.shown:
        return 1.0
    registry = _registry()
    return float(registry.Quantity(1.0, dimension.base or "dimensionless").to(dimension.shown).m)


def _value(number: float, unit: str, dimension: Dimension) -> float:
    if _UNSAID_PREFIX.match(unit):
        raise NotUnderstood("“mohm” may mean milli or mega; type milliohm or Mohm")
    if _WIRE.match(unit):
        return _wire_area(number, dimension)
    if not unit:
        if dimension.base == "" and dimension.shown == "":
            return number
        raise NotUnderstood(f"the unit is missing; type it like {dimension.example}")
    return _convert(number, unit, dimension)


def _wire_area(number: float, dimension: Dimension) -> float:
    from gaugelog.physics.conductors import awg_diameter

    if dimension is not AREA:
        raise NotUnderstood(f"AWG is a wire size, not a {dimension.name}")
    return math.pi / 4 * awg_diameter(number) ** 2


def _convert(number: float, unit: str, dimension: Dimension) -> float:
    registry = _registry()
    spelled = _ALIASES.get(unit, unit)
    if dimension is not TEMPERATURE:
        # A slope per degree means a difference of temperature, never a point on a scale.
        spelled = re.sub(r"\bdeg([CF])\b", r"delta_deg\1", spelled.replace("°", "deg"))
    try:
        quantity = registry.Quantity(number, spelled)
        return float(quantity.to(dimension.base or "dimensionless").m)
    except Exception as error:
        # pint raises a family of its own and builtins alike; the person needs one sentence.
        raise NotUnderstood(
            f"“{unit}” is no unit of {dimension.name}; type it like {dimension.example}"
        ) from error


@cache
def _registry() -> Any:
    import pint

    registry: Any = pint.UnitRegistry(cache_folder=":auto:")
    return registry
