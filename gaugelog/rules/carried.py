"""What a person need not type again: meters, lots and the air about them, for a while."""

from __future__ import annotations

from datetime import timedelta

from gaugelog.ledger.routes import AIR, HUMIDITY, StepInput

AIR_HOLDS = timedelta(minutes=30)
"""How long the air about a person is taken to be as measured (common practice)."""
SHIFT = timedelta(hours=8)
"""How long a meter or a lot in hand is taken to stay the same one: a shift."""


def carries_for(item: StepInput) -> timedelta | None:
    """How long what was entered for `item` may be offered again; None: never.

    A reading and a gauge are never carried; nor is the temperature of a surface, which is one
    place's own.
    """
    if item.kind in {"instrument", "consumable"}:
        return SHIFT
    if item.kind == "quantity" and item.type in {AIR, HUMIDITY}:
        return AIR_HOLDS
    return None


def carried_as(item: StepInput) -> str:
    """The name under which a value is carried from one step to another: its kind and type."""
    return f"{item.kind}/{item.type}"
