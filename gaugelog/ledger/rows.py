"""What an apply function is given and gives: rows by table and id, and changes to them."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass
from typing import Any, Protocol

Row = dict[str, Any]
"""A row by column; every ledger table has a text key `id`."""


@dataclass(frozen=True, slots=True)
class Put:
    """A row as it is from now on, whole."""

    table: str
    row: Row


@dataclass(frozen=True, slots=True)
class Drop:
    """A row that is no more."""

    table: str
    id: str


Change = Put | Drop


class Known(Protocol):
    """What is known before an entry: one row at a time, by its id."""

    def get(self, table: str, row_id: str) -> Row | None:
        """The row, or None."""
        ...


@dataclass(frozen=True, slots=True)
class At:
    """Where in the journal a fact stands: number, time (UTC text), actor, and the machine's run.

    `boot` and `uptime_ms` show whether the clock was set between two entries.
    """

    seq: int
    time: str
    actor: str
    boot: str = ""
    uptime_ms: int = 0
    data: str = ""
    """The fact as JSON, as it was kept."""


Apply = Callable[[Known, At, Any], Iterator[Change]]
"""How one kind of fact changes the tables. Pure: same known and fact, same changes."""


def have(known: Known, table: str, row_id: str) -> Row:
    """The row, copied so that it can be changed. Raises LookupError when there is none."""
    row = known.get(table, row_id)
    if row is None:
        raise LookupError(f"no {table} {row_id} is known")
    return dict(row)
