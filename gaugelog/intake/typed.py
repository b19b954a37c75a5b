"""What people type at a meter, "12.5 GΩ" or ">20 GΩ", understood; units are never guessed."""

from __future__ import annotations

import re
from collections.abc import Sequence
from dataclasses import dataclass

from gaugelog.errors import Fault, Faulty
from gaugelog.intake.units import converted, tidy, unit_of
from gaugelog.ledger.base import SYMBOLS, Quantity
from gaugelog.ledger.checks import CHECKS, SIGNED
from gaugelog.ledger.readings import Qualifier

LONGEST = 60
LARGEST_POWER = 30
"""Powers of ten beyond which no number of the trade lies, either way."""

_TYPED = re.compile(
    r"(?P<sign>[<>=]?) ?"
    r"(?P<number>[-+]?[\d.,]+(?:[eE][+-]?\d+)?) ?"
    r"(?P<unit>(?:[A-Za-zΩµ%°/][^<>=]*|1/K)?)",
    re.ASCII,
)
_NUMBER = re.compile(r"[+-]?(?P<digits>\d+(\.\d*)?|\.\d+)([eE][+-]?\d{1,3})?", re.ASCII)
_COMMA = re.compile(r"[+−-]?\d+,\d+([eE][+-]?\d+)?", re.ASCII)
_OVERLOAD = frozenset({"ol", "o.l", "o.l.", "overload", "over", "0l"})
_MILLI_OR_MEGA = frozenset({"mohm", "mohms", "mω"})

CHECK_UNITS: dict[str, tuple[str, ...]] = {name: kind.units for name, kind in CHECKS.items()}
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
    typed, units = text.strip(), CHECK_UNITS[check]
    if CHECKS[check].attribute:
        return _mark(typed)
    if _is_overload(typed, units):
        return TypedReading("overload", None, typed)
    match = _match(typed, "reading", units)
    found = _quantity(match, units, typed)
    if found.si() < 0 and check not in SIGNED:
        raise _fault(typed, f"is below 0, which no {check} is.", "Measure again; mind the leads.")
    return TypedReading(_qualifier(match["sign"]), found, typed)


def _mark(typed: str) -> TypedReading:
    """A reading that is no number: the label of the channel that answered."""
    if len(typed) > LONGEST:
        raise _fault(typed, "is too long for a label.", "Type it as it stands on the channel.")
    return TypedReading("=", None, typed)


def parse_quantity(text: str, units: Sequence[str]) -> Quantity:
    """Understand a quantity in one of `units`. Raises Faulty with one plain sentence.

    A few foreign units are converted to one of `units`: inches, degrees Fahrenheit, ksi.

    >>> str(parse_quantity("21.5 °C", ("degC",)))
    '21.5 °C'
    """
    typed = text.strip()
    match = _match(typed, "quantity", units)
    if match["sign"]:
        raise _fault(typed, "is no quantity.", f"Type it like {_example(units)}.")
    return _quantity(match, units, typed)


def number_of(text: str) -> str | None:
    """A plain decimal number without its plus sign, or None when it is none or beyond reason.

    >>> number_of("+12.50"), number_of("twelve"), number_of("1e99")
    ('12.50', None, None)
    """
    plain = text.strip().replace("−", "-")
    match = _NUMBER.fullmatch(plain) if len(plain) <= LONGEST else None
    if match is None:
        return None
    is_zero = not match["digits"].strip("0.")
    if not is_zero and not 10.0**-LARGEST_POWER <= abs(float(plain)) <= 10.0**LARGEST_POWER:
        return None
    return plain.removeprefix("+")


def pointed(text: str) -> str | None:
    """A number written with a decimal comma as it should be, or None when it has none.

    >>> pointed("2,08"), pointed("2.08"), pointed("1,234.5")
    ('2.08', None, None)
    """
    plain = text.strip()
    return plain.replace(",", ".") if _COMMA.fullmatch(plain) else None


def _match(typed: str, what: str, units: Sequence[str]) -> re.Match[str]:
    match = _TYPED.fullmatch(tidy(typed)) if len(typed) <= LONGEST else None
    if match is None:
        raise _fault(typed, f"is no {what}.", f"Type it like {_example(units)}.")
    return match


def _is_overload(typed: str, units: Sequence[str]) -> bool:
    """A meter shows OL, often with the unit of its range."""
    word, _, unit = typed.partition(" ")
    return word.casefold() in _OVERLOAD and (not unit or unit_of(unit) in units)


def _quantity(match: re.Match[str], units: Sequence[str], typed: str) -> Quantity:
    number, unit = match["number"], match["unit"].strip()
    point = pointed(number)
    if point is not None:
        asked = f"Type a decimal point: {point} {unit}".rstrip()
        raise _fault(typed, "has a decimal comma.", f"{asked}.")
    value = number_of(number)
    if value is None:
        raise _fault(typed, "is no number of this trade.", f"Type it like {_example(units)}.")
    _demand_plain(unit, units, typed)
    found = _unit(unit, units)
    quantity = Quantity(value=value, unit=found) if found else converted(value, unit, units)
    if quantity is None:
        allowed = ", ".join(_shown(each) for each in units)
        raise _fault(typed, f"has the unit {unit}.", f"Units here: {allowed}.")
    return quantity


def _demand_plain(unit: str, units: Sequence[str], typed: str) -> None:
    if not unit and tuple(units) != ("1",):
        raise _fault(typed, "has no unit.", f"Type it like {_example(units)}.")
    bare = unit.replace(" ", "")
    if bare[:1] == "m" and bare.casefold() in _MILLI_OR_MEGA:
        raise _fault(
            typed,
            f"has the unit {unit}: milli or mega?",
            "Type Mohm for a million ohms, or the value in ohm.",
        )


def _unit(unit: str, units: Sequence[str]) -> str | None:
    if not unit:
        return "1"
    found = "%RH" if unit == "%" and "%RH" in units else unit_of(unit)
    return found if found in units else None


def _qualifier(sign: str) -> Qualifier:
    return ">" if sign == ">" else "<" if sign == "<" else "="


def _shown(unit: str) -> str:
    return SYMBOLS.get(unit) or unit


def _example(units: Sequence[str]) -> str:
    if "Gohm" in units:
        return "12.5 GΩ"
    if units[0] == "1":
        return "12.5"
    return "350.4 Ω" if units[0] == "ohm" else f"12.5 {_shown(units[0])}"


def _fault(typed: str, what: str, remedy: str) -> Faulty:
    shown = typed if len(typed) <= LONGEST else typed[:LONGEST] + "…"
    return Faulty([Fault("", f"“{shown}” {what}", remedy)])
