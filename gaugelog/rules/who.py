"""Who may do what: roles, the second person of a hold, and the reviewer who did no step."""

from __future__ import annotations

import json

from gaugelog.errors import Refused
from gaugelog.ledger.people import PersonRow, Role
from gaugelog.ledger.points import PointRow
from gaugelog.ledger.view import View
from gaugelog.rules.taken import readings_at


def roles_of(view: View, person: str) -> tuple[Role, ...]:
    """The roles of an active person; none when unknown or no longer active."""
    row = view.get(PersonRow, person)
    return tuple(json.loads(row.roles)) if row is not None and row.active else ()


def demand_role(view: View, person: str, *roles: Role) -> None:
    """Raise Refused unless `person` is active and has one of `roles`."""
    row = view.get(PersonRow, person)
    if row is None or not row.active:
        raise Refused(f"{person} is not active in this logbook.", "Ask the custodian.")
    if not set(roles) & set(json.loads(row.roles)):
        wanted = " or ".join(roles)
        raise Refused(
            f"{person} does not have the role {wanted}.",
            f"Have it done by a {wanted}, or ask the custodian for the role.",
        )


def workers_of(view: View, point: str) -> set[str]:
    """Everyone who ever did, skipped or measured something at a point (by its id).

    Deciding a hold is witnessing, not doing a step.
    """
    row = view.get(PointRow, point)
    did: set[str] = set(json.loads(row.workers)) if row is not None else set()
    return did | {reading.observed_by for reading in readings_at(view, point)}


def demand_second_person(view: View, person: str, point: str, what: str) -> None:
    """Raise Refused when `person` did a step of the point: `what` needs somebody else."""
    if person in workers_of(view, point):
        raise Refused(
            f"{person} did a step of this point and can't {what}.",
            "Have a second person do it; witnessing a hold is not doing a step.",
        )
