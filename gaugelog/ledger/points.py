"""Points: what is measured and why, at which place, by which grids."""

from __future__ import annotations

from collections.abc import Iterator
from typing import ClassVar, Literal

from sqlmodel import Field, SQLModel

from gaugelog.ledger.base import FactBody, Id, Part, Quantity
from gaugelog.ledger.rows import At, Change, Known, Put

GridState = Literal[
    "planned",
    "released",
    "in work",
    "on hold",
    "ready to coat",
    "awaiting review",
    "accepted",
    "returned",
    "non-conforming",
    "failed in service",
    "withdrawn",
    "removed",
]

Numbering = Literal["", "counter-clockwise", "clockwise"]
SeenFrom = Literal["", "gauge side", "other side"]


class Place(Part):
    """Where a gauge sits: datum, coordinates, side and axis direction, with tolerances."""

    datum: str
    x: Quantity
    y: Quantity
    z: Quantity | None = None
    side: str
    axis: str
    """What the gauge axis follows: `length of girder`."""
    angle: Quantity
    """From that direction, counter-clockwise seen from outside."""
    tolerance: Quantity
    angle_tolerance: Quantity


class PlannedGrid(Part):
    """One sensing element of the point."""

    id: Id
    label: str
    number: int


class PointPlanned(FactBody):
    """A point as planned, with its place and grids."""

    kind: ClassVar[str] = "point.planned"

    id: Id
    label: str
    campaign: Id
    article: Id
    zone: str
    quantity: str
    purpose: str
    load: Literal["static", "dynamic"]
    strain_min: Quantity
    strain_max: Quantity
    temperature_min: Quantity
    temperature_max: Quantity
    duration: Quantity | None = None
    cycles: int | None = None
    permitted_error: Quantity
    """In µm/m."""
    place: Place
    lot: Id
    route: Id
    pattern: str = "single"
    """Pattern of the gauge, as its lot has it: `rectangular` …"""
    numbering: Numbering = ""
    """Which way grids follow grid 1; empty where it makes no difference."""
    seen_from: SeenFrom = ""
    """The side that the numbering is seen from: the grids' own, or through the article."""
    dummy: bool = False
    """Whether it compensates others: bonded alike, on a piece that feels no strain."""
    grids: tuple[PlannedGrid, ...]


class PointRow(SQLModel, table=True):
    """A point with the route it follows."""

    __tablename__ = "point"

    id: str = Field(primary_key=True)
    label: str = Field(index=True)
    campaign: str = Field(index=True)
    zone: str
    lot: str
    route: str
    gauge: str
    """The physical gauge in place, or empty."""
    generation: int
    """1 for the first gauge at the place; a replaced gauge is a new generation."""
    blocked: str
    """JSON list of `subject/check/stage` whose latest reading blocks."""
    workers: str
    """JSON list of everyone who ever did or skipped a step, also one that was done again since."""
    touched: str
    """JSON list of what plan revisions changed here since a reviewer last looked."""
    data: str
    """The whole of `PointPlanned` as JSON."""
    seq: int


class GridRow(SQLModel, table=True):
    """A grid and its state."""

    __tablename__ = "grid"

    id: str = Field(primary_key=True)
    label: str = Field(index=True)
    point: str = Field(index=True)
    number: int
    circuit: str
    """The circuit it is wired into, or empty."""
    state: str


def apply_point_planned(_known: Known, at: At, fact: PointPlanned) -> Iterator[Change]:
    """The point and its grids are planned."""
    yield Put(
        "point",
        {
            "id": fact.id,
            "label": fact.label,
            "campaign": fact.campaign,
            "zone": fact.zone,
            "lot": fact.lot,
            "route": fact.route,
            "gauge": "",
            "generation": 1,
            "blocked": "[]",
            "workers": "[]",
            "touched": "[]",
            "data": at.data,
            "seq": at.seq,
        },
    )
    for grid in fact.grids:
        yield Put(
            "grid",
            {
                "id": grid.id,
                "label": grid.label,
                "point": fact.id,
                "number": grid.number,
                "circuit": "",
                "state": "planned",
            },
        )
