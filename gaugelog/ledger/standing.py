"""The standing of stock: free to use, in quarantine, or scrapped, each with its reason."""

from __future__ import annotations

from collections.abc import Iterator
from typing import ClassVar, Literal

from sqlmodel import Field, SQLModel

from gaugelog.ledger.base import FactBody, Id
from gaugelog.ledger.rows import At, Change, Known, Put, have

Standing = Literal["free", "quarantined", "scrapped"]
StockKind = Literal["lot", "pack", "gauge", "consumable"]


class StandingSet(FactBody):
    """Someone set the standing of a lot, a pack, a gauge or a consumable lot."""

    kind: ClassVar[str] = "standing.set"

    item: Id
    item_kind: StockKind
    label: str
    standing: Standing
    reason: str
    scraps: tuple[Id, ...] = ()
    """The gauges on the shelf that are scrapped with it."""
    set_by: Id


class StandingRow(SQLModel, table=True):
    """The standing of one thing in stock; what has no row is free."""

    __tablename__ = "standing"

    id: str = Field(primary_key=True)
    """The id of the lot, pack, gauge or consumable lot."""
    item_kind: str
    label: str = Field(index=True)
    standing: str
    reason: str
    by: str
    at: str
    seq: int


def apply_standing_set(known: Known, at: At, fact: StandingSet) -> Iterator[Change]:
    """The thing stands so from now on; gauges that are scrapped with it leave the shelf."""
    yield Put(
        "standing",
        {
            "id": fact.item,
            "item_kind": fact.item_kind,
            "label": fact.label,
            "standing": fact.standing,
            "reason": fact.reason,
            "by": fact.set_by,
            "at": at.time,
            "seq": at.seq,
        },
    )
    for gauge in fact.scraps:
        yield Put("gauge", {**have(known, "gauge", gauge), "state": "scrapped"})
