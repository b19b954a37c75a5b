"""Start-of-shift checks: a meter read on something whose value is known."""

from __future__ import annotations

from collections.abc import Iterator
from typing import ClassVar, Literal

from sqlmodel import Field, SQLModel

from gaugelog.ledger.base import DecimalText, FactBody, Id, Quantity, TimeText
from gaugelog.ledger.rows import At, Change, Known, Put


class MeterChecked(FactBody):
    """A meter was read on a reference, and agreed with it or not."""

    kind: ClassVar[str] = "meter.checked"

    id: Id
    instrument: Id
    label: str
    """The meter's."""
    quantity: str
    range: str
    reference: Id
    reference_label: str
    value: Quantity
    """The reference's value."""
    value_uncertainty: Quantity
    """Expanded, k = 2."""
    typed: str
    reads: Quantity
    off: Quantity
    """What was read less the known value."""
    at_most: Quantity
    """Expanded uncertainty of that difference, k = 2: it may be so far off."""
    score: DecimalText
    """E_n: how far it is off, in parts of that."""
    outcome: Literal["pass", "fail"]
    rule: str
    note: str = ""
    observed_at: TimeText
    checked_by: Id


class MeterCheckRow(SQLModel, table=True):
    """A check of a meter."""

    __tablename__ = "meter_check"

    id: str = Field(primary_key=True)
    instrument: str = Field(index=True)
    quantity: str
    reference: str
    outcome: str
    observed_at: str
    by: str
    data: str
    """The whole of `MeterChecked` as JSON."""
    seq: int


def apply_meter_checked(_known: Known, at: At, fact: MeterChecked) -> Iterator[Change]:
    """The check is known; every one is kept, the latest before a reading speaks for it."""
    yield Put(
        "meter_check",
        {
            "id": fact.id,
            "instrument": fact.instrument,
            "quantity": fact.quantity,
            "reference": fact.reference,
            "outcome": fact.outcome,
            "observed_at": fact.observed_at,
            "by": fact.checked_by,
            "data": at.data,
            "seq": at.seq,
        },
    )
