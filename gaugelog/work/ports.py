"""What the deeds need from higher rooms: declared here, handed in by the commands."""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING, Protocol

from gaugelog.journal.clock import Moment
from gaugelog.journal.keys import Signer

if TYPE_CHECKING:
    from gaugelog.journal.evidence import Evidence
    from gaugelog.ledger.view import View


@dataclass(frozen=True, slots=True)
class RecordRequest:
    """Which record is wanted: of which point, from which head, and what its signature means."""

    point: str
    revision: int
    head: str
    moment: Moment
    meaning: str
    evidence: Evidence | None = None
    """Where the photos are that the record shows."""


@dataclass(frozen=True, slots=True)
class Stamp:
    """What a signature shows on the page."""

    person: str
    name: str
    meaning: str
    moment: Moment
    head: str


class RecordMaker(Protocol):
    """Draws and signs the record of a point."""

    def draft(self, view: View, request: RecordRequest) -> bytes:
        """The record as a draft: marked on every page, unsigned."""
        ...

    def submitted(self, view: View, request: RecordRequest, signer: Signer) -> bytes:
        """The record with the technician's signature."""
        ...

    def accepted(self, pdf: bytes, stamp: Stamp, signer: Signer) -> bytes:
        """The record with the reviewer's signature added."""
        ...
