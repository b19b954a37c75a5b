"""A throw-away authority and the signers of the sample record."""

from __future__ import annotations

from dataclasses import dataclass
from datetime import UTC, datetime

from gaugelog.journal.authority import new_key
from gaugelog.journal.clock import Moment, SetClock
from gaugelog.journal.keys import Authority, Signer, UnlockedKey
from gaugelog.work.ports import Stamp
from tests.documents.sample import HEAD

SUBMITTED = Moment(datetime(2026, 12, 1, 14, 42, 10, 123456, tzinfo=UTC), 60, "boot", 1_000)
ACCEPTED = Moment(datetime(2026, 12, 2, 8, 15, 0, tzinfo=UTC), 60, "boot", 64_000_000)
LATER_HEAD = "147:Q3M7XK2ZB4WA5N6RTYC2DHEJPL"


@dataclass(frozen=True)
class Crew:
    """The authority, and one signer for each part."""

    authority: Authority
    technician: Signer
    reviewer: Signer


def crew() -> Crew:
    """A fresh authority with two people."""
    clock = SetClock(SUBMITTED)
    authority = Authority.create("Footbridge 7", clock)
    return Crew(
        authority, enrolled(authority, "t.okondo", clock), enrolled(authority, "w.brandt", clock)
    )


def enrolled(authority: Authority, person: str, clock: SetClock) -> UnlockedKey:
    """A person's unlocked key with a certificate of the authority."""
    key = new_key()
    certificate = authority.issue(person, key.public_key(), clock)
    return UnlockedKey(key, certificate, (authority.certificate,))


def technician_stamp() -> Stamp:
    """What the technician's signature shows."""
    return Stamp(
        "t.okondo",
        "Tamsin Okondo-Havlíčková",
        "I did the work recorded here; the readings are as I took them.",
        SUBMITTED,
        HEAD,
    )


def reviewer_stamp() -> Stamp:
    """What the reviewer's signature shows."""
    return Stamp(
        "w.brandt",
        "Wiebke Brandt-Ilesanmi",
        "I reviewed this record against the plan and the criteria and accept the point.",
        ACCEPTED,
        LATER_HEAD,
    )
