"""Reading a journal where SQLite may write nothing: read-only media and folders, full disks.

A write-ahead log needs a shared-memory file beside the database, even to read. Where it can't be
made, the file is read as one that stands still, and is looked at again when the reading ends.
"""

from __future__ import annotations

import shutil
import sqlite3
from pathlib import Path
from tempfile import TemporaryDirectory

from gaugelog.errors import StorageTrouble

_NO_ROOM_FOR_SHARED_MEMORY = frozenset(
    {
        sqlite3.SQLITE_IOERR_SHMOPEN,
        sqlite3.SQLITE_IOERR_SHMSIZE,
        sqlite3.SQLITE_IOERR_SHMMAP,
        sqlite3.SQLITE_IOERR_SHMLOCK,
    }
)
_Stamp = tuple[tuple[int, int] | None, ...]


class StillConnection(sqlite3.Connection):
    """A connection for reading only, to a file that is taken to stand still meanwhile."""

    path: Path
    stamp: _Stamp
    copy: TemporaryDirectory[str] | None = None

    def demand_unchanged(self) -> None:
        """Refuse what was read if somebody wrote meanwhile. Raises StorageTrouble."""
        if _stamp(self.path) != self.stamp:
            raise StorageTrouble(
                f"{self.path} was written by another program while it was read.",
                "Try again when that program is done.",
            )

    def close(self) -> None:
        """Close the connection and take away what it was read from, if that was a copy."""
        super().close()
        if self.copy is not None:
            self.copy.cleanup()


def is_for_still(error: sqlite3.Error, path: Path) -> bool:
    """Whether a connection failed for want of a place to write, and not for what is in the file."""
    code = getattr(error, "sqlite_errorcode", 0)
    unwritable = code & 0xFF in {sqlite3.SQLITE_CANTOPEN, sqlite3.SQLITE_READONLY}
    return path.is_file() and (unwritable or code in _NO_ROOM_FOR_SHARED_MEMORY)


def connect_still(path: Path) -> StillConnection:
    """Connect to read `path` without writing anything beside it. Raises sqlite3.Error.

    Where a program that died left a write-ahead log, a copy of both is read: what was
    acknowledged is in that log.
    """
    stamp = _stamp(path)
    if _log_of(path).is_file() and _log_of(path).stat().st_size:
        connection = _joined(path) or _copied(path)
    else:
        connection = _connect(path, "mode=ro&immutable=1")
    connection.path, connection.stamp = path, stamp
    return connection


def _joined(path: Path) -> StillConnection | None:
    """A connection by the shared memory that others made, or None when there is none."""
    connection = _connect(path, "mode=ro")
    try:
        connection.execute("SELECT 1 FROM sqlite_schema LIMIT 1").fetchone()
    except sqlite3.OperationalError:
        connection.close()
        return None
    return connection


def _copied(path: Path) -> StillConnection:
    folder = TemporaryDirectory(prefix="gaugelog-")
    try:
        copy = Path(folder.name) / path.name
        shutil.copyfile(path, copy)
        shutil.copyfile(_log_of(path), _log_of(copy))
        connection = _connect(copy, "mode=rw")
    except BaseException:
        folder.cleanup()
        raise
    connection.copy = folder
    return connection


def _connect(path: Path, how: str) -> StillConnection:
    return sqlite3.connect(
        f"{path.resolve().as_uri()}?{how}",
        uri=True,
        isolation_level=None,
        check_same_thread=False,
        factory=StillConnection,
    )


def _log_of(path: Path) -> Path:
    return path.with_name(f"{path.name}-wal")


def _stamp(path: Path) -> _Stamp:
    return tuple(_state(file) for file in (path, _log_of(path)))


def _state(file: Path) -> tuple[int, int] | None:
    try:
        found = file.stat()
    except OSError:
        return None
    return found.st_mtime_ns, found.st_size
