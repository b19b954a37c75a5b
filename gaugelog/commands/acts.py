"""The acts of the demo's story: walk a point, submit, return, accept, amend, replace a gauge."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass, field
from typing import TYPE_CHECKING, Any

if TYPE_CHECKING:
    from gaugelog.journal.clock import SetClock
    from gaugelog.journal.keys import UnlockedKey
    from gaugelog.rules.progress import NextStep
    from gaugelog.work.logbook import Logbook
    from gaugelog.work.ports import RecordMaker

PLAYED_BY = {
    "walk": "technician",
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
    """What every act needs: the logbook, its clock, the unlocked keys, and what is usual."""

    book: Logbook
    clock: SetClock
    keys: Mapping[str, UnlockedKey]
    maker: RecordMaker
    usual: Mapping[str, Any]


def title_of(act: Mapping[str, Any]) -> str:
    """The act in a few words: `walk FB-1 until coated`."""
    kind = _kind(act)
    until = f" until {act['until']}" if "until" in act else ""
    return f"{kind} {act[kind]}{until}"


def play(stage: Stage, act: Mapping[str, Any]) -> None:
    """Play one act. Raises StoryFault when it does not fit."""
    kind = _kind(act)
    stage.clock.advance(60 * act.get("wait", 0))
    key = stage.keys[act.get("by", stage.usual[PLAYED_BY[kind]])]
    if kind == "walk":
        _Walk(stage, act, key, _lines(act.get("typed", {}))).play()
    else:
        _SIGNED[kind](stage, act, key)


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
    from gaugelog.commands.disposition import REPLACE_MEANING
    from gaugelog.work import dispositions

    dispositions.replace(
        stage.book, key, point=act["replace"], reason=act["reason"], meaning=REPLACE_MEANING
    )


_SIGNED: dict[str, Callable[[Stage, Mapping[str, Any], UnlockedKey], None]] = {
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
    """A point's steps, one after the other. Lines are taken off as they are typed."""

    stage: Stage
    act: Mapping[str, Any]
    key: UnlockedKey
    lines: dict[str, list[dict[str, Any]]]
    usual_typed: set[tuple[str, str]] = field(default_factory=set)

    def play(self) -> None:
        """To `until`, or to the end of the route; every line of the act has to be typed."""
        from gaugelog.work import steps

        point, until = self.act["walk"], self.act.get("until", "")
        while True:
            found = steps.next_step(self.stage.book, point)
            if found.step is None or found.step.id == until:
                break
            self._step(found, found.step.id)
        left = [step for step, lines in self.lines.items() if lines]
        if left or (until and found.step is None):
            raise StoryFault(f"{title_of(self.act)}: never came to {', '.join(left) or until}")

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
