"""Looking at what is known: rows by id or by column, labels to rows, ids to names."""

from __future__ import annotations

import sqlite3
from collections.abc import Callable, Sequence
from functools import cache
from typing import TypeVar

from sqlalchemy import inspect
from sqlalchemy.orm import configure_mappers
from sqlmodel import SQLModel

from gaugelog.errors import Refused
from gaugelog.journal.canonical import nfc
from gaugelog.ledger.buffer import Buffer
from gaugelog.ledger.circuits import CircuitRow
from gaugelog.ledger.instruments import InstrumentRow
from gaugelog.ledger.people import IdentitySheet, PersonRow
from gaugelog.ledger.points import GridRow, PointRow
from gaugelog.ledger.schema import load_row, select, table_of
from gaugelog.ledger.stock import ConsumableRow, GaugeRow, LotRow

T = TypeVar("T", bound=SQLModel)


class View:
    """One unchanging look at the ledger, inside a transaction or outside alike.

    `sheet` gives the bytes of an identity sheet by its digest, None when it was erased.
    """

    def __init__(
        self, connection: sqlite3.Connection, sheet: Callable[[str], bytes | None]
    ) -> None:
        self._connection = connection
        self._sheet = sheet

    def get(self, model: type[T], row_id: str) -> T | None:
        """The row with this id, or None."""
        found = self.all(model, id=row_id)
        return found[0] if found else None

    def all(self, model: type[T], **equals: str | int) -> list[T]:
        """Every row whose columns equal what is given, in the journal's order or by label."""
        table = table_of(model).name
        where = " AND ".join(f'"{table}"."{name}" = ?' for name in equals)
        query = select(table) + (f" WHERE {where}" if where else "") + _order(model)
        names = _columns(model)
        rows = self._connection.execute(query, tuple(equals.values()))
        return [_row(model, names, row) for row in rows]

    def known(self) -> Buffer:
        """The same look as plain rows, for the functions that the fold shares with the rules."""
        return Buffer(lambda table, row_id: load_row(self._connection, table, row_id))

    def identity(self, person: str) -> IdentitySheet | None:
        """Name and initials of a person; None when unknown or erased."""
        row = self.get(PersonRow, person)
        data = self._sheet(row.sheet) if row is not None else None
        return None if data is None else IdentitySheet.model_validate_json(data)

    def name(self, person: str) -> str:
        """The person as people read it: `T. Okoro (TO)`, or the id where the name was erased."""
        sheet = self.identity(person)
        if sheet is None:
            return f"{person} (name erased)"
        return f"{sheet.name} ({sheet.initials})"

    def point(self, label: str) -> PointRow | None:
        """The point with this label, whatever the case."""
        return self._labelled(PointRow, label)

    def gauge(self, label: str) -> GaugeRow | None:
        """The gauge with this label, pack and number: `K7-03/4`."""
        return self._labelled(GaugeRow, label)

    def lot(self, label: str) -> LotRow | None:
        """The gauge lot with this label."""
        return self._labelled(LotRow, label)

    def instrument(self, label: str) -> InstrumentRow | None:
        """The instrument with this label."""
        return self._labelled(InstrumentRow, label)

    def consumable(self, label: str) -> ConsumableRow | None:
        """The consumable lot with this label."""
        return self._labelled(ConsumableRow, label)

    def subject(self, label: str) -> str:
        """The id of whatever is called `label`. Raises Refused when nothing or several are."""
        models = (PointRow, GridRow, CircuitRow, GaugeRow, LotRow, InstrumentRow, ConsumableRow)
        for model in models:
            row = self._labelled(model, label)
            if row is not None:
                return str(row.id)  # type: ignore[attr-defined]
        raise Refused(f"Nothing is called {label}.", "Give the label of a point, lot or meter.")

    def _labelled(self, model: type[T], label: str) -> T | None:
        wanted = nfc(label.strip())
        found = self._like(model, wanted)
        exact = [row for row in found if row.label == wanted]  # type: ignore[attr-defined]
        fitting = exact or found
        if len(fitting) > 1:
            named = " or ".join(row.label for row in fitting)  # type: ignore[attr-defined]
            raise Refused(f"{wanted} may be {named}.", "Give the label in its exact spelling.")
        return fitting[0] if fitting else None

    def _like(self, model: type[T], wanted: str) -> list[T]:
        """Rows with this label, whatever the case; SQLite knows the case of ASCII letters only."""
        if not wanted.isascii():
            folded = wanted.casefold()
            rows = self.all(model)
            return [row for row in rows if row.label.casefold() == folded]  # type: ignore[attr-defined]
        query = f"{select(table_of(model).name)} WHERE label = ? COLLATE NOCASE{_order(model)}"
        names = _columns(model)
        found = self._connection.execute(query, (wanted,)).fetchall()
        return [_row(model, names, row) for row in found]


def _row(model: type[T], names: tuple[str, ...], values: Sequence[object]) -> T:
    """A row object of what the table holds, made as SQLAlchemy makes one that it loads.

    The class's own way goes through each column's descriptor, for rows that are to be stored;
    these are only looked at, and there may be many.
    """
    row: T = _maker(model)()
    row.__dict__.update(zip(names, values, strict=True))
    return row


@cache
def _maker(model: type[T]) -> Callable[[], T]:
    configure_mappers()
    made: Callable[[], T] = inspect(model).class_manager.new_instance
    return made


@cache
def _columns(model: type[SQLModel]) -> tuple[str, ...]:
    return tuple(column.name for column in table_of(model).columns)


@cache
def _order(model: type[SQLModel]) -> str:
    names = _columns(model)
    keys = [name for name in ("seq", "number", "label") if name in names]
    return f" ORDER BY {', '.join([*keys, 'id'])}"
