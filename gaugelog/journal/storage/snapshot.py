"""A database copied as it stands in one view, by SQLite's own backup, while others may write."""

from __future__ import annotations

import sqlite3
from pathlib import Path

from gaugelog.journal.storage.sqlite_tables import SqliteReader


def copy_database(reader: SqliteReader, target: Path) -> None:
    """Copy what `reader` sees to a new file. Raises sqlite3.Error."""
    copy = sqlite3.connect(target)
    try:
        reader.connection.backup(copy)
        # One plain file: no write-ahead log has to travel beside it.
        copy.execute("PRAGMA journal_mode = DELETE")
    finally:
        copy.close()
