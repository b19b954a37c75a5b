from __future__ import annotations

import subprocess
import sys

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.intake.units import converted, tidy, unit_of
from gaugelog.ledger.base import SYMBOLS, UNITS


@pytest.mark.parametrize("unit", UNITS)
def test_each_unit_is_known_by_its_name_and_by_its_symbol(unit: str) -> None:
    assert unit == unit_of(unit)
    assert unit == unit_of(SYMBOLS.get(unit) or unit)


@pytest.mark.parametrize(
    ("text", "unit"),
    [
        ("ohms", "ohm"),
        ("Ohm", "ohm"),
        ("OHM", "ohm"),
        ("deg C", "degC"),
        ("% RH", "%RH"),
        ("µm / m", "um/m"),
        ("microstrain", "um/m"),
        ("μm/m", "um/m"),
        ("GPA", "GPa"),
        ("hours", "h"),
    ],
)
def test_common_spellings_are_known(text: str, unit: str) -> None:
    assert unit == unit_of(text)


@pytest.mark.parametrize("text", ["mohm", "mΩ", "mpa", "MV", "M", "MM", "", "furlong", "G"])
def test_a_spelling_that_could_mean_another_size_is_not_known(text: str) -> None:
    assert unit_of(text) is None


def test_look_alikes_become_one_character() -> None:
    assert "-5 µm Ω" == tidy("−5\u00a0 μm\t\u2126")


@pytest.mark.parametrize(
    ("number", "unit", "ours", "value"),
    [
        ("70", "°F", "degC", "21.111111"),
        ("32", "degF", "degC", "0"),
        ("-40", "F", "degC", "-40"),
        ("0.125", "inch", "mm", "3.175"),
        ("6.5", "ppm/°F", "ppm/K", "11.7"),
        ("11.7", "ppm/°C", "ppm/K", "11.7"),
        ("1", "psi", "MPa", "0.0068947573"),
        ("55", "Ω/km", "ohm/m", "0.055"),
        ("7.85", "g/cm3", "kg/m3", "7850"),
    ],
)
def test_foreign_units_are_converted(number: str, unit: str, ours: str, value: str) -> None:
    found = converted(number, unit, (ours,))
    assert found is not None
    assert (value, ours) == (found.value, found.unit)


def test_what_is_not_on_the_list_is_not_converted() -> None:
    assert converted("5", "deg", ("um/m",)) is None
    assert converted("5", "milliohm", ("ohm",)) is None
    assert converted("5", "in", ("degC",)) is None


def test_a_conversion_keeps_more_digits_than_were_typed() -> None:
    found = converted("0.123456789012", "in", ("mm",))
    assert found is not None
    assert "3.1358024409048" == found.value


@given(st.decimals(min_value=-200, max_value=2000, places=2).map(str))
def test_fahrenheit_is_converted_as_the_formula_says(number: str) -> None:
    found = converted(number, "degF", ("degC",))
    assert found is not None
    assert (float(number) - 32) / 1.8 == pytest.approx(float(found.value), abs=1e-4)


def test_common_units_are_understood_without_loading_pint() -> None:
    code = (
        "import sys\n"
        "from gaugelog.intake.typed import parse_reading\n"
        "parse_reading('12.5 GΩ', 'insulation')\n"
        "sys.exit('pint' in sys.modules)"
    )
    assert 0 == subprocess.run([sys.executable, "-c", code], check=False).returncode
