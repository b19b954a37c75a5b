"""What is typed at a meter is understood as it was meant, or refused in one sentence."""

from __future__ import annotations

from decimal import Decimal

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.errors import Faulty
from gaugelog.intake.typed import (
    LONGEST,
    number_of,
    parse_quantity,
    parse_reading,
    pointed,
)
from gaugelog.ledger.base import UNITS, Quantity
from tests.intake.conftest import faults_of, lines_of, told

OHMS = ("ohm", "kohm")


def refusal(text: str, check: str = "insulation") -> str:
    (line,) = lines_of(lambda: parse_reading(text, check))
    return line


@pytest.mark.parametrize(
    "text",
    [
        "12.5 GΩ",
        "12.5 Gohm",
        "12.5GOhm",
        " 12.5  gohm ",
        "12.5 gigaohm",
        "12.5 G\u2126",
        "12.5 G Ω",
        "= 12.5 GΩ",
    ],
)
def test_one_insulation_typed_in_many_ways_is_one_reading(text: str) -> None:
    found = parse_reading(text, "insulation")
    assert Quantity(value="12.5", unit="Gohm") == found.quantity
    assert "=" == found.qualifier


def test_a_reading_keeps_the_very_text_that_was_typed() -> None:
    assert ">20 GΩ" == parse_reading("  >20 GΩ ", "insulation").typed


@pytest.mark.parametrize(
    ("text", "qualifier"), [(">20 GΩ", ">"), ("> 20 GΩ", ">"), ("≥20 GΩ", ">"), ("<0.1 Mohm", "<")]
)
def test_a_bound_that_the_meter_shows_is_a_qualifier(text: str, qualifier: str) -> None:
    assert qualifier == parse_reading(text, "insulation").qualifier


@pytest.mark.parametrize(
    "text", ["OL", "ol", "0L", "O.L", "overload", "Overload", "OL MΩ", "OL Gohm"]
)
def test_a_meter_out_of_range_is_an_overload_without_a_value(text: str) -> None:
    found = parse_reading(text, "insulation")
    assert ("overload", None) == (found.qualifier, found.quantity)


def test_an_overload_with_a_strange_unit_is_refused() -> None:
    assert "is no reading" in refusal("OL volts")


@pytest.mark.parametrize("text", ["12.5 mohm", "12.5 mΩ", "12.5 m Ω", "12.5 mOhm", "12.5 mOHM"])
def test_milli_or_mega_is_asked_and_never_guessed(text: str) -> None:
    assert "milli or mega?" in refusal(text)


@pytest.mark.parametrize("text", ["12.5 Mohm", "12.5 MΩ", "12.5 MOhm", "12.5 MOHM", "12.5 megohm"])
def test_a_capital_m_is_mega(text: str) -> None:
    assert Quantity(value="12.5", unit="Mohm") == parse_reading(text, "insulation").quantity


def test_a_reading_without_its_unit_is_refused() -> None:
    assert "“12.5” has no unit. Type it like 12.5 GΩ." == refusal("12.5").removeprefix(": ")


@pytest.mark.parametrize(
    ("text", "shown"),
    [
        ("350.40 ohm", "350.40 Ω"),
        ("350.4 Ω", "350.4 Ω"),
        ("0.3504 kohm", "0.3504 kΩ"),
        ("3.504e2 ohm", "3.504e2 Ω"),
        ("+350.4 ohm", "350.4 Ω"),
    ],
)
def test_a_resistance_keeps_its_digits(text: str, shown: str) -> None:
    assert shown == str(parse_reading(text, "resistance").quantity)


def test_a_decimal_comma_is_told_with_what_to_type_instead() -> None:
    line = refusal("350,4 ohm", "resistance")
    assert "has a decimal comma. Type a decimal point: 350.4 ohm." in line


@pytest.mark.parametrize(
    "text",
    [
        "",
        "GΩ",
        "twelve GΩ",
        "1 234 GΩ",
        "1,234.5 GΩ",
        "..5 GΩ",
        "--5 GΩ",
        "nan GΩ",
        "inf GΩ",
        "good",
        "5 6 Ω",
    ],
)
def test_what_is_no_number_is_refused(text: str) -> None:
    assert "is no" in refusal(text)


def test_digits_of_other_scripts_are_no_number() -> None:
    assert "is no reading" in refusal("\u0661\u0662 GΩ")


@pytest.mark.parametrize("text", ["1e31 ohm", "1e999 ohm", "1e-400 ohm", "9e9999 ohm"])
def test_numbers_beyond_all_bounds_are_refused(text: str) -> None:
    assert "is no number of this trade" in refusal(text)


def test_a_resistance_below_zero_is_no_reading() -> None:
    assert "is below 0, which no resistance is" in refusal("-350 ohm", "resistance")


def test_a_unit_of_another_kind_names_the_units_that_fit() -> None:
    assert "has the unit V. Units here: Ω, kΩ." in refusal("350.4 V", "resistance")


def test_a_long_text_is_refused_and_shown_shortened() -> None:
    (fault,) = faults_of(lambda: parse_reading("1" * 500 + " GΩ", "insulation"))
    assert len(fault.what) < LONGEST + 40


def test_a_quantity_has_no_bound() -> None:
    with pytest.raises(Faulty):
        parse_quantity("> 3 mm", ("mm",))


def test_a_typographic_minus_is_a_minus() -> None:
    assert Quantity(value="-5", unit="degC") == parse_quantity("−5 °C", ("degC",))


def test_humidity_may_be_typed_in_plain_per_cent() -> None:
    assert Quantity(value="52", unit="%RH") == parse_quantity("52 %", ("%RH",))


def test_a_bare_number_is_a_quantity_only_where_it_has_no_unit() -> None:
    assert Quantity(value="0.3", unit="1") == parse_quantity("0.3", ("1",))
    with pytest.raises(Faulty):
        parse_quantity("0.3", ("mm",))


def test_a_unit_that_fits_after_conversion_is_converted() -> None:
    assert Quantity(value="12.7", unit="mm") == parse_quantity("0.5 in", ("mm",))


def test_a_foreign_unit_of_another_kind_is_refused() -> None:
    with pytest.raises(Faulty):
        parse_quantity("0.5 in", OHMS)


@pytest.mark.parametrize(
    ("text", "point"),
    [("0,5", "0.5"), ("-1,5e3", "-1.5e3"), ("−2,08", "−2.08"), ("0.5", None), ("1,234.5", None)],
)
def test_a_decimal_comma_is_known_when_seen(text: str, point: str | None) -> None:
    assert point == pointed(text)


@given(st.decimals(min_value=0, max_value=10**20, places=4, allow_nan=False))
def test_every_plain_decimal_comes_through_digit_by_digit(value: Decimal) -> None:
    assert f"{value:f}" == number_of(f"{value:f}")


@given(
    st.decimals(min_value=0, max_value=10**6, places=3, allow_nan=False),
    st.sampled_from(["ohm", "kohm", "Mohm", "Gohm", "Tohm"]),
)
def test_a_quantity_as_written_out_is_read_back(value: Decimal, unit: str) -> None:
    written = Quantity(value=f"{value:f}", unit=unit)
    assert written == parse_reading(str(written), "insulation").quantity


@given(st.text(max_size=80), st.sampled_from(["resistance", "insulation"]))
def test_any_text_is_understood_or_told_in_one_sentence(text: str, check: str) -> None:
    faults = told(lambda: parse_reading(text, check))
    assert faults is None or 1 == len(faults)


@given(
    st.from_regex(r"[<>=]?[-+0-9.,eE]{1,12} ?[a-zA-ZΩµμ°%/ 0-9]{0,8}", fullmatch=True),
    st.sampled_from(sorted(UNITS)),
)
def test_any_near_quantity_is_understood_or_told(text: str, unit: str) -> None:
    faults = told(lambda: parse_quantity(text, (unit,)))
    assert faults is None or 1 == len(faults)
