"""How far a point is along its route: the step that is open, and the state of its grids."""

from __future__ import annotations

import json
from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from functools import lru_cache

from gaugelog.ledger.points import PointPlanned
from gaugelog.ledger.routes import RouteAdopted, RouteStep
from gaugelog.ledger.rows import Change, Known, Put, Row, have
from gaugelog.ledger.sharing import sharers

SETTLED = frozenset({"done", "skipped", "released"})
"""Outcomes after which the route goes on."""

UNDER_WAY = frozenset({"in work", "on hold", "ready to coat", "non-conforming"})
"""States of grids where work goes on."""


@dataclass(frozen=True, slots=True)
class OpenStep:
    """A step that is to be done on a subject; `number` counts from 1."""

    number: int
    step: RouteStep
    subject: str


@lru_cache(maxsize=256)
def route_of(data: str) -> RouteAdopted:
    """A route from its JSON; kept, because every step asks for it."""
    return RouteAdopted.model_validate_json(data)


@lru_cache(maxsize=4096)
def grids_of(data: str) -> tuple[str, ...]:
    """The ids of a point's grids, from the JSON of `PointPlanned`."""
    return tuple(grid.id for grid in PointPlanned.model_validate_json(data).grids)


def step_key(point: str, step: str, subject: str) -> str:
    """The id of a step's row."""
    return f"{point}/{step}/{subject}"


def subjects_of(known: Known, point: Row, step: RouteStep) -> list[str]:
    """What a step is done on: the point itself, each of its grids, or each circuit of theirs.

    A point's place and its gauge go by the point's own id.
    """
    grids = grids_of(point["data"])
    if step.subject in {"place", "gauge"}:
        return [point["id"]]
    if step.subject == "grid":
        return list(grids)
    circuits = (have(known, "grid", grid)["circuit"] for grid in grids)
    return list(dict.fromkeys(circuit for circuit in circuits if circuit))


def open_step(known: Known, point: Row) -> OpenStep | None:
    """The first step of the route that is not settled on each of its subjects; None at the end."""
    route = route_of(have(known, "route", point["route"])["data"])
    for number, step in enumerate(route.steps, start=1):
        for subject in subjects_of(known, point, step):
            row = known.get("step", step_key(point["id"], step.id, subject))
            if row is None or row["outcome"] not in SETTLED:
                return OpenStep(number, step, subject)
    return None


def move(known: Known, point: Row, reached: str = "") -> Iterator[Change]:
    """The states of a point's grids after something happened; `reached` names a state of its own.

    A grid with a blocking reading is non-conforming; where the next step is a hold, all are on
    hold.
    """
    upcoming = open_step(known, point)
    calm = "on hold" if upcoming is not None and upcoming.step.hold else reached or "in work"
    blocked = json.loads(point["blocked"])
    for grid_id in grids_of(point["data"]):
        grid = have(known, "grid", grid_id)
        bad = any(_concerns(key, grid_id, point) for key in blocked)
        grid["state"] = "non-conforming" if bad else calm
        yield Put("grid", grid)


def mark(known: Known, point: Row) -> Iterator[Change]:
    """Grids that a blocking reading concerns are non-conforming; the others stay as they are."""
    blocked = json.loads(point["blocked"])
    for grid_id in grids_of(point["data"]) if blocked else ():
        if any(_concerns(key, grid_id, point) for key in blocked):
            yield Put("grid", {**have(known, "grid", grid_id), "state": "non-conforming"})


def _concerns(key: str, grid_id: str, point: Row) -> bool:
    subject = key.split("/", 1)[0]
    return subject == grid_id or subject not in grids_of(point["data"])


def note_worker(known: Known, point_id: str, person: str) -> Iterator[Change]:
    """Note who did or skipped a step of a point; kept for good, also when it is done again."""
    point = have(known, "point", point_id)
    workers = json.loads(point["workers"])
    if person not in workers:
        yield Put("point", {**point, "workers": json.dumps([*workers, person])})


def set_states(known: Known, point: Row, state: str) -> Iterator[Change]:
    """All grids of a point into one state."""
    for grid_id in grids_of(point["data"]):
        yield Put("grid", {**have(known, "grid", grid_id), "state": state})


def reopen(known: Known, point: Row, steps: Sequence[RouteStep]) -> Iterator[Change]:
    """Mark steps that were settled as to be done again; of a circuit, for each of its points."""
    others: dict[str, None] = {}
    for step in steps:
        for subject in subjects_of(known, point, step):
            sharing = sharers(known, point["id"], subject) if step.subject == "circuit" else ()
            for each in (point["id"], *sharing):
                row = known.get("step", step_key(each, step.id, subject))
                if row is not None:
                    yield Put("step", {**row, "outcome": "reopened"})
            others |= dict.fromkeys(sharing)
    for other in others:
        yield from move_along(known, other)


def count_for_sharers(known: Known, row: Row, person: str) -> Iterator[Change]:
    """A step's row, done on a circuit by `person`, for each other point whose route asks for it."""
    for other in sharers(known, row["point"], row["subject"]):
        if row["step"] in _circuit_steps(known, have(known, "point", other)):
            if person:
                yield from note_worker(known, other, person)
            key = step_key(other, row["step"], row["subject"])
            yield Put("step", {**row, "id": key, "point": other})
            yield from move_along(known, other)


def _circuit_steps(known: Known, point: Row) -> set[str]:
    steps = route_of(have(known, "route", point["route"])["data"]).steps
    return {step.id for step in steps if step.subject == "circuit"}


def under_way(known: Known, point: Row) -> bool:
    """Whether work goes on at a point; what happens on its circuit moves none that is at rest."""
    states = {have(known, "grid", grid)["state"] for grid in grids_of(point["data"])}
    return states <= UNDER_WAY


def move_along(known: Known, point_id: str) -> Iterator[Change]:
    """The states of a point that shares a circuit, after something happened on it elsewhere."""
    point = have(known, "point", point_id)
    if under_way(known, point):
        yield from move(known, point)


def reopen_from(known: Known, point: Row, step: str) -> Iterator[Change]:
    """The step with this id and those after it are to be done again; none where it is empty."""
    steps = route_of(have(known, "route", point["route"])["data"]).steps
    start = next((place for place, item in enumerate(steps) if item.id == step), None)
    if start is not None:
        yield from reopen(known, point, steps[start:])
