"""The acts of the demo's story: walk, check, photo, submit, return, accept, amend, replace."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass, field
from datetime import timedelta
from pathlib import Path
from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    from gaugelog.journal.clock import SetClock
    from gaugelog.journal.keys import UnlockedKey
    from gaugelog.rules.progress import NextStep
    from gaugelog.work.logbook import Logbook
    from gaugelog.work.ports import RecordMaker

PLAYED_BY = {
    "walk": "technician",
    "check": "technician",
    "photo": "technician",
    "submit": "technician",
    "amend": "technician",
    "replace": "technician",
    "return": "reviewer",
    "accept": "reviewer",
}
"""The acts that a chapter may hold, and who usually plays each."""


class StoryFault(Exception):
    """The story does not fit the logbook that it is played in: a defect of its files."""


@dataclass(frozen=True)
class Stage:
    """What every act needs: logbook, clock, unlocked keys, what is usual, the story's files."""

    book: Logbook
    clock: SetClock
    keys: Mapping[str, UnlockedKey]
    maker: RecordMaker
    usual: Mapping[str, Any]
    files: Path


def title_of(act: Mapping[str, Any]) -> str:
    """The act in a few words: `walk FB-1 until coated`."""
    kind = _kind(act)
    until = f" until {act['until']}" if "until" in act else ""
    points = act[kind] if isinstance(act[kind], str) else ", ".join(act[kind])
    return f"{kind} {points}{until}"


def play(stage: Stage, act: Mapping[str, Any]) -> None:
    """Play one act. Raises StoryFault when it does not fit."""
    kind = _kind(act)
    _wait(stage, act)
    key = stage.keys[act.get("by", stage.usual[PLAYED_BY[kind]])]
    if kind == "walk":
        _Walk(stage, act, key, _lines(act.get("typed", {}))).play()
    else:
        _DEEDS[kind](stage, act, key)


def _wait(stage: Stage, act: Mapping[str, Any]) -> None:
    """Let the clock run to `at` (a time at the place of work), then for `wait` minutes."""
    now = stage.clock.now()
    if "at" in act:
        here = now.utc + timedelta(minutes=now.offset_minutes)
        ahead = (act["at"] - here.replace(tzinfo=None)).total_seconds()
        if ahead < 0:
            raise StoryFault(f"{title_of(act)}: {act['at']} is past, it is {here:%d %B %H:%M}")
        stage.clock.advance(ahead)
    stage.clock.advance(60 * act.get("wait", 0))


def _kind(act: Mapping[str, Any]) -> str:
    kinds = [kind for kind in PLAYED_BY if kind in act]
    if len(kinds) != 1:
        raise StoryFault(f"An act is one of {', '.join(PLAYED_BY)}: {dict(act)}")
    return kinds[0]


def _submit(stage: Stage, act: Mapping[str, Any], key: UnlockedKey) -> None:
    from gaugelog.work import reviews
    from gaugelog.work.meanings import SUBMIT_MEANING

    reviews.submit(stage.book, key, stage.maker, point=act["submit"], meaning=SUBMIT_MEANING)


def _accept(stage: Stage, act: Mapping[str, Any], key: UnlockedKey) -> None:
    from gaugelog.work import reviews
    from gaugelog.work.meanings import ACCEPT_MEANING

    reviews.accept(stage.book, key, stage.maker, point=act["accept"], meaning=ACCEPT_MEANING)


def _give_back(stage: Stage, act: Mapping[str, Any], key: UnlockedKey) -> None:
    from gaugelog.work import reviews

    redo_from = act.get("redo_from", "")
    reviews.give_back(
        stage.book, key, point=act["return"], reason=act["reason"], redo_from=redo_from
    )


def _amend(stage: Stage, act: Mapping[str, Any], key: UnlockedKey) -> None:
    from gaugelog.work.amend import amend

    redo_from = act.get("redo_from", "")
    amend(stage.book, key, point=act["amend"], reason=act["reason"], redo_from=redo_from)


def _replace(stage: Stage, act: Mapping[str, Any], key: UnlockedKey) -> None:
    from gaugelog.work import dispositions
    from gaugelog.work.meanings import REPLACE_MEANING

    dispositions.replace(
        stage.book, key, point=act["replace"], reason=act["reason"], meaning=REPLACE_MEANING
    )


def _check(stage: Stage, act: Mapping[str, Any], key: UnlockedKey) -> None:
    from gaugelog.work import shift

    told = {name: act[name] for name in ("reference", "value", "reads")}
    if shift.check(stage.book, key, meter=act["check"], **told).fact.outcome != "pass":
        raise StoryFault(f"{title_of(act)}: does not agree")


def _photo(stage: Stage, act: Mapping[str, Any], key: UnlockedKey) -> None:
    from gaugelog.intake.pictures import load_pictures
    from gaugelog.work import photos

    pictures = load_pictures([stage.files / act["file"]])
    step, note = act.get("step", ""), act.get("note", "")
    photos.add(stage.book, key, pictures, point=act["photo"], step=step, note=note)


_DEEDS: dict[str, Callable[[Stage, Mapping[str, Any], UnlockedKey], None]] = {
    "check": _check,
    "photo": _photo,
    "submit": _submit,
    "accept": _accept,
    "return": _give_back,
    "amend": _amend,
    "replace": _replace,
}


def _lines(typed: Mapping[str, Any]) -> dict[str, list[dict[str, Any]]]:
    """What is typed at each step, a list of attempts; one line alone is the only attempt."""
    return {
        step: [dict(each) for each in (lines if isinstance(lines, list) else [lines])]
        for step, lines in typed.items()
    }


@dataclass
class _Walk:
    """The steps of one point, or of several that share a circuit, one after the other.

    Each point goes as far as it can, then it is the next one's turn. Lines are taken off as they
    are typed.
    """

    stage: Stage
    act: Mapping[str, Any]
    key: UnlockedKey
    lines: dict[str, list[dict[str, Any]]]
    usual_typed: set[tuple[str, str]] = field(default_factory=set)

    def play(self) -> None:
        """To `until`, or to the end of the route; every line of the act has to be typed."""
        points = self.act["walk"]
        open_points = [points] if isinstance(points, str) else list(points)
        while open_points:
            ends = [self._walk(point) for point in open_points]
            if not any(moved for moved, _ in ends):
                raise StoryFault(f"{title_of(self.act)}: comes no further")
            open_points = [
                point for point, (_, waits) in zip(open_points, ends, strict=True) if waits
            ]
        left = [step for step, lines in self.lines.items() if lines]
        if left:
            raise StoryFault(f"{title_of(self.act)}: never came to {', '.join(left)}")

    def _walk(self, point: str) -> tuple[bool, bool]:
        """Walk a point until it waits for another or comes to its end: moved, waits."""
        from gaugelog.work import steps

        moved, until = False, self.act.get("until", "")
        while (found := steps.next_step(self.stage.book, point)).step is not None:
            if found.step.id == until:
                return True, False
            if found.forbidden:
                return moved, True
            self._step(found, found.step.id)
            moved = True
        return True, False

    def _step(self, found: NextStep, step: str) -> None:
        from gaugelog.work import steps

        line = self._line(step, found.subject_label)
        self.stage.clock.advance(60 * line.pop("wait"))
        point, book = found.point, self.stage.book
        if "skip" in line:
            steps.skip(book, self.key, point=point, reason=line["skip"])
            return
        told = {name: line.pop(name) for name in ("reason", "note", "refuse") if name in line}
        hold = found.step is not None and found.step.hold
        key = self.stage.keys[self.stage.usual["second"]] if hold else self.key
        steps.do(book, key, point=point, typed=line, **told)

    def _line(self, step: str, subject: str) -> dict[str, Any]:
        """The next line for this step: of this grid or circuit, or of the step, or the usual."""
        usual = self.stage.usual["step"].get(step, {"wait": 5})
        for name in (f"{step} {subject}", step):
            if self.lines.get(name):
                return {**usual, **self.lines[name].pop(0)}
        if (step, subject) in self.usual_typed:
            raise StoryFault(f"{title_of(self.act)}: what is usual did not settle {step}")
        self.usual_typed.add((step, subject))
        return dict(usual)
