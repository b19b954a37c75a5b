"""What the journal asks of a storage: insert and select, one writer at a time.

There is no way to change or delete an entry. Identity sheets stand apart and can be erased.
"""

from __future__ import annotations

from collections.abc import Callable, Collection, Iterator
from contextlib import AbstractContextManager
from typing import NamedTuple, Protocol

from gaugelog.errors import StorageTrouble
from gaugelog.journal.entry import Entry, Head
from gaugelog.journal.head import NO_HASH

OnWait = Callable[[float], None]
"""Told the seconds waited so far, again and again while another process writes."""


class Filed(NamedTuple):
    """An entry with the place the storage keeps it at, which must be the one its header names."""

    chain: str
    seq: int
    deed: str
    deed_index: int
    kind: str
    entry: Entry


class Reader(Protocol):
    """One unchanging view of what is stored, as long as it is open."""

    def head(self, chain: str) -> Head | None:
        """The last entry of a chain by number and hash, or None when there is no such chain."""
        ...

    def chains(self) -> list[str]:
        """The ids of all chains, sorted."""
        ...

    def entries(self, chain: str | None = None, after: int = 0) -> Iterator[Entry]:
        """Entries numbered above `after`, of one chain or of all, by chain and number."""
        ...

    def filed(self, chain: str) -> Iterator[Filed]:
        """All entries of a chain by the number they are filed under; nothing is parsed."""
        ...

    def entry(self, chain: str, seq: int) -> Entry | None:
        """One entry, or None."""
        ...

    def deed(self, deed_id: str) -> list[Entry]:
        """The entries of a deed in their order; an empty list when there is none."""
        ...

    def of_kinds(self, kinds: Collection[str]) -> Iterator[Entry]:
        """The entries of some kinds, by chain and number."""
        ...

    def sheet(self, digest: str) -> bytes | None:
        """An identity sheet by its SHA-256 digest, or None when it is not there (any more)."""
        ...

    def sheets(self) -> list[str]:
        """The digests of all identity sheets that are there, sorted."""
        ...

    def missing_guards(self) -> list[str]:
        """What the storage's own guards against alteration lack, a sentence each."""
        ...

    def damages(self) -> list[str]:
        """What is broken in the storage itself, whatever the entries say, a sentence each."""
        ...


class Writer(Reader, Protocol):
    """The one writer. What it did is on disk when its `with` ends, and undone on any exception."""

    def insert(self, entry: Entry) -> None:
        """Keep a new entry as the next of its chain.

        Raises StorageTrouble when it is not the next one: its number, its link to the entry
        before, and its place in its deed must be free and fit.
        """
        ...

    def put_sheet(self, data: bytes) -> str:
        """Keep an identity sheet; returns its SHA-256 digest. Twice the same is kept once."""
        ...

    def erase_sheet(self, digest: str) -> None:
        """Erase an identity sheet for good. Raises StorageTrouble when it is not there."""
        ...


class Storage(Protocol):
    """A place that keeps entries and identity sheets."""

    def reading(self) -> AbstractContextManager[Reader]:
        """Read one unchanging view. Raises StorageTrouble when it can't be read."""
        ...

    def writing(self, on_wait: OnWait | None = None) -> AbstractContextManager[Writer]:
        """Be the one writer, after waiting for another to finish.

        Raises StorageTrouble when the other takes too long, or the place can't be written.
        """
        ...


def demand_next(head: Head | None, entry: Entry) -> None:
    """Refuse an entry that does not follow the last one of its chain. Raises StorageTrouble."""
    header = entry.header
    seq, previous = (head.seq, head.hash) if head else (0, NO_HASH)
    if header.seq != seq + 1 or header.previous != previous.hex():
        raise StorageTrouble(
            f"Entry {header.seq} does not follow entry {seq}, the last of its chain.",
            "Read the journal again and append to its head.",
        )


def deed_taken(entry: Entry) -> StorageTrouble:
    """The trouble of an entry whose place in its deed is taken."""
    return StorageTrouble(
        f"Deed {entry.header.deed} has its entry {entry.header.index} already.",
        "Give each deed an id of its own.",
    )


def no_sheet(digest: str) -> StorageTrouble:
    """The trouble of an identity sheet that is not there to be erased."""
    return StorageTrouble(
        f"There is no identity sheet {digest}.", "Look up the person; it may be erased already."
    )


GIVE_UP_SECONDS = 30.0
"""How long a writer waits for another one."""


def still_busy(seconds: float) -> StorageTrouble:
    """The trouble of having waited in vain for another writer."""
    return StorageTrouble(
        f"Another process has been writing to the logbook for {seconds:.0f} seconds.",
        "Wait until it is done, or find out which program holds the logbook, and try again.",
    )
