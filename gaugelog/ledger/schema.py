"""The ledger's tables: their columns from the SQLModel classes, their version, plain SQL."""

from __future__ import annotations

import sqlite3
from collections.abc import Iterable
from functools import cache

from sqlalchemy import Table
from sqlalchemy.dialects import sqlite
from sqlalchemy.schema import CreateIndex, CreateTable
from sqlmodel import SQLModel

from gaugelog.ledger.buffer import Buffer
from gaugelog.ledger.campaign import CampaignRow, ChannelRow, CriteriaRow
from gaugelog.ledger.circuits import CircuitRow
from gaugelog.ledger.instruments import CalibrationRow, InstrumentRow
from gaugelog.ledger.papers import CertificateRow
from gaugelog.ledger.people import PersonRow
from gaugelog.ledger.photos import PhotoRow
from gaugelog.ledger.points import GridRow, PointRow
from gaugelog.ledger.readings import ReadingRow
from gaugelog.ledger.reviews import RecordRow
from gaugelog.ledger.revisions import RevisionRow
from gaugelog.ledger.routes import RouteRow
from gaugelog.ledger.rows import Row
from gaugelog.ledger.shiftchecks import MeterCheckRow
from gaugelog.ledger.standing import StandingRow
from gaugelog.ledger.steps import StepRow
from gaugelog.ledger.stock import ConsumableRow, GaugeRow, LotRow
from gaugelog.ledger.story import StoryRow

LEDGER_VERSION = 13
"""Raise it when a table or an apply function changes: older logbooks are replayed when opened."""

TABLES: tuple[type[SQLModel], ...] = (
    PersonRow,
    LotRow,
    GaugeRow,
    ConsumableRow,
    InstrumentRow,
    CalibrationRow,
    CampaignRow,
    CriteriaRow,
    ChannelRow,
    RouteRow,
    PointRow,
    GridRow,
    CircuitRow,
    StepRow,
    ReadingRow,
    RecordRow,
    StoryRow,
    RevisionRow,
    StandingRow,
    PhotoRow,
    CertificateRow,
    MeterCheckRow,
)

_VERSION_TABLE = "CREATE TABLE IF NOT EXISTS ledger_version (id TEXT PRIMARY KEY, value INTEGER)"


def table_of(model: type[SQLModel]) -> Table:
    """The SQLAlchemy table of a row class."""
    table: Table = model.__table__  # type: ignore[attr-defined]
    return table


@cache
def columns(name: str) -> tuple[str, ...]:
    """The columns of the table called `name`, in order."""
    by_name = {table_of(model).name: table_of(model) for model in TABLES}
    return tuple(column.name for column in by_name[name].columns)


def names() -> list[str]:
    """The names of the ledger's tables."""
    return [table_of(model).name for model in TABLES]


def create_tables(connection: sqlite3.Connection) -> None:
    """Lay down empty tables, of this version, in the open transaction."""
    for model in TABLES:
        table = table_of(model)
        connection.execute(f"DROP TABLE IF EXISTS {_quoted(table.name)}")
        connection.execute(str(CreateTable(table).compile(dialect=sqlite.dialect())))
        for index in sorted(table.indexes, key=lambda each: str(each.name)):
            connection.execute(str(CreateIndex(index).compile(dialect=sqlite.dialect())))
    connection.execute(_VERSION_TABLE)
    connection.execute(
        "INSERT INTO ledger_version (id, value) VALUES ('ledger', ?)"
        " ON CONFLICT (id) DO UPDATE SET value = excluded.value",
        (LEDGER_VERSION,),
    )


def ledger_version(connection: sqlite3.Connection) -> int:
    """The version of the tables that are there; 0 when there are none."""
    there = connection.execute(
        "SELECT count(*) FROM sqlite_schema WHERE name = 'ledger_version'"
    ).fetchone()
    if not there[0]:
        return 0
    found = connection.execute("SELECT value FROM ledger_version WHERE id = 'ledger'").fetchone()
    return int(found[0]) if found else 0


def load_row(connection: sqlite3.Connection, table: str, row_id: str) -> Row | None:
    """One row by its id, or None."""
    found = connection.execute(select(table) + " WHERE id = ?", (row_id,)).fetchone()
    return None if found is None else dict(zip(columns(table), found, strict=True))


def load_rows(connection: sqlite3.Connection, table: str) -> Iterable[Row]:
    """Every row of a table."""
    for found in connection.execute(select(table)):
        yield dict(zip(columns(table), found, strict=True))


def write(connection: sqlite3.Connection, buffer: Buffer) -> None:
    """Write what a buffer holds, a table at a time, in the open transaction."""
    for table, rows in buffer.rows.items():
        gone = [(row_id,) for row_id, row in rows.items() if row is None]
        if gone:
            connection.executemany(f"DELETE FROM {_quoted(table)} WHERE id = ?", gone)
        names_ = columns(table)
        kept = [tuple(map(row.__getitem__, names_)) for row in rows.values() if row is not None]
        if kept:
            connection.executemany(_upsert(table), kept)


@cache
def select(table: str) -> str:
    """The statement that reads every row of a table, its columns in order.

    They are named with their table: SQLite takes a quoted name by itself for a text where there
    is no such column.
    """
    quoted = _quoted(table)
    return (
        f"SELECT {', '.join(f'{quoted}.{_quoted(each)}' for each in columns(table))} FROM {quoted}"
    )


@cache
def _upsert(table: str) -> str:
    names_ = columns(table)
    marks = ", ".join("?" * len(names_))
    sets = ", ".join(f"{_quoted(name)} = excluded.{_quoted(name)}" for name in names_[1:])
    return (
        f"INSERT INTO {_quoted(table)} ({', '.join(map(_quoted, names_))}) VALUES ({marks})"
        f" ON CONFLICT (id) DO UPDATE SET {sets}"
    )


def _quoted(name: str) -> str:
    return f'"{name}"'
