"""A plan's folder as a whole: four files understood together, every fault of all at once.

The two tables may be CSV or XLSX.
"""

from __future__ import annotations

import hashlib
from collections.abc import Callable, Mapping
from dataclasses import dataclass, field
from pathlib import Path
from typing import TypeVar

from gaugelog.errors import Fault, Faulty
from gaugelog.intake.adopted import Routes
from gaugelog.intake.campaign import read_campaign
from gaugelog.intake.circuits import Named, read_circuits
from gaugelog.intake.criteria import read_criteria
from gaugelog.intake.fields import Fields, Gathered
from gaugelog.intake.files import read_bytes
from gaugelog.intake.grids import GridPlan, read_grids
from gaugelog.intake.texts import listed
from gaugelog.ledger.campaign import CampaignPlanned, CriteriaAgreed
from gaugelog.ledger.circuits import CircuitPlanned
from gaugelog.ledger.points import PointPlanned
from gaugelog.ledger.routes import RouteAdopted

FILES = ("campaign.toml", "criteria.toml", "grids.csv", "circuits.csv")
NewId = Callable[[], str]
T = TypeVar("T")


@dataclass(frozen=True, slots=True)
class PlanFacts:
    """A plan as understood; `files` are the input files by name, to be kept as evidence."""

    campaign: CampaignPlanned
    criteria: CriteriaAgreed
    routes: tuple[RouteAdopted, ...]
    points: tuple[PointPlanned, ...]
    circuits: tuple[CircuitPlanned, ...]
    files: dict[str, bytes]

    @property
    def digests(self) -> dict[str, str]:
        """SHA-256 of each input file by its name."""
        return {name: hashlib.sha256(data).hexdigest() for name, data in self.files.items()}


def load_plan(folder: Path, *, lots: Mapping[str, str], new_id: NewId) -> PlanFacts:
    """Understand the plan in `folder`; `lots` gives the ids of the lots in stock by label.

    Raises Faulty naming every fault of every file at once.
    """
    if not folder.is_dir():
        remedy = f"Give the folder that holds {', '.join(FILES)}."
        raise Faulty([Fault(str(folder), "is no folder.", remedy)])
    reading = _Reading(folder, lots, new_id)
    facts = reading.facts()
    if facts is None:
        raise Faulty(reading.faults)
    return facts


@dataclass(slots=True)
class _Reading:
    """The files of one plan while they are understood, each as far as it goes."""

    folder: Path
    lots: Mapping[str, str]
    new_id: NewId
    faults: Gathered = field(default_factory=list)
    files: dict[str, bytes] = field(default_factory=dict)

    def facts(self) -> PlanFacts | None:
        """The plan, or None where there are faults."""
        campaign = self._understood("campaign.toml", self._campaign)
        owner = campaign.id if campaign is not None else "-"
        criteria = self._understood(
            "criteria.toml",
            lambda name, data: read_criteria(name, data, owner, self.new_id, self.faults),
        )
        plans = self._understood(
            self._table("grids"),
            lambda name, data: read_grids(name, data, owner, self.new_id, self.faults),
        )
        routes = Routes(self.folder, self.new_id, FILES)
        points = [self._settled(plan, campaign, routes) for plan in plans or ()]
        named = Named(_grids(points) if plans is not None else None, _channels(campaign))
        circuits = self._understood(
            self._table("circuits"),
            lambda name, data: read_circuits(
                name, data, owner, named, new_id=self.new_id, faults=self.faults
            ),
        )
        if self.faults or campaign is None or criteria is None or circuits is None:
            return None
        files = {**self.files, **routes.files}
        return PlanFacts(campaign, criteria, routes.all, tuple(points), tuple(circuits), files)

    def _campaign(self, name: str, data: bytes) -> CampaignPlanned:
        return read_campaign(name, data, self.new_id, self.faults)

    def _table(self, name: str) -> str:
        """The name of a table's file, which may be CSV or XLSX; a fault where both are there."""
        text, workbook = f"{name}.csv", f"{name}.xlsx"
        if not (self.folder / workbook).exists():
            return text
        if (self.folder / text).exists():
            what = f"is there beside {text}."
            self.faults.append(Fault(workbook, what, "Keep the one that counts."))
        return workbook

    def _understood(self, name: str, read: Callable[[str, bytes], T]) -> T | None:
        """What `read` makes of a file; None, and faults, where it can't be read as one."""
        try:
            self.files[name] = read_bytes(self.folder / name)
            return read(name, self.files[name])
        except Faulty as error:
            self.faults += error.faults
            return None

    def _settled(
        self, plan: GridPlan, campaign: CampaignPlanned | None, routes: Routes
    ) -> PointPlanned:
        """The point with ids for the labels of its article, lot and route."""
        row, point = plan.fields, plan.point
        route = routes.named(row, point.route)
        found = {
            "article": _article(row, point, campaign) if campaign is not None else None,
            "lot": self._lot(row, point.lot),
            "route": route.id if route is not None else None,
        }
        return point.model_copy(update={name: value or "-" for name, value in found.items()})

    def _lot(self, row: Fields, label: str) -> str | None:
        if not row.sound("lot") or not row.has("lot"):
            return None
        for known, lot in self.lots.items():
            if known.casefold() == label.casefold():
                return lot
        row.fault("lot", f"no lot {label} was received.", f"In stock: {listed(self.lots)}.")
        return None


def _grids(points: list[PointPlanned]) -> dict[str, str]:
    return {grid.label.casefold(): grid.id for point in points for grid in point.grids}


def _channels(campaign: CampaignPlanned | None) -> dict[tuple[str, str], str] | None:
    if campaign is None:
        return None
    return {
        (module.label.casefold(), channel.label.casefold()): channel.id
        for module in campaign.modules
        for channel in module.channels
    }


def _article(row: Fields, point: PointPlanned, campaign: CampaignPlanned) -> str | None:
    if not row.has("article") or not row.sound("article"):
        return None
    for article in campaign.articles:
        if article.label.casefold() == point.article.casefold():
            zones = [zone.label for zone in article.zones]
            named = row.has("zone") and row.sound("zone")
            if named and point.zone.casefold() not in map(str.casefold, zones):
                what = f"{article.label} has no zone {point.zone}."
                row.fault("zone", what, f"Zones: {listed(zones)}.")
            return article.id
    known = listed([article.label for article in campaign.articles])
    row.fault("article", f"campaign.toml has no article {point.article}.", f"It has {known}.")
    return None
