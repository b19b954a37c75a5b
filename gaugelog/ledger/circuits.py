"""Circuits: a bridge of four arms, its lead wires, and the channel it is wired to."""

from __future__ import annotations

from collections.abc import Iterator
from typing import ClassVar, Literal

from sqlmodel import Field, SQLModel

from gaugelog.ledger.base import FactBody, Id, Part, Quantity
from gaugelog.ledger.rows import At, Change, Known, Put, have

ElementKind = Literal["grid", "dummy", "completion", "trim"]


class Element(Part):
    """One element in series in an arm: a grid by its id, or a resistor by its value."""

    kind: ElementKind
    grid: Id | None = None
    resistance: Quantity | None = None
    inside_module: bool = False


class Leads(Part):
    """The lead wires of a circuit; the user's own cable lot and wire marks."""

    wires: int
    length: Quantity
    resistance_per_length: Quantity
    cable: str = ""
    marks: dict[str, str] = {}
    """Function of the wire to the user's own mark or colour."""


class CircuitPlanned(FactBody):
    """A circuit as planned; arms are numbered round the bridge, 1 and 3 opposite."""

    kind: ClassVar[str] = "circuit.planned"

    id: Id
    label: str
    campaign: Id
    arrangement: str
    """`quarter three-wire` and the like."""
    arms: tuple[tuple[Element, ...], tuple[Element, ...], tuple[Element, ...], tuple[Element, ...]]
    leads: Leads
    channel: Id
    grids: tuple[Id, ...]
    """Every grid in the arms."""


class CircuitRow(SQLModel, table=True):
    """A circuit."""

    __tablename__ = "circuit"

    id: str = Field(primary_key=True)
    label: str = Field(index=True)
    campaign: str
    channel: str = Field(index=True)
    arrangement: str
    data: str
    """The whole of `CircuitPlanned` as JSON."""


def apply_circuit_planned(known: Known, at: At, fact: CircuitPlanned) -> Iterator[Change]:
    """The circuit is planned, and its grids know it; a shared dummy keeps to its first circuit."""
    yield Put(
        "circuit",
        {
            "id": fact.id,
            "label": fact.label,
            "campaign": fact.campaign,
            "channel": fact.channel,
            "arrangement": fact.arrangement,
            "data": at.data,
        },
    )
    for grid in fact.grids:
        row = have(known, "grid", grid)
        if not row["circuit"]:
            yield Put("grid", {**row, "circuit": fact.id})
