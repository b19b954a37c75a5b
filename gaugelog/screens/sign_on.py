"""Sign on: who is there, and the secret that unlocks their key."""

from __future__ import annotations

from typing import ClassVar

from textual.binding import Binding, BindingType
from textual.content import Content

from gaugelog.screens.desk import Seat
from gaugelog.screens.dialog import Dialog, Question
from gaugelog.screens.words import Words, lines, plain


class SignOn(Dialog[Seat]):
    """Asks who and the secret. Dismissed with a seat, never without one: there is no way around.

    `last` is who sat here before, `why` says why it is asked.
    """

    BINDINGS: ClassVar[list[BindingType]] = [
        Binding("escape", "take_back", "Start over", priority=True),
        Binding("ctrl+q", "app.quit", "Leave", priority=True),
    ]

    heading = "Sign on"
    doing = "Unlocking your key"

    def __init__(self, last: str = "", why: str = "") -> None:
        super().__init__()
        self._last, self._why = last, why

    def explained(self) -> Content:
        """Which logbook, why it is asked, and whose keys are on this machine."""
        opening = self.full.opening
        if not opening.done:
            return lines(plain("Opening the logbook …"), plain("Type on meanwhile."))
        desk = opening.desk
        here = ", ".join(desk.keys.people())
        keys = f"Keys on this machine: {here}." if here else "No key is on this machine yet."
        why = [plain(self._why)] if self._why else []
        return lines(plain(desk.logbook.name, "bold"), *why, plain(keys))

    def say_where(self) -> None:
        """The logbook is open: say which it is."""
        self.query_one(".explained", Words).say(self.explained())

    def questions(self) -> tuple[Question, ...]:
        """Who, and the secret."""
        return (
            Question("person", "Who (id, typed or scanned)", value=self._last),
            Question("secret", "Passphrase", secret=True),
        )

    def answer(self, given: dict[str, str]) -> Seat:
        """Unlock the key."""
        return self.full.opening.wait().sign_on(given["person"], given["secret"])

    def action_take_back(self) -> None:
        """Empty the fields: another person signs on."""
        from textual.widgets import Input

        if self._busy:
            return
        for field in reversed(list(self.query(Input))):
            field.value = ""
            field.focus()
