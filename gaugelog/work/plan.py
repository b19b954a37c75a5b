"""Deeds about the plan: load it as a draft, check it, release it; look at it."""

from __future__ import annotations

import json
from collections.abc import Iterable, Iterator
from contextlib import contextmanager
from dataclasses import dataclass
from pathlib import Path
from sqlite3 import Connection

from gaugelog.errors import Fault, Faulty, Refused
from gaugelog.intake.plan import PlanFacts, load_plan
from gaugelog.journal.collection import no_collection
from gaugelog.journal.ids import new_id
from gaugelog.journal.keys import Signer
from gaugelog.ledger.campaign import CampaignRow, ChannelRow, PlanLoaded, PlanReleased
from gaugelog.ledger.circuits import CircuitRow
from gaugelog.ledger.points import GridRow, PointPlanned, PointRow
from gaugelog.ledger.routes import RouteRow
from gaugelog.ledger.stock import LotRow
from gaugelog.ledger.view import View
from gaugelog.rules.fit import PlanFinding, Progress, check_plan
from gaugelog.rules.planned import latest_campaign, planned_campaign
from gaugelog.rules.progress import worst_state
from gaugelog.rules.who import demand_role
from gaugelog.work.kept import demand_meaning, name_to_keep
from gaugelog.work.logbook import Deed, Logbook
from gaugelog.work.revising import as_released, drafted


@dataclass(frozen=True, slots=True)
class PlannedPoint:
    """One line of the plan, in the words people read."""

    point: str
    zone: str
    lot: str
    circuit: str
    channel: str
    route: str
    permitted_error: str
    state: str
    touched: tuple[str, ...] = ()
    """What plan revisions changed here since a reviewer last looked."""


@dataclass(frozen=True, slots=True)
class PlanHead:
    """Which plan it is: its label and title, the revision that stands, and its state."""

    label: str
    title: str
    revision: int
    state: str


def head(logbook: Logbook) -> PlanHead:
    """The plan that is checked, as `check` takes it. Raises Refused when none is loaded."""
    with logbook.storage.reading() as reader, _as_drafted(reader.connection) as (_view, campaign):
        return PlanHead(campaign.label, campaign.title, campaign.revision, campaign.state)


_TOLD_EVERY = 50


@no_collection()
def understand(logbook: Logbook, folder: Path) -> PlanFacts:
    """Read the planner's files in `folder`. Raises Faulty naming every fault of every file."""
    with logbook.reading() as view:
        lots = {row.label: row.id for row in view.all(LotRow)}
    return load_plan(folder, lots=lots, new_id=new_id)


@no_collection()
def load(
    logbook: Logbook, signer: Signer, facts: PlanFacts, progress: Progress | None = None
) -> PlanLoaded:
    """Keep a plan as the draft; an earlier draft is replaced. Returns what was loaded.

    Raises Refused when the one who acts is no planner, or the plan is released already; Faulty
    when a route names an input as no entry can.
    """
    _demand_plain_names(facts)
    for data in facts.files.values():
        logbook.evidence.put(data)
    with logbook.deed(signer) as deed:
        demand_role(deed.view, signer.person, "planner")
        earlier = latest_campaign(deed.view)
        if earlier is not None and earlier.state == "released":
            raise Refused(
                f"The plan of {earlier.label} is released.",
                "A released plan is changed by a revision: say why, with --reason.",
            )
        loaded = _loaded(facts, earlier)
        _keep(deed, facts, loaded, progress)
    return loaded


def _demand_plain_names(facts: PlanFacts) -> None:
    # An entry keeps inputs by their names, and names in an entry are ASCII.
    faults = [
        Fault(
            f"route {route.label}, step {step.id}, input {item.name}",
            "has a name with letters beyond a to z.",
            "Name it plainly; the prompt may be in any language.",
        )
        for route in facts.routes
        for step in route.steps
        for item in step.inputs
        if not item.name.isascii()
    ]
    if faults:
        raise Faulty(faults)


@no_collection()
def check(logbook: Logbook, progress: Progress | None = None) -> list[PlanFinding]:
    """Everything found about the plan: ok, warning or refusal, each with figure and source."""
    with logbook.storage.reading() as reader, _as_drafted(reader.connection) as (view, campaign):
        return check_plan(view, campaign, logbook.clock.now().local.date(), progress)


@contextmanager
def _as_drafted(connection: Connection) -> Iterator[tuple[View, CampaignRow]]:
    """What is checked and released: the draft, or the revision of the plan as if it stood."""
    now = View(connection, lambda _sheet: None)
    campaign = planned_campaign(now)
    draft = drafted(now, campaign)
    if draft is None:
        yield now, campaign
        return
    with as_released(connection, draft) as view:
        yield view, planned_campaign(view)


@no_collection()
def release(
    logbook: Logbook, signer: Signer, *, meaning: str, progress: Progress | None = None
) -> PlanReleased:
    """Release the draft for work: plan and criteria are frozen. Returns what was released.

    Raises Refused when the check refuses something, naming it, or there is no draft.
    """
    demand_meaning(meaning)
    with logbook.deed(signer) as deed:
        demand_role(deed.view, signer.person, "planner")
        before = planned_campaign(deed.view)
        if before.state == "released" and drafted(deed.view, before) is None:
            raise Refused(
                f"Revision {before.revision} is released already.",
                "Work on: gaugelog step next. To change the plan: gaugelog plan load --reason WHY",
            )
        with _as_drafted(deed.writer.connection) as (view, campaign):
            findings = check_plan(view, campaign, deed.moment.local.date(), progress)
            points = [row.id for row in view.all(PointRow)]
        refused = [finding for finding in findings if finding.level == "refusal"]
        if refused:
            raise Refused(
                f"The plan check refuses {len(refused)} things; first: {refused[0].subject}: "
                f"{refused[0].what}",
                "See them all with `gaugelog plan check`, mend the files, load them again.",
            )
        body = PlanReleased(
            campaign=campaign.id,
            revision=campaign.revision,
            meaning=meaning,
            warnings=tuple(
                f"{finding.subject}: {finding.what}"
                for finding in findings
                if finding.level == "warning"
            ),
        )
        known = [row.id for row in deed.view.all(PointRow)]
        deed.keep(body, [campaign.id, *known, *points])
    return body


def is_released(logbook: Logbook) -> bool:
    """Whether a plan is released, so that the next load is a revision of it."""
    with logbook.reading() as view:
        campaign = latest_campaign(view)
    return campaign is not None and campaign.state == "released"


@no_collection()
def overview(logbook: Logbook) -> list[PlannedPoint]:
    """Every point of the plan with its lot, circuit, channel and state."""
    with logbook.reading() as view:
        grids: dict[str, list[GridRow]] = {}
        for grid in view.all(GridRow):
            grids.setdefault(grid.point, []).append(grid)
        names = _Names(view)
        return [names.line(row, grids.get(row.id, [])) for row in view.all(PointRow)]


class _Names:
    """Labels of what points refer to, read once."""

    def __init__(self, view: View) -> None:
        self._lots = {row.id: row.label for row in view.all(LotRow)}
        self._routes = {row.id: row.label for row in view.all(RouteRow)}
        self._circuits = {row.id: row for row in view.all(CircuitRow)}
        self._channels = {row.id: row.label for row in view.all(ChannelRow)}

    def line(self, row: PointRow, grids: list[GridRow]) -> PlannedPoint:
        circuits = [self._circuits[grid.circuit] for grid in grids if grid.circuit]
        planned = PointPlanned.model_validate_json(row.data)
        return PlannedPoint(
            row.label,
            row.zone,
            self._lots.get(row.lot, "not in stock"),
            ", ".join(dict.fromkeys(circuit.label for circuit in circuits)) or "none",
            ", ".join(dict.fromkeys(self._channels.get(item.channel, "?") for item in circuits)),
            self._routes.get(row.route, "?"),
            str(planned.permitted_error),
            worst_state([grid.state for grid in grids]),
            tuple(json.loads(row.touched)),
        )


def _loaded(facts: PlanFacts, earlier: CampaignRow | None) -> PlanLoaded:
    return PlanLoaded(
        campaign=facts.campaign.id,
        revision=1 + (earlier.revision if earlier else 0),
        criteria=facts.criteria.id,
        points=tuple(point.id for point in facts.points),
        circuits=tuple(circuit.id for circuit in facts.circuits),
        routes=tuple(route.id for route in facts.routes),
        replaces=earlier.id if earlier else None,
        files={name_to_keep(name): digest for name, digest in facts.digests.items()},
    )


def _keep(
    deed: Deed, facts: PlanFacts, loaded: PlanLoaded, progress: Progress | None = None
) -> None:
    campaign, total = facts.campaign.id, len(facts.points) + len(facts.circuits)
    deed.keep(facts.campaign, [campaign, *(article.id for article in facts.campaign.articles)])
    deed.keep(facts.criteria, [campaign, facts.criteria.id])
    for route in facts.routes:
        deed.keep(route, [campaign, route.id], evidence=[route.file])
    for done, point in enumerate(facts.points, start=1):
        deed.keep(point, _about_point(campaign, point))
        _tell(progress, done, total)
    for done, circuit in enumerate(facts.circuits, start=len(facts.points) + 1):
        deed.keep(circuit, [campaign, circuit.id, circuit.channel, *circuit.grids])
        _tell(progress, done, total)
    deed.keep(loaded, [campaign], evidence=loaded.files.values())


def _tell(progress: Progress | None, done: int, total: int) -> None:
    if progress and (done % _TOLD_EVERY == 0 or done == total):
        progress(done, total)


def _about_point(campaign: str, point: PointPlanned) -> Iterable[str]:
    return [campaign, point.id, *(grid.id for grid in point.grids), point.lot]
