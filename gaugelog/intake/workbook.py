"""Reading people's XLSX: the cells of the first sheet as text or dates; what can't be one is told.

Only values count. A formula is told, not trusted: the value saved beside it may be old, or lacking.
"""

from __future__ import annotations

import io
import re
import zipfile
from collections.abc import Iterable, Iterator
from dataclasses import dataclass
from datetime import date, datetime, time
from decimal import Decimal
from typing import Any

from gaugelog.errors import Fault, Faulty

ZIP = b"PK\x03\x04"
"""What an XLSX file begins with; it is a zip of XML."""

OLD = b"\xd0\xcf\x11\xe0"
"""What a spreadsheet of the older kind begins with, and an XLSX file locked with a password."""

_LARGEST_UNPACKED = 256 * 1024 * 1024
_MOST_ROWS, _MOST_COLUMNS = 100_000, 200
_DIGITS = 15
"""Significant digits that a spreadsheet keeps of a number."""

_QUOTED = re.compile(r'"[^"]*"|\\.|\[[^\]]*\]')


@dataclass(frozen=True, slots=True)
class Unreadable:
    """A cell whose value can't be taken: what is wrong with it, and what to do."""

    what: str
    remedy: str


Cell = str | date | Unreadable


def cells_of(name: str, data: bytes, most_rows: int = _MOST_ROWS) -> list[list[Cell]]:
    """The rows of the first sheet, the empty ones too, each without its empty end.

    Raises Faulty when the file is no XLSX, holds no sheet of cells, or is far too large.
    """
    _demand_size(name, data)
    try:
        rows = list(_rows(data, most_rows))
    except Faulty:
        raise
    except Exception as error:  # the library raises anything for a damaged file
        what = "is no XLSX file, or is damaged."
        raise Faulty([Fault(name, what, "Save it again as XLSX, or as “CSV UTF-8”.")]) from error
    if len(rows) > _MOST_ROWS:
        raise Faulty([Fault(name, f"has more than {_MOST_ROWS} rows.")])
    if not any(rows):
        raise Faulty([Fault(name, "has nothing on its first sheet.")])
    return rows


def _demand_size(name: str, data: bytes) -> None:
    try:
        with zipfile.ZipFile(io.BytesIO(data)) as archive:
            size = sum(info.file_size for info in archive.infolist())
    except Exception as error:  # as above
        what = "is no XLSX file, or is damaged."
        raise Faulty([Fault(name, what, "Save it again as XLSX, or as “CSV UTF-8”.")]) from error
    if size > _LARGEST_UNPACKED:
        raise Faulty([Fault(name, f"unpacks to {size} bytes; {_LARGEST_UNPACKED} are read.")])


def _rows(data: bytes, most: int) -> Iterator[list[Cell]]:
    from openpyxl import load_workbook

    book = load_workbook(io.BytesIO(data), read_only=True, data_only=False, keep_links=False)
    try:
        sheet = book.worksheets[0]
        sheet.reset_dimensions()  # what a file says of its own size is not to be trusted
        for row in sheet.iter_rows(max_row=most + 1, max_col=_MOST_COLUMNS):
            yield _trimmed(_value(cell) for cell in row)
    finally:
        book.close()


def _trimmed(cells: Iterable[Cell]) -> list[Cell]:
    found = list(cells)
    while found and found[-1] == "":
        found.pop()
    return found


def _value(cell: Any) -> Cell:
    value = cell.value
    if value is None:
        return ""
    if cell.data_type == "f":
        return Unreadable("holds a formula.", "Copy the column and paste it as values.")
    if cell.data_type == "e":
        return Unreadable(f"holds the error {value}.", "Put the value in its place.")
    return _plain(value, cell.number_format or "")


def _plain(value: Any, form: str) -> Cell:
    """A value as text or a date; `form` is the cell's number format."""
    if isinstance(value, bool):
        return "true" if value else "false"
    if isinstance(value, int | float):
        return _number(value, form)
    if isinstance(value, datetime):
        return value.date() if value.time() == time() else value
    return value.strip() if isinstance(value, str) else str(value)


def _number(value: float, form: str) -> str | Unreadable:
    text = f"{value:.{_DIGITS}g}"
    if "%" in _QUOTED.sub("", form):
        shown = f"{float(value) * 100:.{_DIGITS - 3}g}"
        return Unreadable(
            f"is formatted as per cent: it shows {shown} % and holds {text}.",
            "Format the column as plain numbers; the column's name says the unit.",
        )
    plain = 1e-6 <= abs(value) < 10**_DIGITS
    return format(Decimal(text), "f") if plain else text
