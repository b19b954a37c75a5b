"""The journal in a SQLite file: write-ahead log, one writer, what was acknowledged is on disk."""

from __future__ import annotations

import json
import random
import sqlite3
import threading
import time
from collections.abc import Collection, Iterator
from contextlib import contextmanager
from pathlib import Path
from typing import Any

from gaugelog.errors import StorageTrouble
from gaugelog.journal.entry import Entry, Head, sha256
from gaugelog.journal.storage.port import (
    GIVE_UP_SECONDS,
    Filed,
    OnWait,
    demand_next,
    no_sheet,
    still_busy,
)
from gaugelog.journal.storage.schema import GUARDS, TABLES, plain
from gaugelog.journal.storage.troubles import told_plainly

_BUSY_MS = 5000
_POLL_SECONDS = 0.01


class SqliteReader:
    """One unchanging view of the file; see `Reader`.

    `connection` is the open transaction, for those who read their own tables in the same view.
    """

    def __init__(self, connection: sqlite3.Connection) -> None:
        self.connection = connection

    def head(self, chain: str) -> Head | None:
        """The last entry of a chain, or None."""
        found = self._first(
            "SELECT header, body, signature FROM entry WHERE chain = ? ORDER BY seq DESC LIMIT 1",
            chain,
        )
        return _entry(*found).head if found else None

    def chains(self) -> list[str]:
        """The ids of all chains, sorted; a look-up for each, not a walk through all entries."""
        found: list[str] = []
        last = self._first("SELECT min(chain) FROM entry")
        while last is not None and last[0] is not None:
            found.append(str(last[0]))
            last = self._first("SELECT min(chain) FROM entry WHERE chain > ?", last[0])
        return found

    def entries(self, chain: str | None = None, after: int = 0) -> Iterator[Entry]:
        """Entries numbered above `after`, by chain and number."""
        if chain is None:
            for name in self.chains():
                yield from self.entries(name, after)
            return
        for row in self.connection.execute(
            "SELECT header, body, signature FROM entry WHERE chain = ? AND seq > ? ORDER BY seq",
            (chain, after),
        ):
            yield _entry(*row)

    def filed(self, chain: str) -> Iterator[Filed]:
        """All entries of a chain as they are filed."""
        for seq, deed, index, kind, *row in self.connection.execute(
            "SELECT seq, deed, deed_index, kind, header, body, signature FROM entry WHERE chain = ?"
            " ORDER BY seq",
            (chain,),
        ):
            yield Filed(chain, seq, deed, index, kind, _entry(*row))

    def entry(self, chain: str, seq: int) -> Entry | None:
        """One entry, or None."""
        found = self._first(
            "SELECT header, body, signature FROM entry WHERE chain = ? AND seq = ?", chain, seq
        )
        return _entry(*found) if found else None

    def deed(self, deed_id: str) -> list[Entry]:
        """The entries of a deed in their order."""
        rows = self.connection.execute(
            "SELECT header, body, signature FROM entry WHERE deed = ? ORDER BY deed_index",
            (deed_id,),
        )
        return [_entry(*row) for row in rows]

    def of_kinds(self, kinds: Collection[str]) -> Iterator[Entry]:
        """The entries of some kinds, by chain and number."""
        for row in self.connection.execute(
            "SELECT header, body, signature FROM entry"
            " WHERE kind IN (SELECT value FROM json_each(?)) ORDER BY chain, seq",
            (json.dumps(sorted(kinds)),),
        ):
            yield _entry(*row)

    def sheet(self, digest: str) -> bytes | None:
        """An identity sheet, or None."""
        found = self._first("SELECT data FROM sheet WHERE digest = ?", digest)
        return _bytes(found[0]) if found else None

    def sheets(self) -> list[str]:
        """The digests of all identity sheets."""
        rows = self.connection.execute("SELECT digest FROM sheet ORDER BY digest")
        return [str(row[0]) for row in rows]

    def missing_guards(self) -> list[str]:
        """Which triggers are gone or say something else than they should."""
        found = dict(
            self.connection.execute("SELECT name, sql FROM sqlite_schema WHERE type = 'trigger'")
        )
        return [
            f"The trigger {name} is {'altered' if name in found else 'missing'}."
            for name, statement in GUARDS.items()
            if plain(str(found.get(name))) != plain(statement)
        ]

    def _first(self, statement: str, *values: str | int) -> tuple[Any, ...] | None:
        found: tuple[Any, ...] | None = self.connection.execute(statement, values).fetchone()
        return found


class SqliteWriter(SqliteReader):
    """The one writer; see `Writer`. Others write their own tables through `connection`."""

    def __init__(self, connection: sqlite3.Connection) -> None:
        super().__init__(connection)
        self.erased = False

    def insert(self, entry: Entry) -> None:
        """Keep a new entry as the next of its chain."""
        demand_next(self, entry)
        header = entry.header
        self.connection.execute(
            "INSERT INTO entry (chain, seq, previous, deed, deed_index, kind, header, body,"
            " signature) VALUES (?, ?, ?, ?, ?, ?, ?, ?, ?)",
            (
                header.chain,
                header.seq,
                bytes.fromhex(header.previous),
                header.deed,
                header.index,
                header.kind,
                entry.header_bytes,
                entry.body_bytes,
                entry.signature,
            ),
        )

    def put_sheet(self, data: bytes) -> str:
        """Keep an identity sheet; returns its digest."""
        digest = sha256(data)
        self.connection.execute(
            "INSERT INTO sheet (digest, data) VALUES (?, ?) ON CONFLICT DO NOTHING", (digest, data)
        )
        return digest

    def erase_sheet(self, digest: str) -> None:
        """Erase an identity sheet; its bytes are overwritten, not just forgotten."""
        self.connection.execute("PRAGMA secure_delete = ON")
        done = self.connection.execute("DELETE FROM sheet WHERE digest = ?", (digest,))
        if done.rowcount == 0:
            raise no_sheet(digest)
        self.erased = True


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
        """Read one unchanging view."""
        with told_plainly(self.path), self._connection() as connection:
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
        with told_plainly(self.path), self._connection() as connection:
            _begin(connection, on_wait)
            writer = SqliteWriter(connection)
            try:
                yield writer
                connection.execute("COMMIT")
            except BaseException:
                _roll_back(connection)
                raise
            if writer.erased:
                # What was erased must not live on in the write-ahead log.
                connection.execute("PRAGMA wal_checkpoint(TRUNCATE)")

    def close(self) -> None:
        """Close the connections that are kept open."""
        with self._lock:
            while self._idle:
                self._idle.pop().close()

    @contextmanager
    def _connection(self) -> Iterator[sqlite3.Connection]:
        with self._lock:
            connection = self._idle.pop() if self._idle else None
        if connection is None:
            connection = _connect(self.path, "rw")
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
        with self._lock:
            self._idle.append(connection)


def _connect(path: Path, mode: str) -> sqlite3.Connection:
    connection = sqlite3.connect(
        f"{path.resolve().as_uri()}?mode={mode}",
        uri=True,
        isolation_level=None,
        timeout=_BUSY_MS / 1000,
        check_same_thread=False,
    )
    for setting in (
        "journal_mode = WAL",
        "synchronous = FULL",
        "foreign_keys = ON",
        "recursive_triggers = ON",
    ):
        connection.execute(f"PRAGMA {setting}")
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
    if not _has_journal(connection):
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


def _entry(header: object, body: object, signature: object) -> Entry:
    return Entry(_bytes(header) or b"", _bytes(body), _bytes(signature))


def _bytes(value: object) -> bytes | None:
    if value is None or isinstance(value, bytes):
        return value
    # A column that was tampered with can hold any type; as bytes it fails the check like bytes.
    return str(value).encode("utf-8", "surrogatepass")
