"""A point's evidence on one page, for the reviewer to accept it or return it."""

from __future__ import annotations

from collections.abc import Iterable
from typing import ClassVar

from textual import events
from textual.binding import Binding, BindingType
from textual.containers import VerticalScroll
from textual.widget import Widget

from gaugelog.screens import evidence_text as text
from gaugelog.screens.judge import AcceptDialog, ReturnDialog
from gaugelog.screens.room import Room
from gaugelog.screens.words import WAIT, Words, plain
from gaugelog.work import reviews
from gaugelog.work.reviewing import PointEvidence, evidence_of

_DIGITS = range(1, 10)
_PARTS = ("state", "bars", "checks", "skipped", "photos", "notes", "people", "story", "steps")


class EvidenceScreen(Room):
    """What was done and measured at one point; opened for any point, judged by who may."""

    about = (
        "All that was kept of one point. The checks with the smallest margin stand first; share "
        "is the margin as a part of the room: half the band between two limits, else the limit. "
        "Accept signs the record with your passphrase; Return sends the point back with a reason. "
        "Who did a step of the point, or signed its record, can't judge it. A digit opens a photo."
    )

    BINDINGS: ClassVar[list[BindingType]] = [
        Binding("f5", "accept", "Accept"),
        Binding("f7", "return", "Return"),
        Binding("o", "open_record", "Record"),
        *(Binding(str(key), f"open_photo({key})", f"Photo {key}", show=False) for key in _DIGITS),
        Binding("up", "scroll(-1)", "Up", show=False),
        Binding("down", "scroll(1)", "Down", show=False),
        Binding("pageup,b", "page(-1)", "Page up", show=False),
        Binding("pagedown,space", "page(1)", "Page down", show=False),
        Binding("home", "end(-1)", "Top", show=False),
        Binding("end", "end(1)", "Bottom", show=False),
        Binding("escape", "app.go('review')", "Queue"),
    ]

    def __init__(self, point: str) -> None:
        super().__init__()
        self.point = point
        self.found: PointEvidence | None = None
        self._own_deed = False
        """Whether the next change was made here, so that it needs no warning."""

    def title_text(self) -> str:
        """The point and its zone."""
        zone = f", zone {self.found.zone}" if self.found is not None else ""
        return f"review of {self.point}{zone}"

    def body(self) -> Iterable[Widget]:
        """One page that scrolls."""
        yield VerticalScroll(
            *(Words(id=name, classes="part") for name in _PARTS),
            id="evidence",
            can_focus=False,
        )

    def on_mount(self) -> None:
        """Read it."""
        self.facts_changed()

    def on_resize(self, _event: events.Resize) -> None:
        """Columns go by the width, once the new width is known."""
        self.call_after_refresh(self._draw)

    def facts_changed(self) -> None:
        """Read again, on another thread."""
        seat, book, point = self.desk.seat, self.desk.logbook, self.point
        if seat is not None:
            self.look_again(lambda: evidence_of(book, point, seat.person), self._read)

    def _read(self, found: PointEvidence) -> None:
        before, self.found = self.found, found
        if before is not None and _stands(before) != _stands(found):
            if not self._own_deed:
                self.tell(plain(f"! {self.point} is {found.state} now.", WAIT))
            self._own_deed = False
        if before != found:
            self._draw()
        self.draw_bar()
        self.refresh_bindings()

    def _draw(self) -> None:
        found = self.found
        if found is None or not self.query("#evidence"):
            return
        room = max(self.query_one("#evidence").size.width - 3, 60)
        for name, told in text.parts(found, room).items():
            words = self.query_one(f"#{name}", Words)
            words.say(told)
            words.display = bool(words.text)

    def action_accept(self) -> None:
        """Sign the record as its reviewer."""
        self.full.push_screen(AcceptDialog(self.point), self._judged)

    def action_return(self) -> None:
        """Send the point back, with a reason."""
        if self.found is not None:
            self.full.push_screen(ReturnDialog(self.found), self._judged)

    def _judged(self, sentence: str | None) -> None:
        if sentence is not None:
            self.tell(plain(f"✓ {sentence}"))
            self._own_deed = True
            self.facts_changed()

    def action_open_record(self) -> None:
        """Open the newest record in the viewer of this system."""
        book, viewer, point = self.desk.logbook, self.desk.viewer, self.point

        def act() -> str:
            found = reviews.record(book, point=point)
            viewer.open(found.pdf, f"{found.file_name}.pdf")
            return f"Opened {found.file_name}.pdf: {found.description}"

        self.in_background("Opening the record", act, self.tell)

    def action_open_photo(self, number: int) -> None:
        """Open a photo, as it was given, in the viewer of this system."""
        if self.found is None:
            return
        book, viewer, photo = self.desk.logbook, self.desk.viewer, self.found.photos[number - 1]

        def act() -> str:
            viewer.open(book.evidence.get(photo.file), f"{photo.file[:8]}-{photo.name}")
            return f"Opened photo {number}, {photo.name}"

        self.in_background("Opening the photo", act, self.tell)

    def action_scroll(self, by: int) -> None:
        """Move by a line."""
        self._pane().scroll_relative(y=by, animate=False)

    def action_page(self, by: int) -> None:
        """Move by a page."""
        pane = self._pane()
        pane.scroll_page_down(animate=False) if by > 0 else pane.scroll_page_up(animate=False)

    def action_end(self, by: int) -> None:
        """To the top, or the bottom."""
        pane = self._pane()
        pane.scroll_end(animate=False) if by > 0 else pane.scroll_home(animate=False)

    def _pane(self) -> VerticalScroll:
        return self.query_one("#evidence", VerticalScroll)

    def check_action(self, action: str, parameters: tuple[object, ...]) -> bool | None:
        """A key is shown only where it works now."""
        found = self.found
        if action == "accept":
            return found is not None and not found.bar and not found.blocks
        if action == "return":
            return found is not None and not found.bar
        if action == "open_photo":
            return found is not None and int(str(parameters[0])) <= len(found.photos)
        if action == "open_record":
            return found is not None and found.revision > 0
        return True


def _stands(found: PointEvidence) -> tuple[str, int]:
    return found.state, found.revision
