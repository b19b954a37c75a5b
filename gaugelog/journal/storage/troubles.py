"""What SQLite complains of, said in plain words with what to do about it."""

from __future__ import annotations

import sqlite3
from collections.abc import Iterator
from contextlib import contextmanager
from pathlib import Path

from gaugelog.errors import StorageTrouble

_WORDS: dict[int, tuple[str, str]] = {
    sqlite3.SQLITE_BUSY: (
        "{path} is held by another process.",
        "Wait until it is done and try again.",
    ),
    sqlite3.SQLITE_LOCKED: (
        "{path} is held by another process.",
        "Wait until it is done and try again.",
    ),
    sqlite3.SQLITE_FULL: (
        "The disk is full; nothing was stored in {path}.",
        "Make room and try again.",
    ),
    sqlite3.SQLITE_READONLY: (
        "{path} may not be written.",
        "Ask for write permission on the file and its folder, or copy the logbook elsewhere.",
    ),
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


def trouble_of(error: sqlite3.Error, path: Path) -> StorageTrouble | None:
    """The trouble behind an error of SQLite, or None when the fault is the program's own."""
    code = getattr(error, "sqlite_errorcode", None)
    words = _WORDS.get(code & 0xFF) if code is not None else None
    if words is None:
        return None
    message, remedy = words
    return StorageTrouble(message.format(path=path), remedy)


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
