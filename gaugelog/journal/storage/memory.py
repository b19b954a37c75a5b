"""A storage in memory: for tests, and for checks without a file."""

from __future__ import annotations

import threading
import time
from collections.abc import Collection, Iterator
from contextlib import contextmanager
from dataclasses import dataclass, field

from gaugelog.journal.entry import Entry, Head, sha256
from gaugelog.journal.storage.port import (
    GIVE_UP_SECONDS,
    Filed,
    OnWait,
    deed_taken,
    demand_next,
    no_sheet,
    still_busy,
)

_POLL_SECONDS = 0.02


@dataclass
class _Shelf:
    """What is kept: chains, deeds and sheets. Entries are only ever added."""

    chains: dict[str, list[Filed]] = field(default_factory=dict)
    deeds: dict[str, list[Entry]] = field(default_factory=dict)
    sheets: dict[str, bytes] = field(default_factory=dict)

    def copy(self) -> _Shelf:
        return _Shelf(
            {chain: list(filed) for chain, filed in self.chains.items()},
            {deed: list(entries) for deed, entries in self.deeds.items()},
            dict(self.sheets),
        )


class MemoryReader:
    """A view of one shelf; see `Reader`."""

    def __init__(self, shelf: _Shelf) -> None:
        self._shelf = shelf

    def head(self, chain: str) -> Head | None:
        """The last entry of a chain, or None."""
        filed = self._shelf.chains.get(chain)
        return filed[-1].entry.head if filed else None

    def chains(self) -> list[str]:
        """The ids of all chains, sorted."""
        return sorted(self._shelf.chains)

    def entries(self, chain: str | None = None, after: int = 0) -> Iterator[Entry]:
        """Entries numbered above `after`, by chain and number."""
        for name in self.chains() if chain is None else [chain]:
            yield from (item.entry for item in self.filed(name) if item.seq > after)

    def filed(self, chain: str) -> Iterator[Filed]:
        """All entries of a chain as they are filed."""
        return iter(self._shelf.chains.get(chain, []))

    def entry(self, chain: str, seq: int) -> Entry | None:
        """One entry, or None."""
        found = (item.entry for item in self.filed(chain) if item.seq == seq)
        return next(found, None)

    def deed(self, deed_id: str) -> list[Entry]:
        """The entries of a deed in their order."""
        return list(self._shelf.deeds.get(deed_id, []))

    def of_kinds(self, kinds: Collection[str]) -> Iterator[Entry]:
        """The entries of some kinds, by chain and number."""
        return (entry for entry in self.entries() if entry.header.kind in kinds)

    def sheet(self, digest: str) -> bytes | None:
        """An identity sheet, or None."""
        return self._shelf.sheets.get(digest)

    def sheets(self) -> list[str]:
        """The digests of all identity sheets."""
        return sorted(self._shelf.sheets)

    def missing_guards(self) -> list[str]:
        """Memory has no guards that could be taken away."""
        return []

    def damages(self) -> list[str]:
        """Memory is not damaged."""
        return []


class MemoryWriter(MemoryReader):
    """The one writer on a shelf of its own; see `Writer`."""

    def insert(self, entry: Entry) -> None:
        """Keep a new entry as the next of its chain."""
        header = entry.header
        demand_next(self.head(header.chain), entry)
        deed = self._shelf.deeds.setdefault(header.deed, [])
        if any(other.header.index == header.index for other in deed):
            raise deed_taken(entry)
        filed = Filed(header.chain, header.seq, header.deed, header.index, header.kind, entry)
        self._shelf.chains.setdefault(header.chain, []).append(filed)
        deed.append(entry)

    def put_sheet(self, data: bytes) -> str:
        """Keep an identity sheet; returns its digest."""
        digest = sha256(data)
        self._shelf.sheets[digest] = data
        return digest

    def erase_sheet(self, digest: str) -> None:
        """Erase an identity sheet."""
        if self._shelf.sheets.pop(digest, None) is None:
            raise no_sheet(digest)


class MemoryStorage:
    """Entries and sheets in memory. A writer works on a copy that takes the place at the end."""

    def __init__(self) -> None:
        self._shelf = _Shelf()
        self._lock = threading.Lock()

    @contextmanager
    def reading(self) -> Iterator[MemoryReader]:
        """Read what is there now, whatever is written meanwhile."""
        yield MemoryReader(self._shelf)

    @contextmanager
    def writing(self, on_wait: OnWait | None = None) -> Iterator[MemoryWriter]:
        """Be the one writer."""
        self._take_lock(on_wait)
        try:
            draft = self._shelf.copy()
            yield MemoryWriter(draft)
            self._shelf = draft
        finally:
            self._lock.release()

    def _take_lock(self, on_wait: OnWait | None) -> None:
        start = time.monotonic()
        while not self._lock.acquire(timeout=_POLL_SECONDS):
            waited = time.monotonic() - start
            if waited > GIVE_UP_SECONDS:
                raise still_busy(waited)
            if on_wait is not None:
                on_wait(waited)
