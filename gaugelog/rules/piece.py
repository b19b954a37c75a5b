"""The grids of a point are of one gauge: one piece, entered for each of its grids alike."""

from __future__ import annotations

import json

from gaugelog.errors import Refused
from gaugelog.ledger.points import GridRow, PointRow
from gaugelog.ledger.progress import SETTLED
from gaugelog.ledger.routes import RouteStep
from gaugelog.ledger.steps import Entered, StepRow
from gaugelog.ledger.stock import GaugeRow
from gaugelog.ledger.view import View


def demand_one_piece(
    view: View, point: PointRow, step: RouteStep, subject: str, entered: dict[str, Entered]
) -> None:
    """Raise Refused when another piece was taken for another grid of the point in this step."""
    names = [item.name for item in step.inputs if item.kind == "gauge" and item.name in entered]
    for row in view.all(StepRow, point=point.id, step=step.id):
        if row.subject == subject or row.outcome not in SETTLED:
            continue
        before = json.loads(row.data)
        for name in names:
            taken = Entered.model_validate(before[name]).id if name in before else None
            if taken and taken != entered[name].id:
                _refuse(view, point, row, taken)


def _refuse(view: View, point: PointRow, row: StepRow, taken: str) -> None:
    piece, grid = view.get(GaugeRow, taken), view.get(GridRow, row.subject)
    label = piece.label if piece is not None else "another piece"
    where = grid.label if grid is not None else point.label
    raise Refused(
        f"The grids of {point.label} are of one gauge, and {label} was taken for {where}.",
        f"Enter that one; to take another, go back: gaugelog step redo {point.label} {row.step}",
    )
