"""Which accepted record of a point is being revised, if one is."""

from __future__ import annotations

from gaugelog.ledger.reviews import RecordRow
from gaugelog.ledger.view import View


def under_amendment(view: View, point: str) -> RecordRow | None:
    """The accepted record that was reopened and that no accepted one has taken the place of."""
    rows = view.all(RecordRow, point=point)
    amended = [row for row in rows if row.state == "amended"]
    if not amended or any(row.revises == amended[-1].revision for row in _accepted(rows)):
        return None
    return amended[-1]


def record_in_force(view: View, point: str) -> RecordRow | None:
    """The accepted record of a point that stands now, unamended; None when there is none."""
    rows = view.all(RecordRow, point=point)
    return rows[-1] if rows and rows[-1].state == "accepted" else None


def _accepted(rows: list[RecordRow]) -> list[RecordRow]:
    return [row for row in rows if row.state == "accepted"]
