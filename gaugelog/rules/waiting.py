"""A step on a circuit waits until each of the circuit's points has come as far."""

from __future__ import annotations

from collections.abc import Iterator

from gaugelog.ledger.circuits import CircuitRow
from gaugelog.ledger.points import GridRow
from gaugelog.ledger.progress import SETTLED, OpenStep, route_of, step_key, subjects_of
from gaugelog.ledger.routes import RouteStep
from gaugelog.ledger.rows import Known, Row, have
from gaugelog.ledger.sharing import points_in
from gaugelog.ledger.view import View


def waits_for(view: View, point: str, found: OpenStep) -> Iterator[str]:
    """What other points of the circuit must have done first, a sentence each.

    Their own steps, on place and grid, that come before this one on their routes. Nobody wires a
    bridge of which one gauge is not bonded yet.
    """
    if found.step.subject != "circuit":
        return
    known = view.known()
    circuit = view.get(CircuitRow, found.subject)
    for other in points_in(known, found.subject):
        row = have(known, "point", other)
        if other != point and circuit is not None and _is_withdrawn(view, other):
            yield f"{circuit.label} holds a grid of {row['label']}, withdrawn: plan it anew."
            continue
        still = _first_open(known, row, found.step.id) if other != point else None
        if still is not None and circuit is not None:
            yield f"{circuit.label} waits for {row['label']}: “{still.title}” is open there."


def _is_withdrawn(view: View, point: str) -> bool:
    return {grid.state for grid in view.all(GridRow, point=point)} == {"withdrawn"}


def _first_open(known: Known, point: Row, before: str) -> RouteStep | None:
    """The first own step of a point that is open before the step called `before`."""
    steps = route_of(have(known, "route", point["route"])["data"]).steps
    ids = [step.id for step in steps]
    for step in steps[: ids.index(before)] if before in ids else ():
        subjects = subjects_of(known, point, step) if step.subject != "circuit" else []
        rows = (known.get("step", step_key(point["id"], step.id, each)) for each in subjects)
        if any(row is None or row["outcome"] not in SETTLED for row in rows):
            return step
    return None
