"""Why work at a point was sent back: told first, until it is dealt with."""

from __future__ import annotations

from collections.abc import Iterator

from gaugelog.journal.clock import Moment
from gaugelog.ledger.points import PointRow
from gaugelog.ledger.progress import SETTLED
from gaugelog.ledger.steps import StepRow
from gaugelog.ledger.story import StoryRow
from gaugelog.ledger.view import View
from gaugelog.rules.windows import local_text, time_of

_OF_THE_RECORD = {"returned": "Returned", "amendment": "Taken up again"}
_AT_A_STEP = {
    "hold refused": "Hold refused",
    "step reopened": "To be done again",
    "note left": "Note",
}
_SETTLES = frozenset({"submitted", "accepted", "withdrawn"})


def sent_back(view: View, point: PointRow, now: Moment) -> Iterator[str]:
    """Each reason that is not dealt with, the oldest first: what, who, when, why.

    A refused hold, a step to be done again and a note are dealt with when that step is settled;
    all of them when the point is submitted anew.
    """
    turns = view.all(StoryRow, point=point.id)
    settled = max((turn.seq for turn in turns if turn.turn in _SETTLES), default=0)
    for turn in turns:
        what = _what(view, turn) if turn.seq > settled else ""
        if what:
            when = local_text(time_of(turn.at), now)
            yield f"{what} by {view.name(turn.by)}, {when}: {turn.reason}"


def _what(view: View, turn: StoryRow) -> str:
    """What a turn asks for; empty where it asks for nothing any more."""
    if turn.turn in _OF_THE_RECORD:
        return _OF_THE_RECORD[turn.turn]
    if turn.turn not in _AT_A_STEP or _settled_since(view, turn):
        return ""
    return f"{_AT_A_STEP[turn.turn]} ({turn.step})"


def _settled_since(view: View, turn: StoryRow) -> bool:
    rows = view.all(StepRow, point=turn.point, step=turn.step)
    return bool(rows) and all(row.outcome in SETTLED and row.seq > turn.seq for row in rows)
