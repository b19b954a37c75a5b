"""`gaugelog calc SUBJECT --each FILE.csv`: many rows, results beside them, faults by row."""

from __future__ import annotations

import csv
import sys
from collections.abc import Iterator
from pathlib import Path
from typing import TextIO

from gaugelog.commands.calc.engine import Subject, Worked, work_out
from gaugelog.errors import Fault, Faulty

_FORMULA_STARTS = ("=", "+", "-", "@", "\t", "\r")


def work_out_each(subject: Subject, file: Path, common: dict[str, str]) -> list[Worked]:
    """Work out every row; `common` serves arguments that are no column.

    Raises Faulty with every fault of every row at once.
    """
    faults: list[Fault] = []
    found: list[Worked] = []
    for number, row in _rows(file):
        where = f"{file.name}, row {number}, column "
        try:
            found.append(work_out(subject, {**common, **row}, where))
        except Faulty as error:
            faults.extend(error.faults)
    if faults:
        raise Faulty(faults)
    return found


def _rows(file: Path) -> Iterator[tuple[int, dict[str, str]]]:
    try:
        text = file.read_text(encoding="utf-8-sig")
    except OSError as error:
        raise Faulty([Fault(file.name, f"can't be read: {error.strerror}.")]) from error
    except UnicodeDecodeError as error:
        raise Faulty(
            [Fault(file.name, "is not UTF-8 text.", "Save it as CSV in UTF-8.")]
        ) from error
    reader = csv.DictReader(text.splitlines())
    if not reader.fieldnames:
        raise Faulty([Fault(file.name, "is empty.", "A first row of argument names is needed.")])
    for row in reader:
        if None in row:
            raise Faulty(
                [Fault(f"{file.name}, row {reader.line_num}", "has more cells than the first row.")]
            )
        yield reader.line_num, {name: value or "" for name, value in row.items()}


def write_each(found: list[Worked], out: TextIO = sys.stdout) -> None:
    """Write inputs as understood and results as CSV; text that starts like a formula is guarded."""
    if not found:
        return
    first = found[0]
    writer = csv.writer(out, lineterminator="\r\n")
    writer.writerow([*first.inputs, *(figure.name for figure in first.answer.figures), "warnings"])
    for worked in found:
        shown = [figure.shown for figure in worked.answer.figures]
        cells = [*worked.inputs.values(), *shown, "; ".join(worked.answer.warnings)]
        writer.writerow([_guarded(cell) for cell in cells])


def _guarded(cell: str) -> str:
    if cell.startswith(_FORMULA_STARTS) and not cell[1:2].isdigit():
        return "'" + cell
    return cell
