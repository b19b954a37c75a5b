"""What SQLite complains of, said in plain words with what to do about it."""

from __future__ import annotations

import shutil
import sqlite3
from collections.abc import Iterator
from contextlib import contextmanager
from pathlib import Path

from gaugelog.errors import StorageTrouble

_FULL = ("The disk is full; nothing was stored in {path}.", "Make room and try again.")
_GONE = ("{path} is not there.", "Restore it from a backup, or name another logbook.")
_NOT_WRITABLE = (
    "{path} may not be written: it, its folder or its medium is read-only.",
    "Ask for write permission on both, or copy the whole logbook to where you may write.",
)
_WORDS: dict[int, tuple[str, str]] = {
    sqlite3.SQLITE_BUSY: (
        "{path} is held by another process.",
        "Wait until it is done and try again.",
    ),
    sqlite3.SQLITE_LOCKED: (
        "{path} is held by another process.",
        "Wait until it is done and try again.",
    ),
    sqlite3.SQLITE_FULL: _FULL,
    sqlite3.SQLITE_READONLY: _NOT_WRITABLE,
    sqlite3.SQLITE_PERM: (
        "{path} may not be opened.",
        "Ask for permission on the file and its folder.",
    ),
    sqlite3.SQLITE_CANTOPEN: (
        "{path} can't be opened.",
        "See that the file is there and that you may read and write its folder.",
    ),
    sqlite3.SQLITE_NOTADB: (
        "{path} is not a logbook's database.",
        "Name another logbook, or restore this file from a backup.",
    ),
    sqlite3.SQLITE_CORRUPT: (
        "{path} is damaged.",
        "Keep the damaged file, and restore the newest backup.",
    ),
    sqlite3.SQLITE_IOERR: (
        "The disk failed while {path} was read or written.",
        "Look to the disk first; then check the journal or restore a backup.",
    ),
}


_LEAST_ROOM = 64 * 1024


class NotWritable(StorageTrouble):
    """The logbook can be read, and not written."""


def trouble_of(error: sqlite3.Error, path: Path) -> StorageTrouble | None:
    """The trouble behind an error of SQLite, or None when the fault is the program's own."""
    code = getattr(error, "sqlite_errorcode", None)
    words = _words(code, path) if code is not None else None
    if words is None:
        return None
    message, remedy = words
    kind = NotWritable if words is _NOT_WRITABLE else StorageTrouble
    return kind(message.format(path=path), remedy)


def _words(code: int, path: Path) -> tuple[str, str] | None:
    kind = code & 0xFF
    if kind == sqlite3.SQLITE_CANTOPEN and _is_readable(path):
        return _NOT_WRITABLE
    if kind == sqlite3.SQLITE_CANTOPEN and not path.exists():
        return _GONE
    if kind == sqlite3.SQLITE_IOERR and _is_full(path):
        return _FULL
    return _WORDS.get(kind)


def _is_readable(path: Path) -> bool:
    try:
        path.open("rb").close()
    except OSError:
        return False
    return True


def _is_full(path: Path) -> bool:
    """Whether the disk has less room than SQLite needs to open its shared memory."""
    try:
        return shutil.disk_usage(path.parent).free < _LEAST_ROOM
    except OSError:
        return False


def not_writable(path: Path) -> NotWritable:
    """The trouble of a logbook that can be read, and not written."""
    message, remedy = _NOT_WRITABLE
    return NotWritable(message.format(path=path), remedy)


@contextmanager
def told_plainly(path: Path) -> Iterator[None]:
    """Turn errors of SQLite that people can do something about into StorageTrouble."""
    try:
        yield
    except sqlite3.Error as error:
        trouble = trouble_of(error, path)
        if trouble is None:
            raise
        raise trouble from error
