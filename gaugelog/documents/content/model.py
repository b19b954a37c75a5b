"""The record as data: the very JSON that is attached to the PDF, `gaugelog-record 1`.

Everything on the page comes from here, so a client's program can read what a person reads. The
shipped `templates/record.schema.json` is the schema of these models. Values are decimal text
with a unit, never floats; times are UTC.
"""

from __future__ import annotations

from typing import Literal

from gaugelog.documents.content.base import OffsetText, Shown
from gaugelog.documents.content.installation import (
    ArticleShown,
    CertificateShown,
    CircuitShown,
    GaugeShown,
    GridShown,
    PointShown,
)
from gaugelog.documents.content.workdone import (
    AmendsShown,
    PhotoShown,
    ReadingShown,
    StepShown,
    TurnShown,
)
from gaugelog.ledger.base import DateText, DecimalText, Id, Quantity, TimeText
from gaugelog.ledger.instruments import InstrumentRange
from gaugelog.ledger.people import Qualification

RECORD_FORMAT = "gaugelog-record 1"


class Drawn(Shown):
    """When and from what the record was drawn."""

    at: TimeText
    offset: OffsetText
    head: str
    """The journal's head as printed: sequence number and 26 characters of its hash."""
    program: str


class CampaignShown(Shown):
    """The job."""

    label: str
    title: str
    client: str
    installer: str = ""
    contract: str = ""
    document: str = ""
    site: str = ""
    surroundings: str
    plan_revision: int


class PartShown(Shown):
    """One input of the budget: what it is, what it adds, its share of the variance in per cent."""

    name: str
    contribution: Quantity
    share: DecimalText


class CorrectionShown(Shown):
    """What is to be taken off or multiplied, with its source."""

    name: str
    value: str
    source: str


class BudgetShown(Shown):
    """What the strain of the point is worth at its largest planned strain; largest share first."""

    strain: Quantity
    expanded: Quantity
    coverage: DecimalText
    parts: tuple[PartShown, ...]
    corrections: tuple[CorrectionShown, ...]
    standard: str


class CriteriaShown(Shown):
    """The acceptance criteria agreed with the plan, and what they say of doubtful words."""

    title: str
    edition: str
    agreed_by: str = ""
    coverage: DecimalText
    conditional_pass: str
    conditional_fail: str


class RouteShown(Shown):
    """The route card that was followed."""

    label: str
    title: str
    edition: str
    family: str
    basis: str
    file: str
    """SHA-256 of the route's file."""


class MeterCheckShown(Shown):
    """A check of an instrument on a known value, before readings of this record."""

    id: Id
    quantity: str
    range: str
    reference_label: str
    value: Quantity
    value_uncertainty: Quantity
    """Expanded, k = 2."""
    reads: Quantity
    off: Quantity
    at_most: Quantity
    """Expanded uncertainty of the difference, k = 2."""
    outcome: str
    observed_at: TimeText
    checked_by: Id


class InstrumentShown(Shown):
    """An instrument that was used, under the certificate it had."""

    id: Id
    label: str
    type: str
    maker: str
    serial: str
    certificate_number: str
    calibrated_by: str
    calibrated_on: DateText
    due: DateText
    ranges: tuple[InstrumentRange, ...]
    """Only the ranges that were used."""
    certificates: tuple[CertificateShown, ...] = ()
    """The files that are kept of the certificate in force."""
    checks: tuple[MeterCheckShown, ...] = ()
    """The start-of-shift checks that speak for readings of this record."""


class ConsumableShown(Shown):
    """A lot of adhesive, coating, solder, cable or cleaner that was used."""

    id: Id
    label: str
    type: str
    maker: str
    name: str
    received_on: DateText
    expires: DateText | None = None
    certificates: tuple[CertificateShown, ...] = ()


class PersonShown(Shown):
    """A person who did something for the record; the name is as known when it was drawn."""

    id: Id
    name: str
    initials: str = ""
    roles: tuple[str, ...]
    qualifications: tuple[Qualification, ...] = ()
    part: tuple[str, ...] = ()
    """What they did: `steps`, `readings`, `holds`, `story`, `photos`, `submission`."""


class SigningShown(Shown):
    """What the first signature means and whose it is; empty in a draft."""

    person: str
    name: str
    meaning: str


class RecordContent(Shown):
    """One revision of a point's record."""

    format: Literal["gaugelog-record 1"] = "gaugelog-record 1"
    number: str
    """Campaign, point and revision: `K1-BR2-R1`."""
    revision: int
    state: Literal["draft", "submitted"]
    amends: AmendsShown | None = None
    """The accepted record that this one takes the place of, if there is one."""
    drawn: Drawn
    campaign: CampaignShown
    criteria: CriteriaShown
    article: ArticleShown
    point: PointShown
    grids: tuple[GridShown, ...]
    gauge: GaugeShown | None = None
    """The gauge in place; none in a draft before one is taken."""
    circuits: tuple[CircuitShown, ...]
    route: RouteShown
    steps: tuple[StepShown, ...]
    readings: tuple[ReadingShown, ...]
    photos: tuple[PhotoShown, ...] = ()
    """In the order in which the page numbers them."""
    budget: BudgetShown | None = None
    story: tuple[TurnShown, ...] = ()
    """How the record came about, where that took more than one go."""
    instruments: tuple[InstrumentShown, ...]
    consumables: tuple[ConsumableShown, ...]
    people: tuple[PersonShown, ...]
    signing: SigningShown | None = None
    cautions: tuple[str, ...]
    """Cautions of the article and the route, each once."""
