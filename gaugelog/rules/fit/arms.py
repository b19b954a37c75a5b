"""Arms by their nominal resistances."""

from __future__ import annotations

from gaugelog.ledger.circuits import CircuitPlanned, Element
from gaugelog.rules.fit.plan import Plan

OPPOSED = {1: 2, 2: 1, 3: 4, 4: 3}
"""The arm that carries the same current as each arm."""


def nominal_arm(plan: Plan, circuit: CircuitPlanned, number: int) -> float | None:
    """Nominal resistance of an arm without its trim, ohm; None where a grid's lot is unknown."""
    parts = [_nominal(plan, each) for each in circuit.arms[number - 1] if each.kind != "trim"]
    known = [part for part in parts if part is not None]
    return sum(known) if known and len(known) == len(parts) else None


def arm_of(circuit: CircuitPlanned, grid: str) -> int:
    """The number of the arm that holds a grid."""
    return next(
        number
        for number, arm in enumerate(circuit.arms, start=1)
        if any(element.grid == grid for element in arm)
    )


def _nominal(plan: Plan, element: Element) -> float | None:
    if element.grid is None:
        return element.resistance.si() if element.resistance is not None else None
    lot = plan.lot_of_grid(element.grid)
    return None if lot is None else lot.nominal_resistance.si()
