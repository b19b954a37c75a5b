"""Columns of a list: as wide as what stands in them, and cut where the terminal ends."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from rich.cells import cell_len
from textual.content import Content

from gaugelog.screens.words import CALM
from gaugelog.visible import visible

_GAP = 2


@dataclass(frozen=True, slots=True)
class Column:
    """A column: its heading, whether numbers stand in it, and the least it may be cut to.

    `least` 0 means that it is never cut.
    """

    title: str
    number: bool = False
    least: int = 0


@dataclass(frozen=True, slots=True)
class Cell:
    """A piece of text with its style."""

    text: str
    style: str = ""


def widths(columns: Sequence[Column], rows: Sequence[Sequence[Cell]], room: int) -> list[int]:
    """Cells for each column, so that a line fits in `room`; the widest is cut first."""
    wide = [
        max([cell_len(column.title), *(cell_len(visible(row[place].text)) for row in rows)])
        for place, column in enumerate(columns)
    ]
    spare = room - sum(wide) - _GAP * (len(wide) - 1)
    while spare < 0:
        free = [
            place for place, each in enumerate(columns) if each.least and wide[place] > each.least
        ]
        if not free:
            break
        widest = max(free, key=lambda place: wide[place])
        wide[widest] -= 1
        spare += 1
    return wide


def line(columns: Sequence[Column], cells: Sequence[Cell], wide: Sequence[int]) -> Content:
    """One line: numbers to the right, words to the left, the rest cut with an ellipsis."""
    parts: list[str | tuple[str, str]] = []
    for column, cell, width in zip(columns, cells, wide, strict=True):
        parts += [(_fit(cell.text, width, column.number), cell.style), " " * _GAP]
    return Content.assemble(*parts[:-1])


def heading(columns: Sequence[Column], wide: Sequence[int]) -> Content:
    """The line of headings."""
    return line(columns, [Cell(column.title, CALM) for column in columns], wide)


def _fit(text: str, width: int, number: bool) -> str:
    shown = visible(text)
    spare = width - cell_len(shown)
    if spare < 0:
        return str(Content(shown).truncate(width, ellipsis=True, pad=True))
    return " " * spare + shown if number else shown + " " * spare
