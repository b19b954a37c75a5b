"""What a point wants of a person now: whether its next deed is theirs to do."""

from __future__ import annotations

from typing import Literal

from gaugelog.ledger.points import PointRow
from gaugelog.ledger.view import View
from gaugelog.rules.progress import NextStep
from gaugelog.rules.who import roles_of, workers_of

Wanted = Literal["", "step", "hold", "submit", "review"]


def wanted_of(view: View, point: PointRow, found: NextStep, person: str) -> Wanted:
    """What `person` may do at a point now, by their roles and what they did there; else empty."""
    roles = set(roles_of(view, person))
    if found.state == "awaiting review":
        mine = "reviewer" in roles and person not in workers_of(view, point.id)
        return "review" if mine else ""
    if found.blocks or found.state in {"accepted", "withdrawn", "planned"}:
        return ""
    if found.step is None:
        return "submit" if "technician" in roles else ""
    if found.step.hold:
        mine = bool(roles & {"technician", "reviewer"})
        return "hold" if mine and person not in workers_of(view, point.id) else ""
    return "step" if "technician" in roles else ""
