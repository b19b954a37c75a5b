"""What becomes of a point that can't go on as it is: its gauge is replaced, or it is withdrawn."""

from __future__ import annotations

from collections.abc import Iterator
from typing import ClassVar, Literal

from gaugelog.ledger.base import FactBody, Id
from gaugelog.ledger.progress import move, reopen, route_of, set_states
from gaugelog.ledger.rows import At, Change, Known, Put, Row, have
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
