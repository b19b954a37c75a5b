"""Every unit that people type is the size that a general-purpose registry of units gives it."""

from __future__ import annotations

from decimal import Decimal
from functools import cache
from typing import Any

import pint
import pytest

from gaugelog.intake.typed import parse_quantity
from gaugelog.intake.units import PINT_NAMES
from gaugelog.ledger.base import UNITS

# Facts of NIST SP 811 (2008), appendix B.8, factors for units listed alphabetically.
NIST_SP_811 = [
    ("1 in", "mm", 25.4),
    ("1 ft", "m", 0.3048),
    ("1 cm", "mm", 10.0),
    ("1 psi", "MPa", 6.894757e-3),
    ("1 ksi", "MPa", 6.894757),
    ("1 lb/in3", "kg/m3", 2.767990e4),
    ("1 rad", "deg", 57.29578),
    ("212 °F", "degC", 100.0),
    ("-40 °F", "degC", -40.0),
    ("98.6 degF", "degC", 37.0),
]

BASES = {
    "ohm": ("ohm", "kohm", "Mohm", "Gohm", "Tohm"),
    "ohm/m": ("ohm/m",),
    "volt": ("V", "mV", "uV"),
    "ampere": ("A", "mA"),
    "dimensionless": ("1", "%", "um/m", "mV/V", "%RH"),
    "meter": ("um", "mm", "m"),
    "meter**2": ("mm2",),
    "pascal": ("Pa", "kPa", "MPa", "GPa"),
    "kg/m**3": ("kg/m3",),
    "delta_degC": ("K",),
    "1/kelvin": ("1/K", "ppm/K"),
    "watt/meter**2": ("W/m2", "kW/m2"),
    "second": ("s", "min", "h", "d"),
    "hertz": ("Hz", "kHz"),
    "radian": ("deg",),
}
"""The SI unit of each kind and the units of that kind; temperatures on a scale stay in °C."""


@cache
def registry() -> Any:
    return pint.UnitRegistry(non_int_type=Decimal)


@pytest.mark.parametrize(
    ("base", "unit"), [(b, unit) for b, units in BASES.items() for unit in units]
)
def test_each_unit_has_the_factor_of_pint(base: str, unit: str) -> None:
    # pint, an independent library of units
    named = PINT_NAMES.get(unit, unit)
    expected = registry().Quantity(Decimal(1), named).to(base).magnitude
    assert float(expected) == pytest.approx(float(UNITS[unit]), rel=1e-15)


def test_every_unit_is_held_to_pint() -> None:
    assert set(UNITS) == {unit for units in BASES.values() for unit in units} | {"degC"}


@pytest.mark.parametrize(("typed", "unit", "expected"), NIST_SP_811)
def test_foreign_units_have_the_factors_of_nist_sp_811(
    typed: str, unit: str, expected: float
) -> None:
    # NIST SP 811 (2008), B.8 and 4.2.1.1 (from memory)
    assert expected == pytest.approx(float(parse_quantity(typed, (unit,)).value), rel=1e-6)


def test_an_expansion_of_steel_is_the_same_in_both_units() -> None:
    # 6.5 ppm/°F is quoted beside 11.7 ppm/°C for carbon steel: common practice
    assert "11.7" == parse_quantity("6.5 ppm/°F", ("ppm/K",)).value
