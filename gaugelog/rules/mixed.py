"""Pot life: how long a lot has been mixed when it is used, against what its sheet allows."""

from __future__ import annotations

from collections.abc import Mapping, Sequence

from gaugelog.ledger.base import Quantity
from gaugelog.ledger.routes import MIXED, RouteStep
from gaugelog.ledger.stock import ConsumableReceived

SOURCE = "its data sheet"


def mixed_troubles(
    step: RouteStep, entered: Mapping[str, Quantity], used: Sequence[ConsumableReceived]
) -> tuple[str, ...]:
    """Every lot that was mixed longer ago than its pot life; nothing where no time was entered.

    `entered` are the quantities of the step by the name of their input.
    """
    since = _since(step, entered)
    if since is None:
        return ()
    return tuple(
        f"{lot.label} was mixed {since} ago; its pot life is {lot.pot_life} ({SOURCE})."
        for lot in used
        if lot.pot_life is not None and since.si() > lot.pot_life.si() * (1 + 1e-9)
    )


def unmixed_flags(
    step: RouteStep, entered: Mapping[str, Quantity], used: Sequence[ConsumableReceived]
) -> list[str]:
    """Says of each lot with a pot life that it was not judged, where no time was entered."""
    if _since(step, entered) is not None:
        return []
    return [
        f"{lot.label} has a pot life of {lot.pot_life}, and no time since it was mixed was entered."
        for lot in used
        if lot.pot_life is not None
    ]


def _since(step: RouteStep, entered: Mapping[str, Quantity]) -> Quantity | None:
    names = [item.name for item in step.inputs if item.type == MIXED]
    return next((entered[name] for name in names if name in entered), None)
