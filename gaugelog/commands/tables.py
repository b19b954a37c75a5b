"""Tables that fit the terminal: long words broken, or a paragraph a row where none fits."""

from __future__ import annotations

import textwrap
from collections.abc import Callable, Iterable, Iterator, Sequence
from typing import TYPE_CHECKING

from gaugelog.commands.folding import broken

if TYPE_CHECKING:
    from rich.console import Console

_BETWEEN = 3
"""How far two columns stand apart."""

_LONGEST_WHOLE = 32
"""A word of so many letters or less, such as a printed head, is never broken in a column."""

Rows = list[list[str]]
Widest = Callable[[Iterable[str]], int]


def draw(title: str, columns: Sequence[str], rows: Rows, screen: Console) -> None:
    """Print a table; a column whose heading starts with `>` is aligned right.

    A column that says nothing in any row is left out. What is too wide has its long words broken
    after hyphens; where a column would still be lost, each row is told as a paragraph.
    """
    told = [place for place in range(len(columns)) if any(row[place] for row in rows)]
    columns = [columns[place] for place in told]
    rows = [[row[place] for place in told] for row in rows]
    if _width(columns, rows, _longest) > screen.width:
        broken_rows = [[broken(cell) for cell in row] for row in rows]
        if _width(columns, broken_rows, _least) > screen.width:
            _print_paragraphs(title, columns, rows, screen)
            return
        rows = broken_rows
    _print_table(title, columns, rows, screen)


def _print_table(title: str, columns: Sequence[str], rows: Rows, screen: Console) -> None:
    from rich import box
    from rich.table import Table
    from rich.text import Text

    table = Table(title=Text(title), title_justify="left", box=box.SIMPLE_HEAD, pad_edge=False)
    for place, column in enumerate(columns):
        table.add_column(
            Text(_heading(column)),
            justify="right" if column.startswith(">") else "left",
            overflow="fold",
            min_width=_least([_heading(column), *(row[place] for row in rows)]),
        )
    for row in rows:
        table.add_row(*map(Text, row))
    screen.print(table)


def _print_paragraphs(title: str, columns: Sequence[str], rows: Rows, screen: Console) -> None:
    from rich.text import Text

    screen.print(Text(title))
    for row in rows:
        for line in _paragraph(columns, row, screen.width):
            screen.print(Text(line), soft_wrap=True)
    screen.print()


def _paragraph(columns: Sequence[str], row: Sequence[str], width: int) -> Iterator[str]:
    """A row told in words; one without its first cell goes on with the row before."""
    first, *others = row
    if first:
        yield from ("", f"{_heading(columns[0])} {first}")
    pairs = zip(columns[1:], others, strict=True)
    told = "; ".join(
        f"{_heading(column)} {' '.join(cell.split())}" for column, cell in pairs if cell
    )
    yield from textwrap.wrap(
        told,
        width - 1,
        initial_indent="  ",
        subsequent_indent="    ",
        break_on_hyphens=False,
    )


def _heading(column: str) -> str:
    return column.removeprefix(">")


def _width(columns: Sequence[str], rows: Rows, widest: Widest) -> int:
    widths = [
        widest([_heading(column), *(row[place] for row in rows)])
        for place, column in enumerate(columns)
    ]
    return sum(widths) + _BETWEEN * len(widths)


def _longest(cells: Iterable[str]) -> int:
    return max((len(line) for cell in cells for line in cell.split("\n")), default=1)


def _least(cells: Iterable[str]) -> int:
    """How narrow a column may get: its words stay whole, unless they are very long."""
    words = (word for cell in cells for word in cell.split())
    return max((len(word) for word in words if len(word) <= _LONGEST_WHOLE), default=1)
