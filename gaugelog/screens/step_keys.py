"""Which keys of the step screen work now; those that do not are not shown."""

from __future__ import annotations

from textual.binding import Binding, BindingType

from gaugelog.rules.progress import NextStep

KEYS: list[BindingType] = [
    Binding("space", "acknowledge", "Cautions read"),
    Binding("enter", "do", "Done"),
    Binding("f5", "hold", "Decide the hold"),
    Binding("f5", "submit", "Submit the record"),
    Binding("f6", "pins", "Find the cause"),
    Binding("f7", "redo", "Earlier step"),
    Binding("f9", "skip", "Skip"),
    Binding("ctrl+l", "leave", "Leave a note"),
    Binding("ctrl+n", "add('note')", "Note", show=False),
    Binding("ctrl+o", "add('when')", "Observed at", show=False),
    Binding("up,shift+tab", "app.focus_previous", "Up", show=False),
    Binding("down,tab", "app.focus_next", "Down", show=False),
    Binding("pageup", "scroll(-1)", "Page up", show=False),
    Binding("pagedown", "scroll(1)", "Page down", show=False),
    Binding("escape", "app.go('worklist')", "Worklist", show=False),
]
"""The keys of the step's screen; which of them work now is for `working_keys` to say."""

_AT_REST = frozenset({"planned", "awaiting review", "accepted", "withdrawn"})


def cautions_wait(found: NextStep | None, acknowledged: bool) -> bool:
    """Whether cautions stand before the fields and were not acknowledged yet."""
    if found is None or found.step is None or found.step.hold or found.blocks:
        return False
    return bool(found.step.cautions) and not acknowledged


def working_keys(found: NextStep, waiting: bool) -> dict[str, bool]:
    """For each action of the step screen, whether it works; `waiting`: cautions come first."""
    step = found.step
    free = step is not None and not found.blocks
    hold = step is not None and step.hold
    skippable = step is not None and step.skip != "never" and not hold
    return {
        "acknowledge": waiting,
        "do": free and not hold and not waiting,
        "add": free and not hold and not waiting,
        "hold": free and hold,
        "submit": step is None and found.title != "none" and not found.blocks,
        "pins": found.again and step is not None and step.subject in {"grid", "circuit"},
        "leave": step is not None and (found.again or bool(found.blocks)) and _in_work(found),
        "redo": _in_work(found),
        "skip": skippable and not found.forbidden,
    }


def _in_work(found: NextStep) -> bool:
    return found.state not in _AT_REST
