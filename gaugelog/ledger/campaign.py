"""The campaign: client, article, channels and criteria; its plan, loaded in draft and released."""

from __future__ import annotations

from typing import ClassVar, Literal

from sqlmodel import Field, SQLModel

from gaugelog.ledger.base import DecimalText, FactBody, Id, Part, Quantity

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
    contract: str = ""
    document: str = ""
    site: str = ""
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
    largest_test_voltage: Quantity | None = None
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
