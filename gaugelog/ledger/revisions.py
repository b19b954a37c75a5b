"""Revisions of a released plan: drafted whole in one fact, taking effect when they are released."""

from __future__ import annotations

import json
from collections.abc import Iterable, Iterator
from dataclasses import replace
from typing import ClassVar, Literal

from pydantic import BaseModel
from sqlmodel import Field, SQLModel

from gaugelog.ledger import campaign as plans
from gaugelog.ledger.base import FactBody, Id, Part
from gaugelog.ledger.campaign import CampaignPlanned, CriteriaAgreed, PlanLoaded, PlanReleased
from gaugelog.ledger.circuits import CircuitPlanned, apply_circuit_planned
from gaugelog.ledger.points import PointPlanned, apply_point_planned
from gaugelog.ledger.progress import grids_of, move, reopen_from, set_states
from gaugelog.ledger.routes import RouteAdopted, apply_route_adopted
from gaugelog.ledger.rows import At, Change, Drop, Known, Put, Row, have
from gaugelog.ledger.story import told

Subject = Literal["job", "article", "channel", "criteria", "route", "point", "circuit"]
What = Literal["added", "changed", "dropped"]

_UNTOUCHED = frozenset({"planned", "released", "withdrawn"})
_AT_REST = frozenset({"accepted", "awaiting review", "withdrawn"})


class PlanChange(Part):
    """One thing that a revision changes, and how."""

    subject: Subject
    label: str
    what: What
    lines: tuple[str, ...] = ()
    """`place x: 100 mm → 150 mm`"""


class Affected(Part):
    """A point that was there before, and what of the revision bears on it."""

    point: Id
    lines: tuple[str, ...]


class PlanRevised(FactBody):
    """The draft of a revision: everything added or changed, whole; it replaces an earlier draft."""

    kind: ClassVar[str] = "plan.revised"

    campaign: Id
    revision: int
    reason: str
    job: CampaignPlanned | None = None
    criteria: CriteriaAgreed | None = None
    routes: tuple[RouteAdopted, ...] = ()
    points: tuple[PointPlanned, ...] = ()
    circuits: tuple[CircuitPlanned, ...] = ()
    dropped_points: tuple[Id, ...] = ()
    dropped_circuits: tuple[Id, ...] = ()
    changes: tuple[PlanChange, ...] = ()
    affected: tuple[Affected, ...] = ()
    files: dict[str, str] = {}
    """The planner's files by their digest among the evidence."""


class ChangeSeen(FactBody):
    """A reviewer looked at what a revision changes where work was done; it may go on."""

    kind: ClassVar[str] = "change.seen"

    point: Id
    revision: int
    """Of the plan."""
    remark: str
    redo_from: str = ""
    """The step that work goes on from; empty: nothing is done again."""
    seen_by: Id
    meaning: str


class RevisionRow(SQLModel, table=True):
    """A revision of a released plan."""

    __tablename__ = "revision"

    id: str = Field(primary_key=True)
    """`campaign/revision`."""
    campaign: str = Field(index=True)
    revision: int
    state: str
    """`draft` or `released`."""
    reason: str
    data: str
    """The whole of `PlanRevised` as JSON."""
    seq: int


def apply_plan_revised(_known: Known, at: At, fact: PlanRevised) -> Iterator[Change]:
    """The draft is kept; the released plan stands until this one is released."""
    yield Put(
        "revision",
        {
            "id": f"{fact.campaign}/{fact.revision}",
            "campaign": fact.campaign,
            "revision": fact.revision,
            "state": "draft",
            "reason": fact.reason,
            "data": at.data,
            "seq": at.seq,
        },
    )


def apply_plan_released(known: Known, at: At, fact: PlanReleased) -> Iterator[Change]:
    """A plan is released for work: the first one as it was loaded, a later one as revised."""
    row = known.get("revision", f"{fact.campaign}/{fact.revision}")
    if row is None:
        yield from plans.apply_plan_released(known, at, fact)
        return
    revised = PlanRevised.model_validate_json(row["data"])
    yield Put("revision", {**row, "state": "released"})
    there = {point.id for point in revised.points if known.get("point", point.id) is not None}
    yield from _job(known, at, revised)
    for circuit in (*revised.dropped_circuits, *(each.id for each in revised.circuits)):
        yield from _unwired(known, circuit)
    for circuit in revised.dropped_circuits:
        yield Drop("circuit", circuit)
    for point in revised.dropped_points:
        yield from _dropped(known, at, point, revised)
    for planned in revised.points:
        yield from (_changed if planned.id in there else _added)(known, at, planned)
    for wired in revised.circuits:
        yield from apply_circuit_planned(known, _as_kept(at, wired), wired)
    for affected in revised.affected:
        yield from _touched(known, at, affected, revised)


def apply_change_seen(known: Known, at: At, fact: ChangeSeen) -> Iterator[Change]:
    """The mark is taken off the point; work goes on, from `redo_from` where it is named."""
    point = {**have(known, "point", fact.point), "touched": "[]"}
    yield Put("point", point)
    yield told(at, fact.point, "change seen", fact.seen_by, reason=fact.remark, step=fact.redo_from)
    yield from reopen_from(known, point, fact.redo_from)
    if _states(known, point).isdisjoint(_AT_REST):
        yield from move(known, point)


def _job(known: Known, at: At, revised: PlanRevised) -> Iterator[Change]:
    """The campaign as revised: its channels, criteria and routes, and the list of its parts."""
    row = have(known, "campaign", revised.campaign)
    if revised.job is not None:
        yield from _channels(row, revised.job)
        row |= {name: getattr(revised.job, name) for name in ("label", "title", "client")}
        row |= {"surroundings": revised.job.surroundings, "data": _json(revised.job)}
    if revised.criteria is not None:
        criteria = revised.criteria
        yield from plans.apply_criteria_agreed(known, _as_kept(at, criteria), criteria)
        row["criteria"] = criteria.id
    for route in revised.routes:
        yield from apply_route_adopted(known, _as_kept(at, route), route)
    plan = _listed(PlanLoaded.model_validate_json(row["plan"]), row["criteria"], revised)
    now = {"plan": _json(plan), "revision": revised.revision, "released_seq": at.seq}
    yield Put("campaign", {**row, **now})


def _channels(row: Row, job: CampaignPlanned) -> Iterator[Change]:
    earlier = CampaignPlanned.model_validate_json(row["data"])
    wanted = {channel.id for module in job.modules for channel in module.channels}
    for module in earlier.modules:
        for channel in module.channels:
            if channel.id not in wanted:
                yield Drop("channel", channel.id)
    yield from plans.channels_of(job)


def _listed(plan: PlanLoaded, criteria: str, revised: PlanRevised) -> PlanLoaded:
    return PlanLoaded(
        campaign=plan.campaign,
        revision=revised.revision,
        criteria=criteria,
        points=_ids(plan.points, revised.points, revised.dropped_points),
        circuits=_ids(plan.circuits, revised.circuits, revised.dropped_circuits),
        routes=_ids(plan.routes, revised.routes, ()),
        files=revised.files,
    )


def _ids(
    before: Iterable[str],
    now: Iterable[PointPlanned | CircuitPlanned | RouteAdopted],
    dropped: Iterable[str],
) -> tuple[str, ...]:
    gone = set(dropped)
    every = dict.fromkeys((*before, *(each.id for each in now)))
    return tuple(each for each in every if each not in gone)


def _unwired(known: Known, circuit: str) -> Iterator[Change]:
    row = known.get("circuit", circuit)
    for grid in CircuitPlanned.model_validate_json(row["data"]).grids if row is not None else ():
        found = known.get("grid", grid)
        if found is not None and found["circuit"] == circuit:
            yield Put("grid", {**found, "circuit": ""})


def _dropped(known: Known, at: At, point_id: str, revised: PlanRevised) -> Iterator[Change]:
    """A point without work goes; one with work is withdrawn, and what was kept of it stays."""
    point = have(known, "point", point_id)
    if _states(known, point) <= {"planned", "released"}:
        for grid in grids_of(point["data"]):
            yield Drop("grid", grid)
        yield Drop("point", point_id)
        return
    why = f"plan revision {revised.revision} drops it: {revised.reason}"
    yield told(at, point_id, "withdrawn", at.actor, reason=why)
    yield from set_states(known, point, "withdrawn")


def _added(known: Known, at: At, planned: PointPlanned) -> Iterator[Change]:
    yield from apply_point_planned(known, _as_kept(at, planned), planned)
    yield from set_states(known, have(known, "point", planned.id), "released")


def _changed(known: Known, _at: At, planned: PointPlanned) -> Iterator[Change]:
    """The point as planned now; what was done there stays, and so do the states of its grids."""
    point = have(known, "point", planned.id)
    states = [have(known, "grid", grid)["state"] for grid in grids_of(point["data"])]
    kept = {grid.id for grid in planned.grids}
    for grid_id in grids_of(point["data"]):
        if grid_id not in kept:
            yield Drop("grid", grid_id)
    for grid in planned.grids:
        new = {"circuit": "", "state": states[0], "point": planned.id}
        found = known.get("grid", grid.id) or new
        yield Put("grid", {**found, "id": grid.id, "label": grid.label, "number": grid.number})
    now = {name: getattr(planned, name) for name in ("label", "zone", "lot", "route")}
    yield Put("point", {**point, **now, "data": _json(planned)})


def _touched(known: Known, at: At, affected: Affected, revised: PlanRevised) -> Iterator[Change]:
    """A point where work was done is marked until a reviewer has looked."""
    point = known.get("point", affected.point)
    if point is None or _states(known, point) <= _UNTOUCHED:
        return
    lines = [f"plan revision {revised.revision}: {line}" for line in affected.lines]
    marked = [*json.loads(point["touched"]), *lines]
    yield Put("point", {**point, "touched": json.dumps(marked, ensure_ascii=False)})
    why = f"{revised.reason} ({'; '.join(lines)})"
    yield told(at, affected.point, "plan changed", at.actor, reason=why)


def _states(known: Known, point: Row) -> set[str]:
    return {have(known, "grid", grid)["state"] for grid in grids_of(point["data"])}


def _as_kept(at: At, body: FactBody) -> At:
    return replace(at, data=_json(body))


def _json(body: BaseModel) -> str:
    return body.model_dump_json(exclude_none=True)
