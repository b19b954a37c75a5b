"""Notes left at a step that stays open: why, for whoever takes it up next."""

from __future__ import annotations

from collections.abc import Iterator
from typing import ClassVar

from gaugelog.ledger.base import FactBody, Id
from gaugelog.ledger.rows import At, Change, Known
from gaugelog.ledger.story import told


class NoteLeft(FactBody):
    """A person leaves a step open and says why, or what was found."""

    kind: ClassVar[str] = "note.left"

    point: Id
    subject: Id
    step: str
    note: str
    left_by: Id


def apply_note_left(_known: Known, at: At, fact: NoteLeft) -> Iterator[Change]:
    """The note is a turn of the point's story; it changes no state."""
    yield told(at, fact.point, "note left", fact.left_by, reason=fact.note, step=fact.step)
