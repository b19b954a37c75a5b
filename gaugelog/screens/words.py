"""Words and signs of the screen: foreign text stays text, a state is never told by colour alone."""

from __future__ import annotations

from textual.content import Content
from textual.widgets import Input, Static

from gaugelog.errors import Faulty, GaugelogError
from gaugelog.visible import visible

GOOD, BAD, WAIT, CALM = "$text-success", "$text-error", "$text-warning", "$text-muted"

STATES: dict[str, tuple[str, str]] = {
    "planned": ("·", CALM),
    "released": ("○", CALM),
    "in work": ("▸", ""),
    "on hold": ("‖", WAIT),
    "ready to coat": ("◇", ""),
    "awaiting review": ("»", WAIT),
    "accepted": ("✓", GOOD),
    "returned": ("←", BAD),
    "non-conforming": ("✗", BAD),
    "failed in service": ("✗", BAD),
    "withdrawn": ("–", CALM),
    "removed": ("–", CALM),
}
"""Sign and style of each state of a point."""

VERDICTS: dict[str, tuple[str, str]] = {
    "pass": ("✓", GOOD),
    "conditional pass": ("✓?", WAIT),
    "conditional fail": ("✗?", BAD),
    "fail": ("✗", BAD),
    "undecided": ("?", WAIT),
}
"""Sign and style of each word of a verdict."""


def plain(text: str, style: str = "") -> Content:
    """Foreign text as it is: no markup is read in it, what can't be seen is made visible."""
    shown = visible(text, keep_newlines=True)
    return Content.styled(shown, style) if style else Content(shown)


def lines(*parts: Content) -> Content:
    """Several contents, one under the other."""
    return Content("\n").join(parts)


def state_word(state: str) -> Content:
    """A state with its sign: `✗ non-conforming`."""
    sign, style = STATES.get(state, ("?", ""))
    return plain(f"{sign} {state}", style)


def verdict_word(word: str) -> Content:
    """The word of a verdict with its sign: `✓ PASS`."""
    sign, style = VERDICTS.get(word, ("?", ""))
    return plain(f"{sign} {word.upper()}", f"bold {style}".strip())


def told(error: GaugelogError) -> Content:
    """What stopped a deed: each fault on its own line, or the sentence, with what to do."""
    if isinstance(error, Faulty):
        return lines(*(plain(f"✗ {fault}", BAD) for fault in error.faults))
    sentence = plain(f"✗ {error.message}", BAD)
    return lines(sentence, plain(f"  {error.remedy}")) if error.remedy else sentence


def defect(error: Exception) -> Content:
    """What is said of an error that nobody foresaw; nothing of the deed was kept."""
    text = f"This is a defect of Gaugelog ({type(error).__name__}: {error})"
    return plain(f"✗ {text}; nothing half-done was stored.", BAD)


class Words(Static):
    """A piece of text; a plain string in it is never read as markup."""

    def __init__(
        self, text: Content | str = "", *, id: str | None = None, classes: str | None = None
    ) -> None:
        super().__init__(_content(text), id=id, classes=classes, markup=False)

    def say(self, text: Content | str) -> None:
        """Show other text; nothing is drawn where it is the same."""
        self.update(_content(text))

    @property
    def text(self) -> str:
        """What stands there, without its styles."""
        return str(self.content)


def show_unseen(field: Input) -> None:
    """Make what was typed or pasted visible, where it holds what can't be seen or acts."""
    shown = visible(field.value)
    if shown != field.value:
        with field.prevent(Input.Changed):
            field.value = shown
            field.cursor_position = len(shown)


def _content(text: Content | str) -> Content:
    return plain(text) if isinstance(text, str) else text
