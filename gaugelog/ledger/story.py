"""The story of a point: its turns in order, so that a record can tell how it came about.

The step table keeps only the latest outcome of a step; what was refused, sent back or taken up
again would be lost on the page without this one.
"""

from __future__ import annotations

from typing import Literal

from sqlmodel import Field, SQLModel

from gaugelog.ledger.rows import At, Put

Turn = Literal[
    "hold refused",
    "hold released",
    "step reopened",
    "submitted",
    "returned",
    "accepted",
    "amendment",
    "plan changed",
    "change seen",
    "gauge replaced",
    "withdrawn",
    "note left",
]


class StoryRow(SQLModel, table=True):
    """One turn in the story of a point."""

    __tablename__ = "story"

    id: str = Field(primary_key=True)
    """`point/turn/number`."""
    point: str = Field(index=True)
    turn: str
    revision: int
    """The revision of the record it concerns, or 0."""
    step: str
    """The step it concerns or goes back to, or empty."""
    by: str
    at: str
    """When it was entered, UTC."""
    reason: str
    seq: int


def told(
    at: At, point: str, turn: Turn, by: str, *, reason: str = "", step: str = "", revision: int = 0
) -> Put:
    """A turn in the story of a point."""
    return Put(
        "story",
        {
            "id": f"{point}/{turn}/{at.seq}",
            "point": point,
            "turn": turn,
            "revision": revision,
            "step": step,
            "by": by,
            "at": at.time,
            "reason": reason,
            "seq": at.seq,
        },
    )
