"""The demo's story: its people, its files, and what each of them does when."""

from __future__ import annotations

import tomllib
from collections.abc import Callable
from dataclasses import dataclass
from datetime import UTC, datetime
from functools import partial
from pathlib import Path
from typing import TYPE_CHECKING, Any

from gaugelog.commands.acts import Stage, play, title_of
from gaugelog.errors import MachineTrouble

if TYPE_CHECKING:
    from gaugelog.journal.clock import SetClock
    from gaugelog.journal.keys import KeyFolder, UnlockedKey
    from gaugelog.work.logbook import Logbook
    from gaugelog.work.ports import RecordMaker

PASSPHRASE = "gauge it twice"  # noqa: S105 (the demo's, printed by the demo)
_PACKAGE = Path(__file__).parent.parent


def demo_files() -> Path:
    """The folder of the demo's input files: in the installed package, or atop the source."""
    for folder in (_PACKAGE / "demo_project", _PACKAGE.parent / "demo_project"):
        if (folder / "story.toml").is_file():
            return folder
    raise MachineTrouble("The demo's files are missing here.", "Install Gaugelog again.")


@dataclass
class Story:
    """The story as read, and the logbook while it is played. Keys are unlocked once."""

    files: Path
    told: dict[str, Any]
    chapters: list[dict[str, Any]]
    clock: SetClock
    keys: dict[str, UnlockedKey]
    maker: RecordMaker
    logbook: Logbook | None = None

    def acts(self, home: Path) -> list[tuple[str, Callable[[], None]]]:
        """Everything that is played, in order: a title and the deed; `home` is the demo's."""
        first = [
            ("start the logbook, enrol people", lambda: self._start(home)),
            ("receive stock, enter meters", self._stock),
            ("load and release the plan", self._plan),
        ]
        played = [
            (title_of(act), partial(self._act, act, _usual(self.told["usual"], chapter)))
            for chapter in self.chapters
            for act in chapter["act"]
        ]
        return [*first, *played]

    def told_by_chapters(self, what: str) -> list[Any]:
        """What the chapters say to `look` at, or to type `next`, in their order."""
        return [line for chapter in self.chapters for line in chapter.get(what, ())]

    def book(self) -> Logbook:
        """The logbook, once it is started."""
        if self.logbook is None:
            raise AssertionError("the story begins with its first act")
        return self.logbook

    def _act(self, act: dict[str, Any], usual: dict[str, Any]) -> None:
        play(Stage(self.book(), self.clock, self.keys, self.maker, usual, self.files), act)

    def _start(self, home: Path) -> None:
        from gaugelog.work import people

        folders: dict[str, KeyFolder] = {}

        def keys_of(logbook_id: str) -> KeyFolder:
            from gaugelog.journal.keys import KeyFolder

            return folders.setdefault("keys", KeyFolder(home / "keys" / logbook_id))

        first, *others = (_newcomer(person) for person in self.told["person"])
        self.logbook = people.start(
            home / "logbook",
            keys_of=keys_of,
            name=self.told["name"],
            custodian=first,
            passphrase=PASSPHRASE,
            clock=self.clock,
        )
        keys = folders["keys"]
        self.keys[first.person] = keys.unlock(first.person, PASSPHRASE)
        authority = keys.unlock_authority(PASSPHRASE)
        for newcomer in others:
            self.clock.advance(60)
            self.keys[newcomer.person] = people.enrol(
                self.logbook,
                self.keys[first.person],
                authority,
                keys,
                newcomer=newcomer,
                passphrase=PASSPHRASE,
            )

    def _stock(self) -> None:
        from gaugelog.intake.instruments import load_instruments
        from gaugelog.intake.stock import load_stock
        from gaugelog.journal.ids import new_id
        from gaugelog.work import instruments, stock

        self.clock.advance(120)
        files = [self.files / "lots.csv", self.files / "consumables.csv"]
        planner = self.keys["p.lind"]
        stock.receive(self.book(), planner, load_stock(files, new_id=new_id))
        meters = load_instruments(self.files / "instruments.toml", new_id=new_id)
        instruments.add(self.book(), planner, meters)

    def _plan(self) -> None:
        from gaugelog.work import plan

        self.clock.advance(180)
        planner = self.keys["p.lind"]
        facts = plan.understand(self.book(), self.files / "plan")
        plan.load(self.book(), planner, facts)
        from gaugelog.work.meanings import RELEASE_MEANING

        plan.release(self.book(), planner, meaning=RELEASE_MEANING)


def read_story(maker: RecordMaker) -> Story:
    """The shipped story, ready to be played."""
    from gaugelog.journal.clock import Moment, SetClock
    from gaugelog.journal.ids import new_id

    files = demo_files()
    told = _told(files / "story.toml")
    begin = datetime.fromisoformat(told["start"].replace("Z", "+00:00")).astimezone(UTC)
    clock = SetClock(Moment(begin, 60, new_id(), 3_600_000))
    chapters = [_told(chapter) for chapter in sorted((files / "story").glob("*.toml"))]
    return Story(files, told, chapters, clock, {}, maker)


def _usual(general: dict[str, Any], chapter: dict[str, Any]) -> dict[str, Any]:
    """What is usual in a chapter: its own lines over the general ones, cell by cell."""
    lines = dict(general["step"])
    for step, line in chapter.get("usual", {}).items():
        lines[step] = {**lines.get(step, {}), **line}
    return {**general, "step": lines}


def _told(file: Path) -> dict[str, Any]:
    return tomllib.loads(file.read_text(encoding="utf-8"))


def _newcomer(person: dict[str, Any]) -> Any:
    from gaugelog.work.people import Newcomer

    return Newcomer(
        person["id"],
        person["name"],
        person["initials"],
        tuple(person["roles"]),
        tuple(person.get("qualifications", ())),
    )
