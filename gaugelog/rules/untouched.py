"""A record is accepted only while it tells all: nothing was done or measured since it was drawn."""

from __future__ import annotations

from gaugelog.errors import Refused
from gaugelog.ledger.points import PointRow
from gaugelog.ledger.progress import open_step
from gaugelog.ledger.reviews import RecordRow
from gaugelog.ledger.steps import StepRow
from gaugelog.ledger.view import View
from gaugelog.rules.taken import readings_at


def demand_untouched(view: View, point: PointRow, record: RecordRow) -> None:
    """Raise Refused when a circuit of the point was worked on since the record was submitted.

    A point under review rests, but another point of its circuit may be taken up again.
    """
    done = [row.seq for row in view.all(StepRow, point=point.id)]
    read = [row.seq for row in readings_at(view, point.id)]
    later = any(seq > record.seq for seq in (*done, *read))
    if later or open_step(view.known(), point.model_dump()) is not None:
        raise Refused(
            f"A circuit of {point.label} was worked on since its record was submitted.",
            "Return it; it is submitted anew when the circuit is in order.",
        )
