"""A screen under test: a copy of a prepared job, driven by a pilot, read as plain lines."""

from __future__ import annotations

import asyncio
import shutil
from collections.abc import Awaitable, Callable
from dataclasses import dataclass
from pathlib import Path
from typing import Any

from textual import events
from textual.pilot import Pilot

from gaugelog.journal.clock import Moment, SetClock
from gaugelog.journal.ids import new_id
from gaugelog.journal.keys import KeyFolder
from gaugelog.screens.app import FullScreen
from gaugelog.screens.desk import Desk
from gaugelog.screens.room import Room
from gaugelog.work.logbook import Logbook
from tests.work.job import CHEAP_ROUNDS, WORD, Job, PlainMaker, released_job

SMALL, LARGE = (80, 24), (120, 40)


@dataclass
class Seen:
    """The program under test with its pilot."""

    app: FullScreen
    pilot: Pilot[None]

    @property
    def room(self) -> Room:
        """The screen on top, which is no dialog."""
        return self.app.rooms()[-1]

    async def keys(self, *names: str) -> None:
        """Press keys, each after what the one before began has ended."""
        driver = self.app._driver
        assert driver is not None
        for name in names:
            char = _CHARACTERS.get(name, name if len(name) == 1 else None)
            event = events.Key(name, char)
            event.set_sender(self.app)
            driver.send_message(event)
            await self.rest()

    async def type(self, text: str, *, enter: bool = True) -> None:
        """Give a value at once, as a scanner does, and Enter."""
        focused = self.app.screen.focused
        assert focused is not None
        focused.post_message(events.Paste(text))
        await self.rest()
        if enter:
            await self.keys("enter")

    async def rest(self) -> None:
        """Wait until no slow work runs, no message waits and everything is drawn.

        Pilot's own waiting takes a tenth of a second a key; this takes as long as the work does.
        """
        quiet = 0
        for _ in range(2000):
            await self.pilot._wait_for_screen()
            await asyncio.sleep(_LOOK_SECONDS)
            quiet = quiet + 1 if self._quiet() else 0
            if quiet == _QUIET_LOOKS:
                break
        assert self.app._exception is None, self.app._exception

    def _quiet(self) -> bool:
        if not all(each.is_finished for each in self.app.workers):
            return False
        nodes = [self.app, *self.app.screen_stack, *self.app.screen.walk_children()]
        waiting = any(node.message_queue_size or node._next_callbacks for node in nodes)
        screen = self.app.screen
        drawn = not (screen._dirty_widgets or screen._layout_required or screen._callbacks)
        return drawn and not waiting

    async def sign_on(self, person: str = "t.okoro", word: str = WORD) -> None:
        """Sign on as a person."""
        await self.type(person)
        await self.type(word)

    def lines(self) -> list[str]:
        """What stands on the terminal, a string a line."""
        strips = self.app.screen._compositor.render_strips()
        return ["".join(segment.text for segment in strip).rstrip() for strip in strips]

    def text(self) -> str:
        """The same in one string."""
        return "\n".join(self.lines())


_CHARACTERS = {"enter": "\r", "space": " ", "tab": "\t", "question_mark": "?"}
_LOOK_SECONDS, _QUIET_LOOKS = 0.004, 3

Play = Callable[[Seen], Awaitable[None]]


def clock_of(job: Job) -> SetClock:
    """A clock that goes on where the job's stands."""
    now = job.clock.now()
    return SetClock(Moment(now.utc, now.offset_minutes, now.boot, now.uptime_ms))


def run_screen(
    book: Logbook,
    keys: KeyFolder,
    play: Play,
    *,
    size: tuple[int, int] = SMALL,
    place: str = "",
    point: str = "",
    look: str = "gaugelog-dark",
    **desk: Any,
) -> None:
    """Open the screen on a logbook and play."""
    drafts = desk.pop("drafts", keys.path / "drafts")
    app = FullScreen(Desk(book, keys, PlainMaker, drafts, **desk), place, point, look)

    async def act() -> None:
        async with app.run_test(size=size) as pilot:
            seen = Seen(app, pilot)
            await seen.rest()
            await play(seen)

    asyncio.run(act())


@dataclass(frozen=True)
class Prepared:
    """Folders of a job that stands at some step, to be copied for each test."""

    folder: Path
    clock: SetClock

    def copy(self, target: Path) -> Job:
        """A copy of it, opened, with its keys."""
        shutil.copytree(self.folder, target)
        now = self.clock.now()
        clock = SetClock(Moment(now.utc, now.offset_minutes, now.boot, now.uptime_ms))
        book = Logbook.open(target / "book", clock=clock)
        folder = KeyFolder(target / "keys", CHEAP_ROUNDS)
        keys = {person: folder.unlock(person, WORD) for person in folder.people()}
        return Job(book, clock, folder, keys)


def prepared(folder: Path, count: int = 0) -> Prepared:
    """A released job whose point FB-1 has walked `count` steps."""
    job = released_job(folder)
    job.walk(count)
    job.book.storage.close()
    return Prepared(folder, job.clock)


__all__ = ["LARGE", "SMALL", "Job", "Prepared", "Seen", "new_id", "prepared", "run_screen"]
