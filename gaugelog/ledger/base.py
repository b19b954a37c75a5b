"""What every fact and every ledger table is built from: frozen models, decimal text, quantities."""

from __future__ import annotations

from decimal import Decimal
from typing import Annotated, ClassVar

from pydantic import BaseModel, ConfigDict, StringConstraints

Id = Annotated[str, StringConstraints(min_length=1, max_length=64)]
"""Random text made by the program; for a person, the id they enrolled with."""

DecimalText = Annotated[
    str, StringConstraints(pattern=r"^[+-]?(\d+(\.\d*)?|\.\d+)([eE][+-]?\d+)?$")
]
"""A number as decimal text with the digits that were typed or that decided."""

TimeText = Annotated[str, StringConstraints(pattern=r"^\d{4}-\d\d-\d\dT\d\d:\d\d:\d\d(\.\d+)?Z$")]
"""A UTC time, `2026-12-01T09:00:00Z`."""

DateText = Annotated[str, StringConstraints(pattern=r"^\d{4}-\d\d-\d\d$")]
"""A calendar date, `2026-12-01`."""


class Part(BaseModel):
    """A part of a fact. Frozen; fields a newer program wrote are kept.

    What validates it is built when it is first needed: a command needs a few of many kinds.
    """

    model_config = ConfigDict(frozen=True, extra="allow", defer_build=True)


class FactBody(Part):
    """The fact of one entry; its kind and version are stable names, never import paths."""

    kind: ClassVar[str]
    version: ClassVar[int] = 1


class Quantity(Part):
    """A value as decimal text with its unit, one of `UNITS`; never a float, never a bare number."""

    value: DecimalText
    unit: str

    def si(self) -> float:
        """The value in SI units (ohm, V, m, Pa, s, ratio); temperatures stay in °C."""
        return float(Decimal(self.value) * UNITS[self.unit])

    def to(self, unit: str) -> float:
        """The value in another unit of the same dimension."""
        return float(Decimal(self.value) * UNITS[self.unit] / UNITS[unit])

    def __str__(self) -> str:
        """The value with its unit as people write it, `10 GΩ`."""
        symbol = SYMBOLS.get(self.unit, self.unit)
        return self.value if symbol == "" else f"{self.value} {symbol}"


UNITS: dict[str, Decimal] = {
    "1": Decimal(1),
    "%": Decimal("0.01"),
    "um/m": Decimal("1e-6"),
    "ohm": Decimal(1),
    "kohm": Decimal("1e3"),
    "Mohm": Decimal("1e6"),
    "Gohm": Decimal("1e9"),
    "Tohm": Decimal("1e12"),
    "ohm/m": Decimal(1),
    "V": Decimal(1),
    "mV": Decimal("1e-3"),
    "uV": Decimal("1e-6"),
    "A": Decimal(1),
    "mA": Decimal("1e-3"),
    "mV/V": Decimal("1e-3"),
    "um": Decimal("1e-6"),
    "mm": Decimal("1e-3"),
    "m": Decimal(1),
    "mm2": Decimal("1e-6"),
    "Pa": Decimal(1),
    "kPa": Decimal("1e3"),
    "MPa": Decimal("1e6"),
    "GPa": Decimal("1e9"),
    "kg/m3": Decimal(1),
    "degC": Decimal(1),
    "K": Decimal(1),
    "1/K": Decimal(1),
    "ppm/K": Decimal("1e-6"),
    "W/m2": Decimal(1),
    "kW/m2": Decimal("1e3"),
    "s": Decimal(1),
    "min": Decimal(60),
    "h": Decimal(3600),
    "d": Decimal(86400),
    "Hz": Decimal(1),
    "kHz": Decimal("1e3"),
    "deg": Decimal("0.017453292519943295769"),
    "%RH": Decimal("0.01"),
}
"""The units a fact may carry, each with its factor to SI."""

SYMBOLS: dict[str, str] = {
    "1": "",
    "um/m": "µm/m",
    "ohm": "Ω",
    "kohm": "kΩ",
    "Mohm": "MΩ",
    "Gohm": "GΩ",
    "Tohm": "TΩ",
    "ohm/m": "Ω/m",
    "uV": "µV",
    "um": "µm",
    "mm2": "mm²",
    "kg/m3": "kg/m³",
    "degC": "°C",
    "W/m2": "W/m²",
    "kW/m2": "kW/m²",
    "deg": "°",
    "%RH": "% RH",
}
"""How people write a unit where its plain-text name differs."""
