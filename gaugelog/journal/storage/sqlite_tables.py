"""What is read from and written to the tables of the journal, within one transaction."""

from __future__ import annotations

import json
import sqlite3
from collections.abc import Collection, Iterator
from typing import Any

from gaugelog.journal.entry import Entry, Head, sha256
from gaugelog.journal.storage.port import Filed, deed_taken, demand_next, no_sheet
from gaugelog.journal.storage.schema import GUARDS, plain


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

    def damages(self) -> list[str]:
        """What SQLite's own check of its pages finds; the first few say enough."""
        found = self.connection.execute("PRAGMA quick_check(3)")
        return [f"The database is damaged: {plain(row[0])}." for row in found if row[0] != "ok"]

    def _first(self, statement: str, *values: str | int) -> tuple[Any, ...] | None:
        found: tuple[Any, ...] | None = self.connection.execute(statement, values).fetchone()
        return found


class SqliteWriter(SqliteReader):
    """The one writer; see `Writer`. Others write their own tables through `connection`."""

    def __init__(self, connection: sqlite3.Connection) -> None:
        super().__init__(connection)
        self.erased = False
        self._heads: dict[str, Head | None] = {}

    def head(self, chain: str) -> Head | None:
        """The last entry of a chain; looked up once, for nobody else writes meanwhile."""
        if chain not in self._heads:
            self._heads[chain] = super().head(chain)
        return self._heads[chain]

    def insert(self, entry: Entry) -> None:
        """Keep a new entry as the next of its chain."""
        header = entry.header
        demand_next(self.head(header.chain), entry)
        try:
            self.connection.execute(_INSERT, _row(entry))
        except sqlite3.IntegrityError as error:
            raise deed_taken(entry) from error
        self._heads[header.chain] = entry.head

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


_INSERT = """
INSERT INTO entry (chain, seq, previous, deed, deed_index, kind, header, body, signature)
VALUES (?, ?, ?, ?, ?, ?, ?, ?, ?)
"""


def _row(entry: Entry) -> tuple[str | int | bytes | None, ...]:
    header = entry.header
    return (
        header.chain,
        header.seq,
        bytes.fromhex(header.previous),
        header.deed,
        header.index,
        header.kind,
        entry.header_bytes,
        entry.body_bytes,
        entry.signature,
    )


def _entry(header: object, body: object, signature: object) -> Entry:
    return Entry(_bytes(header) or b"", _bytes(body), _bytes(signature))


def _bytes(value: object) -> bytes | None:
    if value is None or isinstance(value, bytes):
        return value
    # A column that was tampered with can hold any type; as bytes it fails the check like bytes.
    return str(value).encode("utf-8", "surrogatepass")
