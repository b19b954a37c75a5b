"""Submission, acceptance and return of a point; the revisions of its record."""

from __future__ import annotations

from typing import ClassVar

from sqlmodel import Field, SQLModel

from gaugelog.ledger.base import FactBody, Id


class PointSubmitted(FactBody):
    """The technician signed the record of a point and hands it to review."""

    kind: ClassVar[str] = "point.submitted"

    point: Id
    revision: int
    file: str
    """Digest of the record PDF with one signature."""
    head: str
    """Head of the journal that the record was drawn from, as printed on it."""
    meaning: str
    submitted_by: Id
    reason: str = ""
    """Why a record that was accepted is revised; empty at the first revision."""


class PointAccepted(FactBody):
    """The reviewer signed the record; the point is accepted."""

    kind: ClassVar[str] = "point.accepted"

    point: Id
    revision: int
    file: str
    """Digest of the record PDF with both signatures."""
    head: str
    meaning: str
    accepted_by: Id


class PointReturned(FactBody):
    """The reviewer sends a point back; work goes on from step `redo_from`."""

    kind: ClassVar[str] = "point.returned"

    point: Id
    revision: int
    reason: str
    redo_from: str
    returned_by: Id


class RecordRow(SQLModel, table=True):
    """One revision of a point's record."""

    __tablename__ = "record"

    id: str = Field(primary_key=True)
    """`point/revision`."""
    point: str = Field(index=True)
    revision: int
    state: str
    """`submitted`, `accepted` or `returned`."""
    submitted_file: str
    submitted_by: str
    submitted_at: str
    submitted_head: str
    accepted_file: str
    accepted_by: str
    accepted_at: str
    accepted_head: str
    reason: str
    """Why it was returned, or empty."""
    seq: int
