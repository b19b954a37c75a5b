"""Tables for spreadsheets, CSV and XLSX: foreign text stays text and is never a formula."""

from __future__ import annotations

import csv
import io
import re
from collections.abc import Iterable, Sequence
from datetime import datetime
from typing import Any

from gaugelog.visible import visible

Cell = str | float
Row = Sequence[Cell]

_NUMBER = re.compile(r"[+-]?(\d+(\.\d*)?|\.\d+)([eE][+-]?\d+)?", re.ASCII)
_FORMULA = ("=", "+", "-", "@")
_WIDEST, _NARROWEST = 48, 6


def csv_bytes(rows: Iterable[Row]) -> bytes:
    """The rows as CSV (RFC 4180) in UTF-8 with the mark by which spreadsheets know it.

    A cell that a spreadsheet would take for a formula begins with an apostrophe; a number stays
    a number.
    """
    out = io.StringIO(newline="")
    writer = csv.writer(out, lineterminator="\r\n")
    writer.writerows([_csv_cell(cell) for cell in row] for row in rows)
    return out.getvalue().encode("utf-8-sig")


def _csv_cell(cell: Cell) -> str:
    return guarded(cell) if isinstance(cell, str) else f"{cell:.12g}"


def guarded(cell: str) -> str:
    """The text of a CSV cell, made safe to open.

    >>> guarded("=1+1"), guarded("-12.5"), guarded("-1+2")
    ("'=1+1", '-12.5', "'-1+2")
    """
    shown = visible(cell)
    risky = shown.lstrip().startswith(_FORMULA) and _NUMBER.fullmatch(shown) is None
    return f"'{shown}" if risky else shown


def xlsx_bytes(title: str, rows: Sequence[Row], at: datetime) -> bytes:
    """The rows as the one sheet of an XLSX file, the first row its frozen heading.

    Every cell is text or a number, never a formula. `at` stands as the time it was made.
    """
    from openpyxl import Workbook
    from openpyxl.styles import Font

    book = Workbook()
    book.properties.creator = "Gaugelog"
    book.properties.created = book.properties.modified = at.replace(tzinfo=None)
    sheet = book.active
    sheet.title = title
    for number, row in enumerate(rows, start=1):
        for column, value in enumerate(row, start=1):
            _fill(sheet.cell(number, column), value)
    for cell in sheet[1]:
        cell.font = Font(bold=True)
    sheet.freeze_panes = "A2"
    sheet.auto_filter.ref = sheet.dimensions
    _set_widths(sheet)
    out = io.BytesIO()
    book.save(out)
    return out.getvalue()


def _set_widths(sheet: Any) -> None:
    for column in sheet.columns:
        longest = max(len(str(cell.value or "")) for cell in column)
        width = min(max(longest, _NARROWEST), _WIDEST) + 2
        sheet.column_dimensions[column[0].column_letter].width = width


def _fill(cell: Any, value: Cell) -> None:
    if not isinstance(value, str):
        cell.value = value
        return
    cell.value = visible(value)
    cell.data_type = "s"  # or what begins with = would be a formula
    cell.quotePrefix = value.lstrip().startswith(_FORMULA)
