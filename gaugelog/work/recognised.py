"""A plan read anew, with the ids of what it has in common with the released one."""

from __future__ import annotations

from collections.abc import Iterable, Mapping
from dataclasses import dataclass, replace

from gaugelog.errors import Refused
from gaugelog.intake.plan import PlanFacts
from gaugelog.ledger.campaign import (
    CampaignPlanned,
    CampaignRow,
    CriteriaAgreed,
    CriteriaRow,
    PlanLoaded,
)
from gaugelog.ledger.circuits import CircuitPlanned, CircuitRow
from gaugelog.ledger.points import PointPlanned, PointRow
from gaugelog.ledger.routes import RouteAdopted, RouteRow
from gaugelog.ledger.stock import LotRow
from gaugelog.ledger.view import View
from gaugelog.rules.changes import content, renamed


@dataclass(frozen=True, slots=True)
class Released:
    """The plan as released: every body by its id, and the labels of all that they refer to."""

    job: CampaignPlanned
    criteria: CriteriaAgreed
    routes: dict[str, RouteAdopted]
    points: dict[str, PointPlanned]
    circuits: dict[str, CircuitPlanned]
    names: dict[str, str]


def released_plan(view: View, campaign: CampaignRow) -> Released:
    """The released plan of a campaign. Raises Refused when the ledger lacks its criteria."""
    criteria = view.get(CriteriaRow, campaign.criteria)
    if criteria is None:
        raise Refused("The criteria of the plan are not known.", "Check the journal.")
    loaded = PlanLoaded.model_validate_json(campaign.plan)
    routes = {row.id: RouteAdopted.model_validate_json(row.data) for row in view.all(RouteRow)}
    points = view.all(PointRow, campaign=campaign.id)
    circuits = view.all(CircuitRow, campaign=campaign.id)
    job = CampaignPlanned.model_validate_json(campaign.data)
    return Released(
        job,
        CriteriaAgreed.model_validate_json(criteria.data),
        {each: routes[each] for each in loaded.routes if each in routes},
        {row.id: PointPlanned.model_validate_json(row.data) for row in points},
        {row.id: CircuitPlanned.model_validate_json(row.data) for row in circuits},
        {row.id: row.label for row in view.all(LotRow)},
    )


def recognised(facts: PlanFacts, known: Released) -> PlanFacts:
    """The facts with known ids: jobs, points, grids and circuits by label, routes by content."""
    ids = {facts.campaign.id: known.job.id, **_job_ids(facts.campaign, known.job)}
    ids |= _by_label(facts.points, known.points.values())
    ids |= _by_label(_grids(facts.points), _grids(known.points.values()))
    ids |= _by_label(facts.circuits, known.circuits.values())
    for route in facts.routes:
        same = [each for each in known.routes.values() if content(each) == content(route)]
        ids.update((route.id, each.id) for each in same)
    if content(facts.criteria) == content(known.criteria):
        ids[facts.criteria.id] = known.criteria.id
    return replace(
        facts,
        campaign=renamed(facts.campaign, ids),
        criteria=renamed(facts.criteria, ids),
        routes=tuple(renamed(each, ids) for each in facts.routes),
        points=tuple(renamed(each, ids) for each in facts.points),
        circuits=tuple(renamed(each, ids) for each in facts.circuits),
    )


def _job_ids(new: CampaignPlanned, known: CampaignPlanned) -> dict[str, str]:
    ids = _by_label(new.articles, known.articles) | _by_label(new.modules, known.modules)
    modules = {module.label.casefold(): module for module in known.modules}
    for module in new.modules:
        there = modules.get(module.label.casefold())
        ids |= _by_label(module.channels, there.channels if there is not None else ())
    return ids


def _grids(points: Iterable[PointPlanned]) -> list[object]:
    return [grid for point in points for grid in point.grids]


def _by_label(new: Iterable[object], known: Iterable[object]) -> dict[str, str]:
    there: Mapping[str, str] = {each.label.casefold(): each.id for each in known}  # type: ignore[attr-defined]
    return {
        each.id: there[each.label.casefold()]  # type: ignore[attr-defined]
        for each in new
        if each.label.casefold() in there  # type: ignore[attr-defined]
    }
