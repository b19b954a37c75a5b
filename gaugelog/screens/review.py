"""Review: the queue of points whose records wait for a second person."""

from __future__ import annotations

from collections.abc import Iterable

from textual.content import Content

from gaugelog.screens.columns import Cell, Column
from gaugelog.screens.evidence_text import moment
from gaugelog.screens.listing import Listing, Row
from gaugelog.screens.words import CALM, WAIT, lines, plain, state_word
from gaugelog.work.reviewing import Waiting, waiting_for_review

Queue = dict[str, Waiting]


class ReviewScreen(Listing[Queue]):
    """Points under review; Enter opens the evidence of one."""

    about = (
        "Records that wait for a second person. Enter opens the evidence of the point under the "
        "cursor. Points where you did a step are not yours to judge; they stand below."
    )

    finds = "Find or scan a point"
    columns = (
        Column("point", least=6),
        Column("zone", least=6),
        Column("revision", number=True),
        Column("signed by", least=10),
        Column("waits since"),
        Column("yours?", least=10),
    )

    def title_text(self) -> str:
        """How many wait, and how many of them the person here may judge."""
        if self.found is None:
            return "review"
        mine = sum(not each.bar for each in self.found.values())
        return f"review: {len(self.found)} wait, {mine} for you"

    def read(self, person: str) -> Queue:
        """The points under review, by label."""
        return {each.point: each for each in waiting_for_review(self.desk.logbook, person)}

    def rows(self, found: Queue) -> Iterable[Row]:
        """Those for the person here first."""
        for mine in (True, False):
            for each in found.values():
                if mine == (not each.bar):
                    yield _row(each)

    def more(self, found: Queue, name: str, width: int) -> Content:
        """Who signed, and whether the person here may judge it."""
        each = found[name]
        head = Content.assemble(
            plain(f"{each.point}, zone {each.zone}: ", "bold"), state_word("awaiting review")
        )
        yours = plain(f"✗ Not for you: {each.bar}", WAIT) if each.bar else plain("Enter: open it.")
        return lines(head, plain(f"signed by {each.submitted_by}"), yours)

    def nothing(self) -> str:
        """The queue is empty."""
        return "Nothing waits for review."

    def chosen(self, name: str) -> None:
        """Open its evidence."""
        self.full.go("review", name)

    def clicked(self, name: str) -> None:
        """The same."""
        self.chosen(name)


def _row(each: Waiting) -> Row:
    return Row(
        each.point,
        "Not for you" if each.bar else "For you",
        (
            Cell(each.point, "" if each.bar else "bold"),
            Cell(each.zone),
            Cell(str(each.revision)),
            Cell(each.submitted_by),
            Cell(moment(each.submitted_at)),
            Cell("– not yours", CALM) if each.bar else Cell("▸ yes"),
        ),
    )
