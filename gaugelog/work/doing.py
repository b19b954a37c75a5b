"""A step in hand: the point and when it was observed; and what became of it."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from datetime import UTC, date, datetime, timedelta

from gaugelog.errors import ExitCode, Fault, Faulty, Refused
from gaugelog.journal.clock import Moment
from gaugelog.ledger.points import GridRow, PointRow
from gaugelog.ledger.readings import ReadingTaken
from gaugelog.ledger.routes import RouteStep
from gaugelog.ledger.sharing import points_in
from gaugelog.ledger.view import View
from gaugelog.rules.progress import NextStep
from gaugelog.work.logbook import Deed
from gaugelog.work.readings import explain

LONGEST_AGO = timedelta(days=3650)
"""A time further back than this is a slip of the pen, and no job lasts that long."""


@dataclass(frozen=True, slots=True)
class ReadingShown:
    """A reading that was kept, with its verdict in plain lines."""

    reading: ReadingTaken
    explained: tuple[str, ...]


@dataclass(frozen=True, slots=True)
class StepOutcome:
    """What became of a step: whether it is settled, the readings kept, what to say."""

    settled: bool
    readings: tuple[ReadingShown, ...]
    lines: tuple[str, ...]

    @property
    def exit_code(self) -> ExitCode:
        """OK when the step is settled, TROUBLE when a reading keeps it open."""
        return ExitCode.OK if self.settled else ExitCode.TROUBLE


def shown(readings: Sequence[ReadingTaken]) -> tuple[ReadingShown, ...]:
    """Readings with their verdicts in plain lines."""
    return tuple(ReadingShown(reading, tuple(explain(reading))) for reading in readings)


@dataclass(frozen=True, slots=True)
class Doing:
    """A step in hand: the deed it is done in, the point, how far it is, when it was observed.

    `order` says that it was observed before a step that it follows, and why; mostly empty.
    """

    making: Deed
    row: PointRow
    found: NextStep
    step: RouteStep
    observed: datetime
    order: str = ""

    @property
    def day(self) -> date:
        """The calendar day of it where the work is done."""
        return day_of(self.observed, self.making.moment)


def day_of(observed: datetime, moment: Moment) -> date:
    """The calendar day of an observation (UTC) where the work is done."""
    return moment.wall(observed).date()


def point_row(view: View, label: str) -> PointRow:
    """The point with this label. Raises Refused when there is none."""
    row = view.point(label)
    if row is None:
        raise Refused(f"There is no point {label}.", "See `gaugelog plan show`.")
    return row


def about(view: View, row: PointRow, subject: str, *others: str) -> list[str]:
    """The ids a fact at a point concerns: the point, its grids, the subject, and others.

    A fact on a circuit concerns every point and grid in it.
    """
    known = view.known()
    points = dict.fromkeys((row.id, *points_in(known, subject)))
    grids = [grid.id for point in points for grid in view.all(GridRow, point=point)]
    return [row.id, subject, *[point for point in points if point != row.id], *grids, *others]


def observed_at(text: str, now: Moment) -> datetime:
    """When something was observed, UTC: `14:30` or `2026-12-01 14:30` on this machine's clock.

    The offset is that of the day it was observed on, summer time or not. Raises Faulty when it is
    no time or lies in the future.
    """
    if not text.strip():
        return now.utc
    try:
        whole = text.strip()
        if len(whole) <= len("14:30:00"):
            whole = f"{now.local:%Y-%m-%d} {whole}"
        found = datetime.fromisoformat(whole)
        when = found.astimezone(UTC) if found.tzinfo else now.from_wall(found)
    except (ValueError, OverflowError):
        fault = Fault("at", f"“{text}” is no time.", "Like 14:30, or 2026-12-01 14:30.")
        raise Faulty([fault]) from None
    if when > now.utc + timedelta(minutes=1):
        raise Faulty([Fault("at", f"{text} lies in the future.", "Give when it was observed.")])
    if when < now.utc - LONGEST_AGO:
        raise Faulty([Fault("at", f"{text} is too long ago.", "Give when it was observed.")])
    return when


def utc_text(when: datetime) -> str:
    """A UTC time as facts carry it, to the second."""
    return f"{when:%Y-%m-%dT%H:%M:%SZ}"
