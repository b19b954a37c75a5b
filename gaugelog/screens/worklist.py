"""The worklist: every point by zone, what it needs next, what blocks it, what runs; yours first."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Sequence
from itertools import groupby
from typing import ClassVar

from textual import events
from textual.binding import Binding, BindingType
from textual.containers import Horizontal
from textual.content import Content
from textual.widget import Widget
from textual.widgets import Input, OptionList
from textual.widgets.option_list import Option

from gaugelog.screens.cursor import CursorList
from gaugelog.screens.room import Room, look_keys
from gaugelog.screens.words import (
    BAD,
    CALM,
    STATES,
    WAIT,
    Words,
    lines,
    plain,
    show_unseen,
    state_word,
)
from gaugelog.visible import visible
from gaugelog.work import looking
from gaugelog.work.looking import Listed

WANTED = {
    "step": "do the step",
    "hold": "decide the hold",
    "submit": "submit the record",
    "review": "review the record",
}
"""What a point may want of the person who looks."""

_YOURS = "For you now"


class WorklistScreen(Room):
    """Points one a line under their zone; typing finds, Enter opens."""

    about = (
        "Every point by its zone, what it needs next, what blocks it and what runs; what is yours "
        "to do stands first. Type a part of a label, zone or state to narrow the list, or scan a "
        "label; Enter opens the point under the cursor. The plan, the stock and the wiring are a "
        "key away."
    )

    BINDINGS: ClassVar[list[BindingType]] = [
        Binding("up", "cursor(-1)", "Up", show=False),
        Binding("down", "cursor(1)", "Down", show=False),
        Binding("pageup", "page(-1)", "Page up", show=False),
        Binding("pagedown", "page(1)", "Page down", show=False),
        Binding("escape", "clear", "All points", show=False),
        *look_keys("app.go"),
    ]

    def __init__(self) -> None:
        super().__init__()
        self._listed: list[Listed] = []
        self._shown: dict[str, Listed] = {}

    def title_text(self) -> str:
        """How many points, and how many of them are for the person here."""
        mine = sum(1 for each in self._listed if each.wanted)
        return (
            f"worklist: {len(self._listed)} points, {mine} for you" if self._listed else "worklist"
        )

    def body(self) -> Iterable[Widget]:
        """The field to find by, the list, and more of the point under the cursor."""
        yield Horizontal(
            Words("Find or scan a point", classes="asks"),
            Words("[", classes="bracket"),
            Input(id="find", compact=True),
            Words("]", classes="bracket"),
            id="finding",
            classes="field",
        )
        yield Words(id="columns")
        table = CursorList(id="points", markup=False)
        table.can_focus = False
        yield table
        yield Words(id="more")

    def on_mount(self) -> None:
        """Read the list."""
        self.query_one("#find", Input).focus()
        self.facts_changed()

    def on_resize(self, _event: events.Resize) -> None:
        """Columns go by the width."""
        self._draw()

    def facts_changed(self) -> None:
        """Read every point again, on another thread."""
        seat = self.desk.seat
        if seat is None:
            return
        book, person = self.desk.logbook, seat.person
        self.look_again(lambda: looking.for_person(book, person), self._read)

    def _read(self, listed: list[Listed]) -> None:
        if listed != self._listed:
            self._listed = listed
            self._draw()
        self.draw_bar()
        if not listed:
            self.tell("No plan is released. The planner loads one: gaugelog plan load FOLDER")

    def on_input_changed(self, event: Input.Changed) -> None:
        """What is typed narrows the list."""
        event.stop()
        show_unseen(event.input)
        self._draw()

    def on_input_submitted(self, event: Input.Submitted) -> None:
        """Enter opens the point whose label was typed or scanned, else the one under the cursor."""
        event.stop()
        typed = event.value.strip().casefold()
        exact = [each for each in self._listed if each.next.point.casefold() == typed]
        chosen = exact[0] if exact else self._under_cursor()
        if chosen is None:
            self.tell(plain(f"✗ No point is called “{event.value.strip()}”.", BAD))
            event.input.action_select_all()  # the next code takes its place
            return
        self._open(chosen)

    def on_option_list_option_selected(self, event: OptionList.OptionSelected) -> None:
        """A click opens the point."""
        event.stop()
        chosen = self._shown.get(event.option_id or "")
        if chosen is not None:
            self._open(chosen)

    def on_option_list_option_highlighted(self, event: OptionList.OptionHighlighted) -> None:
        """Tell more of the point under the cursor."""
        event.stop()
        self._draw_more()

    def action_cursor(self, by: int) -> None:
        """Move the cursor without leaving the field."""
        table = self.query_one("#points", OptionList)
        table.action_cursor_down() if by > 0 else table.action_cursor_up()

    def action_page(self, by: int) -> None:
        """Move the cursor by a page."""
        table = self.query_one("#points", OptionList)
        table.action_page_down() if by > 0 else table.action_page_up()  # type: ignore[no-untyped-call]

    def action_clear(self) -> None:
        """Show all points again."""
        self.query_one("#find", Input).value = ""
        self.tell("")

    def _open(self, chosen: Listed) -> None:
        self.query_one("#find", Input).value = ""
        place = "review" if chosen.wanted == "review" else "step"
        self.full.go(place, chosen.next.point)

    def _under_cursor(self) -> Listed | None:
        option = self.query_one("#points", OptionList).highlighted_option
        return None if option is None else self._shown.get(option.id or "")

    def _draw(self) -> None:
        table = self.query_one("#points", OptionList)
        before = self._under_cursor()
        found = [each for each in self._listed if _fits(each, self.query_one("#find", Input).value)]
        self._shown = {f"p{place}": each for place, each in enumerate(found)}
        widths = _widths(self.size.width or 80, found)
        self.query_one("#columns", Words).say(plain(_columns(widths), CALM))
        table.set_options(_options(self._shown, widths))
        self._restore_cursor(table, before)
        self._draw_more()

    def _restore_cursor(self, table: OptionList, before: Listed | None) -> None:
        names = {each.next.point: name for name, each in self._shown.items()}
        kept = names.get(before.next.point) if before is not None else None
        first = kept or next(iter(self._shown), None)
        if first is not None:
            table.highlighted = table.get_option_index(first)

    def _draw_more(self) -> None:
        chosen = self._under_cursor()
        self.query_one("#more", Words).say(plain("") if chosen is None else _more(chosen))


def _fits(each: Listed, typed: str) -> bool:
    wanted = typed.strip().casefold()
    found = each.next
    return not wanted or any(
        wanted in text.casefold() for text in (found.point, found.zone, found.state, found.title)
    )


def _widths(width: int, found: Sequence[Listed]) -> tuple[int, int, int, int]:
    """Widths of point, state, next step, and what holds it up; the last takes what is left."""
    point = max([5, *(len(visible(each.next.point)) for each in found)])
    point = min(point, 16)
    state = 17
    left = max(width - point - state - 10, 24)
    title = min(34, left * 6 // 10)
    return point, state, title, left - title


def _columns(widths: tuple[int, int, int, int]) -> str:
    return "   " + " ".join(
        _cell(name, width)
        for name, width in zip(
            ("point", "state", "next step", "what holds or runs"), widths, strict=True
        )
    )


def _options(shown: dict[str, Listed], widths: tuple[int, int, int, int]) -> Iterator[Option]:
    for heading, group in groupby(shown.items(), key=lambda item: _section(item[1])):
        yield Option(plain(f" {heading}", "bold $primary"), disabled=True)
        for name, each in group:
            yield Option(_row(each, widths), id=name)


def _section(each: Listed) -> str:
    return _YOURS if each.wanted else f"Zone {each.next.zone}"


def _row(each: Listed, widths: tuple[int, int, int, int]) -> Content:
    found = each.next
    point, state, title, held = widths
    sign, style = STATES.get(found.state, ("?", ""))
    told, told_style = _held(each)
    return Content.assemble(
        "   ",
        (_cell(found.point, point), "bold" if each.wanted else ""),
        " ",
        (_cell(f"{sign} {found.state}", state), style),
        " ",
        _cell(_next(each), title),
        " ",
        (_cell(told, held), told_style),
    )


def _next(each: Listed) -> str:
    found = each.next
    if found.step is None:
        return found.title if found.title != "none" else ""
    return f"{found.number}/{found.count} {found.title}"


def _held(each: Listed) -> tuple[str, str]:
    """What blocks a point, else the window that runs; short, for a line of the list."""
    found = each.next
    shut = [window.sentence for window in found.windows if not window.open]
    if shut:
        return f"◷ {_short(shut[0])}", WAIT
    if found.blocks:
        return f"! {found.blocks[0]}", BAD if found.step is not None else CALM
    if found.sent_back:
        return f"← {found.sent_back[-1]}", BAD
    running = [window.sentence for window in found.windows if "left" in window.sentence]
    if running:
        return f"◷ {_short(running[0])}", WAIT
    return (f"you: {WANTED[each.wanted]}", "") if each.wanted else ("", "")


def _short(sentence: str) -> str:
    """The last part of a window's sentence: `25 min to wait`."""
    return sentence.rpartition(": ")[2]


def _more(each: Listed) -> Content:
    found = each.next
    told = [plain(f"← {reason}", BAD) for reason in found.sent_back]
    told += [plain(window.sentence, "" if window.open else WAIT) for window in found.windows]
    told += [plain(f"! {block}", BAD) for block in found.forbidden if found.step is not None]
    yours = f"You may {WANTED[each.wanted]}: Enter." if each.wanted else ""
    return lines(
        Content.assemble(
            plain(f"{found.point}, zone {found.zone}: ", "bold"), state_word(found.state)
        ),
        plain(_next(each) + (f"   {yours}" if yours else "")),
        *told,
    )


def _cell(text: str, width: int) -> str:
    """Text in exactly `width` cells: filled with blanks, or cut with an ellipsis."""
    shown = Content(visible(text))
    return str(shown.truncate(width, ellipsis=True, pad=True))
