"""The ledger as it would be after a change that is not kept: a copy in memory to ask rules of."""

from __future__ import annotations

import sqlite3
from collections.abc import Callable, Iterator
from contextlib import closing, contextmanager

from gaugelog.ledger import schema
from gaugelog.ledger.buffer import Buffer
from gaugelog.ledger.rows import Change, Known
from gaugelog.ledger.view import View


@contextmanager
def preview(
    connection: sqlite3.Connection, changes: Callable[[Known], Iterator[Change]]
) -> Iterator[View]:
    """A view of the tables with `changes` made; names of people can't be read through it."""
    with closing(sqlite3.connect(":memory:")) as memory:
        schema.create_tables(memory)
        copy = Buffer()
        for table in schema.names():
            copy.rows[table] = {str(row["id"]): row for row in schema.load_rows(connection, table)}
        copy.take(changes(copy))
        schema.write(memory, copy)
        yield View(memory, lambda _sheet: None)
