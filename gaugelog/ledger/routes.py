"""Routes: the ordered steps of one kind of installation."""

from __future__ import annotations

from collections.abc import Iterator
from typing import ClassVar, Literal

from sqlmodel import Field, SQLModel

from gaugelog.ledger.base import FactBody, Id, Part, Quantity
from gaugelog.ledger.rows import At, Change, Known, Put

StepSubject = Literal["place", "gauge", "grid", "circuit"]
"""What a step is done on. Place and gauge are one a point: a step on the gauge mounts it."""

InputKind = Literal[
    "gauge", "consumable", "instrument", "reading", "quantity", "text", "yes", "photo"
]
SkipRule = Literal["never", "planner", "with reason"]

BOND_LINE = "bond-line temperature"
"""What a quantity stands for from which a cure time is taken."""

MIXED = "time since mixing"
"""What a quantity stands for that is held against a lot's pot life."""

PLACE_X, PLACE_Y, AXIS = "position x", "position y", "axis direction"
"""What a quantity stands for that is held against the planned place."""

FIRST_WIRE = "first of the pair"
"""A resistance to one wire of a pair; the reading beside it is that to the other."""

ZERO_BEFORE, PRESSED = "zero before", "pressed"
"""Strain before a gauge is pressed and while it is; the reading beside them is that after."""

ZERO_SEEN, GAUGE_TEMPERATURE, LEAD_TEMPERATURE = (
    "zero seen",
    "gauge temperature",
    "lead temperature",
)
"""A zero that a later one is held against, and how warm gauge and leads were."""

BANDWIDTH = "bandwidth"
"""Bandwidth that a noise was read at."""

EXPECTED_SIGN = "expected sign"
"""A text: the sign that a reading should have, `+` or `-`."""

AIR, HUMIDITY, SURFACE = "air temperature", "relative humidity", "surface temperature"
"""What a quantity may stand for: rules on dew point and adhesive windows look for these."""


class Window(Part):
    """A bound on when the step may be done, counted from when an earlier step was observed."""

    bound: Literal["not before", "within"]
    duration: Quantity
    after: str
    """Id of the earlier step."""
    cure_of: str = ""
    """Id of the step that entered the adhesive: its schedule at the bond-line temperature that
    `after` entered rules where it asks for longer than `duration`."""


class StepInput(Part):
    """One thing the person enters: what it is, its prompt, its unit."""

    name: str
    kind: InputKind
    prompt: str
    unit: str = ""
    check: str = ""
    """For a reading: the check kind, `resistance` or `insulation` …"""
    type: str = ""
    """For a consumable: its kind. For an instrument: what it measures. For a quantity: what it
    stands for, where a rule looks for it."""
    required: bool = True


class RouteStep(Part):
    """One step: on what, what to do, what to beware of, what to enter, when it may be done."""

    id: str
    title: str
    subject: StepSubject
    stage: str = ""
    """The stage of the readings taken in the step."""
    instruction: str
    cautions: tuple[str, ...] = ()
    inputs: tuple[StepInput, ...] = ()
    hold: bool = False
    """A second person decides; refused, work goes back to `refused_to`."""
    refused_to: str = ""
    windows: tuple[Window, ...] = ()
    skip: SkipRule = "never"
    qualification: str = ""
    """What the person who does the step must be qualified for, on that day; empty asks nothing."""
    reaches: Literal["", "ready to coat"] = ""
    """The state the grids reach when the step is done, where it has a name of its own."""


class RouteAdopted(FactBody):
    """A route card as it stands for this campaign."""

    kind: ClassVar[str] = "route.adopted"

    id: Id
    label: str
    title: str
    edition: str
    family: str
    """What it is for: `room-temperature bond on metal`."""
    basis: str
    """What the order of work follows."""
    steps: tuple[RouteStep, ...]
    process_temperature: Quantity | None = None
    """The hottest the article gets on this route."""
    abrades: bool = True
    file: str
    """Digest of the route's file among the evidence."""


class RouteRow(SQLModel, table=True):
    """A route."""

    __tablename__ = "route"

    id: str = Field(primary_key=True)
    label: str = Field(index=True)
    title: str
    edition: str
    data: str
    """The whole of `RouteAdopted` as JSON."""


def apply_route_adopted(_known: Known, at: At, fact: RouteAdopted) -> Iterator[Change]:
    """The route is known."""
    yield Put(
        "route",
        {
            "id": fact.id,
            "label": fact.label,
            "title": fact.title,
            "edition": fact.edition,
            "data": at.data,
        },
    )
