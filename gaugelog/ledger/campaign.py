"""The campaign: client, article, channels and criteria; its plan, loaded in draft and released."""

from __future__ import annotations

from collections.abc import Iterator
from typing import ClassVar, Literal

from sqlmodel import Field, SQLModel

from gaugelog.ledger.base import DecimalText, FactBody, Id, Part, Quantity
from gaugelog.ledger.progress import grids_of, set_states
from gaugelog.ledger.rows import At, Change, Drop, Known, Put, Row, have

Paper = Literal["a4", "letter"]
Surroundings = Literal["laboratory", "field"]
Conditional = Literal["goes on", "blocks"]


class Zone(Part):
    """A named region of the article."""

    label: str
    description: str = ""


class Material(Part):
    """What the article is made of; `source` says where the figures come from."""

    name: str
    modulus: Quantity
    poisson_ratio: Quantity
    expansion: Quantity
    density: Quantity | None = None
    heat_sink: str = ""
    heat_sink_limit: Quantity | None = None
    """A power density of its own, where the class does not serve."""
    conducting: bool = True
    source: str


class SurfaceAllowance(Part):
    """What may be done to the surface, and by whom that was agreed."""

    largest_process_temperature: Quantity | None = None
    removal_allowed: str = ""
    forbidden_cleaners: tuple[str, ...] = ()
    agreed_by: str = ""


class Article(Part):
    """The test article."""

    id: Id
    label: str
    description: str
    drawing: str
    drawing_revision: str
    material: Material
    zones: tuple[Zone, ...]
    surface: SurfaceAllowance = SurfaceAllowance()
    permits: tuple[str, ...] = ()
    """Permits and cautions of the article: live, pressurised, at height …"""


class ShuntSpec(Part):
    """A shunt resistor built into a channel: value, the arm it spans, the pins it joins."""

    value: Quantity
    arm: int
    between: tuple[str, str]


class Channel(Part):
    """One input of an acquisition module."""

    id: Id
    label: str
    connector: str = ""
    pins: dict[str, str] = {}
    """Function of the pin (`supply+`, `signal+` …) to the user's own pin name."""
    excitation: Quantity
    excitation_kind: Literal["d.c.", "carrier", "pulsed", "constant current"] = "d.c."
    range: Quantity
    """Largest output either way, mV/V."""
    balance_range: Quantity | None = None
    completion: Quantity | None = None
    supply: Literal["common", "switched", "separate"] = "separate"
    shunt: ShuntSpec | None = None


class Module(Part):
    """An acquisition module and its channels."""

    id: Id
    label: str
    type: str
    serial: str
    channels: tuple[Channel, ...]


class CampaignPlanned(FactBody):
    """The job as planned: for whom, on what, measured through which modules."""

    kind: ClassVar[str] = "campaign.planned"

    id: Id
    label: str
    title: str
    client: str
    installer: str = ""
    """The organisation that does the work, with its address."""
    contract: str = ""
    document: str = ""
    site: str = ""
    paper: Paper = "a4"
    """The size of records and wiring maps, unless another is asked for."""
    surroundings: Surroundings
    articles: tuple[Article, ...]
    modules: tuple[Module, ...]


class CheckCriterion(Part):
    """One acceptance figure, or the physics that yields it, for a check at a stage."""

    check: str
    stage: str
    surroundings: Literal["laboratory", "field", "any"] = "any"
    at_least: Quantity | None = None
    at_most: Quantity | None = None
    physics: tuple[str, ...] = ()
    """`permitted error` and the like: also hold the reading to what physics demands."""
    expected: Quantity | None = None
    """What good work reaches: short of it, though within the limit, the reviewer is told."""
    largest_test_voltage: Quantity | None = None
    per: Quantity | None = None
    """For a drift: the time that the figure is meant for."""
    bandwidth: Quantity | None = None
    """For a noise: the bandwidth that the figure is meant at."""
    source: str


class ShiftDemand(Part):
    """Meters are checked on a reference at the start of a shift, or they may not be read."""

    within: Quantity
    """How long before a reading at most."""
    of: tuple[str, ...]
    """What must be checked: `resistance`, `insulation` …"""
    source: str


class CriteriaAgreed(FactBody):
    """The acceptance criteria, agreed with the plan; frozen at its release."""

    kind: ClassVar[str] = "criteria.agreed"

    id: Id
    campaign: Id
    title: str
    edition: str
    coverage: DecimalText
    conditional_pass: Conditional
    conditional_fail: Conditional
    checks: tuple[CheckCriterion, ...]
    agreed_by: str = ""
    shift_check: ShiftDemand | None = None


class PlanLoaded(FactBody):
    """The last entry of a load: the draft plan replaces any earlier draft of the campaign.

    `files` names the input files by their digest among the evidence.
    """

    kind: ClassVar[str] = "plan.loaded"

    campaign: Id
    revision: int
    criteria: Id
    points: tuple[Id, ...]
    circuits: tuple[Id, ...]
    routes: tuple[Id, ...] = ()
    replaces: Id | None = None
    """The earlier draft's campaign, whose rows go."""
    files: dict[str, str]


class PlanReleased(FactBody):
    """The plan and its criteria are frozen; work may begin."""

    kind: ClassVar[str] = "plan.released"

    campaign: Id
    revision: int
    meaning: str
    warnings: tuple[str, ...] = ()
    """Warnings of the plan check that were known at release."""


class CampaignRow(SQLModel, table=True):
    """A campaign with its plan's revision and state."""

    __tablename__ = "campaign"

    id: str = Field(primary_key=True)
    label: str = Field(index=True)
    title: str
    client: str
    surroundings: str
    data: str
    """The whole of `CampaignPlanned` as JSON."""
    criteria: str
    """Id of the criteria in force."""
    revision: int
    state: str
    """`loading`, `draft` or `released`."""
    plan: str
    """The whole of `PlanLoaded` as JSON, or empty."""
    released_seq: int


class CriteriaRow(SQLModel, table=True):
    """Acceptance criteria."""

    __tablename__ = "criteria"

    id: str = Field(primary_key=True)
    campaign: str
    title: str
    edition: str
    data: str
    """The whole of `CriteriaAgreed` as JSON."""


class ChannelRow(SQLModel, table=True):
    """One input of a module."""

    __tablename__ = "channel"

    id: str = Field(primary_key=True)
    label: str = Field(index=True)
    """`M1/3`: module and channel."""
    campaign: str
    module: str
    data: str
    """The `Channel` as JSON."""


def apply_campaign_planned(_known: Known, at: At, fact: CampaignPlanned) -> Iterator[Change]:
    """The campaign and its channels are known; its plan is still being loaded."""
    yield Put(
        "campaign",
        {
            "id": fact.id,
            "label": fact.label,
            "title": fact.title,
            "client": fact.client,
            "surroundings": fact.surroundings,
            "data": at.data,
            "criteria": "",
            "revision": 0,
            "state": "loading",
            "plan": "",
            "released_seq": 0,
        },
    )
    yield from channels_of(fact)


def channels_of(job: CampaignPlanned) -> Iterator[Change]:
    """The rows of every channel of a campaign."""
    for module in job.modules:
        for channel in module.channels:
            yield Put("channel", _channel(job.id, module, channel))


def _channel(campaign: str, module: Module, channel: Channel) -> Row:
    return {
        "id": channel.id,
        "label": f"{module.label}/{channel.label}",
        "campaign": campaign,
        "module": module.label,
        "data": channel.model_dump_json(),
    }


def apply_criteria_agreed(_known: Known, at: At, fact: CriteriaAgreed) -> Iterator[Change]:
    """The criteria are known."""
    yield Put(
        "criteria",
        {
            "id": fact.id,
            "campaign": fact.campaign,
            "title": fact.title,
            "edition": fact.edition,
            "data": at.data,
        },
    )


def apply_plan_loaded(known: Known, at: At, fact: PlanLoaded) -> Iterator[Change]:
    """The draft is whole; the one it replaces goes."""
    if fact.replaces is not None and known.get("campaign", fact.replaces) is not None:
        yield from _drop_draft(known, have(known, "campaign", fact.replaces))
    yield Put(
        "campaign",
        {
            **have(known, "campaign", fact.campaign),
            "criteria": fact.criteria,
            "revision": fact.revision,
            "state": "draft",
            "plan": at.data,
        },
    )


def _drop_draft(known: Known, campaign: Row) -> Iterator[Change]:
    plan = PlanLoaded.model_validate_json(campaign["plan"])
    planned = CampaignPlanned.model_validate_json(campaign["data"])
    for point in plan.points:
        for grid in grids_of(have(known, "point", point)["data"]):
            yield Drop("grid", grid)
        yield Drop("point", point)
    for module in planned.modules:
        for channel in module.channels:
            yield Drop("channel", channel.id)
    for table, ids in (("circuit", plan.circuits), ("route", plan.routes)):
        for row_id in ids:
            yield Drop(table, row_id)
    yield Drop("criteria", plan.criteria)
    yield Drop("campaign", campaign["id"])


def apply_plan_released(known: Known, at: At, fact: PlanReleased) -> Iterator[Change]:
    """The plan is released, and so is every grid of it."""
    campaign = have(known, "campaign", fact.campaign)
    yield Put("campaign", {**campaign, "state": "released", "released_seq": at.seq})
    for point in PlanLoaded.model_validate_json(campaign["plan"]).points:
        yield from set_states(known, have(known, "point", point), "released")
