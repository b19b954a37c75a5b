"""What people type at a meter, "12.5 GΩ" or ">20 GΩ", understood; units are never guessed."""

from __future__ import annotations

import re
from collections.abc import Sequence
from dataclasses import dataclass

from gaugelog.errors import Fault, Faulty
from gaugelog.ledger.base import SYMBOLS, UNITS, Quantity
from gaugelog.ledger.readings import Qualifier

LONGEST = 60

_READING = re.compile(
    r"^(?P<sign>[<>=]?)\s*(?P<number>[^\s<>=A-Za-zΩµ%°]+(?:[eE][+-]?\d+)?)\s*(?P<unit>.*)$"
)
_NUMBER = re.compile(r"[+-]?(\d+(\.\d*)?|\.\d+)([eE][+-]?\d+)?")
_COMMA = re.compile(r"[+-]?\d+,\d+")
_OVERLOAD = frozenset({"ol", "o.l", "o.l.", "overload", "over", "0l"})
_MILLI_OR_MEGA = frozenset({"mohm", "mω", "mohms"})

_SPELLINGS: dict[str, str] = {
    **{unit.casefold(): unit for unit in UNITS if unit not in {"mV", "MPa", "m", "mm", "V"}},
    **{symbol: unit for unit, symbol in SYMBOLS.items() if symbol},
    "Ω": "ohm",
    "ohms": "ohm",
    "kΩ": "kohm",
    "MΩ": "Mohm",
    "GΩ": "Gohm",
    "TΩ": "Tohm",
    "Mohm": "Mohm",
    "MOhm": "Mohm",
    "megohm": "Mohm",
    "megaohm": "Mohm",
    "gigaohm": "Gohm",
    "kiloohm": "kohm",
    "teraohm": "Tohm",
    "mV": "mV",
    "MPa": "MPa",
    "m": "m",
    "mm": "mm",
    "V": "V",
    "v": "V",
    "um/m": "um/m",
    "µm/m": "um/m",
    "ue": "um/m",
    "microstrain": "um/m",
    "C": "degC",
    "°C": "degC",
    "deg C": "degC",
    "% RH": "%RH",
    "%rh": "%RH",
}

CHECK_UNITS: dict[str, tuple[str, ...]] = {
    "resistance": ("ohm", "kohm"),
    "insulation": ("ohm", "kohm", "Mohm", "Gohm", "Tohm"),
}
"""The units a reading of each check may be typed in."""


@dataclass(frozen=True, slots=True)
class TypedReading:
    """A reading as understood: qualifier, quantity (None for an overload), and as typed."""

    qualifier: Qualifier
    quantity: Quantity | None
    typed: str


def parse_reading(text: str, check: str) -> TypedReading:
    """Understand a reading of `check`. Raises Faulty with one plain sentence when it can't be.

    >>> str(parse_reading("> 20 Gohm", "insulation").quantity)
    '20 GΩ'
    """
    typed = text.strip()
    if typed.casefold() in _OVERLOAD:
        return TypedReading("overload", None, typed)
    units = CHECK_UNITS[check]
    match = _READING.match(_tidy(typed))
    if len(typed) > LONGEST or match is None:
        raise _fault(typed, "is no reading.", f"Type it like {_example(units)}.")
    found = _quantity(match["number"], match["unit"], units, typed)
    return TypedReading(_qualifier(match["sign"]), found, typed)


def parse_quantity(text: str, units: Sequence[str]) -> Quantity:
    """Understand a quantity in one of `units`. Raises Faulty with one plain sentence.

    >>> str(parse_quantity("21.5 °C", ("degC",)))
    '21.5 °C'
    """
    typed = text.strip()
    match = _READING.match(_tidy(typed))
    if len(typed) > LONGEST or match is None or match["sign"]:
        raise _fault(typed, "is no quantity.", f"Type it like {_example(units)}.")
    return _quantity(match["number"], match["unit"], units, typed)


def unit_of(text: str) -> str | None:
    """The unit meant by a spelling, or None; letter case counts where it changes the meaning."""
    plain = text.strip()
    if plain in UNITS:
        return plain
    return _SPELLINGS.get(plain) or _SPELLINGS.get(plain.casefold())


def _quantity(number: str, unit: str, units: Sequence[str], typed: str) -> Quantity:
    if _COMMA.fullmatch(number):
        point = number.replace(",", ".")
        raise _fault(typed, "has a decimal comma.", f"Type a decimal point: {point} {unit}".strip())
    if _NUMBER.fullmatch(number) is None:
        raise _fault(typed, "is no number.", f"Type it like {_example(units)}.")
    return Quantity(value=number.removeprefix("+"), unit=_unit(unit, units, typed))


def _unit(unit: str, units: Sequence[str], typed: str) -> str:
    plain = unit.strip()
    if not plain:
        raise _fault(typed, "has no unit.", f"Type it like {_example(units)}.")
    if plain[:1] == "m" and plain.casefold() in _MILLI_OR_MEGA:
        raise _fault(
            typed,
            f"has the unit {plain}: milli or mega?",
            "Type Mohm for a million ohms, or the value in ohm.",
        )
    found = "%RH" if plain == "%" and "%RH" in units else unit_of(plain)
    if found is None or found not in units:
        allowed = ", ".join(_shown(each) for each in units)
        raise _fault(typed, f"has the unit {plain}.", f"Units here: {allowed}.")
    return found


def _tidy(text: str) -> str:
    # A minus as typography has it, and a non-breaking space, are meant plainly.
    return text.replace("−", "-").replace("\u00a0", " ").replace("≥", ">").replace("≤", "<")


def _qualifier(sign: str) -> Qualifier:
    return ">" if sign == ">" else "<" if sign == "<" else "="


def _shown(unit: str) -> str:
    return SYMBOLS.get(unit) or unit


def _example(units: Sequence[str]) -> str:
    if "Gohm" in units:
        return "12.5 GΩ"
    return "350.4 Ω" if units[0] == "ohm" else f"12.5 {_shown(units[0])}".strip()


def _fault(typed: str, what: str, remedy: str) -> Faulty:
    shown = typed if len(typed) <= LONGEST else typed[:LONGEST] + "…"
    return Faulty([Fault("", f"“{shown}” {what}", remedy)])
