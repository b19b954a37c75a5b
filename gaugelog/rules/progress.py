"""How far a point is: its next step, what blocks it, and whether it may be submitted."""

from __future__ import annotations

import json
from collections.abc import Iterator, Sequence
from dataclasses import dataclass, replace
from datetime import datetime

from gaugelog.errors import Refused
from gaugelog.journal.clock import Moment
from gaugelog.ledger.campaign import CampaignRow
from gaugelog.ledger.circuits import CircuitRow
from gaugelog.ledger.points import GridRow, GridState, PointRow
from gaugelog.ledger.progress import SETTLED, OpenStep, open_step, route_of
from gaugelog.ledger.readings import ReadingRow
from gaugelog.ledger.routes import RouteAdopted, RouteRow, RouteStep
from gaugelog.ledger.steps import StepRow
from gaugelog.ledger.view import View
from gaugelog.physics.validity import OutOfDomain
from gaugelog.rules.barred import why_place_barred
from gaugelog.rules.cure import cured
from gaugelog.rules.sentback import sent_back
from gaugelog.rules.waiting import waits_for
from gaugelog.rules.windows import WindowFound, judge_window

WORST_FIRST: tuple[GridState, ...] = (
    "failed in service",
    "non-conforming",
    "returned",
    "on hold",
    "planned",
    "released",
    "in work",
    "ready to coat",
    "awaiting review",
    "accepted",
    "removed",
)
"""States from worst to best, withdrawn left out; a point shows its worst grid."""

_LEFT_OUT = "withdrawn"


@dataclass(frozen=True, slots=True)
class NextStep:
    """What a point needs now; `step` is None when its route is walked to the end."""

    point: str
    zone: str
    state: str
    number: int
    count: int
    step: RouteStep | None
    subject: str
    subject_label: str
    windows: tuple[WindowFound, ...] = ()
    blocks: tuple[str, ...] = ()
    again: bool = False
    """A reading of this step was kept and blocks: measuring again needs a reason."""
    facts: tuple[str, ...] = ()
    """What the plan says that the step needs."""
    sent_back: tuple[str, ...] = ()
    """Why work was sent back, until that is dealt with."""
    flags: tuple[str, ...] = ()
    """What was flagged at the point so far."""

    @property
    def title(self) -> str:
        """The step's title, or what to do at the end of the route."""
        if self.step is not None:
            return self.step.title
        return "none" if self.state in {"accepted", "awaiting review"} else "submit the record"

    @property
    def forbidden(self) -> tuple[str, ...]:
        """What forbids any deed at the point, whatever the time: the blocks without windows."""
        shut = {window.sentence for window in self.windows}
        return tuple(block for block in self.blocks if block not in shut)


def worst_state(states: Sequence[str]) -> str:
    """The state of a point: that of its worst grid, withdrawn ones left out."""
    known = [state for state in states if state != _LEFT_OUT]
    if not known:
        return _LEFT_OUT if states else "planned"
    return min(known, key=WORST_FIRST.index)


def state_of(view: View, point: PointRow) -> str:
    """The state of a point."""
    return worst_state([grid.state for grid in view.all(GridRow, point=point.id)])


def route_for(view: View, point: PointRow) -> RouteAdopted:
    """The route of a point."""
    row = view.get(RouteRow, point.route)
    if row is None:
        raise Refused(f"The route of {point.label} is not known.", "Load the plan again.")
    return route_of(row.data)


def next_step(
    view: View, point: PointRow, now: Moment, observed: datetime | None = None
) -> NextStep:
    """The next step of a point, with its windows, what blocks it, and why it was sent back.

    `observed` is when the step was done, UTC, if not now.
    """
    found = _standing(view, point, now, observed)
    return replace(found, sent_back=tuple(sent_back(view, point, now)))


def _standing(view: View, point: PointRow, now: Moment, observed: datetime | None) -> NextStep:
    count = len(route_for(view, point).steps)
    state = state_of(view, point)
    found = open_step(view.known(), point.model_dump())
    if found is None:
        blocks = ("Wait for the review.",) if state == "awaiting review" else ()
        return NextStep(point.label, point.zone, state, count, count, None, "", "", (), blocks)
    windows = tuple(_windows(view, point, found, observed or now.utc, now))
    return NextStep(
        point.label,
        point.zone,
        state,
        found.number,
        count,
        found.step,
        found.subject,
        subject_label(view, found.subject) or point.label,
        windows,
        tuple(_blocks(view, point, found, windows)),
        bool(_blocking(view, point, found)),
    )


def subject_label(view: View, subject: str) -> str:
    """The label of a grid or circuit by its id; empty for anything else."""
    grid = view.get(GridRow, subject)
    if grid is not None:
        return grid.label
    circuit = view.get(CircuitRow, subject)
    return circuit.label if circuit is not None else ""


def _windows(
    view: View, point: PointRow, found: OpenStep, observed: datetime, now: Moment
) -> Iterator[WindowFound]:
    steps = {step.id: step for step in route_for(view, point).steps}
    for window in found.step.windows:
        rows = [
            row
            for row in view.all(StepRow, point=point.id, step=window.after)
            if row.outcome in SETTLED
        ]
        own = [row for row in rows if row.subject == found.subject] or rows
        if own and own[-1].outcome != "skipped":
            latest = max(own, key=lambda row: row.observed_at)
            earlier = steps[window.after]
            try:
                fitted = cured(view, point.id, window, earlier, latest)
            except OutOfDomain as error:
                yield WindowFound(False, True, f"The bond line was too cold: {error.message}")
            else:
                yield judge_window(fitted, earlier.title, latest, observed, now)


def _blocks(
    view: View, point: PointRow, found: OpenStep, windows: Sequence[WindowFound]
) -> Iterator[str]:
    campaign = view.get(CampaignRow, point.campaign)
    if campaign is None or campaign.state != "released":
        yield "The plan is not released."
    state = state_of(view, point)
    if state in {"awaiting review", "accepted", "withdrawn", "removed"}:
        yield f"The point is {state}."
    else:
        yield from _unseen(point)
    yield from waits_for(view, point.id, found)
    barred = why_place_barred(view, point)
    if barred and not any(item.kind == "gauge" for item in found.step.inputs):
        # Where a step takes a gauge, another can be taken; it is the input that is refused.
        yield f"In place: {barred.rstrip('.')}."
    for window in windows:
        if not window.open:
            yield window.sentence


def _unseen(point: PointRow) -> Iterator[str]:
    """What plan revisions changed under work that was done, until a reviewer has looked."""
    touched: list[str] = json.loads(point.touched)
    if touched:
        told = "; ".join(touched)
        yield f"A reviewer looks first (`gaugelog plan seen {point.label}`) at {told}."


def demand_changes_seen(point: PointRow) -> None:
    """Raise Refused while a change of the plan waits for a reviewer's eye at the point."""
    for told in _unseen(point):
        raise Refused(
            f"The plan changed under {point.label}. {told}",
            f"A reviewer says so with: gaugelog plan seen {point.label}",
        )


def _blocking(view: View, point: PointRow, found: OpenStep) -> list[ReadingRow]:
    return [
        row
        for row in view.all(ReadingRow, subject=found.subject, latest=1)
        if row.step == found.step.id and row.blocks
    ]


def demand_complete(view: View, point: PointRow) -> None:
    """Raise Refused, naming everything open, unless the point is ready to be submitted."""
    state = state_of(view, point)
    if state in {"awaiting review", "accepted", "withdrawn"}:
        raise Refused(f"{point.label} is {state} already.", remedy_for(point.label, state))
    demand_changes_seen(point)
    still = [*_open_things(view, point)]
    if still:
        raise Refused(
            f"{point.label} is not ready: {'; '.join(still)}.",
            f"See `gaugelog step next {point.label}`.",
        )


def _open_things(view: View, point: PointRow) -> Iterator[str]:
    found = open_step(view.known(), point.model_dump())
    barred = why_place_barred(view, point)
    if barred:
        yield barred
    if found is not None:
        yield f"step {found.number}, “{found.step.title}”, is open"
    for key in json.loads(point.blocked):
        subject, check, stage = key.split("/", 2)
        yield f"{check} {stage} of {subject_label(view, subject) or point.label} blocks"


def remedy_for(point: str, state: str) -> str:
    """What has to happen first where work at a point in this state is over, or not begun."""
    return {
        "planned": "Release the plan first: gaugelog plan release",
        "awaiting review": f"A reviewer sends it back first: gaugelog return {point}",
        "accepted": f"Take it up again first: gaugelog amend {point}",
    }.get(state, f"See what became of it: gaugelog journal show {point}")


def demand_walked(view: View, point: PointRow, step: RouteStep) -> None:
    """Raise Refused unless the step was settled on some subject, so that it can be done again."""
    rows = view.all(StepRow, point=point.id, step=step.id)
    if not any(row.outcome in SETTLED for row in rows):
        raise Refused(
            f"“{step.title}” of {point.label} is not done yet.",
            f"See `gaugelog step next {point.label}`.",
        )


def demand_step(view: View, point: PointRow, step: str) -> RouteStep:
    """The step of the point's route with this id; raises Refused listing those there are."""
    steps = route_for(view, point).steps
    for item in steps:
        if item.id == step:
            return item
    known = ", ".join(item.id for item in steps)
    raise Refused(f"The route of {point.label} has no step {step}.", f"Steps: {known}.")
