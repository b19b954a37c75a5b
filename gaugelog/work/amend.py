"""Deeds that take up an accepted point again: its next record revises the one that was accepted."""

from __future__ import annotations

from gaugelog.errors import Refused
from gaugelog.journal.keys import Signer
from gaugelog.ledger.reviews import PointReopened
from gaugelog.rules.amended import record_in_force
from gaugelog.rules.progress import demand_step, demand_walked
from gaugelog.rules.who import demand_role
from gaugelog.work.doing import about, point_row
from gaugelog.work.kept import demand_reason
from gaugelog.work.logbook import Logbook


def amend(
    logbook: Logbook, signer: Signer, *, point: str, reason: str, redo_from: str = ""
) -> PointReopened:
    """Take up an accepted point again, with a reason; work goes on from `redo_from`, if named.

    The accepted file stays as it is; the next submission is a new revision that names it and the
    reason. Raises Faulty without a reason, Refused when the point is not accepted, the step is
    not of its route, or the one who acts is no technician.
    """
    demand_reason(reason)
    with logbook.deed(signer) as deed:
        row = point_row(deed.view, point)
        demand_role(deed.view, signer.person, "technician")
        accepted = record_in_force(deed.view, row.id)
        if accepted is None:
            raise Refused(
                f"{row.label} has no accepted record to amend.",
                f"See `gaugelog step next {row.label}`.",
            )
        if redo_from:
            demand_walked(deed.view, row, demand_step(deed.view, row, redo_from))
        body = PointReopened(
            point=row.id,
            revision=accepted.revision,
            reason=reason,
            redo_from=redo_from,
            reopened_by=signer.person,
        )
        deed.keep(body, about(deed.view, row, row.id))
    return body
