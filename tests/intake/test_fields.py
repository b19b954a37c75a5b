"""Values of a table: each is understood or a fault with its place; later checks know which."""

from __future__ import annotations

from datetime import UTC, date, datetime
from typing import Any

import pytest

from gaugelog.intake.fields import Fields, Gathered, distinct, in_order, nothing_at
from gaugelog.ledger.base import Quantity


class Table:
    """One table with its faults, as lines."""

    def __init__(self, **values: Any) -> None:
        self.gathered: Gathered = []
        self.fields = Fields("f.toml", values, self.gathered, joint=", ")

    @property
    def lines(self) -> list[str]:
        return [str(fault) for fault in self.gathered]


def test_text_is_trimmed_and_brought_to_one_unicode_form() -> None:
    assert "Bräu" == Table(name=" Bra\u0308u ").fields.text("name")


@pytest.mark.parametrize("value", [None, "", "   ", []])
def test_nothing_is_missing_where_it_is_needed(value: object) -> None:
    table = Table(name=value)
    table.fields.text("name")
    assert ["f.toml, name: is missing."] == table.lines


def test_nothing_is_nothing_where_it_may_be_left_out() -> None:
    table = Table()
    assert "" == table.fields.text("name", needed=False)
    assert table.fields.maybe_number("size", "mm") is None
    assert table.fields.maybe_day("expires") is None
    assert () == table.fields.texts("permits")
    assert [] == table.lines


@pytest.mark.parametrize(
    ("value", "what"),
    [
        (5, "is a number, not text. Put it in quotes."),
        (True, "is true or false, not text."),
        ({"a": 1}, "is a table, not text."),
        (date(2026, 12, 1), "is a date or time, not text."),
        ("x" * 501, "has 501 characters; 500 are kept at most."),
        ("a\x1b[31m", "holds the character ‹U+001B›, which never shows. Remove it."),
        ("a\x00", "holds the character ‹U+0000›, which never shows."),
    ],
)
def test_what_can_not_be_kept_as_text_is_told(value: object, what: str) -> None:
    table = Table(name=value)
    table.fields.text("name")
    assert table.lines[0].startswith(f"f.toml, name: {what}")


@pytest.mark.parametrize(
    "label", ["FB 1", "a,b", "a/b", "a\\b", '"a"', "a" * 41, "a\u202eb", "a\u200bb", "a;b", "<a>"]
)
def test_a_label_that_would_not_stand_on_a_tag_is_told(label: str) -> None:
    table = Table(label=label)
    table.fields.label("label")
    assert "can't be a label" in table.lines[0]


@pytest.mark.parametrize("label", ["FB-1", "K7.03", "Träger_2", "点1", "L-3504", "№7"])
def test_labels_of_any_script_are_kept(label: str) -> None:
    assert label == Table(label=label).fields.label("label")


def test_a_choice_is_one_of_its_options_whatever_the_case() -> None:
    assert "d.c." == Table(kind="D.C.").fields.choice("kind", ("d.c.", "carrier"))
    assert "gauge" == Table(kind="gage").fields.choice("kind", ("text", "gauge"))


def test_a_choice_outside_its_options_names_them() -> None:
    table = Table(kind="moon")
    table.fields.choice("kind", ("laboratory", "field"))
    assert ["f.toml, kind: “moon” is not one of laboratory, field."] == table.lines


def test_a_quantity_without_its_unit_says_how_to_write_it() -> None:
    table = Table(modulus=206)
    table.fields.quantity("modulus", ("GPa",))
    assert ['f.toml, modulus: is a number, without a unit. Write it as "206 GPa".'] == table.lines


@pytest.mark.parametrize("value", [0, 0.0, "0", "-0"])
def test_zero_is_a_number_and_not_above_nothing(value: object) -> None:
    assert 0 == Table(size=value).fields.number("size", "mm").si()
    table = Table(size=value)
    table.fields.number("size", "mm", positive=True)
    assert "must be above 0" in table.lines[0]


@pytest.mark.parametrize(
    "value", ["1e999", "nan", float("nan"), float("inf"), "0x10", "1_000", "12 mm", "ten", 10**40]
)
def test_what_is_no_number_of_the_trade_is_told(value: object) -> None:
    table = Table(size=value)
    table.fields.number("size", "mm")
    assert "is no number of this trade" in table.lines[0]


def test_a_decimal_comma_is_told_to_be_a_point() -> None:
    table = Table(size="0,5")
    table.fields.number("size", "mm")
    assert table.lines[0].endswith("has a decimal comma. Write 0.5.")


def test_true_is_neither_a_number_nor_a_whole_one() -> None:
    table = Table(size=True, count=True)
    table.fields.number("size", "mm")
    table.fields.whole("count", 0, 9)
    assert 2 == len(table.lines)


@pytest.mark.parametrize("value", [11, -1, "2.0", "", "nine", 10**30, 0xF << 9000])
def test_what_is_no_whole_number_in_bounds_is_told(value: object) -> None:
    table = Table(count=value)
    table.fields.whole("count", 0, 10)
    assert 1 == len(table.lines)


@pytest.mark.parametrize("value", ["2026-12-01", date(2026, 12, 1)])
def test_a_day_is_a_date_as_text_or_as_toml_has_it(value: object) -> None:
    assert "2026-12-01" == Table(due=value).fields.day("due")


@pytest.mark.parametrize(
    "value",
    ["1.12.2026", "20261201", "2026-W49-2", "2026-13-01", datetime(2026, 12, 1, tzinfo=UTC), 2026],
)
def test_what_is_no_day_is_told(value: object) -> None:
    table = Table(due=value)
    table.fields.day("due")
    assert "is no date. Write it like 2026-12-01." in table.lines[0]


def test_lists_and_tables_of_the_wrong_kind_are_told() -> None:
    table = Table(permits="one", pins=["a"], zone={"a": 1}, material=5, flag="yes")
    table.fields.texts("permits")
    table.fields.pairs("pins", ("a",))
    table.fields.tables("zone")
    table.fields.table("material")
    table.fields.flag("flag", True)
    assert 5 == len(table.lines)


def test_a_name_that_is_not_asked_for_is_told_with_those_that_are() -> None:
    table = Table(title="T", colour="red")
    table.fields.text("title")
    table.fields.done()
    assert ["f.toml, colour: is not known here. Known: title."] == table.lines


def test_places_within_are_written_as_a_path() -> None:
    table = Table(module=[{"channel": [{"label": "a b"}]}])
    table.fields.tables("module")[0].tables("channel")[0].label("label")
    assert table.lines[0].startswith("f.toml, module[1].channel[1].label: ")


def test_values_that_had_a_fault_are_not_compared() -> None:
    table = Table(low=9, high="x")
    low, high = table.fields.number("low", "mm"), table.fields.number("high", "mm")
    in_order(table.fields, "low", "high", (low.si(), high.si()), "lies below low.")
    assert 1 == len(table.lines)
    assert not table.fields.sound("low", "high")


def test_a_second_figure_below_the_first_is_told_at_the_second() -> None:
    table = Table(low=9, high=3)
    in_order(table.fields, "low", "high", (9, 3), "lies below low.")
    assert ["f.toml, high: lies below low."] == table.lines


def test_a_missing_column_makes_its_cells_unsound_without_a_fault() -> None:
    gathered: Gathered = []
    row = Fields("f.csv, row 2", {}, gathered, ", column ", absent=["size"])
    assert Quantity(value="1", unit="mm") == row.number("size", "mm")
    assert not row.sound("size")
    assert [] == gathered


def test_labels_that_stand_twice_are_told_with_the_first() -> None:
    gathered: Gathered = []
    rows = [Fields(f"f.csv, row {n}", {}, gathered, ", column ") for n in (2, 3, 4)]
    distinct(rows, "lot", ["A", "", "a"])
    assert ["f.csv, row 4, column lot: “a” stands twice. First at f.csv, row 2."] == [
        str(fault) for fault in gathered
    ]


def test_fields_of_a_missing_table_gather_nothing() -> None:
    nothing = nothing_at("f.toml")
    assert "" == nothing.text("title")
    nothing.done()
