"""A screen with a list to look things up in: find or scan, move, and read more beside it."""

from __future__ import annotations

from abc import abstractmethod
from collections.abc import Iterable, Iterator, Mapping, Sequence
from dataclasses import dataclass
from itertools import groupby
from typing import ClassVar, Generic, TypeVar

from textual import events
from textual.binding import Binding, BindingType
from textual.containers import Container, Horizontal, Vertical, VerticalScroll
from textual.content import Content
from textual.widget import Widget
from textual.widgets import Input, OptionList
from textual.widgets.option_list import Option

from gaugelog.errors import GaugelogError
from gaugelog.screens.columns import Cell, Column, heading, line, widths
from gaugelog.screens.cursor import CursorList
from gaugelog.screens.room import Room, look_keys
from gaugelog.screens.words import BAD, Words, plain

T = TypeVar("T")

_EDGE = 3
"""Cells of a line that belong to no column: a blank before, the scroll bar and a blank after."""


@dataclass(frozen=True, slots=True)
class Row:
    """One line: what it is called, under which heading it stands, its cells, and words to find.

    `kind` tells apart what goes by one name: `key` is what the list knows the line by.
    """

    name: str
    section: str
    cells: tuple[Cell, ...]
    words: str = ""
    kind: str = ""

    @property
    def key(self) -> str:
        """Its kind and its name: no two lines of a list have the same."""
        return f"{self.kind} {self.name}" if self.kind else self.name


class Listing(Room, Generic[T]):
    """A list by sections, with more about the line under the cursor.

    A subclass gives `finds`, `columns`, `read`, `rows` and `more`.
    """

    BINDINGS: ClassVar[list[BindingType]] = [
        Binding("up", "cursor(-1)", "Up", show=False),
        Binding("down", "cursor(1)", "Down", show=False),
        Binding("pageup", "page(-1)", "Page up", show=False),
        Binding("pagedown", "page(1)", "Page down", show=False),
        Binding("ctrl+up", "more(-1)", "Details up", show=False),
        Binding("ctrl+down", "more(1)", "Details down", show=False),
        Binding("escape", "clear", "Show all", show=False),
        *look_keys("app.go"),
    ]

    finds = "Find"
    columns: tuple[Column, ...] = ()

    def __init__(self) -> None:
        super().__init__()
        self.found: T | None = None
        self._all: tuple[Row, ...] = ()
        self._rows: dict[str, Row] = {}
        self._drawn: tuple[int, dict[str, Content]] = (0, {})
        self._asked = ("", -1)

    @abstractmethod
    def read(self, person: str) -> T:
        """What is known, for `person`; on another thread. Raises GaugelogError."""

    @abstractmethod
    def rows(self, found: T) -> Iterable[Row]:
        """The lines, those of one section one after the other."""

    def more(self, found: T, name: str, width: int) -> Content:
        """More about a line, by its key, for a pane so wide."""
        return plain("")

    def nothing(self) -> str:
        """What is said where the list is empty."""
        return ""

    def chosen(self, name: str) -> None:
        """Enter on a line: the whole list again, with the cursor there."""
        self.action_clear()
        self._go_to(name)

    def body(self) -> Iterable[Widget]:
        """The field to find by, the list, and more of the line under the cursor."""
        yield Horizontal(
            Words(self.finds, classes="asks"),
            Words("[", classes="bracket"),
            Input(id="find", compact=True),
            Words("]", classes="bracket"),
            id="finding",
            classes="field",
        )
        lines = CursorList(id="lines", markup=False)
        lines.can_focus = False
        yield Container(
            Vertical(Words(id="columns"), lines, id="list"),
            VerticalScroll(Words(id="detail"), id="details", can_focus=False),
            id="look",
        )

    def on_mount(self) -> None:
        """Read what there is."""
        self.query_one("#find", Input).focus()
        self.facts_changed()

    def on_resize(self, _event: events.Resize) -> None:
        """Columns go by the width, once the new width is known."""
        self.call_after_refresh(self._draw)

    def facts_changed(self) -> None:
        """Read again, on another thread, if something was kept since or somebody else looks."""
        seat = self.desk.seat
        if seat is None:
            return
        try:
            asked = (seat.person, self.desk.logbook.head().seq)
        except GaugelogError as error:
            self.tell_error(error)
            return
        if asked != self._asked:
            self.look_again(lambda: (asked, self.read(seat.person)), self._read)

    def _read(self, answer: tuple[tuple[str, int], T]) -> None:
        if self.found is None:
            self.tell("")  # what kept it from being read
        self._asked, self.found = answer
        self._all, self._drawn = tuple(self.rows(self.found)), (0, {})
        self._draw()
        self.draw_bar()
        if not self._rows and not self.query_one("#find", Input).value:
            self.tell(self.nothing())

    def on_input_changed(self, event: Input.Changed) -> None:
        """What is typed narrows the list."""
        event.stop()
        self._draw()

    def on_input_submitted(self, event: Input.Submitted) -> None:
        """Enter: the line whose name was typed or scanned, else the one under the cursor."""
        event.stop()
        typed = event.value.strip().casefold()
        exact = [key for key, row in self._rows.items() if row.name.casefold() == typed]
        name = exact[0] if exact else self.under_cursor
        if name:
            self.tell("")
            self.chosen(name)
        elif typed:
            self.tell(plain(f"✗ Nothing here is called “{event.value.strip()}”.", BAD))
            event.input.action_select_all()  # the next code takes its place

    def on_option_list_option_selected(self, event: OptionList.OptionSelected) -> None:
        """A click is as good as the cursor."""
        event.stop()
        if event.option_id:
            self.clicked(event.option_id)

    def clicked(self, name: str) -> None:
        """A line was clicked; the cursor is there already."""

    def on_option_list_option_highlighted(self, event: OptionList.OptionHighlighted) -> None:
        """Tell more of the line under the cursor."""
        event.stop()
        self._draw_more()

    @property
    def under_cursor(self) -> str:
        """The key of the line under the cursor, or empty."""
        option = self.query_one("#lines", OptionList).highlighted_option
        return "" if option is None else option.id or ""

    def action_cursor(self, by: int) -> None:
        """Move the cursor without leaving the field."""
        lines = self.query_one("#lines", OptionList)
        lines.action_cursor_down() if by > 0 else lines.action_cursor_up()

    def action_page(self, by: int) -> None:
        """Move the cursor by a page."""
        lines = self.query_one("#lines", OptionList)
        lines.action_page_down() if by > 0 else lines.action_page_up()  # type: ignore[no-untyped-call]

    def action_more(self, by: int) -> None:
        """Show what does not fit beside the list."""
        pane = self.query_one("#details", VerticalScroll)
        pane.scroll_page_down(animate=False) if by > 0 else pane.scroll_page_up(animate=False)

    def action_clear(self) -> None:
        """Show the whole list again."""
        name = self.under_cursor
        with self.prevent(Input.Changed):
            self.query_one("#find", Input).value = ""
        self.tell("")
        self._draw()
        self._go_to(name)

    def _go_to(self, name: str) -> None:
        if name in self._rows:
            lines = self.query_one("#lines", OptionList)
            lines.highlighted = lines.get_option_index(name)

    def _draw(self) -> None:
        if self.found is None or not self.query("#lines"):
            return
        lines = self.query_one("#lines", OptionList)
        before = self.under_cursor
        typed = self.query_one("#find", Input).value.strip().casefold()
        shown = [row for row in self._all if _fits(row, typed)]
        self._rows = {row.key: row for row in shown}
        lines.set_options(_options(shown, self._lines()))
        self._go_to(before if before in self._rows else next(iter(self._rows), ""))
        self._draw_more()

    def _lines(self) -> dict[str, Content]:
        """Each line as it is drawn in the room there is: once, not at every letter typed."""
        room = (self.query_one("#list").size.width or self.size.width) - _EDGE
        if room != self._drawn[0]:
            wide = widths(self.columns, [row.cells for row in self._all], room)
            drawn = {row.key: line(self.columns, row.cells, wide) for row in self._all}
            self._drawn = (room, drawn)
            head = heading(self.columns, wide)
            self.query_one("#columns", Words).say(Content.assemble(" ", head))
        return self._drawn[1]

    def _draw_more(self) -> None:
        name = self.under_cursor
        pane = self.query_one("#details", VerticalScroll)
        told = plain("")
        if self.found is not None and name in self._rows:
            told = self.more(self.found, name, max(pane.size.width - 3, 40))
        self.query_one("#detail", Words).say(told)
        pane.scroll_home(animate=False)


def _fits(row: Row, typed: str) -> bool:
    texts = (row.name, row.section, row.words, *(cell.text for cell in row.cells))
    return not typed or any(typed in text.casefold() for text in texts)


def _options(shown: Sequence[Row], lines: Mapping[str, Content]) -> Iterator[Option]:
    for section, group in groupby(shown, key=lambda row: row.section):
        if section:
            yield Option(plain(f" {section}", "bold $primary"), disabled=True)
        for row in group:
            yield Option(Content.assemble(" ", lines[row.key]), id=row.key)
