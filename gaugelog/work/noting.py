"""A deed that does nothing to a step but say why it stays open."""

from __future__ import annotations

from gaugelog.errors import Refused
from gaugelog.journal.keys import Signer
from gaugelog.ledger.notes import NoteLeft
from gaugelog.rules.progress import next_step
from gaugelog.rules.who import demand_role
from gaugelog.work.doing import StepOutcome, about, point_row
from gaugelog.work.kept import demand_reason
from gaugelog.work.logbook import Logbook


def leave_note(logbook: Logbook, signer: Signer, *, point: str, note: str) -> StepOutcome:
    """Leave a note at the step that is open at a point; it is told there until the step is done.

    Raises Faulty without a note, Refused when no step is open or the person has no part in work.
    """
    demand_reason(note)
    with logbook.deed(signer) as deed:
        row = point_row(deed.view, point)
        demand_role(deed.view, signer.person, "technician", "reviewer", "planner")
        found = next_step(deed.view, row, deed.moment)
        if found.step is None or found.state == "withdrawn":
            raise Refused(f"{row.label} has no step open.", "A note is left at an open step.")
        body = NoteLeft(
            point=row.id,
            subject=found.subject,
            step=found.step.id,
            note=note.strip(),
            left_by=signer.person,
        )
        deed.keep(body, about(deed.view, row, found.subject))
        return StepOutcome(True, (), (f"“{found.title}” of {row.label} stays open, with a note.",))
