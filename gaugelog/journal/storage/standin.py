"""A copy that takes the place of a journal which can be read but not written."""

from __future__ import annotations

from collections.abc import Iterator
from contextlib import contextmanager
from pathlib import Path
from tempfile import TemporaryDirectory

from gaugelog.journal.storage.port import OnWait
from gaugelog.journal.storage.snapshot import copy_database
from gaugelog.journal.storage.sqlite import SqliteStorage, SqliteWriter
from gaugelog.journal.storage.troubles import not_writable, told_plainly


class StandIn(SqliteStorage):
    """Reads a copy in a folder of its own, gone with this object; what is new is refused.

    Raises StorageTrouble when there is no room for the copy.
    """

    def __init__(self, original: SqliteStorage) -> None:
        self._folder = TemporaryDirectory(prefix="gaugelog-")
        self._original = original
        copy = Path(self._folder.name) / original.path.name
        with told_plainly(copy), original.reading() as reader:
            copy_database(reader, copy)
        super().__init__(copy)

        self._sealed = False

    def seal(self) -> None:
        """From now on refuse writing: the copy is fit for reading."""
        self._sealed = True

    @contextmanager
    def writing(self, on_wait: OnWait | None = None) -> Iterator[SqliteWriter]:
        """Write to the copy until it is sealed. Then raises NotWritable, naming the original."""
        if self._sealed:
            raise not_writable(self._original.path)
        with super().writing(on_wait) as writer:
            yield writer

    def close(self) -> None:
        """Close the connections and take the copy away."""
        super().close()
        self._folder.cleanup()
