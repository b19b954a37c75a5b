"""The last line: the keys that work now, drawn as one piece of text; a click does what a key does.

A widget for each key would be made anew at every step; this is drawn in a thousandth of that.
"""

from __future__ import annotations

from textual.content import Content
from textual.dom import DOMNode
from textual.screen import Screen
from textual.style import Style
from textual.widget import Widget

from gaugelog.screens.words import plain


class KeysLine(Widget):
    """One line of keys with what they do; drawn again when another set of keys works."""

    def __init__(self) -> None:
        super().__init__(id="keys")
        self._shown = Content("")

    def on_mount(self) -> None:
        """Follow the keys of the screen."""
        self.screen.bindings_updated_signal.subscribe(self, self._follow)
        self._follow(self.screen)

    def render(self) -> Content:
        """The keys."""
        return self._shown

    def _follow(self, screen: Screen[object]) -> None:
        if not screen.is_attached or screen is not self.app.screen:
            return
        found = self._keys(screen)
        if found.plain != self._shown.plain:
            self._shown = found
            self.refresh()

    def _keys(self, screen: Screen[object]) -> Content:
        told = []
        for bound in screen.active_bindings.values():
            binding = bound.binding
            if binding.show and bound.enabled and binding.description:
                key = plain(f" {self.app.get_key_display(binding)}", "bold $primary")
                does = plain(f" {binding.description} ")
                click = Style.from_meta({"@click": _action(bound.node, binding.action)})
                told.append((key + does).stylize(click))
        return Content("").join(told)


def _action(node: DOMNode, action: str) -> str:
    """The action with the place where it is looked for."""
    if action.startswith(("app.", "screen.")):
        return action
    return f"screen.{action}" if isinstance(node, Screen) else f"app.{action}"
