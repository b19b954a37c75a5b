"""Quantities people type at the bench, "350 ohm" or "28 AWG", understood in SI units."""

from __future__ import annotations

import math
import re
import unicodedata
from dataclasses import dataclass
from functools import cache
from typing import Any

from gaugelog.commands.calc.dimensions import AREA, PERCENT, TEMPERATURE, Dimension
from gaugelog.errors import GaugelogError

_ALIASES: dict[str, str] = {
    "mm2": "mm^2",
    "mm²": "mm^2",
    "in2": "inch^2",
    "W/in2": "W/in^2",
    "W/m2": "W/m^2",
    "kW/m2": "kW/m^2",
    "kg/m3": "kg/m^3",
    "g/cm3": "g/cm^3",
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
    "kNm": "kilonewton*meter",
    "N·m": "newton*meter",
    "kN·m": "kilonewton*meter",
}
_NUMBER = re.compile(r"^\s*([+-]?(?:\d+\.?\d*|\.\d+)(?:[eE][+-]?\d+)?)\s*(.*?)\s*$", re.ASCII)
_DECIMAL_COMMA = re.compile(r"^\s*[+-]?\d+,\d")
_WIRE = re.compile(r"^AWG$", re.IGNORECASE)
_UNSAID_PREFIX = re.compile(r"^(mohm|mOhm|MOHM)$")
_MICROSTRAIN = re.compile(r"^(?:ue|µe|µε|ustrain|microstrain)(?=$|/)")
_FACTOR = r"[^\W\d_]*[°%]?[^\W\d_]*(?:(?:\*\*|\^)?-?\d(?:\.\d)?|[²³])?"
_UNIT = re.compile(rf"(?:1?\s*/\s*)?{_FACTOR}(?:\s*[*/·]\s*{_FACTOR}| {_FACTOR})*")
"""Factors with a small exponent: what a unit is made of, and nothing that takes long to read."""


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
    plain = unicodedata.normalize("NFC", text).replace("−", "-").replace("μ", "µ")
    match = _NUMBER.match(plain)
    if match is None:
        raise NotUnderstood(
            f"“{text}” is not a number with a unit; type it like {dimension.example}"
        )
    if _DECIMAL_COMMA.match(plain):
        point = text.strip().replace(",", ".", 1)
        raise NotUnderstood(f"“{text}” has a comma; type a decimal point: {point}")
    value = _value(float(match[1]), match[2], dimension)
    if not math.isfinite(value * _scale(dimension.base, dimension.shown)):
        raise NotUnderstood(f"“{text}” is too large a number")
    if dimension is TEMPERATURE and value < -273.15:
        raise NotUnderstood(f"“{text}” lies below absolute zero")
    as_typed = PERCENT if dimension.shown == "" and match[2] == "%" else dimension
    return Understood(text, value, show(value, as_typed))


def show(value: float, dimension: Dimension, digits: int = 6) -> str:
    """`value` (base unit) in the dimension's shown unit, to `digits` significant digits."""
    number, symbol = value * _scale(dimension.base, dimension.shown), dimension.symbol
    for unit, larger in dimension.larger:
        reached = value * _scale(dimension.base, unit)
        # A rounding away from one whole unit still shows as one.
        if abs(reached) >= 1 - 1e-9:
            number, symbol = reached, larger
    gap = "" if symbol == "°" else " "
    # Nothing has no sign: a product with a negative number would print −0.
    return f"{number + 0.0:.{digits}g}{gap}{symbol}".strip()


@cache
def _scale(base: str, unit: str) -> float:
    if base == unit:
        return 1.0
    return float(_registry().Quantity(1.0, base or "dimensionless").to(unit).m)


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
        raise NotUnderstood(
            f"AWG is a wire size; {dimension.name} is asked for, like {dimension.example}"
        )
    try:
        return math.pi / 4 * awg_diameter(number) ** 2
    except GaugelogError as error:
        raise NotUnderstood(f"AWG sizes go from −3 (0000) to 50, not {number:g}") from error


def _convert(number: float, unit: str, dimension: Dimension) -> float:
    try:
        if not _may_be(unit, dimension):
            raise ValueError(unit)
        quantity = _registry().Quantity(number, _spelled(unit, dimension))
        return float(quantity.to(dimension.base or "dimensionless").m)
    except Exception as error:
        # pint raises a family of its own and builtins alike; the person needs one sentence.
        raise NotUnderstood(
            f"“{unit}” is no unit of {dimension.name}; type it like {dimension.example}"
        ) from error


def _may_be(unit: str, dimension: Dimension) -> bool:
    """Whether a text has the form of a unit, and for a bare ratio is one of this very kind."""
    if len(unit) > 40 or not (unit in _ALIASES or _UNIT.fullmatch(unit)):
        return False
    return not dimension.only or re.fullmatch(dimension.only, unit) is not None


def _spelled(unit: str, dimension: Dimension) -> str:
    """A unit as the registry spells it."""
    spelled = _MICROSTRAIN.sub("micrometer/meter", _ALIASES.get(unit, unit)).replace("·", "*")
    spelled = f"1{spelled}" if spelled.startswith("/") else spelled
    if dimension is TEMPERATURE:
        return spelled
    # A slope per degree means a difference of temperature, never a point on a scale.
    return re.sub(r"\bdeg([CF])\b", r"delta_deg\1", spelled.replace("°", "deg"))


@cache
def _registry() -> Any:
    import pint

    registry: Any = pint.UnitRegistry(cache_folder=":auto:")
    return registry
