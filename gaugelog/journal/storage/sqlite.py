"""The journal in a SQLite file: write-ahead log, one writer, what was acknowledged is on disk."""

from __future__ import annotations

import random
import sqlite3
import threading
import time
from collections.abc import Callable, Iterator
from contextlib import contextmanager
from pathlib import Path

from gaugelog.errors import StorageTrouble
from gaugelog.journal.storage.port import GIVE_UP_SECONDS, OnWait, still_busy
from gaugelog.journal.storage.schema import GUARDS, TABLES
from gaugelog.journal.storage.sqlite_tables import SqliteReader, SqliteWriter
from gaugelog.journal.storage.still import StillConnection, connect_still, is_for_still
from gaugelog.journal.storage.troubles import told_plainly

__all__ = ["SqliteReader", "SqliteStorage", "SqliteWriter"]

_SETTINGS = (
    "journal_mode = WAL",
    "synchronous = FULL",
    "foreign_keys = ON",
    "recursive_triggers = ON",
)
_BUSY_MS = 5000
_POLL_SECONDS = 0.01


class SqliteStorage:
    """A journal in one SQLite file. Connections are kept open and lent out one at a time."""

    def __init__(self, path: Path) -> None:
        self.path = path
        self._idle: list[sqlite3.Connection] = []
        self._lock = threading.Lock()

    def create(self) -> None:
        """Lay down the tables in a new file. Raises StorageTrouble when a journal is there."""
        with told_plainly(self.path):
            connection = _connect(self.path, "rwc")
            try:
                _lay_down(connection, self.path)
            finally:
                connection.close()

    @contextmanager
    def reading(self) -> Iterator[SqliteReader]:
        """Read one unchanging view; also where nothing may be written, as on read-only media."""
        with told_plainly(self.path), self._connection(_open_to_read) as connection:
            connection.execute("BEGIN")
            try:
                # SQLite takes its view at the first read, not at BEGIN.
                connection.execute("SELECT 1 FROM entry LIMIT 1").fetchone()
                yield SqliteReader(connection)
            finally:
                _roll_back(connection)

    @contextmanager
    def writing(self, on_wait: OnWait | None = None) -> Iterator[SqliteWriter]:
        """Be the one writer."""
        with told_plainly(self.path), self._connection(_open_to_write) as connection:
            _begin(connection, on_wait)
            writer = SqliteWriter(connection)
            try:
                yield writer
                connection.execute("COMMIT")
            except BaseException:
                _roll_back(connection)
                raise
            if writer.erased:
                # What was erased must not live on in the write-ahead log. While another process
                # holds an older view, SQLite keeps it until that view is closed.
                connection.execute("PRAGMA wal_checkpoint(TRUNCATE)")

    def close(self) -> None:
        """Close the connections that are kept open."""
        with self._lock:
            while self._idle:
                self._idle.pop().close()

    @contextmanager
    def _connection(
        self, opened: Callable[[Path], sqlite3.Connection]
    ) -> Iterator[sqlite3.Connection]:
        with self._lock:
            connection = self._idle.pop() if self._idle else None
        if connection is None:
            connection = opened(self.path)
            _demand_journal(connection, self.path)
        try:
            yield connection
        except sqlite3.Error:
            # After an error of its own a connection is not trusted with the next deed.
            connection.close()
            raise
        except BaseException:
            self._take_back(connection)
            raise
        self._take_back(connection)

    def _take_back(self, connection: sqlite3.Connection) -> None:
        if isinstance(connection, StillConnection):
            connection.close()
            connection.demand_unchanged()
            return
        with self._lock:
            self._idle.append(connection)


def _open_to_write(path: Path) -> sqlite3.Connection:
    return _connect(path, "rw")


def _open_to_read(path: Path) -> sqlite3.Connection:
    try:
        return _connect(path, "rw")
    except sqlite3.Error as error:
        if not is_for_still(error, path):
            raise
        return connect_still(path)


def _connect(path: Path, mode: str) -> sqlite3.Connection:
    connection = sqlite3.connect(
        f"{path.resolve().as_uri()}?mode={mode}",
        uri=True,
        isolation_level=None,
        timeout=_BUSY_MS / 1000,
        check_same_thread=False,
    )
    try:
        for setting in _SETTINGS:
            connection.execute(f"PRAGMA {setting}")
    except sqlite3.Error:
        connection.close()
        raise
    return connection


def _lay_down(connection: sqlite3.Connection, path: Path) -> None:
    connection.execute("BEGIN IMMEDIATE")
    if _has_journal(connection):
        raise StorageTrouble(
            f"There is a journal in {path} already.", "Open it, or choose another folder."
        )
    for statement in (*TABLES, *GUARDS.values()):
        connection.execute(statement)
    connection.execute("COMMIT")


def _has_journal(connection: sqlite3.Connection) -> bool:
    found = connection.execute(
        "SELECT count(*) FROM sqlite_schema WHERE type = 'table' AND name IN ('entry', 'sheet')"
    ).fetchone()
    return bool(found[0] == len(TABLES))


def _demand_journal(connection: sqlite3.Connection, path: Path) -> None:
    try:
        found = _has_journal(connection)
    except sqlite3.Error:
        connection.close()
        raise
    if not found:
        connection.close()
        raise StorageTrouble(
            f"{path} holds no journal.", "Name another logbook, or restore this file from a backup."
        )


def _begin(connection: sqlite3.Connection, on_wait: OnWait | None) -> None:
    # SQLite's own waiting says nothing to the person, so it is turned off for this statement.
    start = time.monotonic()
    connection.execute("PRAGMA busy_timeout = 0")
    try:
        while not _began(connection):
            waited = time.monotonic() - start
            if waited > GIVE_UP_SECONDS:
                raise still_busy(waited)
            if on_wait is not None:
                on_wait(waited)
            time.sleep(_POLL_SECONDS * random.uniform(0.5, 2))  # noqa: S311 (no secret)
    finally:
        connection.execute(f"PRAGMA busy_timeout = {_BUSY_MS}")


def _began(connection: sqlite3.Connection) -> bool:
    try:
        connection.execute("BEGIN IMMEDIATE")
    except sqlite3.OperationalError as error:
        if error.sqlite_errorcode & 0xFF != sqlite3.SQLITE_BUSY:
            raise
        return False
    return True


def _roll_back(connection: sqlite3.Connection) -> None:
    # Some errors, such as a full disk, have SQLite roll back by itself.
    if connection.in_transaction:
        connection.execute("ROLLBACK")
