"""What the screen works with: the logbook, the keys, who sits there, and since when."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass, field
from pathlib import Path
from threading import Lock
from time import monotonic
from typing import TYPE_CHECKING

from gaugelog.errors import KeyTrouble, Refused
from gaugelog.screens.viewer import Viewer

if TYPE_CHECKING:
    from gaugelog.journal.keys import KeyFolder, Signer
    from gaugelog.work.logbook import Logbook
    from gaugelog.work.ports import RecordMaker

IDLE_SECONDS = 15 * 60.0
"""How long a key stays unlocked while nobody types."""


@dataclass(frozen=True, slots=True)
class Seat:
    """A person who signed on: the unlocked key, and the name as people read it."""

    signer: Signer
    name: str

    @property
    def person(self) -> str:
        """The person's id."""
        return self.signer.person


@dataclass
class Desk:
    """The logbook with what its deeds need, and who sits at it.

    `maker` draws and signs records, and is asked for only when one is due; `drafts` is the folder
    of half-typed fields; `ticks` gives seconds that only run forward.
    """

    logbook: Logbook
    keys: KeyFolder
    maker: Callable[[], RecordMaker]
    drafts: Path
    idle_seconds: float = IDLE_SECONDS
    ticks: Callable[[], float] = monotonic
    viewer: Viewer = field(default_factory=Viewer)
    seat: Seat | None = None
    _touched: float = field(default=0.0, repr=False)

    def sign_on(self, person: str, secret: str) -> Seat:
        """Unlock the key of `person`; slow, so never on the thread that draws.

        Raises KeyTrouble for a wrong secret or a missing key, Refused for someone not enrolled.
        """
        from gaugelog.ledger.people import PersonRow

        if not person.strip():
            raise KeyTrouble("Who signs was not said.", "Type your id.")
        with self.logbook.reading() as view:
            row = view.get(PersonRow, person.strip())
            if row is None or not row.active:
                raise Refused(f"Nobody is enrolled as {person}.", "Ask the custodian.")
            name = view.name(row.id)
        return Seat(self.keys.unlock(person.strip(), secret), name)

    def sit(self, seat: Seat | None) -> None:
        """Let a person sit down; None locks the desk."""
        self.seat = seat
        self.touch()

    def touch(self) -> None:
        """Somebody typed."""
        self._touched = self.ticks()

    @property
    def seconds_left(self) -> float:
        """How long until the key is locked, if nobody types."""
        return self.idle_seconds - (self.ticks() - self._touched)

    @property
    def signer(self) -> Signer:
        """The unlocked key of who sits here. Raises KeyTrouble when nobody does."""
        if self.seat is None:
            raise KeyTrouble("Nobody is signed on.", "Sign on first.")
        return self.seat.signer


class Opening:
    """A desk that is there already, or is opened once, by whoever needs it first."""

    def __init__(self, desk: Desk | Callable[[], Desk]) -> None:
        self._desk = desk if isinstance(desk, Desk) else None
        self._open = desk if not isinstance(desk, Desk) else None
        self._lock = Lock()

    @property
    def done(self) -> bool:
        """Whether the desk is there."""
        return self._desk is not None

    @property
    def desk(self) -> Desk:
        """The desk. Raises KeyTrouble while it is not there."""
        if self._desk is None:
            raise KeyTrouble("The logbook is not open yet.", "Wait a moment.")
        return self._desk

    def wait(self) -> Desk:
        """The desk, opened now if it was not; slow, so never on the thread that draws."""
        with self._lock:
            if self._desk is None and self._open is not None:
                self._desk = self._open()
        return self.desk
