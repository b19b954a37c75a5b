"""Submission, acceptance and return of a point; the revisions of its record."""

from __future__ import annotations

from collections.abc import Iterator
from typing import ClassVar

from sqlmodel import Field, SQLModel

from gaugelog.ledger.base import FactBody, Id
from gaugelog.ledger.progress import move, reopen_from, set_states
from gaugelog.ledger.rows import At, Change, Known, Put, have
from gaugelog.ledger.story import told


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
    """Why a record that was accepted is revised; empty where none was."""
    revises: int | None = None
    """The accepted revision that this one takes the place of."""


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


class PointReopened(FactBody):
    """An accepted point goes back to work; its next record revises the one that was accepted."""

    kind: ClassVar[str] = "point.reopened"

    point: Id
    revision: int
    """The accepted revision, whose file stays as it is."""
    reason: str
    redo_from: str = ""
    """The step that work goes on from; empty: nothing is done again."""
    reopened_by: Id


class RecordRow(SQLModel, table=True):
    """One revision of a point's record."""

    __tablename__ = "record"

    id: str = Field(primary_key=True)
    """`point/revision`."""
    point: str = Field(index=True)
    revision: int
    state: str
    """`submitted`, `returned`, `accepted`, or `amended` when it was reopened after that."""
    submitted_file: str
    submitted_by: str
    submitted_at: str
    submitted_head: str
    accepted_file: str
    accepted_by: str
    accepted_at: str
    accepted_head: str
    reason: str
    """Why it was returned or is amended, or empty."""
    revises: int
    """The accepted revision that it takes the place of, or 0."""
    revision_reason: str
    """Why it does, or empty."""
    seq: int


def apply_point_submitted(known: Known, at: At, fact: PointSubmitted) -> Iterator[Change]:
    """A record with one signature awaits review."""
    yield Put(
        "record",
        {
            "id": f"{fact.point}/{fact.revision}",
            "point": fact.point,
            "revision": fact.revision,
            "state": "submitted",
            "submitted_file": fact.file,
            "submitted_by": fact.submitted_by,
            "submitted_at": at.time,
            "submitted_head": fact.head,
            "accepted_file": "",
            "accepted_by": "",
            "accepted_at": "",
            "accepted_head": "",
            "reason": "",
            "revises": fact.revises or 0,
            "revision_reason": fact.reason,
            "seq": at.seq,
        },
    )
    yield told(at, fact.point, "submitted", fact.submitted_by, revision=fact.revision)
    yield from set_states(known, have(known, "point", fact.point), "awaiting review")


def apply_point_accepted(known: Known, at: At, fact: PointAccepted) -> Iterator[Change]:
    """The record has both signatures; the point is accepted."""
    yield Put(
        "record",
        {
            **have(known, "record", f"{fact.point}/{fact.revision}"),
            "state": "accepted",
            "accepted_file": fact.file,
            "accepted_by": fact.accepted_by,
            "accepted_at": at.time,
            "accepted_head": fact.head,
        },
    )
    yield told(at, fact.point, "accepted", fact.accepted_by, revision=fact.revision)
    yield from set_states(known, have(known, "point", fact.point), "accepted")


def apply_point_returned(known: Known, at: At, fact: PointReturned) -> Iterator[Change]:
    """The record is returned; steps from `redo_from` on are to be done again."""
    record = have(known, "record", f"{fact.point}/{fact.revision}")
    yield Put("record", {**record, "state": "returned", "reason": fact.reason})
    yield told(
        at,
        fact.point,
        "returned",
        fact.returned_by,
        reason=fact.reason,
        step=fact.redo_from,
        revision=fact.revision,
    )
    point = have(known, "point", fact.point)
    yield from reopen_from(known, point, fact.redo_from)
    yield from set_states(known, point, "returned")


def apply_point_reopened(known: Known, at: At, fact: PointReopened) -> Iterator[Change]:
    """The accepted record is being amended: the point is in work again."""
    record = have(known, "record", f"{fact.point}/{fact.revision}")
    yield Put("record", {**record, "state": "amended", "reason": fact.reason})
    yield told(
        at,
        fact.point,
        "amendment",
        fact.reopened_by,
        reason=fact.reason,
        step=fact.redo_from,
        revision=fact.revision,
    )
    point = have(known, "point", fact.point)
    yield from reopen_from(known, point, fact.redo_from)
    yield from move(known, point)
