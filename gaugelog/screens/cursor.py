"""A list whose cursor line is legible in every look: one colour on the bar, whatever the cells."""

from __future__ import annotations

from rich.segment import Segment
from rich.style import Style
from textual.strip import Strip
from textual.widgets import OptionList

_OPTION, _HIGHLIGHTED = "option-list--option", "option-list--option-highlighted"


class CursorList(OptionList):
    """An option list that takes the colours of its cells away under the cursor.

    Green or red on the bar could not be read; the signs beside them stay.
    """

    def render_line(self, y: int) -> Strip:
        """One line as it is drawn."""
        strip = super().render_line(y)
        if not any(_option(each.style) == self.highlighted for each in strip):
            return strip
        bar = self.get_visual_style(_OPTION, _HIGHLIGHTED).rich_style
        return Strip([_on(bar, each) for each in strip], strip.cell_length)


def _option(style: Style | None) -> object:
    return style.meta.get("option", -1) if style is not None else -1


def _on(bar: Style, segment: Segment) -> Segment:
    meta = segment.style.meta if segment.style is not None else {}
    return Segment(segment.text, bar + Style.from_meta(meta), segment.control)
