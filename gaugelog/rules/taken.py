"""The readings of a point: its own, and those of its circuits wherever they were taken."""

from __future__ import annotations

from gaugelog.ledger.circuits import CircuitPlanned, CircuitRow
from gaugelog.ledger.points import GridRow
from gaugelog.ledger.readings import ReadingRow
from gaugelog.ledger.view import View


def circuits_of(view: View, point: str) -> list[str]:
    """The ids of every circuit that holds a grid of a point (by its id), its dummy's among them."""
    grids = {grid.id for grid in view.all(GridRow, point=point)}
    rows = view.all(CircuitRow)
    held = ((row.id, CircuitPlanned.model_validate_json(row.data).grids) for row in rows)
    return [circuit for circuit, found in held if not grids.isdisjoint(found)]


def readings_at(view: View, point: str) -> list[ReadingRow]:
    """Every reading of a point (by its id), its circuits' among them, in the journal's order."""
    own = view.all(ReadingRow, point=point)
    circuits = {grid.circuit for grid in view.all(GridRow, point=point) if grid.circuit}
    shared = [row for each in circuits for row in view.all(ReadingRow, subject=each)]
    found = {row.id: row for row in (*own, *shared)}
    return sorted(found.values(), key=lambda row: (row.seq, row.id))
