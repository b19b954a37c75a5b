"""Units as people spell them; the common ones by a table, foreign ones converted by pint."""

from __future__ import annotations

import unicodedata
from collections.abc import Sequence
from decimal import Context, Decimal
from functools import cache
from typing import Any

from gaugelog.ledger.base import SYMBOLS, UNITS, Quantity

_CASE_MATTERS = frozenset({"mV", "MPa", "Mohm", "m", "mm"})

_SPELLINGS: dict[str, str] = {
    **{unit: unit for unit in UNITS},
    **{symbol.replace(" ", ""): unit for unit, symbol in SYMBOLS.items() if symbol},
    "MOhm": "Mohm",
    "MOHM": "Mohm",
    "Mohms": "Mohm",
    "Ω/m": "ohm/m",
    "ohms": "ohm",
    "C": "degC",
    "degrees": "deg",
    "hours": "h",
    "days": "d",
    "minutes": "min",
    "seconds": "s",
}
_ANY_CASE: dict[str, str] = {
    **{unit.casefold(): unit for unit in UNITS if unit not in _CASE_MATTERS},
    "ohms": "ohm",
    "kohms": "kohm",
    "gohms": "Gohm",
    "kiloohm": "kohm",
    "kiloohms": "kohm",
    "megohm": "Mohm",
    "megohms": "Mohm",
    "megaohm": "Mohm",
    "gigaohm": "Gohm",
    "gigohm": "Gohm",
    "teraohm": "Tohm",
    "ue": "um/m",
    "µe": "um/m",
    "microstrain": "um/m",
    "%rh": "%RH",
    "%r.h.": "%RH",
}
_FOREIGN: dict[str, tuple[str, str]] = {
    "in": ("inch", "mm"),
    "inch": ("inch", "mm"),
    "inches": ("inch", "mm"),
    "ft": ("foot", "m"),
    "cm": ("centimeter", "mm"),
    "psi": ("psi", "MPa"),
    "ksi": ("ksi", "MPa"),
    "F": ("degF", "degC"),
    "degF": ("degF", "degC"),
    "°F": ("degF", "degC"),
    "ppm/F": ("ppm/delta_degF", "ppm/K"),
    "ppm/degF": ("ppm/delta_degF", "ppm/K"),
    "ppm/°F": ("ppm/delta_degF", "ppm/K"),
    "ppm/C": ("ppm/delta_degC", "ppm/K"),
    "ppm/degC": ("ppm/delta_degC", "ppm/K"),
    "ppm/°C": ("ppm/delta_degC", "ppm/K"),
    "lb/in3": ("pound/inch**3", "kg/m3"),
    "W/in2": ("watt/inch**2", "kW/m2"),
    "g/cm3": ("gram/centimeter**3", "kg/m3"),
    "t/m3": ("tonne/meter**3", "kg/m3"),
    "ohm/ft": ("ohm/foot", "ohm/m"),
    "Ω/ft": ("ohm/foot", "ohm/m"),
    "ohm/km": ("ohm/kilometer", "ohm/m"),
    "Ω/km": ("ohm/kilometer", "ohm/m"),
    "rad": ("radian", "deg"),
}
"""A spelling, what pint calls it, and the unit of ours it is converted to.

Only these are converted: pint reads `mohm` as milliohm and an angle as a bare number, and units
are never guessed.
"""

PINT_NAMES: dict[str, str] = {
    "mm2": "mm**2",
    "kg/m3": "kg/m**3",
    "W/m2": "W/m**2",
    "kW/m2": "kW/m**2",
    "%": "percent",
    "%RH": "percent",
    "1": "dimensionless",
}
"""What pint calls those units of ours that it spells otherwise."""


def tidy(text: str) -> str:
    """One spelling for look-alikes: minus, Ω and µ signs, spaces, ≥ and ≤ of a meter's bound."""
    plain = unicodedata.normalize("NFC", text).replace("μ", "µ")
    plain = plain.replace("−", "-").replace("≥", ">").replace("≤", "<")
    return " ".join(plain.split())


def unit_of(text: str) -> str | None:
    """The unit meant by a spelling, or None; letter case counts where it changes the meaning.

    >>> unit_of("M Ω"), unit_of("mohm")
    ('Mohm', None)
    """
    plain = tidy(text).replace(" ", "")
    return _SPELLINGS.get(plain) or _ANY_CASE.get(plain.casefold())


def converted(number: str, unit: str, units: Sequence[str]) -> Quantity | None:
    """A number in a foreign unit, in the unit of `units` it is converted to; None if none fits.

    Kept to eight digits, more where more were typed: far beyond what any reading carries.

    >>> str(converted("0.5", "in", ("mm",)))
    '12.7 mm'
    """
    foreign = _FOREIGN.get(tidy(unit).replace(" ", ""))
    if foreign is None or foreign[1] not in units:
        return None
    name, ours = foreign
    registry = _registry()
    exact = registry.Quantity(Decimal(number), name).to(PINT_NAMES.get(ours, ours)).magnitude
    digits = max(8, len(Decimal(number).as_tuple().digits) + 3)
    kept = Context(prec=digits).plus(Decimal(exact).quantize(Decimal("1e-15"), context=_WIDE))
    return Quantity(value=f"{kept.normalize():f}", unit=ours)


_WIDE = Context(prec=60)


@cache
def _registry() -> Any:
    import pint

    registry: Any = pint.UnitRegistry(non_int_type=Decimal)
    return registry
