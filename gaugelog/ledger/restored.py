"""A logbook restored from a backup: which one, and what a printed head proves missing."""

from __future__ import annotations

from collections.abc import Iterator
from typing import ClassVar

from gaugelog.ledger.base import FactBody, Id, Part, TimeText
from gaugelog.ledger.rows import At, Change, Known


class EntriesMissing(Part):
    """Entries that were in the journal once and are not in the backup: the first and the last."""

    first: int
    last: int

    def __str__(self) -> str:
        """As people read it, `entries 12…14` or `entry 12`."""
        if self.first == self.last:
            return f"entry {self.first}"
        return f"entries {self.first}…{self.last}"


class LogbookRestored(FactBody):
    """The first entry after a restore; nothing else may be kept before it."""

    kind: ClassVar[str] = "logbook.restored"

    logbook: Id
    backup: str
    """SHA-256 of the backup's file."""
    made: TimeText
    """When the backup was made."""
    head: str
    """The head at the backup, as printed."""
    printed: tuple[str, ...] = ()
    """Heads from paper that were held against the backup."""
    missing: EntriesMissing | None = None
    """What those heads prove missing; None: nothing is proven."""
    troubles: tuple[str, ...] = ()
    """What the check found of evidence that was lost before the backup."""
    reason: str


def apply_logbook_restored(_known: Known, _at: At, _fact: LogbookRestored) -> Iterator[Change]:
    """What is known is what the backup held: nothing changes."""
    yield from ()
