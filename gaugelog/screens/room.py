"""What every screen has: a bar that says where and who, a line of talk, the keys that work now."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Iterator
from dataclasses import dataclass
from datetime import timedelta
from typing import TYPE_CHECKING, TypeVar, cast

from textual.app import ComposeResult
from textual.binding import Binding
from textual.containers import Horizontal
from textual.content import Content
from textual.message import Message
from textual.screen import Screen
from textual.widget import Widget

from gaugelog.errors import GaugelogError
from gaugelog.screens.keys_line import KeysLine
from gaugelog.screens.words import CALM, WAIT, Words, defect, plain, told

if TYPE_CHECKING:
    from gaugelog.screens.app import FullScreen
    from gaugelog.screens.desk import Desk

T = TypeVar("T")

_WARN_SECONDS = 60.0
_DOING = "… "
"""What the talk begins with while slow work runs."""


def look_keys(action: str, *, show: bool = True) -> Iterator[Binding]:
    """Keys that lead to the screens to look at; `action` is that of the program, `go`."""
    for key, place, name in (
        ("f3", "review", "Review"),
        ("f4", "wiring", "Wiring"),
        ("f10", "stock", "Stock"),
        ("f12", "plan", "Plan"),
    ):
        yield Binding(key, f"{action}('{place}')", name, show=show)


class Room(Screen[None]):
    """A screen of Gaugelog. A subclass gives `title_text`, `body`, and what it does on a change.

    What is slow goes through `in_background`; what is to be said goes through `tell`.
    """

    about = ""
    """What the screen is for and how it is used, for the help."""

    @dataclass
    class Finished(Message):
        """Slow work has ended; `act` runs on the thread that draws."""

        act: Callable[[], None]

    @dataclass
    class Looked(Message):
        """A look at what is kept has ended; `act` runs on the thread that draws."""

        act: Callable[[], None]

    def __init__(self) -> None:
        super().__init__()
        self.place = ""
        """Where this is, as keys name it; see `places`."""
        self._looking = False
        self._look_due: Callable[[], None] | None = None
        self.ready = False
        """Whether its widgets are there: until then nothing is drawn or changed."""
        self._doing = ""
        self._since = 0.0
        self._where, self._who = Words(id="where"), Words(id="who")
        self._talk = Words(id="talk")

    @property
    def full(self) -> FullScreen:
        """The program this screen belongs to."""
        return cast("FullScreen", self.app)

    @property
    def desk(self) -> Desk:
        """The logbook and who sits at it."""
        return self.full.desk

    @property
    def busy(self) -> bool:
        """Whether slow work runs; a second Enter does nothing then."""
        return bool(self._doing)

    def title_text(self) -> str:
        """What this screen is about, for the bar."""
        return ""

    def body(self) -> Iterable[Widget]:
        """What stands between the bar and the talk."""
        return ()

    def facts_changed(self) -> None:
        """Something was kept, here or by another program, or time went on: look again."""

    def seat_changed(self) -> None:
        """Another person sits here, or the same one again: look again."""
        self.facts_changed()

    def leaving(self) -> None:
        """The program ends, or the desk is locked: put away what is half done."""

    def closing(self) -> None:
        """The person goes to another screen: put away what is half done."""
        self.leaving()

    def compose(self) -> ComposeResult:
        """The bar, the body, the talk, the keys."""
        with Horizontal(id="bar"):
            yield self._where
            yield self._who
        yield from self.body()
        yield self._talk
        yield KeysLine()

    def on_mount(self) -> None:
        """Fill the bar, and keep it so. Textual calls this besides a subclass's own `on_mount`."""
        self.ready = True
        show(self._talk, bool(self._talk.text))
        self.draw_bar()
        self.set_interval(0.5, self._draw_doing)

    def draw_bar(self) -> None:
        """Show where we are, who sits here, and the time of this machine."""
        book, seat = self.desk.logbook, self.desk.seat
        about = self.title_text()
        self._where.say(f" {book.name}" + (f" · {about}" if about else ""))
        moment = book.clock.now()
        clock = f"{moment.utc + timedelta(minutes=moment.offset_minutes):%H:%M}"
        who = seat.name if seat is not None else "nobody signed on"
        self._who.say(Content(" · ").join([plain(who), *self._left(), plain(f"{clock} ")]))

    def _left(self) -> list[Content]:
        left = self.desk.seconds_left
        soon = self.desk.seat is not None and left < _WARN_SECONDS
        return [plain(f"locks in {max(left, 0):.0f} s", f"bold {WAIT}")] if soon else []

    def tell(self, text: Content | str) -> None:
        """Say something to the person; it stands until something else is said."""
        self._talk.say(text)
        show(self._talk, bool(self._talk.text))

    def tell_error(self, error: GaugelogError) -> None:
        """Say what stopped a deed, and what to do."""
        self.tell(told(error))

    @property
    def talk(self) -> str:
        """What was said last."""
        return self._talk.text

    def in_background(
        self,
        doing: str,
        act: Callable[[], T],
        then: Callable[[T], None],
        failed: Callable[[GaugelogError], None] | None = None,
    ) -> None:
        """Do slow work on another thread, and say so; `then` gets its result on this one.

        While it runs nothing else is begun. What it raises is told, or given to `failed`.
        """
        if self.busy:
            return
        self._doing, self._since = doing, self.desk.ticks()
        tell = failed or self.tell_error

        def work() -> None:
            try:
                result = act()
            except GaugelogError as error:
                self._finish(lambda error=error: tell(error))  # type: ignore[misc]
            except Exception as error:  # a defect: said plainly, the screen stays
                self._finish(lambda error=error: self._tell_defect(error))  # type: ignore[misc]
            else:
                self._finish(lambda: then(result))

        self.run_worker(work, thread=True, group="slow", exit_on_error=False)

    def look_again(self, act: Callable[[], T], then: Callable[[T], None]) -> None:
        """Look at what is kept, on another thread, and say nothing of it unless it fails.

        The keys work meanwhile, and what was told stands. While one look runs, the last one that
        was asked for waits its turn: it is for who sits here now, and sees what is kept by then.
        """
        if self._looking:
            self._look_due = lambda: self.look_again(act, then)
            return
        self._looking = True

        def work() -> None:
            try:
                result = act()
            except GaugelogError as error:
                self._seen(lambda error=error: self.tell_error(error))  # type: ignore[misc]
            except Exception as error:  # a defect: said plainly, the screen stays
                self._seen(lambda error=error: self._tell_defect(error))  # type: ignore[misc]
            else:
                self._seen(lambda: then(result))

        self.run_worker(work, thread=True, group="look", exit_on_error=False)

    def _seen(self, act: Callable[[], None]) -> None:
        self.post_message(self.Looked(act))

    def on_room_looked(self, message: Room.Looked) -> None:
        """A look has ended: show what was found."""
        message.stop()
        self._looking = False
        due, self._look_due = self._look_due, None
        if self.is_mounted:
            message.act()
            if due is not None:
                due()

    def _finish(self, act: Callable[[], None]) -> None:
        self.post_message(self.Finished(act))

    def on_room_finished(self, message: Room.Finished) -> None:
        """Slow work ended: say or show what came of it."""
        message.stop()
        self._doing = ""
        if self.app.is_running:
            if self.talk.startswith(_DOING):
                self.tell("")
            message.act()

    def _tell_defect(self, error: Exception) -> None:
        self.tell(defect(error))

    def _draw_doing(self) -> None:
        if self._doing:
            seconds = self.desk.ticks() - self._since
            self.tell(plain(f"{_DOING}{self._doing} ({seconds:.0f} s)", CALM))


def show(widget: Widget, shown: bool) -> None:
    """Show a widget, or leave its room to others."""
    widget.display = shown
