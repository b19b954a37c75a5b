"""Reading people's files: text in UTF-8, TOML with line and column, CSV with row numbers."""

from __future__ import annotations

import csv
import io
import tomllib
from collections.abc import Iterator
from pathlib import Path
from typing import Any

from gaugelog.errors import Fault, Faulty

LARGEST = 8 * 1024 * 1024
"""Bytes beyond which a file is no plan of a person's."""

MOST_CELL = 10_000
"""Characters beyond which a cell is refused."""


def read_bytes(path: Path) -> bytes:
    """The file's bytes. Raises Faulty when it can't be read, is empty or far too large."""
    try:
        data = path.read_bytes()
    except OSError as error:
        reason = error.strerror or "unknown reason"
        remedy = "See that it is there, is a file, and may be read."
        raise Faulty([Fault(path.name, f"can't be read: {reason}.", remedy)]) from error
    if not data.strip():
        raise Faulty([Fault(path.name, "is empty.")])
    if len(data) > LARGEST:
        raise Faulty([Fault(path.name, f"has {len(data)} bytes; {LARGEST} are read at most.")])
    return data


def text_of(name: str, data: bytes) -> str:
    """The text of a file. Raises Faulty with the line of the first byte that is not UTF-8."""
    try:
        return data.decode("utf-8-sig")
    except UnicodeDecodeError as error:
        line = data.count(b"\n", 0, error.start) + 1
        remedy = "Save it as UTF-8; spreadsheets call that “CSV UTF-8”."
        raise Faulty([Fault(f"{name}, line {line}", "is not UTF-8 text.", remedy)]) from error


def toml_of(name: str, data: bytes) -> dict[str, Any]:
    """The values of a TOML file. Raises Faulty with line and column of a slip."""
    try:
        return tomllib.loads(text_of(name, data))
    except tomllib.TOMLDecodeError as error:
        remedy = "Mend the line; text stands in quotes, lists in square brackets."
        raise Faulty([Fault(name, f"is no TOML: {error}.", remedy)]) from error
    except RecursionError as error:
        raise Faulty([Fault(name, "is nested too deeply.")]) from error


def rows_of(
    name: str, data: bytes, needed: tuple[str, ...], others: tuple[str, ...] = ()
) -> Iterator[tuple[int, dict[str, str]]]:
    """Row number and cells by column of a CSV file; empty rows are passed over.

    Raises Faulty naming every column that is missing, unknown or double, and rows with cells too
    many. Row 1 is the heading.
    """
    reader = csv.reader(io.StringIO(text_of(name, data), newline=""), strict=True)
    try:
        table = list(enumerate(reader, start=1))
    except csv.Error as error:
        where = f"{name}, line {reader.line_num}"
        remedy = "A cell with a quotation mark is put in quotes, the mark doubled."
        raise Faulty([Fault(where, f"is no CSV: {error}.", remedy)]) from error
    heading = [cell.strip() for cell in table[0][1]]
    faults = _heading_faults(name, heading, needed, others)
    rows = [(number, cells) for number, cells in table[1:] if any(cell.strip() for cell in cells)]
    faults += [
        Fault(f"{name}, row {number}", f"has {len(cells)} cells, the heading {len(heading)}.")
        for number, cells in rows
        if len(cells) > len(heading)
    ]
    if not rows and not faults:
        faults.append(Fault(name, "has a heading but no row."))
    if faults:
        raise Faulty(faults)
    for number, cells in rows:
        filled = cells + [""] * (len(heading) - len(cells))
        yield number, {column: cell.strip() for column, cell in zip(heading, filled, strict=True)}


def _heading_faults(
    name: str, heading: list[str], needed: tuple[str, ...], others: tuple[str, ...]
) -> list[Fault]:
    if len(heading) == 1 and ";" in heading[0]:
        remedy = "Save it with commas between cells, and decimal points in numbers."
        return [Fault(f"{name}, row 1", "has semicolons between cells.", remedy)]
    faults = [
        Fault(f"{name}, row 1", f"has no column {column}.", "Add it; row 1 names the columns.")
        for column in needed
        if column not in heading
    ]
    for place, column in enumerate(heading, start=1):
        if column not in needed and column not in others:
            known = ", ".join((*needed, *others))
            shown = column or "(empty)"
            faults.append(
                Fault(f"{name}, row 1, cell {place}", f"{shown} is no column.", f"Known: {known}.")
            )
        elif column in heading[: place - 1]:
            faults.append(Fault(f"{name}, row 1, cell {place}", f"{column} stands twice."))
    return faults
