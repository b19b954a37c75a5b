"""What becomes of a point that can't go on as it is: its gauge is replaced, or it is withdrawn."""

from __future__ import annotations

import json
from collections.abc import Iterator
from typing import ClassVar, Literal

from gaugelog.ledger.base import FactBody, Id
from gaugelog.ledger.progress import (
    move,
    move_along,
    reopen,
    route_of,
    set_states,
    step_key,
)
from gaugelog.ledger.rows import At, Change, Known, Put, Row, have
from gaugelog.ledger.sharing import sharers
from gaugelog.ledger.steps import given_up, was_mounted
from gaugelog.ledger.story import Turn, told

Disposition = Literal["replace", "withdraw"]


class DispositionMade(FactBody):
    """Someone decided what becomes of a point, and why."""

    kind: ClassVar[str] = "disposition.made"

    point: Id
    disposition: Disposition
    reason: str
    gauge: Id | None = None
    """The piece in place, which goes."""
    readings: tuple[Id, ...] = ()
    """Readings on that piece that were the latest; none of them speaks for the next one."""
    circuits: tuple[Id, ...] = ()
    """Every circuit that the piece was wired into; a dummy may serve several."""
    revision: int | None = None
    """The accepted record that is amended by it."""
    decided_by: Id
    meaning: str


def apply_disposition_made(known: Known, at: At, fact: DispositionMade) -> Iterator[Change]:
    """The gauge is given up; the place is prepared anew, or the point is withdrawn."""
    point = have(known, "point", fact.point)
    label = ""
    if point["gauge"]:
        label = f"{have(known, 'gauge', point['gauge'])['label']}: "
        yield given_up(known, point, was_mounted(known, point))
    turn: Turn = "gauge replaced" if fact.disposition == "replace" else "withdrawn"
    yield told(at, fact.point, turn, fact.decided_by, reason=f"{label}{fact.reason}")
    if fact.disposition == "withdraw":
        yield Put("point", {**point, "gauge": ""})
        yield from set_states(known, point, "withdrawn")
        return
    yield from _amended(known, fact)
    for reading in fact.readings:
        yield Put("reading", {**have(known, "reading", reading), "latest": 0})
    yield from _anew(known, point)
    for circuit in fact.circuits:
        yield from _circuit_anew(known, at, fact, circuit, label)


def _circuit_anew(
    known: Known, at: At, fact: DispositionMade, circuit: str, label: str
) -> Iterator[Change]:
    """A bridge with another piece in it is wired and checked again, for each of its points."""
    where = have(known, "point", fact.point)["label"]
    for other in sharers(known, fact.point, circuit):
        why = f"at {where}, in the same circuit: {label}{fact.reason}"
        yield told(at, other, "gauge replaced", fact.decided_by, reason=why)
        point = have(known, "point", other)
        before = json.loads(point["blocked"])
        still = [each for each in before if not each.startswith(f"{circuit}/")]
        if still != before:
            yield Put("point", {**point, "blocked": json.dumps(still)})
        for step in route_of(have(known, "route", point["route"])["data"]).steps:
            row = known.get("step", step_key(other, step.id, circuit))
            if row is not None:
                yield Put("step", {**row, "outcome": "reopened"})
        yield from move_along(known, other)


def _amended(known: Known, fact: DispositionMade) -> Iterator[Change]:
    if fact.revision is not None:
        record = have(known, "record", f"{fact.point}/{fact.revision}")
        yield Put("record", {**record, "state": "amended", "reason": fact.reason})


def _anew(known: Known, point: Row) -> Iterator[Change]:
    """The place of another generation: every step of the route is to be done again.

    A new piece is never bonded over the old place, so preparation comes again too; and which
    steps of a route that somebody wrote prepare the surface, no program can tell.
    """
    generation = point["generation"] + 1
    new = {**point, "gauge": "", "generation": generation, "blocked": "[]"}
    yield Put("point", new)
    steps = route_of(have(known, "route", point["route"])["data"]).steps
    yield from reopen(known, new, steps)
    yield from move(known, new)
