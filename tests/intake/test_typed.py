"""What is typed at a meter is understood as it was meant, or refused in one sentence."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.errors import Faulty
from gaugelog.intake.typed import parse_quantity, parse_reading, unit_of
from gaugelog.ledger.base import SYMBOLS, UNITS


@pytest.mark.parametrize(
    ("text", "check", "qualifier", "shown"),
    [
        ("12.5 GΩ", "insulation", "=", "12.5 GΩ"),
        ("12.5 Gohm", "insulation", "=", "12.5 GΩ"),
        ("12.5GOhm", "insulation", "=", "12.5 GΩ"),
        (">20 GΩ", "insulation", ">", "20 GΩ"),
        ("> 20 Gohm", "insulation", ">", "20 GΩ"),
        ("<5 Mohm", "insulation", "<", "5 MΩ"),
        ("12.5 MΩ", "insulation", "=", "12.5 MΩ"),
        ("12500 megohm", "insulation", "=", "12500 MΩ"),
        ("350.40 ohm", "resistance", "=", "350.40 Ω"),
        ("350.4 Ω", "resistance", "=", "350.4 Ω"),
        ("0.3504 kohm", "resistance", "=", "0.3504 kΩ"),
        ("3.504e2 ohm", "resistance", "=", "3.504e2 Ω"),
    ],
)
def test_a_reading_keeps_its_digits(text: str, check: str, qualifier: str, shown: str) -> None:
    found = parse_reading(text, check)
    assert qualifier == found.qualifier
    assert shown == str(found.quantity)
    assert text == found.typed


@pytest.mark.parametrize("text", ["OL", "ol", "O.L", "overload", "0L"])
def test_an_overload_is_a_reading_without_a_value(text: str) -> None:
    found = parse_reading(text, "insulation")
    assert found.qualifier == "overload"
    assert found.quantity is None


@pytest.mark.parametrize(
    ("text", "check", "sentence"),
    [
        ("12.5 mohm", "insulation", "milli or mega"),
        ("12.5 mΩ", "insulation", "milli or mega"),
        ("12.5", "insulation", "has no unit"),
        ("350,4 ohm", "resistance", "decimal comma"),
        ("350.4 V", "resistance", "has the unit V"),
        ("12.5 Gohm", "resistance", "has the unit Gohm"),
        ("good", "insulation", "is no reading"),
        ("", "insulation", "is no reading"),
        ("nan ohm", "resistance", "is no reading"),
        ("--5 ohm", "resistance", "is no number"),
        ("5 ohm 6 ohm", "resistance", "has the unit"),
        ("9" * 80 + " ohm", "resistance", "is no reading"),
    ],
)
def test_what_is_not_understood_is_never_guessed(text: str, check: str, sentence: str) -> None:
    with pytest.raises(Faulty) as caught:
        parse_reading(text, check)
    assert sentence in caught.value.faults[0].what


@pytest.mark.parametrize(
    ("text", "unit", "shown"),
    [
        ("21.5 °C", "degC", "21.5 °C"),
        ("−3 degC", "degC", "-3 °C"),
        ("45 % RH", "%RH", "45 % RH"),
        ("45 %", "%RH", "45 % RH"),
        ("0.3 mm", "mm", "0.3 mm"),
    ],
)
def test_a_quantity_is_understood(text: str, unit: str, shown: str) -> None:
    assert shown == str(parse_quantity(text, (unit,)))


def test_mega_and_milli_stay_apart() -> None:
    assert unit_of("MPa") == "MPa"
    assert unit_of("mV") == "mV"
    assert unit_of("MV") is None


@pytest.mark.parametrize("unit", sorted(UNITS))
def test_every_unit_can_be_typed_as_it_is_shown(unit: str) -> None:
    assert unit == unit_of(unit)
    if SYMBOLS.get(unit):
        assert unit == unit_of(SYMBOLS[unit])


@given(st.text(max_size=80))
def test_any_text_is_a_reading_or_one_fault(text: str) -> None:
    try:
        parse_reading(text, "insulation")
    except Faulty as error:
        found = error.faults
    else:
        return
    assert len(found) == 1


@given(st.text(max_size=80))
def test_any_text_is_a_quantity_or_one_fault(text: str) -> None:
    try:
        parse_quantity(text, ("mm",))
    except Faulty as error:
        found = error.faults
    else:
        return
    assert len(found) == 1
