"""The order of observations at a point: a step is observed after those that it follows."""

from __future__ import annotations

from datetime import datetime

from gaugelog.errors import Refused
from gaugelog.journal.clock import Moment
from gaugelog.ledger.points import PointRow
from gaugelog.ledger.progress import SETTLED
from gaugelog.ledger.steps import StepRow
from gaugelog.ledger.view import View
from gaugelog.rules.progress import demand_step
from gaugelog.rules.windows import clock_jumped, local_text, time_of


def order_flag(view: View, point: PointRow, observed: datetime, now: Moment, reason: str) -> str:
    """What is kept with a step that was observed (UTC) before one that it follows; else nothing.

    Times are never mended. Raises Refused when no reason is given for such a time, unless the
    clock was set in between: then the two times can't be told apart from a slip.
    """
    later = _observed_later(view, point, observed)
    if later is None:
        return ""
    if not reason.strip() and not clock_jumped(later, now):
        title = demand_step(view, point, later.step).title
        raise Refused(
            f"{point.label}: {local_text(observed, now)} lies before “{title}”, which this step "
            f"follows and which was done at {local_text(time_of(later.observed_at), now)}.",
            "Give the right time with --at; if it is right, say why with --reason.",
        )
    flag = f"Observed before step {later.step}, which it follows."
    return f"{flag} Reason: {reason.strip()}" if reason.strip() else flag


def _observed_later(view: View, point: PointRow, observed: datetime) -> StepRow | None:
    """The step that was observed last, if that was after `observed`.

    Times count to the minute, as people give them. A skipped step was not observed; when the
    skip was entered binds nothing.
    """
    rows = [
        row
        for row in view.all(StepRow, point=point.id)
        if row.outcome in SETTLED and row.outcome != "skipped"
    ]
    last = max(rows, key=lambda row: row.observed_at, default=None)
    if last is None or time_of(last.observed_at).replace(second=0) <= observed:
        return None
    return last
