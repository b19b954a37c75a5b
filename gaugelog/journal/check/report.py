"""What a check found: every trouble with its step and its entry, and legal oddities as notices."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from gaugelog.journal.canonical import JsonValue
from gaugelog.journal.head import Head
from gaugelog.visible import counted

TITLES: dict[int, str] = {
    1: "Format",
    2: "Sequence",
    3: "Chain",
    4: "Bodies",
    5: "Deeds and signatures",
    6: "Certificates valid then",
    7: "Evidence",
    8: "Ledger rebuilt and compared",
}
"""The steps of the check by number."""


@dataclass(frozen=True, slots=True)
class Trouble:
    """One thing that is not as it should be: the step that saw it, where, what, what to do."""

    step: int
    where: str
    what: str
    remedy: str = ""


@dataclass(frozen=True, slots=True)
class Notice:
    """Something out of the ordinary that is no trouble."""

    where: str
    what: str


@dataclass(frozen=True, slots=True)
class StepResult:
    """What one step found; `skipped` when it was not asked for.

    `cut_short` when the storage failed before the step had seen every entry.
    """

    number: int
    title: str
    troubles: tuple[Trouble, ...]
    skipped: bool = False
    cut_short: bool = False

    @property
    def outcome(self) -> str:
        """`ok`, `trouble`, `not asked` or `not finished`."""
        if self.skipped:
            return "not asked"
        if self.troubles:
            return "trouble"
        return "not finished" if self.cut_short else "ok"


@dataclass(frozen=True, slots=True)
class Report:
    """The whole of a check: how many entries, up to which heads, and what each step found."""

    entries: int
    heads: tuple[Head, ...]
    steps: tuple[StepResult, ...]
    notices: tuple[Notice, ...]

    @property
    def ok(self) -> bool:
        """Whether no step found trouble."""
        return not self.troubles

    @property
    def troubles(self) -> tuple[Trouble, ...]:
        """Every trouble, by step and then by entry."""
        return tuple(trouble for step in self.steps for trouble in step.troubles)

    @property
    def summary(self) -> str:
        """The outcome in one sentence."""
        checked = counted(self.entries, "entry", "entries")
        heads = ", ".join(head.printed for head in self.heads)
        upto = f", head {heads}" if heads else ""
        if self.ok:
            return f"The journal is sound: {checked} checked{upto}."
        found = counted(len(self.troubles), "trouble")
        return f"The journal is NOT sound: {found} found in {checked}{upto}."

    def as_json(self) -> dict[str, JsonValue]:
        """The report as plain data."""
        return {
            "ok": self.ok,
            "entries": self.entries,
            "heads": [_head_json(head) for head in self.heads],
            "steps": [_step_json(step) for step in self.steps],
            "notices": [{"where": one.where, "what": one.what} for one in self.notices],
            "summary": self.summary,
        }


class Findings:
    """Gathers troubles and notices while the steps run, and puts them in order at the end."""

    def __init__(self) -> None:
        self._troubles: list[tuple[int, Trouble]] = []
        self._notices: list[Notice] = []
        self._cut_short: frozenset[int] = frozenset()

    def trouble(self, position: int, trouble: Trouble) -> None:
        """Note a trouble; `position` is the entry's place in the walk, to sort by."""
        self._troubles.append((position, trouble))

    def notice(self, where: str, what: str) -> None:
        """Note an oddity."""
        self._notices.append(Notice(where, what))

    def cut_short(self, *steps: int) -> None:
        """Note that steps did not see every entry."""
        self._cut_short |= frozenset(steps)

    def report(self, entries: int, heads: Sequence[Head], skipped: frozenset[int]) -> Report:
        """Everything found, step by step."""
        steps = tuple(
            StepResult(
                number,
                title,
                self._of_step(number),
                number in skipped,
                number in self._cut_short,
            )
            for number, title in TITLES.items()
        )
        return Report(entries, tuple(heads), steps, tuple(self._notices))

    def _of_step(self, number: int) -> tuple[Trouble, ...]:
        found = [item for item in self._troubles if item[1].step == number]
        return tuple(trouble for _, trouble in sorted(found, key=lambda item: item[0]))


def _head_json(head: Head) -> dict[str, JsonValue]:
    return {
        "chain": head.chain,
        "sequence": head.seq,
        "hash": head.hash.hex(),
        "printed": head.printed,
    }


def _step_json(step: StepResult) -> dict[str, JsonValue]:
    return {
        "number": step.number,
        "title": step.title,
        "outcome": step.outcome,
        "troubles": [
            {"where": one.where, "what": one.what, "remedy": one.remedy} for one in step.troubles
        ],
    }
