"""What time it is, told so that a clock that was set shows.

A moment holds the time of day and, beside it, the time since the machine started. The first can
be set by anyone, the second only runs: where they disagree, the clock jumped.
"""

from __future__ import annotations

import time
from dataclasses import dataclass, field, replace
from datetime import UTC, datetime, timedelta, timezone
from pathlib import Path
from typing import Protocol

from gaugelog.journal.ids import new_id

_BOOT_ID = Path("/proc/sys/kernel/random/boot_id")
_TOLERANCE_SECONDS = 5.0
_DRIFT = 1e-4
"""A healthy clock is corrected by less than 100 parts in a million."""


@dataclass(frozen=True, slots=True)
class Moment:
    """A time in UTC to the microsecond, the local offset, and the machine's own running time.

    `offset_minutes` is east of Greenwich; `boot` names the run of the machine; `uptime_ms` is
    the time since it started, sleep included, in milliseconds. `zoned` says that the machine's
    time zone tells the offset of other days; else the offset holds on every day.
    """

    utc: datetime
    offset_minutes: int
    boot: str
    uptime_ms: int
    zoned: bool = field(default=False, compare=False)

    def __post_init__(self) -> None:
        if self.utc.tzinfo is None or self.utc.utcoffset() != timedelta(0):
            raise ValueError("utc is not an aware time in UTC.")

    @property
    def text(self) -> str:
        """The time as `2026-12-01T09:00:00.000000Z`."""
        return self.utc.strftime("%Y-%m-%dT%H:%M:%S.%fZ")

    @property
    def offset(self) -> str:
        """The local offset as `+01:00`."""
        hours, minutes = divmod(abs(self.offset_minutes), 60)
        return f"{'-' if self.offset_minutes < 0 else '+'}{hours:02d}:{minutes:02d}"

    @property
    def local(self) -> datetime:
        """The time on the wall where it was recorded, as an aware time."""
        return self.utc.astimezone(self._fixed)

    def wall(self, utc: datetime) -> datetime:
        """Another time, UTC, on the wall where this moment was recorded, as an aware time.

        Summer time counts where the zone is known: it is the offset of that day, not of this one.
        """
        return utc.astimezone() if self.zoned else utc.astimezone(self._fixed)

    def from_wall(self, wall: datetime) -> datetime:
        """A time read off the wall there, without an offset, in UTC.

        An hour that summer time's end brings twice is taken as the first of the two.
        """
        return (wall if self.zoned else wall.replace(tzinfo=self._fixed)).astimezone(UTC)

    @property
    def _fixed(self) -> timezone:
        return timezone(timedelta(minutes=self.offset_minutes))


class Clock(Protocol):
    """Tells the moment. Handed in wherever time matters, so that a test can set it."""

    def now(self) -> Moment:
        """The moment it is."""
        ...


class SystemClock:
    """The clock of this machine."""

    def __init__(self) -> None:
        self._boot = _boot_id()

    def now(self) -> Moment:
        """The moment it is on this machine."""
        utc = datetime.now(UTC)
        offset = utc.astimezone().utcoffset() or timedelta(0)
        return Moment(utc, round(offset / timedelta(minutes=1)), self._boot, _uptime_ms(), True)


class SetClock:
    """A clock that stands still until it is moved on; for tests and the demo."""

    def __init__(self, start: Moment) -> None:
        self._moment = start

    def now(self) -> Moment:
        """The moment the clock was set to."""
        return self._moment

    def advance(self, seconds: float) -> None:
        """Let `seconds` pass, on the wall and since the machine started alike."""
        self._moment = replace(
            self._moment,
            utc=self._moment.utc + timedelta(seconds=seconds),
            uptime_ms=self._moment.uptime_ms + round(seconds * 1000),
        )

    def set(self, moment: Moment) -> None:
        """Set the clock to any moment, back or forth, as people do with real ones."""
        self._moment = moment


def jump_between(before: Moment, after: Moment) -> float | None:
    """Seconds by which the clock was set between two moments of one machine, or None if it ran.

    Positive when it was set forward. Within one run of the machine the time of day is held
    against the running time; across a restart only a time that goes back can be told.
    """
    passed = (after.utc - before.utc).total_seconds()
    if before.boot != after.boot:
        return passed if passed < -_TOLERANCE_SECONDS else None
    ran = (after.uptime_ms - before.uptime_ms) / 1000
    jump = passed - ran
    return jump if abs(jump) > _TOLERANCE_SECONDS + _DRIFT * abs(ran) else None


def _boot_id() -> str:
    try:
        return _BOOT_ID.read_text(encoding="ascii").strip()
    except OSError:
        # Elsewhere nothing names the run of the machine; the process has a run of its own.
        return new_id()


def _uptime_ms() -> int:
    try:
        return time.clock_gettime_ns(time.CLOCK_BOOTTIME) // 1_000_000
    except (AttributeError, OSError):
        return time.monotonic_ns() // 1_000_000
