"""`gaugelog calc SUBJECT --each FILE.csv`: many rows, results beside them, faults by row."""

from __future__ import annotations

import csv
import re
import sys
from collections.abc import Iterator, Sequence
from pathlib import Path
from typing import TextIO

from gaugelog.commands.calc.engine import work_out
from gaugelog.commands.calc.model import Family, Subject, Worked
from gaugelog.errors import Fault, Faulty
from gaugelog.visible import visible

_FIGURE = re.compile(r"[+-]?\d+(\.\d+)?([eE][+-]?\d+)? ?[A-Za-zΩµ°%/²³·^ ]*")


def work_out_each(subject: Subject | Family, file: Path, common: dict[str, str]) -> list[Worked]:
    """Work out every row; `common` serves arguments that are no column, and empty cells.

    Raises Faulty with every fault of every row at once.
    """
    faults: list[Fault] = []
    found: list[Worked] = []
    for where, row in _rows(subject, file, faults):
        try:
            found.append(work_out(subject, {**common, **row}, where))
        except Faulty as error:
            faults.extend(error.faults)
    if faults:
        raise Faulty(faults, "nothing was worked out")
    return found


def _rows(
    subject: Subject | Family, file: Path, faults: list[Fault]
) -> Iterator[tuple[str, dict[str, str]]]:
    """Each row's filled cells by column, and its place."""
    from gaugelog.intake.files import read_bytes
    from gaugelog.intake.tables import Columns, rows_of

    known = tuple(dict.fromkeys(argument.name for argument in subject.arguments))
    for row in rows_of(file.name, read_bytes(file), Columns((), known), faults):
        cells = {name: row.text(name, needed=False) for name in known}
        yield row.where(""), {name: cell for name, cell in cells.items() if cell}


def write_each(found: Sequence[Worked], out: TextIO | None = None) -> None:
    """Write inputs as understood and results as CSV, to stdout where no `out` is given.

    Text that starts like a formula is guarded.

    A row that lacks what another has (an input left out, a figure of another kind) leaves the
    cell empty.
    """
    inputs = dict.fromkeys(name for worked in found for name in worked.inputs)
    figures = dict.fromkeys(figure.name for worked in found for figure in worked.answer.figures)
    writer = csv.writer(out or sys.stdout, lineterminator="\r\n")
    writer.writerow([_guarded(name) for name in [*inputs, *figures, "warnings"]])
    for worked in found:
        shown = {figure.name: figure.shown for figure in worked.answer.figures}
        cells = [
            *(worked.inputs.get(name, "") for name in inputs),
            *(shown.get(name, "") for name in figures),
            "; ".join(worked.answer.warnings),
        ]
        writer.writerow([_guarded(cell) for cell in cells])


def _guarded(cell: str) -> str:
    """The cell, made safe to open; a figure with its unit is no formula."""
    from gaugelog.documents.spreadsheet import guarded

    return visible(cell) if _FIGURE.fullmatch(cell) else guarded(cell)
