"""Help that knows where you are: what this screen is for, the keys that work now, the signs."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from textual.app import ComposeResult
from textual.binding import Binding
from textual.containers import VerticalScroll
from textual.content import Content
from textual.screen import Screen

from gaugelog.screens.dialog import Dialog
from gaugelog.screens.keys_line import KeysLine
from gaugelog.screens.words import CALM, STATES, VERDICTS, Words, lines, plain

_HIDDEN = frozenset(
    {"help", "command_palette", "app.focus_next", "app.focus_previous", "cursor", "scroll"}
)
"""What is told in words of its own."""
_KEY_WIDTH = 16


@dataclass(frozen=True, slots=True)
class KeyTold:
    """What some keys do here, now."""

    keys: tuple[str, ...]
    does: str


class HelpDialog(Dialog[None]):
    """Tells about a screen; Escape goes back to it as it was."""

    BINDINGS = [  # noqa: RUF012 (as Dialog has it)
        Binding("pageup,up", "scroll(-1)", "Up", show=False),
        Binding("pagedown,down,space", "scroll(1)", "Down", show=False),
    ]

    heading = "Help"

    def __init__(self, about: str, keys: list[KeyTold]) -> None:
        super().__init__()
        self._about, self._keys = about, keys

    def compose(self) -> ComposeResult:
        """What it is for, the keys, the signs."""
        with VerticalScroll(id="dialog", can_focus=False):
            yield Words(plain(self.heading, "bold"), classes="heading")
            yield Words(plain(self._about), classes="explained")
            yield Words(self._keys_text(), classes="explained")
            yield Words(_signs())
        yield KeysLine()

    def action_scroll(self, by: int) -> None:
        """Show what does not fit."""
        pane = self.query_one("#dialog", VerticalScroll)
        pane.scroll_page_down(animate=False) if by > 0 else pane.scroll_page_up(animate=False)

    def _keys_text(self) -> Content:
        told = [
            Content.assemble(
                plain(f"  {', '.join(each.keys):<{_KEY_WIDTH}}", "bold"), plain(each.does)
            )
            for each in self._keys
        ]
        told += [
            plain(f"  {keys:<{_KEY_WIDTH}}{does}", CALM)
            for keys, does in (
                ("↑ ↓ PgUp PgDn", "move about"),
                ("f1 or ?", "this help; ? on a field that is empty"),
                ("^p", "find what can be done, or a point, by its name"),
            )
        ]
        return lines(plain("Keys that work here now", "bold $secondary"), *told)


def keys_of(screen: Screen[object]) -> list[KeyTold]:
    """The keys of a screen and of the program that work now, those that do the same together."""
    found: dict[str, list[str]] = {}
    # What stands in the last line comes first.
    for bound in sorted(screen.active_bindings.values(), key=lambda each: not each.binding.show):
        binding = bound.binding
        ours = bound.node is screen or bound.node is screen.app
        if ours and bound.enabled and binding.description and binding.action not in _HIDDEN:
            found.setdefault(binding.description, []).append(screen.app.get_key_display(binding))
    return [KeyTold(tuple(keys), does) for does, keys in found.items()]


def _signs() -> Content:
    states = [f"{sign} {name}" for name, (sign, _) in STATES.items()]
    verdicts = [f"{sign} {name}" for name, (sign, _) in VERDICTS.items()]
    return lines(
        plain("Signs", "bold $secondary"),
        *(plain(f"  {each}", CALM) for each in _in_rows(states)),
        *(plain(f"  {each}", CALM) for each in _in_rows(verdicts)),
    )


def _in_rows(texts: list[str], width: int = 22, columns: int = 3) -> Iterator[str]:
    for start in range(0, len(texts), columns):
        yield "".join(f"{each:<{width}}" for each in texts[start : start + columns]).rstrip()
