"""What was flagged at a point: seen, kept, and not judged. A reviewer looks at it."""

from __future__ import annotations

import json

from gaugelog.ledger.points import PointRow
from gaugelog.ledger.progress import SETTLED
from gaugelog.ledger.steps import StepRow
from gaugelog.ledger.view import View
from gaugelog.rules.progress import route_for


def flags_at(view: View, point: PointRow) -> tuple[str, ...]:
    """Every flag of the steps that stand at a point, with the step's title, in the route's order.

    A step that is done again leaves its flags behind.
    """
    rows = [row for row in view.all(StepRow, point=point.id) if row.outcome in SETTLED]
    titled = (
        (step.title, flag)
        for step in route_for(view, point).steps
        for row in rows
        if row.step == step.id
        for flag in json.loads(row.flags)
    )
    return tuple(dict.fromkeys(f"{title}: {flag}" for title, flag in titled))
