"""Cure time from the adhesive's own schedule at the bond-line temperature that was measured."""

from __future__ import annotations

import json

from gaugelog.ledger.base import Quantity
from gaugelog.ledger.routes import BOND_LINE, RouteStep, Window
from gaugelog.ledger.steps import Entered, StepRow
from gaugelog.ledger.stock import ConsumableReceived, ConsumableRow
from gaugelog.ledger.view import View
from gaugelog.physics.cure import cure_time
from gaugelog.rules.digits import quantity


def cured(view: View, point: str, window: Window, earlier: RouteStep, row: StepRow) -> Window:
    """The window with the duration that the schedule asks for, where that is longer.

    `earlier` and `row` are the step the window counts from and what was entered there. Raises
    OutOfDomain when the bond line was colder than any cure that is listed.
    """
    schedule = _schedule(view, point, window.cure_of) if window.cure_of else ()
    celsius = _bond_line(earlier, row)
    if not schedule or celsius is None:
        return window
    needed = cure_time(celsius.si(), schedule)
    if needed <= window.duration.si():
        return window
    return window.model_copy(update={"duration": quantity(needed, "min")})


def _schedule(view: View, point: str, step: str) -> tuple[tuple[float, float], ...]:
    for row in view.all(StepRow, point=point, step=step):
        for entry in _entered(row).values():
            lot = view.get(ConsumableRow, entry.id) if entry.id else None
            body = ConsumableReceived.model_validate_json(lot.data) if lot is not None else None
            if body is not None and body.cure:
                return tuple((each.temperature.si(), each.duration.si()) for each in body.cure)
    return ()


def _bond_line(step: RouteStep, row: StepRow) -> Quantity | None:
    entered = _entered(row)
    for item in step.inputs:
        if item.type == BOND_LINE and item.name in entered:
            return entered[item.name].quantity
    return None


def _entered(row: StepRow) -> dict[str, Entered]:
    return {name: Entered.model_validate(each) for name, each in json.loads(row.data).items()}
