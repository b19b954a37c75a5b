"""Rows in memory over the tables: changes gather here and are written together."""

from __future__ import annotations

from collections.abc import Callable, Iterable

from gaugelog.ledger.rows import Change, Drop, Row

Load = Callable[[str, str], Row | None]
"""Reads one row from the tables, or None."""


class Buffer:
    """What is known: changes made here first, the tables below. `load` None: start from nothing."""

    def __init__(self, load: Load | None = None) -> None:
        self._load = load
        self.rows: dict[str, dict[str, Row | None]] = {}
        """Table, then id; None where a row was dropped."""

    def get(self, table: str, row_id: str) -> Row | None:
        """The row as it is now, or None."""
        held = self.rows.setdefault(table, {})
        if row_id in held:
            return held[row_id]
        if self._load is None:
            return None
        return self._load(table, row_id)

    def take(self, changes: Iterable[Change]) -> None:
        """Take changes in, one after the other."""
        for change in changes:
            if isinstance(change, Drop):
                self.rows.setdefault(change.table, {})[change.id] = None
            else:
                self.rows.setdefault(change.table, {})[change.row["id"]] = change.row
