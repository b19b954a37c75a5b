"""The full screen as one program: who sits there, which screen is open, what happens meanwhile."""

from __future__ import annotations

import os
from collections.abc import Callable, Iterable
from functools import partial
from pathlib import Path
from typing import TYPE_CHECKING, Any, ClassVar

from textual import events
from textual.app import App, SystemCommand
from textual.binding import Binding, BindingType
from textual.screen import Screen
from textual.widgets import Input

from gaugelog.errors import GaugelogError
from gaugelog.screens import places
from gaugelog.screens.desk import Desk, Opening, Seat
from gaugelog.screens.dialog import Dialog
from gaugelog.screens.help import HelpDialog, keys_of
from gaugelog.screens.palette import PointCommands
from gaugelog.screens.room import Room, look_keys
from gaugelog.screens.sign_on import SignOn
from gaugelog.screens.themes import THEMES, first_theme, next_theme

if TYPE_CHECKING:
    from gaugelog.screens.drafts import Drafts

TICK_SECONDS = 1.0
LOOK_AGAIN_TICKS = 15
"""Windows and cures run: what is shown is read anew this often even if nothing was kept."""


class FullScreen(App[None]):
    """Gaugelog on the whole terminal. `place` and `point` say where it opens after sign-on.

    `desk` may be a function that opens the logbook: it is called on another thread, while the
    sign-on stands there already. `look` names a theme; empty: by the terminal.
    """

    TITLE = "Gaugelog"
    CSS_PATH = Path(__file__).with_name("look.tcss")
    HORIZONTAL_BREAKPOINTS = [(0, "-narrow"), (110, "-wide")]  # noqa: RUF012 (as App has it)
    COMMANDS = App.COMMANDS | {PointCommands}
    BINDINGS: ClassVar[list[BindingType]] = [
        Binding("f2", "go('worklist')", "Worklist"),
        *look_keys("go", show=False),
        Binding("f8", "hand_over", "Hand over", priority=True),
        Binding("f1", "help", "Help", priority=True),
        Binding("ctrl+t", "next_look", "Other colours", show=False),
        Binding("ctrl+q,ctrl+c", "quit", "Leave", priority=True, show=False),
    ]

    def __init__(
        self, desk: Desk | Callable[[], Desk], place: str = "", point: str = "", look: str = ""
    ) -> None:
        super().__init__()
        self.opening = Opening(desk)
        self._place, self._point = place, point
        self._look = look or first_theme(os.environ)
        self._head = 0
        self._ticks = 0
        self.defect: Exception | None = None
        """What nobody foresaw, and ended the program; told by who opened the screen."""

    def on_mount(self) -> None:
        """Ask who is there, and begin to watch."""
        for theme in THEMES:
            self.register_theme(theme)
        self.theme = self._look
        self.push_screen(SignOn(), self._arrived)
        self.set_interval(TICK_SECONDS, self.tick)
        self.run_worker(self._open, thread=True, exit_on_error=False)

    @property
    def desk(self) -> Desk:
        """The logbook and who sits at it, once it is open."""
        return self.opening.desk

    @property
    def drafts(self) -> Drafts:
        """Where half-typed fields are put away."""
        from gaugelog.screens.drafts import Drafts

        return Drafts(self.desk.drafts)

    @property
    def seated(self) -> bool:
        """Whether somebody is signed on."""
        return self.opening.done and self.desk.seat is not None

    def _open(self) -> None:
        """Open the logbook, and load what comes after the sign-on; on another thread."""
        try:
            self.opening.wait()
            places.warm()
        except Exception as error:
            self.call_later(self._handle_exception, error)
            return
        self.call_later(self._opened)

    def _opened(self) -> None:
        if isinstance(self.screen, SignOn):
            self.screen.say_where()

    def rooms(self) -> list[Room]:
        """The screens that are open, the topmost last; not one being built or taken down."""
        return [
            screen
            for screen in self.screen_stack
            if isinstance(screen, Room) and screen.ready and screen.children
        ]

    def go(self, place: str, point: str = "") -> None:
        """Open a screen above the worklist; going to the worklist closes what is above it."""
        self._close_all_but_home()
        if place != "worklist":
            self.push_screen(places.made(place, point))
        else:
            for room in self.rooms()[-1:]:  # none while one is being built
                room.facts_changed()

    def action_go(self, place: str, point: str = "") -> None:
        """A key that leads to a screen."""
        self.go(place, point)

    def check_action(self, action: str, parameters: tuple[object, ...]) -> bool | None:
        """A key is shown only where it works now."""
        if action in {"go", "hand_over"} and (not self.seated or self._asking()):
            return False
        if action == "help":
            return self._may_help()
        if action == "go" and isinstance(self.screen, Room):
            return self.screen.place != parameters[0]
        return True

    def action_hand_over(self) -> None:
        """Lock the desk for the next person to sign on."""
        self.lock("Who takes over? What was half typed is kept for its person.", for_another=True)

    def action_help(self) -> None:
        """Tell what the screen is for, and its keys."""
        screen = self.screen
        if isinstance(screen, (Room, Dialog)):
            self.push_screen(HelpDialog(screen.about, keys_of(screen)))

    def _may_help(self) -> bool:
        return isinstance(self.screen, (Room, Dialog)) and not isinstance(self.screen, HelpDialog)

    def _asks_help(self, event: events.Event) -> bool:
        """Whether it is a question mark that no field wants: one that is typed stays one."""
        if not isinstance(event, events.Key) or event.character != "?" or not self._may_help():
            return False
        field = self.screen.focused
        return not (isinstance(field, Input) and (field.value or field.password))

    def action_next_look(self) -> None:
        """Dark, light, sixteen colours, in turn."""
        self.theme = next_theme(self.theme)

    async def action_quit(self) -> None:
        """Put away what is half typed, and leave."""
        self._leaving()
        self.exit()

    def lock(self, why: str, *, for_another: bool = False) -> None:
        """Forget the unlocked key and ask who is there; what is half typed is put away.

        Who sat here is named already, unless it is `for_another`.
        """
        self._leaving()
        while isinstance(self.screen, Dialog):
            self.pop_screen()
        seat = self.desk.seat
        last = seat.person if seat is not None and not for_another else ""
        self.desk.sit(None)
        self.push_screen(SignOn(last, why), self._returned)

    def tick(self) -> None:
        """Every second: lock an idle desk, and look whether something was kept by anyone."""
        if not self.seated or not self.is_running:
            return
        if self.desk.seconds_left <= 0:
            minutes = self.desk.idle_seconds / 60
            self.lock(f"Locked: nobody typed for {minutes:.0f} min. Sign on to go on.")
            return
        for room in self.rooms():
            room.draw_bar()
        self._ticks += 1
        if self._something_kept() or self._ticks % LOOK_AGAIN_TICKS == 0:
            for room in self.rooms():
                room.facts_changed()

    async def on_event(self, event: events.Event) -> None:
        """Any key or click says that somebody is there."""
        if self.opening.done and isinstance(event, (events.Key, events.MouseDown)):
            self.desk.touch()
        if self._asks_help(event):
            self.action_help()
            return
        await super().on_event(event)

    def _handle_exception(self, error: Exception) -> None:
        # Textual would print a traceback with every local variable, a passphrase among them.
        self.defect = self.defect or error
        self._return_code = 1
        if self._exception is None:
            self._exception = error
            self._exception_event.set()
        self._close_messages_no_wait()

    def get_system_commands(self, screen: Screen[Any]) -> Iterable[SystemCommand]:
        """The palette offers the keys that work now, in words, and nothing else."""
        for _key, bound in sorted(screen.active_bindings.items()):
            binding, ours = bound.binding, bound.node in {screen, self}
            known = binding.description and binding.action != "command_palette"
            if ours and known and bound.enabled:
                yield SystemCommand(
                    binding.description,
                    f"Key: {self.get_key_display(binding)}",
                    partial(self.call_later, self.run_action, binding.action, bound.node),
                )

    def _asking(self) -> bool:
        return isinstance(self.screen, Dialog)

    def _something_kept(self) -> bool:
        try:
            seq = self.desk.logbook.head().seq
        except GaugelogError as error:
            for room in self.rooms()[-1:]:
                room.tell_error(error)
            return False
        changed, self._head = seq != self._head, seq
        return changed

    def _arrived(self, seat: Seat | None) -> None:
        if seat is None:
            self.exit()
            return
        self.desk.sit(seat)
        self._something_kept()
        self.push_screen(places.made(places.HOME))
        draft = self.drafts.load(seat.person)
        place = self._place or ("step" if draft.open and draft.point else "")
        if place and place != "worklist":
            self.push_screen(places.made(place, self._point or draft.point))

    def _returned(self, seat: Seat | None) -> None:
        if seat is None:
            self.exit()
            return
        self.desk.sit(seat)
        for room in self.rooms():
            room.draw_bar()
            room.seat_changed()

    def _close_all_but_home(self) -> None:
        while isinstance(self.screen, Room) and self.screen.place != places.HOME:
            self.screen.closing()
            self.pop_screen()

    def _leaving(self) -> None:
        for room in self.rooms():
            room.leaving()
