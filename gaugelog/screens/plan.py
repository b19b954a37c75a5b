"""Plan: what the plan check refuses, warns of, and finds to fit, each with figure and source."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass

from textual.content import Content

from gaugelog.rules.fit import Level, PlanFinding
from gaugelog.screens.columns import Cell, Column
from gaugelog.screens.listing import Listing, Row
from gaugelog.screens.words import BAD, CALM, GOOD, WAIT, lines, plain
from gaugelog.work import plan
from gaugelog.work.plan import PlanHead

LEVELS: dict[Level, tuple[str, str, str, str]] = {
    "refusal": ("✗", BAD, "refusal", "Refused: the plan can't be released so"),
    "warning": ("!", WAIT, "warning", "Warnings: they do not stop a release, and are kept with it"),
    "ok": ("✓", GOOD, "fits", "Fits"),
}
"""Of each level: sign, style, word, and the heading of its section."""


@dataclass(frozen=True, slots=True)
class Checked:
    """The plan that was checked, and what was found, by a name of its own each."""

    head: PlanHead
    findings: dict[str, PlanFinding]


class PlanScreen(Listing[Checked]):
    """Findings of the plan check, refusals first."""

    about = (
        "What the plan check found: what it refuses first, then warnings, then what fits, each "
        "with the figure that decided and its source. A draft is checked as it would be released."
    )

    finds = "Find a point, circuit, lot or subject"
    columns = (
        Column(""),
        Column("about", least=10),
        Column("finding", least=24),
        Column("figure", least=10),
    )

    def title_text(self) -> str:
        """Which plan, its revision, and the count of findings."""
        if self.found is None:
            return "plan"
        head = self.found.head
        counts = " ".join(f"{self.count(level)}{each[0]}" for level, each in LEVELS.items())
        return f"plan {head.label} revision {head.revision}, {head.state}: {counts}"

    def count(self, level: Level) -> int:
        """How many findings are of a level."""
        found = self.found.findings.values() if self.found is not None else ()
        return sum(each.level == level for each in found)

    def read(self, person: str) -> Checked:
        """Check the plan as it would be released."""
        book = self.desk.logbook
        found = plan.check(book)
        return Checked(
            plan.head(book), {f"finding {place}": each for place, each in enumerate(found)}
        )

    def rows(self, found: Checked) -> Iterable[Row]:
        """One finding a line."""
        for name, each in found.findings.items():
            sign, style, _word, section = LEVELS[each.level]
            cells = (Cell(sign, style), Cell(each.subject), Cell(each.what), Cell(each.figure))
            yield Row(name, section, cells, f"{each.level} {each.source}")

    def more(self, found: Checked, name: str, width: int) -> Content:
        """The whole finding, with figure and source."""
        each = found.findings[name]
        sign, style, word, _section = LEVELS[each.level]
        told = [plain(f"{sign} {word}: {each.subject}", f"bold {style}"), plain(each.what)]
        if each.figure:
            told.append(Content.assemble(plain("figure  ", CALM), plain(each.figure)))
        if each.source:
            told.append(Content.assemble(plain("source  ", CALM), plain(each.source)))
        return lines(*told)
