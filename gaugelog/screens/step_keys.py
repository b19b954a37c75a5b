"""Which keys of the step screen work now; those that do not are not shown."""

from __future__ import annotations

from gaugelog.rules.progress import NextStep

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
