"""Review: the points whose records wait for a second person."""

from __future__ import annotations

from collections.abc import Iterable

from textual.widget import Widget

from gaugelog.screens.room import Room
from gaugelog.screens.words import Words, lines, plain
from gaugelog.work import looking


class ReviewScreen(Room):
    """The queue of points under review; `point` is the one asked for, if any."""

    def __init__(self, point: str = "") -> None:
        super().__init__()
        self.point = point

    def title_text(self) -> str:
        """The point, if one was asked for."""
        return f"review {self.point}".strip()

    def body(self) -> Iterable[Widget]:
        """The queue."""
        yield Words(id="queue")

    def on_mount(self) -> None:
        """Read the queue."""
        self.facts_changed()

    def facts_changed(self) -> None:
        """Read again which points wait."""
        seat = self.desk.seat
        listed = looking.for_person(self.desk.logbook, seat.person if seat is not None else "")
        waiting = [each for each in listed if each.next.state == "awaiting review"]
        told = [
            plain(
                f"{each.next.point}, zone {each.next.zone}"
                + ("" if each.wanted else ": not yours to review")
            )
            for each in waiting
        ]
        self.query_one("#queue", Words).say(
            lines(*told) if told else plain("Nothing waits for review.")
        )
