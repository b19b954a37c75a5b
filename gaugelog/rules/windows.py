"""Windows of time between steps; none is judged across a clock that was set."""

from __future__ import annotations

from dataclasses import dataclass
from datetime import UTC, datetime, timedelta

from gaugelog.journal.clock import Moment, jump_between
from gaugelog.ledger.routes import Window
from gaugelog.ledger.steps import StepRow


@dataclass(frozen=True, slots=True)
class WindowFound:
    """How a window stands at a moment: open or not, judged or not, and the sentence for it."""

    open: bool
    judged: bool
    sentence: str


def judge_window(
    window: Window, title: str, earlier: StepRow, observed: datetime, now: Moment
) -> WindowFound:
    """Whether a step observed at `observed` (UTC) lies in `window` after `earlier`.

    `title` names the earlier step. When the clock was set between the earlier entry and `now`,
    the window is not judged, and that is said.
    """
    if clock_jumped(earlier, now):
        return WindowFound(
            True, False, f"The clock was set since “{title}”; this window is not judged."
        )
    start = time_of(earlier.observed_at)
    bound = start + timedelta(seconds=window.duration.si())
    if window.bound == "not before":
        return _not_before(title, observed, bound, now)
    return _within(window, title, start, observed, bound, now)


def clock_jumped(earlier: StepRow, now: Moment) -> bool:
    """Whether the clock was set between an entry and `now` (see `clock.jump_between`)."""
    entered = Moment(
        time_of(earlier.entered_at), now.offset_minutes, earlier.boot, earlier.uptime_ms
    )
    return jump_between(entered, now) is not None


def _not_before(title: str, observed: datetime, bound: datetime, now: Moment) -> WindowFound:
    when = f"not before {local_text(bound, now)} after “{title}”"
    if observed >= bound:
        return WindowFound(True, True, f"{when}: reached")
    return WindowFound(False, True, f"{when}: {_minutes(bound - observed)} to wait")


def _within(
    window: Window, title: str, start: datetime, observed: datetime, bound: datetime, now: Moment
) -> WindowFound:
    when = f"within {window.duration} of “{title}”, until {local_text(bound, now)}"
    if start.replace(second=0) <= observed <= bound:  # people give times to the minute
        return WindowFound(True, True, f"{when}: {_minutes(bound - observed)} left")
    if observed > bound:
        return WindowFound(False, True, f"{when}: {_minutes(observed - bound)} too late")
    return WindowFound(False, True, f"{when}: the time given lies before that step")


def time_of(text: str) -> datetime:
    """The UTC time that a fact carries as text."""
    return datetime.fromisoformat(text.replace("Z", "+00:00")).astimezone(UTC)


def local_text(when: datetime, now: Moment) -> str:
    """A UTC time as this machine's clock shows it on that day, to the minute."""
    return f"{now.wall(when):%Y-%m-%d %H:%M}"


def _minutes(span: timedelta) -> str:
    minutes = span.total_seconds() / 60
    if 0 < minutes < 1:
        return "less than 1 min"
    if minutes < 120:
        return f"{minutes:.0f} min"
    return f"{minutes / 60:.1f} h"
