"""Reading people's tables, CSV (RFC 4180 with commas) and XLSX: named columns, numbered rows."""

from __future__ import annotations

import csv
import io
from collections.abc import Iterator, Sequence
from dataclasses import dataclass

from gaugelog.errors import Fault, Faulty
from gaugelog.intake.fields import Fields, Gathered
from gaugelog.intake.files import text_of
from gaugelog.intake.workbook import OLD, ZIP, Cell, Unreadable, cells_of


@dataclass(frozen=True, slots=True)
class Columns:
    """The columns of one kind of file: those that must be there, and those that may."""

    needed: tuple[str, ...]
    others: tuple[str, ...] = ()

    @property
    def known(self) -> tuple[str, ...]:
        """Every column, the needed ones first."""
        return (*self.needed, *self.others)


def rows_of(name: str, data: bytes, columns: Columns, faults: Gathered) -> list[Fields]:
    """The rows of a CSV or XLSX file by column; row 1 is the heading, empty rows are passed over.

    Faults of the heading are gathered, and the rows are still given, so that their cells can be
    looked at. A row with too many cells is one fault; which cell is which can't be known, so its
    cells gather none. Raises Faulty where there is no table to look at.
    """
    table = _table(name, data)
    heading = [_column(cell, columns) for cell in _texts(table[0])]
    _semicolons(name, heading)
    faults += _heading_faults(name, heading, columns)
    rows = [(number, row) for number, row in enumerate(table[1:], 2) if any(map(_filled, row))]
    if not rows:
        raise Faulty([Fault(name, "has a heading but no row.")])
    absent = [column for column in columns.needed if column not in heading]
    found = []
    for number, row in rows:
        place = f"{name}, row {number}"
        long = _is_too_long(place, heading, row, faults)
        found.append(_fields(place, _cells(heading, row), [] if long else faults, absent))
    return found


def heading_of(name: str, data: bytes) -> list[str]:
    """The columns that row 1 names, as they stand there. Raises Faulty as `rows_of`."""
    if data.startswith(ZIP):
        return _texts(cells_of(name, data, most_rows=1)[0])
    return _texts(_table(name, data)[0])


def _fields(place: str, cells: dict[str, Cell], faults: Gathered, absent: list[str]) -> Fields:
    """The fields of a row; a cell that can't be read is a fault, and then taken as absent."""
    unreadable = {name: cell for name, cell in cells.items() if isinstance(cell, Unreadable)}
    readable = {name: cell for name, cell in cells.items() if name not in unreadable}
    fields = Fields(place, readable, faults, ", column ", [*absent, *unreadable])
    for name, cell in unreadable.items():
        fields.fault(name, cell.what, cell.remedy)
    return fields


def _texts(row: Sequence[Cell]) -> list[str]:
    return ["" if isinstance(cell, Unreadable) else str(cell) for cell in row]


def _filled(cell: Cell) -> bool:
    return not isinstance(cell, str) or cell.strip() != ""


def _table(name: str, data: bytes) -> Sequence[Sequence[Cell]]:
    if data.startswith(ZIP):
        return cells_of(name, data)
    if data.startswith(OLD):
        what = "is a spreadsheet of the older kind, or locked with a password."
        raise Faulty([Fault(name, what, "Save it as XLSX without a password, or as CSV.")])
    reader = csv.reader(io.StringIO(text_of(name, data), newline=""), strict=True)
    try:
        table = list(reader)
    except csv.Error as error:
        where = f"{name}, line {reader.line_num}"
        remedy = "A cell with a quotation mark is put in quotes, the mark doubled."
        raise Faulty([Fault(where, f"is no CSV: {error}.", remedy)]) from error
    if not table:
        raise Faulty([Fault(name, "is empty.")])
    return table


def _column(cell: str, columns: Columns) -> str:
    """The column meant by a heading, whatever the letter case; “gage” is read as “gauge”."""
    plain = cell.strip()
    meant = plain.casefold().replace("gage", "gauge")
    return next((column for column in columns.known if column.casefold() == meant), plain)


def _semicolons(name: str, heading: Sequence[str]) -> None:
    for sign, called in ((";", "semicolons"), ("\t", "tabs")):
        if len(heading) == 1 and sign in heading[0]:
            remedy = "Save it with commas between cells, and decimal points in numbers."
            raise Faulty([Fault(f"{name}, row 1", f"has {called} between cells.", remedy)])


def _heading_faults(name: str, heading: Sequence[str], columns: Columns) -> Iterator[Fault]:
    for column in columns.needed:
        if column not in heading:
            remedy = "Add it; row 1 names the columns."
            yield Fault(f"{name}, row 1", f"has no column {column}.", remedy)
    for place, column in enumerate(heading, start=1):
        where = f"{name}, row 1, cell {place}"
        if column not in columns.known:
            shown = f"“{column[:60]}”" if column else "an empty cell"
            yield Fault(where, f"{shown} is no column.", f"Known: {', '.join(columns.known)}.")
        elif column in heading[: place - 1]:
            yield Fault(where, f"{column} stands twice.")


def _is_too_long(place: str, heading: Sequence[str], row: Sequence[Cell], faults: Gathered) -> bool:
    if not any(map(_filled, row[len(heading) :])):
        return False
    what = f"has {len(row)} cells, the heading {len(heading)}."
    remedy = "In CSV put a text with a comma in quotes, and a decimal point in numbers."
    faults.append(Fault(place, what, remedy))
    return True


def _cells(heading: Sequence[str], row: Sequence[Cell]) -> dict[str, Cell]:
    filled = [*row, *[""] * (len(heading) - len(row))]
    cells: dict[str, Cell] = {}
    for column, cell in zip(heading, filled, strict=False):
        value = cell.strip() if isinstance(cell, str) else cell
        cells.setdefault(column, value)  # a column that stands twice is a fault already
    return cells
