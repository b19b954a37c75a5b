"""What tests of the journal begin with: people with keys, a clock, and a journal that has begun."""

from __future__ import annotations

from dataclasses import dataclass, field
from datetime import UTC, datetime
from functools import lru_cache

from gaugelog.journal.append import append, begin
from gaugelog.journal.certificates import certificate_issued
from gaugelog.journal.clock import Moment, SetClock
from gaugelog.journal.entry import Entry, Fact
from gaugelog.journal.evidence import Evidence, MemoryEvidence
from gaugelog.journal.ids import new_id
from gaugelog.journal.keys import Authority, Signer, UnlockedKey, new_key
from gaugelog.journal.storage.memory import MemoryStorage
from gaugelog.journal.storage.port import Storage

CHAIN = "chain-a"
START = Moment(datetime(2026, 12, 1, 9, 0, tzinfo=UTC), 60, "boot-1", 3_600_000)


def clock() -> SetClock:
    """A clock that stands at nine in the morning."""
    return SetClock(START)


@lru_cache
def authority() -> Authority:
    """One authority for all tests."""
    return Authority.create("Footbridge", clock())


def signer(person: str = "custodian") -> UnlockedKey:
    """A person with a key that the authority certified; the same key each time."""
    return _certified(person)


@lru_cache
def _certified(person: str) -> UnlockedKey:
    key = new_key()
    certificate = authority().issue(person, key.public_key(), clock())
    return UnlockedKey(key, certificate, authority().chain)


def stranger(person: str = "custodian") -> UnlockedKey:
    """A key that names the person, certified by another authority of the same name."""
    other, key = Authority.create("Footbridge", clock()), new_key()
    return UnlockedKey(key, other.issue(person, key.public_key(), clock()), other.chain)


def note(
    text: str = "clean", about: tuple[str, ...] = ("point-1",), **more: tuple[str, ...]
) -> Fact:
    """A fact of no trade."""
    return Fact("note.taken", 1, about, {"text": text}, **more)


@dataclass
class SampleJournal:
    """A journal that has begun, with a custodian and a technician."""

    storage: Storage = field(default_factory=MemoryStorage)
    evidence: Evidence = field(default_factory=MemoryEvidence)
    clock: SetClock = field(default_factory=clock)
    chain: str = CHAIN

    def start(self) -> SampleJournal:
        """Begin the journal and certify the technician: entries 1 to 3."""
        technician = signer("technician")
        enrolled = certificate_issued("technician", technician.certificate, "enrolled")
        with self.storage.writing() as writer:
            begin(writer, [enrolled], signer(), self.clock.now(), self.chain, new_id())
        return self

    def keep(self, *facts: Fact, by: Signer | None = None, deed: str = "") -> list[Entry]:
        """Append a deed a minute later."""
        self.clock.advance(60)
        with self.storage.writing() as writer:
            return append(
                writer,
                self.chain,
                facts or (note(),),
                by or signer("technician"),
                self.clock.now(),
                deed or new_id(),
            )

    def entries(self) -> list[Entry]:
        """Every entry there is."""
        with self.storage.reading() as reader:
            return list(reader.entries())
