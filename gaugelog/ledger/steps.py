"""Steps done, skipped and held: how a point walks along its route."""

from __future__ import annotations

import json
from collections.abc import Iterator
from typing import ClassVar, Literal

from sqlmodel import Field, SQLModel

from gaugelog.ledger.base import FactBody, Id, Part, Quantity, TimeText
from gaugelog.ledger.progress import (
    count_for_sharers,
    move,
    note_worker,
    reopen,
    route_of,
    step_key,
    subjects_of,
)
from gaugelog.ledger.routes import RouteStep
from gaugelog.ledger.rows import At, Change, Known, Put, Row, have
from gaugelog.ledger.story import Turn, told


class Entered(Part):
    """What was entered for one input: as typed, and what it was understood to be."""

    typed: str
    id: Id | None = None
    """The gauge, consumable, instrument or reading meant."""
    quantity: Quantity | None = None


class StepDone(FactBody):
    """A step was done on a subject of a point."""

    kind: ClassVar[str] = "step.done"

    point: Id
    subject: Id
    """A grid or circuit; the point itself for a step on the place."""
    step: str
    inputs: dict[str, Entered] = {}
    observed_at: TimeText
    done_by: Id
    note: str = ""
    flags: tuple[str, ...] = ()
    """What the program saw and could not judge: a clock that jumped, a conditional pass."""


class StepSkipped(FactBody):
    """A step was left out, with a reason, by someone its skip rule allows."""

    kind: ClassVar[str] = "step.skipped"

    point: Id
    subject: Id
    step: str
    reason: str
    skipped_by: Id


class HoldDecided(FactBody):
    """A second person let the work go on at a hold step, or sent it back."""

    kind: ClassVar[str] = "hold.decided"

    point: Id
    subject: Id
    step: str
    outcome: Literal["released", "refused"]
    reason: str = ""
    decided_by: Id
    observed_at: TimeText
    meaning: str


class StepReopened(FactBody):
    """Work goes back: the step and those after it are to be done again."""

    kind: ClassVar[str] = "step.reopened"

    point: Id
    step: str
    reason: str
    reopened_by: Id


class StepRow(SQLModel, table=True):
    """The latest outcome of a step on a subject."""

    __tablename__ = "step"

    id: str = Field(primary_key=True)
    """`point/step/subject`."""
    point: str = Field(index=True)
    subject: str
    step: str
    outcome: str
    """`done`, `skipped`, `released`, `refused`, or `reopened` when it must be done again."""
    by: str
    observed_at: str
    entered_at: str
    boot: str
    uptime_ms: int
    note: str
    """The note, or the reason of a skip or refusal."""
    data: str
    """The inputs as JSON."""
    flags: str = "[]"
    """JSON list of what was seen and could not be judged, for the reviewer's eye."""
    seq: int


def apply_step_done(known: Known, at: At, fact: StepDone) -> Iterator[Change]:
    """The step is settled on its subject; a gauge that was entered is in service at the point."""
    yield from note_worker(known, fact.point, fact.done_by)
    point = have(known, "point", fact.point)
    step = next(item for item in _steps(known, point) if item.id == fact.step)
    yield from _take_gauge(known, point, step, fact)
    inputs = {name: item.model_dump(mode="json") for name, item in fact.inputs.items()}
    row = _row(at, fact, "done", fact.done_by, fact.observed_at, fact.note)
    row["data"] = json.dumps(inputs, ensure_ascii=False)
    row["flags"] = json.dumps(fact.flags, ensure_ascii=False)
    yield Put("step", row)
    yield from move(known, have(known, "point", fact.point), step.reaches)
    yield from count_for_sharers(known, row, fact.done_by)


def _take_gauge(known: Known, point: Row, step: RouteStep, fact: StepDone) -> Iterator[Change]:
    for item in step.inputs:
        gauge = fact.inputs.get(item.name)
        if item.kind != "gauge" or gauge is None or gauge.id is None:
            continue
        generation = point["generation"]
        if point["gauge"] not in {"", gauge.id}:
            mounted = was_mounted(known, point)
            generation += int(mounted)
            yield given_up(known, point, mounted)
        yield Put("point", {**point, "gauge": gauge.id, "generation": generation})
        taken = {"state": "in service", "point": fact.point}
        yield Put("gauge", {**have(known, "gauge", gauge.id), **taken})


def was_mounted(known: Known, point: Row) -> bool:
    """Whether any step on grid or circuit was done since the gauge in place was taken."""
    steps = _steps(known, point)
    takes = [any(item.kind == "gauge" for item in step.inputs) for step in steps]
    if True not in takes:
        return False
    first = takes.index(True)
    taken = [row["seq"] for row in _rows_of(known, point, steps[first])]
    later = (step for step in steps[first + 1 :] if step.subject != "place")
    rows = (row for step in later for row in _rows_of(known, point, step))
    return bool(taken) and any(row["seq"] > min(taken) for row in rows)


def _rows_of(known: Known, point: Row, step: RouteStep) -> list[Row]:
    keys = (step_key(point["id"], step.id, each) for each in subjects_of(known, point, step))
    return [row for key in keys if (row := known.get("step", key)) is not None]


def given_up(known: Known, point: Row, mounted: bool) -> Change:
    """The gauge that another takes the place of: removed when it was mounted, else on the shelf."""
    state = {"state": "removed"} if mounted else {"state": "on shelf", "point": ""}
    return Put("gauge", {**have(known, "gauge", point["gauge"]), **state})


def apply_step_skipped(known: Known, at: At, fact: StepSkipped) -> Iterator[Change]:
    """The step is settled without being done."""
    yield from note_worker(known, fact.point, fact.skipped_by)
    row = _row(at, fact, "skipped", fact.skipped_by, at.time, fact.reason)
    yield Put("step", row)
    yield from move(known, have(known, "point", fact.point))
    yield from count_for_sharers(known, row, fact.skipped_by)


def apply_hold_decided(known: Known, at: At, fact: HoldDecided) -> Iterator[Change]:
    """The hold is released; or refused, and the steps since `refused_to` are to be done again."""
    point = have(known, "point", fact.point)
    row = _row(at, fact, fact.outcome, fact.decided_by, fact.observed_at, fact.reason)
    before = known.get("step", row["id"])
    if fact.outcome == "refused" or before is not None:
        # A hold that was released at once is no turn of the story; the step tells it.
        turn: Turn = "hold refused" if fact.outcome == "refused" else "hold released"
        yield told(at, fact.point, turn, fact.decided_by, reason=fact.reason, step=fact.step)
    yield Put("step", row)
    yield from count_for_sharers(known, row, "")
    steps = _steps(known, point)
    hold = next(place for place, item in enumerate(steps) if item.id == fact.step)
    if fact.outcome == "refused":
        back = [place for place, item in enumerate(steps) if item.id == steps[hold].refused_to]
        yield from reopen(known, point, steps[back[0] if back else hold : hold])
    yield from move(known, point, steps[hold].reaches if fact.outcome == "released" else "")


def apply_step_reopened(known: Known, at: At, fact: StepReopened) -> Iterator[Change]:
    """The step and those after it are to be done again."""
    yield told(
        at, fact.point, "step reopened", fact.reopened_by, reason=fact.reason, step=fact.step
    )
    point = have(known, "point", fact.point)
    steps = _steps(known, point)
    start = next(place for place, item in enumerate(steps) if item.id == fact.step)
    yield from reopen(known, point, steps[start:])
    yield from move(known, point)


def _steps(known: Known, point: Row) -> tuple[RouteStep, ...]:
    return route_of(have(known, "route", point["route"])["data"]).steps


def _row(
    at: At,
    fact: StepDone | StepSkipped | HoldDecided,
    outcome: str,
    by: str,
    observed_at: str,
    note: str,
) -> Row:
    return {
        "id": step_key(fact.point, fact.step, fact.subject),
        "point": fact.point,
        "subject": fact.subject,
        "step": fact.step,
        "outcome": outcome,
        "by": by,
        "observed_at": observed_at,
        "entered_at": at.time,
        "boot": at.boot,
        "uptime_ms": at.uptime_ms,
        "note": note,
        "data": "{}",
        "flags": "[]",
        "seq": at.seq,
    }
