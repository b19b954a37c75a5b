"""Photos as evidence: the file by its digest, what it shows, who kept it and when."""

from __future__ import annotations

from collections.abc import Iterator
from typing import ClassVar

from sqlmodel import Field, SQLModel

from gaugelog.ledger.base import FactBody, Id, TimeText
from gaugelog.ledger.progress import note_worker
from gaugelog.ledger.rows import At, Change, Known, Put


class PhotoKept(FactBody):
    """A photo of something at a point; the file is among the evidence as it was given."""

    kind: ClassVar[str] = "photo.kept"

    id: Id
    point: Id
    step: str = ""
    """The step of the route that it shows; empty for the point as a whole."""
    subject: Id | None = None
    """The grid or circuit of that step."""
    readings: tuple[Id, ...] = ()
    """The readings that it was given with."""
    gauge: Id | None = None
    """The piece that was in place."""
    file: str
    """SHA-256 of the file."""
    name: str
    """The file's own name, as the camera or the person gave it."""
    format: str
    width: int
    """In pixels as the file has them, before it is turned upright."""
    height: int
    size: int
    """In bytes."""
    note: str = ""
    observed_at: TimeText
    """When it was kept, or when the step was observed that it was given with."""
    kept_by: Id


class PhotoRow(SQLModel, table=True):
    """A photo of a point."""

    __tablename__ = "photo"

    id: str = Field(primary_key=True)
    point: str = Field(index=True)
    step: str
    file: str
    observed_at: str
    by: str
    entered_at: str
    data: str
    """The whole of `PhotoKept` as JSON."""
    seq: int


def apply_photo_kept(known: Known, at: At, fact: PhotoKept) -> Iterator[Change]:
    """The photo belongs to the point; who gives evidence of a point is no judge of it."""
    yield from note_worker(known, fact.point, fact.kept_by)
    yield Put(
        "photo",
        {
            "id": fact.id,
            "point": fact.point,
            "step": fact.step,
            "file": fact.file,
            "observed_at": fact.observed_at,
            "by": fact.kept_by,
            "entered_at": at.time,
            "data": at.data,
            "seq": at.seq,
        },
    )
