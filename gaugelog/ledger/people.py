"""People: who may do what, known by id; name and initials are on an erasable identity sheet."""

from __future__ import annotations

import json
from collections.abc import Iterator
from typing import ClassVar, Literal

from sqlmodel import Field, SQLModel

from gaugelog.ledger.base import DateText, FactBody, Id, Part
from gaugelog.ledger.rows import At, Change, Known, Put, have

Role = Literal["planner", "technician", "reviewer", "custodian"]


class Qualification(Part):
    """What a person is qualified for, by whom it was granted, and until when it holds."""

    name: str
    until: DateText | None = None
    granted_by: str = ""


class IdentitySheet(Part):
    """Name and initials of a person; kept apart from the chain, so that it can be erased."""

    person: Id
    name: str
    initials: str
    salt: str


class PersonEnrolled(FactBody):
    """A person joins the logbook or changes roles; `sheet` is the digest of the identity sheet."""

    kind: ClassVar[str] = "person.enrolled"

    person: Id
    roles: tuple[Role, ...]
    qualifications: tuple[Qualification, ...] = ()
    sheet: str


class PersonLeft(FactBody):
    """A person may act no more; the certificate is revoked in the same deed."""

    kind: ClassVar[str] = "person.left"

    person: Id
    reason: str


class PersonRow(SQLModel, table=True):
    """A person as known now."""

    __tablename__ = "person"

    id: str = Field(primary_key=True)
    roles: str
    """JSON list of roles."""
    qualifications: str
    """JSON list of qualifications."""
    sheet: str
    active: int
    enrolled_seq: int


def apply_person_enrolled(_known: Known, at: At, fact: PersonEnrolled) -> Iterator[Change]:
    """A person is known, or known anew with other roles."""
    qualifications = [item.model_dump(mode="json") for item in fact.qualifications]
    yield Put(
        "person",
        {
            "id": fact.person,
            "roles": json.dumps(fact.roles),
            "qualifications": json.dumps(qualifications, ensure_ascii=False),
            "sheet": fact.sheet,
            "active": 1,
            "enrolled_seq": at.seq,
        },
    )


def apply_person_left(known: Known, _at: At, fact: PersonLeft) -> Iterator[Change]:
    """A person may act no more."""
    yield Put("person", {**have(known, "person", fact.person), "active": 0})
