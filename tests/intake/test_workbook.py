"""Spreadsheets: read as CSV of the same cells is, or told with the cell that can't be."""

from __future__ import annotations

import csv
import io
import re
import time
import zipfile
from collections.abc import Callable
from datetime import date, datetime
from pathlib import Path
from typing import Any

import openpyxl
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from gaugelog.errors import Faulty
from gaugelog.intake.fields import Gathered
from gaugelog.intake.stock import load_stock
from gaugelog.intake.tables import Columns, rows_of
from gaugelog.intake.workbook import Unreadable, cells_of
from tests.intake.conftest import DEMO, counter, faults_of, lines_of, places_of, told, understood

Table = list[list[Any]]
NUMBER = re.compile(r"-?\d+(\.\d+)?", re.ASCII)


def xlsx(*sheets: Table) -> bytes:
    """A workbook with these sheets, as the library writes them."""
    book = openpyxl.Workbook()
    book.remove(book.active)
    for number, table in enumerate(sheets, start=1):
        sheet = book.create_sheet(f"Sheet{number}")
        for row in table:
            sheet.append(row)
    out = io.BytesIO()
    book.save(out)
    return out.getvalue()


def table_of(file: Path) -> Table:
    """A CSV file's cells, numbers and dates as a person's spreadsheet holds them."""
    rows = csv.reader(io.StringIO(file.read_text(encoding="utf-8")))
    return [[_typed(cell) for cell in row] for row in rows]


def _typed(cell: str) -> Any:
    if NUMBER.fullmatch(cell):
        return float(cell)
    if re.fullmatch(r"\d{4}-\d\d-\d\d", cell):
        return datetime.fromisoformat(cell)
    return cell or None


@pytest.fixture
def sheets(plan: Path) -> Path:
    """The demo's plan with its tables as spreadsheets."""
    for name in ("grids", "circuits"):
        (plan / f"{name}.xlsx").write_bytes(xlsx(table_of(plan / f"{name}.csv")))
        (plan / f"{name}.csv").unlink()
    return plan


def _set(file: Path, row: int, column: str, value: Any, form: str = "") -> None:
    book = openpyxl.load_workbook(file)
    sheet = book.active
    place = [cell.value for cell in sheet[1]].index(column) + 1
    cell = sheet.cell(row, place)
    cell.value = value
    if form:
        cell.number_format = form
    book.save(file)


def test_a_plan_from_spreadsheets_is_the_plan_from_text(plan: Path) -> None:
    from_text = understood(plan)
    for name in ("grids", "circuits"):
        (plan / f"{name}.xlsx").write_bytes(xlsx(table_of(plan / f"{name}.csv")))
        (plan / f"{name}.csv").unlink()
    from_sheets = understood(plan)
    assert from_text.points == from_sheets.points
    assert from_text.circuits == from_sheets.circuits
    assert {"grids.xlsx", "circuits.xlsx"} <= set(from_sheets.files)


def test_stock_from_spreadsheets_is_the_stock_from_text(tmp_path: Path) -> None:
    texts = [DEMO / "lots.csv", DEMO / "consumables.csv"]
    sheets = []
    for file in texts:
        sheets.append(tmp_path / f"{file.stem}.xlsx")
        sheets[-1].write_bytes(xlsx(table_of(file)))
    assert load_stock(texts, counter()) == load_stock(sheets, counter())


def test_a_fault_names_the_cell(sheets: Path) -> None:
    _set(sheets / "grids.xlsx", 3, "lot", "L-9999")
    assert ["grids.xlsx, row 3, column lot"] == places_of(lambda: understood(sheets))


def test_all_faults_of_both_spreadsheets_are_told_at_once(sheets: Path) -> None:
    _set(sheets / "grids.xlsx", 2, "x_mm", "=A1+1")
    _set(sheets / "grids.xlsx", 3, "y_mm", "#N/A")
    _set(sheets / "circuits.xlsx", 3, "length_m", -1)
    assert [
        "grids.xlsx, row 2, column x_mm",
        "grids.xlsx, row 3, column y_mm",
        "circuits.xlsx, row 3, column length_m",
    ] == places_of(lambda: understood(sheets))


def test_a_formula_is_told_with_what_to_do(sheets: Path) -> None:
    _set(sheets / "grids.xlsx", 2, "lot", '="L-"&3504')
    (line,) = lines_of(lambda: understood(sheets))
    assert "grids.xlsx, row 2, column lot: holds a formula. Copy the column" in line


def test_text_that_only_looks_like_a_formula_is_text() -> None:
    book = openpyxl.Workbook()
    book.active["A1"] = "=1+1"
    book.active["A1"].data_type = "s"
    out = io.BytesIO()
    book.save(out)
    assert [["=1+1"]] == cells_of("f.xlsx", out.getvalue())


def test_a_per_cent_cell_is_not_read_as_the_number_behind_it(tmp_path: Path) -> None:
    file = tmp_path / "lots.xlsx"
    file.write_bytes(xlsx(table_of(DEMO / "lots.csv")))
    _set(file, 2, "resistance_tolerance_percent", 0.003, "0.00%")
    (line,) = [
        line
        for line in lines_of(lambda: load_stock([file], counter()))
        if "resistance_tolerance_percent: is formatted" in line
    ]
    assert "shows 0.3 % and holds 0.003" in line


@pytest.mark.parametrize("form", ['0.0" % of scale"', "0.0\\%", "General"])
def test_a_per_cent_sign_that_is_only_shown_is_no_matter(form: str, sheets: Path) -> None:
    _set(sheets / "grids.xlsx", 2, "x_mm", 12.5, form)
    assert "12.5" == understood(sheets).points[0].place.x.value


def test_a_label_that_became_a_date_is_told(sheets: Path) -> None:
    _set(sheets / "grids.xlsx", 2, "point", datetime(2026, 3, 4))
    line = lines_of(lambda: understood(sheets))[0]
    assert "column point: is a date or time, not text." in line
    assert "format the cell as text" in line


def test_a_day_with_a_time_is_no_date(tmp_path: Path) -> None:
    table = table_of(DEMO / "consumables.csv")
    table[1][table[0].index("received_on")] = datetime(2026, 7, 30, 12, 30)
    file = tmp_path / "consumables.xlsx"
    file.write_bytes(xlsx(table))
    (fault,) = faults_of(lambda: load_stock([file], counter()))
    assert "consumables.xlsx, row 2, column received_on" == fault.where
    assert "is no date" in fault.what


NUMBERS = [
    (350, "350"),
    (350.0, "350"),
    (0.1 + 0.2, "0.3"),
    (-12.5, "-12.5"),
    (0.00005, "0.00005"),
    (1e-9, "1e-09"),
    (123456789012345.0, "123456789012345"),
]


@pytest.mark.parametrize(("value", "text"), NUMBERS)
def test_a_number_reads_as_its_cell_shows_it(value: float, text: str) -> None:
    # Fifteen significant digits: what spreadsheets keep and show of a number, common practice
    assert [[text]] == cells_of("f.xlsx", xlsx([[value]]))


def test_each_kind_of_cell_is_read() -> None:
    moment = datetime(2026, 12, 1, 9, 30)
    row = ["  text ", True, date(2026, 12, 1), moment, "=1", None]
    (found,) = cells_of("f.xlsx", xlsx([row]))
    assert ["text", "true", date(2026, 12, 1), moment] == found[:4]
    assert isinstance(found[4], Unreadable)
    assert 5 == len(found)


def test_rows_keep_their_numbers_over_empty_ones() -> None:
    faults: Gathered = []
    data = xlsx([["a"], [None], ["x"], [None], ["y"]])
    rows = rows_of("f.xlsx", data, Columns(("a",)), faults)
    assert ["f.xlsx, row 3", "f.xlsx, row 5"] == [row.place for row in rows]
    assert [] == faults


def test_an_unreadable_cell_is_one_fault_though_it_is_needed() -> None:
    faults: Gathered = []
    (row,) = rows_of("f.xlsx", xlsx([["a", "b"], ["=1", "2"]]), Columns(("a", "b")), faults)
    assert ("", "2") == (row.text("a"), row.text("b"))
    assert ["f.xlsx, row 2, column a"] == [fault.where for fault in faults]


def test_only_the_first_sheet_counts() -> None:
    first, second = [["a"], ["1"]], [["a"], ["=2"]]
    assert first == cells_of("f.xlsx", xlsx(first, second))


def test_both_kinds_of_a_table_are_one_fault(plan: Path) -> None:
    (plan / "grids.xlsx").write_bytes(xlsx(table_of(plan / "grids.csv")))
    (line,) = lines_of(lambda: understood(plan))
    assert line == "grids.xlsx: is there beside grids.csv. Keep the one that counts."


# Files that are no spreadsheet, or not only one.


def _parts(change: Callable[[dict[str, bytes]], None]) -> bytes:
    """A small workbook with its parts changed."""
    with zipfile.ZipFile(io.BytesIO(xlsx([["a"], ["text"]]))) as archive:
        parts = {name: archive.read(name) for name in archive.namelist()}
    change(parts)
    out = io.BytesIO()
    with zipfile.ZipFile(out, "w", zipfile.ZIP_DEFLATED) as archive:
        for name, data in parts.items():
            archive.writestr(name, data)
    return out.getvalue()


def _no_sheet(parts: dict[str, bytes]) -> None:
    del parts["xl/worksheets/sheet1.xml"]


def _cut(parts: dict[str, bytes]) -> None:
    parts["xl/worksheets/sheet1.xml"] = parts["xl/worksheets/sheet1.xml"][:-40]


DAMAGED = {
    "a zip of something else": lambda: _zip({"x.txt": b"x"}),
    "a document of another office": lambda: _zip({"mimetype": b"application/x", "a.xml": b"<a/>"}),
    "a zip cut short": lambda: xlsx([["a"]])[:500],
    "the sheet is missing": lambda: _parts(_no_sheet),
    "the sheet is cut short": lambda: _parts(_cut),
}


def _zip(files: dict[str, bytes]) -> bytes:
    out = io.BytesIO()
    with zipfile.ZipFile(out, "w") as archive:
        for name, data in files.items():
            archive.writestr(name, data)
    return out.getvalue()


@pytest.mark.parametrize("how", DAMAGED)
def test_what_is_no_spreadsheet_is_told(how: str) -> None:
    (fault,) = faults_of(lambda: cells_of("f.xlsx", DAMAGED[how]()))
    assert ("f.xlsx", "is no XLSX file, or is damaged.") == (fault.where, fault.what)


def test_an_older_or_locked_spreadsheet_is_told(sheets: Path) -> None:
    # The signature of compound files, [MS-CFB] section 2.2 (from memory)
    signature = bytes.fromhex("D0CF11E0A1B11AE1")
    (sheets / "grids.xlsx").write_bytes(signature + bytes(600))
    line = lines_of(lambda: understood(sheets))[0]
    assert "is a spreadsheet of the older kind, or locked with a password" in line


def test_an_empty_sheet_is_told() -> None:
    assert "has nothing on its first sheet." == faults_of(lambda: cells_of("f", xlsx([])))[0].what


def test_a_heading_alone_is_told() -> None:
    (fault,) = faults_of(lambda: rows_of("f.xlsx", xlsx([["a"]]), Columns(("a",)), []))
    assert "has a heading but no row." == fault.what


def test_a_file_that_unpacks_to_far_too_much_is_not_unpacked(
    monkeypatch: pytest.MonkeyPatch,
) -> None:
    monkeypatch.setattr("gaugelog.intake.workbook._LARGEST_UNPACKED", 1000)
    (fault,) = faults_of(lambda: cells_of("f.xlsx", xlsx([["a"]])))
    assert re.fullmatch(r"unpacks to \d+ bytes; 1000 are read\.", fault.what)


def test_entities_open_no_file_and_do_not_swell(tmp_path: Path) -> None:
    secret = tmp_path / "secret.txt"
    secret.write_text("canary", encoding="utf-8")
    bomb = "".join(f'<!ENTITY b{n} "{f"&b{n - 1};" * 10}">' for n in range(1, 10))
    for entity in (f'<!ENTITY e SYSTEM "{secret.as_uri()}">', f'<!ENTITY b0 "x">{bomb}'):

        def meddle(parts: dict[str, bytes], entity: str = entity) -> None:
            name = "xl/worksheets/sheet1.xml"
            use = b"&e;" if "SYSTEM" in entity else b"&b9;"
            body = parts[name].replace(b"<t>text</t>", b"<t>" + use + b"</t>")
            parts[name] = b"<!DOCTYPE x [" + entity.encode() + b"]>" + body

        started = time.monotonic()
        try:
            found = cells_of("f.xlsx", _inline(meddle))
        except Faulty:
            found = []
        assert "canary" not in str(found)
        assert len(str(found)) < 1000
        assert time.monotonic() - started < 5


def _inline(change: Callable[[dict[str, bytes]], None]) -> bytes:
    """A workbook whose one text stands in the sheet itself, with its parts changed."""

    def write(parts: dict[str, bytes]) -> None:
        parts["xl/worksheets/sheet1.xml"] = (
            b'<worksheet xmlns="http://schemas.openxmlformats.org/spreadsheetml/2006/main">'
            b'<sheetData><row r="1"><c r="A1" t="inlineStr"><is><t>text</t></is></c></row>'
            b"</sheetData></worksheet>"
        )
        change(parts)

    return _parts(write)


@settings(max_examples=40, deadline=None)
@given(st.lists(st.lists(st.text(max_size=8) | st.none() | st.floats(), max_size=4), max_size=4))
def test_whatever_stands_in_cells_is_read_or_told(table: Table) -> None:
    clean = [
        [
            openpyxl.cell.cell.ILLEGAL_CHARACTERS_RE.sub("", c) if isinstance(c, str) else c
            for c in r
        ]
        for r in table
    ]
    faults = told(lambda: rows_of("f.xlsx", xlsx(clean), Columns(("a",), ("b",)), []))
    assert faults is None or all(fault.where.startswith("f.xlsx") for fault in faults)


def test_two_thousand_grids_are_read_quickly(sheets: Path) -> None:
    heading, row, _ = table_of(DEMO / "plan" / "grids.csv")
    many = [[f"G-{n}", *row[1:]] for n in range(2000)]
    data = xlsx([heading, *many])
    started = time.monotonic()
    assert 2001 == len(cells_of("grids.xlsx", data))
    assert time.monotonic() - started < 10
