"""The route beside the step in hand: as many steps as fit, the one in hand among them."""

from __future__ import annotations

from textual.content import Content
from textual.widget import Widget

from gaugelog.screens.step_text import route_text
from gaugelog.work.looking import InHand


class Rail(Widget):
    """A line a step; drawn anew for whatever room it is given."""

    def __init__(self, *, id: str | None = None) -> None:
        super().__init__(id=id)
        self._hand: InHand | None = None

    def look(self, hand: InHand) -> None:
        """Show the route as it stands now."""
        self._hand = hand
        self.refresh()

    def render(self) -> Content:
        """The lines, cut to the width."""
        if self._hand is None:
            return Content("")
        return route_text(self._hand, self.content_size.width, self.content_size.height)
