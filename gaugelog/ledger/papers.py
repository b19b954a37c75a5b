"""Certificates as evidence: the file that came with a lot or an instrument, by its digest."""

from __future__ import annotations

from collections.abc import Iterator
from typing import ClassVar, Literal

from sqlmodel import Field, SQLModel

from gaugelog.ledger.base import FactBody, Id
from gaugelog.ledger.rows import At, Change, Known, Put

PaperOf = Literal["lot", "consumable", "instrument"]
"""What a certificate may be of."""


class CertificateKept(FactBody):
    """The file of a certificate, kept when the thing came or later; as it was given."""

    kind: ClassVar[str] = "certificate.kept"

    id: Id
    item: Id
    item_kind: PaperOf
    label: str
    number: str = ""
    """Of an instrument: the certificate that was in force, `CAL-26-0719`."""
    file: str
    """SHA-256 of the file."""
    name: str
    """The file's own name."""
    size: int
    """In bytes."""
    note: str = ""
    kept_by: Id


class CertificateRow(SQLModel, table=True):
    """A certificate's file."""

    __tablename__ = "certificate"

    id: str = Field(primary_key=True)
    item: str = Field(index=True)
    number: str
    file: str
    name: str
    note: str
    by: str
    at: str
    seq: int


def apply_certificate_kept(_known: Known, at: At, fact: CertificateKept) -> Iterator[Change]:
    """The file is known as one of the thing's certificates; earlier ones stay."""
    yield Put(
        "certificate",
        {
            "id": fact.id,
            "item": fact.item,
            "number": fact.number,
            "file": fact.file,
            "name": fact.name,
            "note": fact.note,
            "by": fact.kept_by,
            "at": at.time,
            "seq": at.seq,
        },
    )
