"""A plan's folder as a whole: four files understood together, every fault of all at once."""

from __future__ import annotations

import hashlib
from collections.abc import Callable, Mapping
from dataclasses import dataclass
from pathlib import Path

from gaugelog.errors import Fault, Faulty
from gaugelog.intake.campaign import read_campaign
from gaugelog.intake.circuits import read_circuits
from gaugelog.intake.criteria import read_criteria
from gaugelog.intake.fields import Fields, Gathered
from gaugelog.intake.files import read_bytes
from gaugelog.intake.grids import GridPlan, read_grids
from gaugelog.intake.route import load_route
from gaugelog.ledger.campaign import CampaignPlanned, CriteriaAgreed
from gaugelog.ledger.circuits import CircuitPlanned
from gaugelog.ledger.points import PointPlanned
from gaugelog.ledger.routes import RouteAdopted

FILES = ("campaign.toml", "criteria.toml", "grids.csv", "circuits.csv")
NewId = Callable[[], str]


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
    faults: Gathered = []
    files = _read(folder, faults)
    reading = _Reading(
        folder, files, {key.casefold(): value for key, value in lots.items()}, new_id
    )
    facts = reading.facts(faults)
    if faults or facts is None:
        raise Faulty(faults)
    return facts


def _read(folder: Path, faults: Gathered) -> dict[str, bytes]:
    if not folder.is_dir():
        remedy = f"Give the folder that holds {', '.join(FILES)}."
        raise Faulty([Fault(str(folder), "is no folder.", remedy)])
    files: dict[str, bytes] = {}
    for name in FILES:
        try:
            files[name] = read_bytes(folder / name)
        except Faulty as error:
            faults += error.faults
    return files


@dataclass(frozen=True, slots=True)
class _Reading:
    """The files of one plan while they are understood, each as far as it goes."""

    folder: Path
    files: dict[str, bytes]
    lots: Mapping[str, str]
    new_id: NewId

    def facts(self, faults: Gathered) -> PlanFacts | None:
        """The plan, or None where a file could not be read at all; faults are gathered."""
        campaign = self._campaign(faults)
        owner = campaign.id if campaign is not None else "-"
        criteria = self._criteria(owner, faults)
        plans = self._grids(owner, faults)
        routes = self._routes(plans, faults)
        points = tuple(self._settled(plan, campaign, routes) for plan in plans)
        circuits = self._circuits(owner, points, campaign, faults)
        if campaign is None or criteria is None:
            return None
        adopted = tuple(routes.values())
        return PlanFacts(campaign, criteria, adopted, points, tuple(circuits), self.files)

    def _campaign(self, faults: Gathered) -> CampaignPlanned | None:
        name = "campaign.toml"
        if name not in self.files:
            return None
        try:
            return read_campaign(name, self.files[name], self.new_id, faults)
        except Faulty as error:
            faults += error.faults
            return None

    def _criteria(self, owner: str, faults: Gathered) -> CriteriaAgreed | None:
        name = "criteria.toml"
        if name not in self.files:
            return None
        try:
            return read_criteria(name, self.files[name], owner, self.new_id, faults)
        except Faulty as error:
            faults += error.faults
            return None

    def _grids(self, owner: str, faults: Gathered) -> list[GridPlan]:
        name = "grids.csv"
        if name not in self.files:
            return []
        try:
            return read_grids(name, self.files[name], owner, self.new_id, faults)
        except Faulty as error:
            faults += error.faults
            return []

    def _routes(self, plans: list[GridPlan], faults: Gathered) -> dict[str, RouteAdopted]:
        routes: dict[str, RouteAdopted] = {}
        bad: set[str] = set()
        for plan in plans:
            named = plan.point.route
            if named in routes or named in bad or named == "-":
                if named in bad:
                    plan.fields.fault("route", f"“{named}” can't be used, as said above.")
                continue
            try:
                route, file, data = load_route(named, self.folder, self.new_id)
            except Faulty as error:
                bad.add(named)
                faults += [_at(plan.fields, fault) for fault in error.faults]
                continue
            routes[named] = route
            self.files[file] = data
        return routes

    def _settled(
        self,
        plan: GridPlan,
        campaign: CampaignPlanned | None,
        routes: Mapping[str, RouteAdopted],
    ) -> PointPlanned:
        """The point with ids for the labels of its article, lot and route."""
        point, row = plan.point, plan.fields
        lot = self.lots.get(point.lot.casefold())
        if lot is None and point.lot != "-":
            known = ", ".join(self.lots) or "none"
            row.fault("lot", f"no lot {point.lot} was received.", f"In stock: {known}.")
        route = routes.get(point.route)
        article = _article(row, point, campaign) if campaign is not None else None
        return point.model_copy(
            update={
                "article": article or "-",
                "lot": lot or "-",
                "route": route.id if route is not None else "-",
            }
        )

    def _circuits(
        self,
        owner: str,
        points: tuple[PointPlanned, ...],
        campaign: CampaignPlanned | None,
        faults: Gathered,
    ) -> list[CircuitPlanned]:
        name = "circuits.csv"
        if name not in self.files:
            return []
        grids = {grid.label.casefold(): grid.id for point in points for grid in point.grids}
        channels = {
            (module.label.casefold(), channel.label.casefold()): channel.id
            for module in (campaign.modules if campaign is not None else ())
            for channel in module.channels
        }
        try:
            return read_circuits(
                name,
                self.files[name],
                owner,
                grids,
                channels,
                new_id=self.new_id,
                faults=faults,
            )
        except Faulty as error:
            faults += error.faults
            return []


def _article(row: Fields, point: PointPlanned, campaign: CampaignPlanned) -> str | None:
    for article in campaign.articles:
        if article.label.casefold() == point.article.casefold():
            zones = [zone.label for zone in article.zones]
            if point.zone.casefold() not in {zone.casefold() for zone in zones}:
                known = ", ".join(zones)
                row.fault("zone", f"{article.label} has no zone {point.zone}.", f"Zones: {known}.")
            return article.id
    known = ", ".join(article.label for article in campaign.articles)
    if point.article != "-":
        row.fault("article", f"campaign.toml has no article {point.article}.", f"It has {known}.")
    return None


def _at(row: Fields, fault: Fault) -> Fault:
    return Fault(row.where("route"), fault.what, fault.remedy) if fault.where == "route" else fault
