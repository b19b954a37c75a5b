"""Looking at work: the route of a point as walked so far, attempts, and what is wanted of whom."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, replace

from gaugelog.ledger.points import PointRow
from gaugelog.ledger.progress import subjects_of
from gaugelog.ledger.readings import ReadingRow, ReadingTaken
from gaugelog.ledger.routes import RouteStep
from gaugelog.ledger.steps import StepRow
from gaugelog.ledger.view import View
from gaugelog.rules.facts import plan_facts
from gaugelog.rules.progress import NextStep, next_step, route_for, subject_label
from gaugelog.rules.wanted import Wanted, wanted_of
from gaugelog.work.doing import ReadingShown, point_row, shown
from gaugelog.work.logbook import Logbook


@dataclass(frozen=True, slots=True)
class StepWalked:
    """A step of a point's route with its outcome on one subject; empty when not reached yet."""

    number: int
    id: str
    title: str
    hold: bool
    subject: str
    subject_label: str
    outcome: str
    by: str


@dataclass(frozen=True, slots=True)
class InHand:
    """Everything a person at the article looks at: the next step, the route, the attempts."""

    next: NextStep
    route: tuple[StepWalked, ...]
    attempts: tuple[ReadingShown, ...]
    """Readings of the step in hand that were kept, oldest first."""


@dataclass(frozen=True, slots=True)
class Listed:
    """A point in the worklist, and what it wants of the person who looks."""

    next: NextStep
    wanted: Wanted


def in_hand(logbook: Logbook, point: str) -> InHand:
    """The step in hand at a point, and the route around it, in one look.

    Raises Refused when there is no such point.
    """
    with logbook.reading() as view:
        row = point_row(view, point)
        found = next_step(view, row, logbook.clock.now())
        if found.step is not None:
            facts = plan_facts(view, row, found.step, found.subject, found.number)
            found = replace(found, facts=tuple(facts))
        return InHand(found, tuple(_walked(view, row)), _attempts(view, found))


def points_called(logbook: Logbook) -> list[tuple[str, str]]:
    """Label and zone of every point, in the order of the plan."""
    with logbook.reading() as view:
        return [(row.label, row.zone) for row in view.all(PointRow)]


def for_person(logbook: Logbook, person: str) -> list[Listed]:
    """Every point with what it needs now and what it wants of `person`: theirs first, by zone."""
    now = logbook.clock.now()
    listed = []
    with logbook.reading() as view:
        for row in view.all(PointRow):
            found = next_step(view, row, now)
            listed.append(Listed(found, wanted_of(view, row, found, person)))
    return sorted(listed, key=lambda each: (not each.wanted, each.next.zone))


def _walked(view: View, row: PointRow) -> Iterator[StepWalked]:
    rows = {(each.step, each.subject): each for each in view.all(StepRow, point=row.id)}
    for number, step in enumerate(route_for(view, row).steps, start=1):
        for subject in subjects_of(view.known(), row.model_dump(), step):
            yield _one(view, row, number, step, subject, rows.get((step.id, subject)))


def _one(
    view: View, row: PointRow, number: int, step: RouteStep, subject: str, kept: StepRow | None
) -> StepWalked:
    return StepWalked(
        number,
        step.id,
        step.title,
        step.hold,
        subject,
        subject_label(view, subject) or row.label,
        kept.outcome if kept is not None else "",
        kept.by if kept is not None else "",
    )


def _attempts(view: View, found: NextStep) -> tuple[ReadingShown, ...]:
    if found.step is None:
        return ()
    rows = view.all(ReadingRow, subject=found.subject, step=found.step.id)
    return shown([ReadingTaken.model_validate_json(each.data) for each in rows])
