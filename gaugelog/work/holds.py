"""Holds: a second person lets the work go on, or sends it back."""

from __future__ import annotations

from collections.abc import Mapping

from gaugelog.errors import Fault, Faulty
from gaugelog.ledger.steps import HoldDecided
from gaugelog.rules.qualified import demand_qualified
from gaugelog.rules.who import demand_role, demand_second_person
from gaugelog.work.doing import Doing, StepOutcome, about, utc_text
from gaugelog.work.inputs import Asked, understand
from gaugelog.work.meanings import HOLD_MEANING, REFUSAL_MEANING


def decide(doing: Doing, typed: Mapping[str, str], note: str, refuse: str) -> StepOutcome:
    """Release a hold, or refuse it with the reason `refuse`; a second person does so.

    Raises Faulty when something is entered that no hold asks for, Refused when the person may
    not decide it.
    """
    making, row, step = doing.making, doing.row, doing.step
    person = making.signer.person
    if refuse and not refuse.strip():
        raise Faulty([Fault("refuse", "is empty.", "Say why the hold is refused.")])
    understand(Asked(making.view, row, step, doing.day, doing.observed, making.moment), typed)
    demand_role(making.view, person, "technician", "reviewer")
    demand_qualified(making.view, person, step, doing.day)
    demand_second_person(making.view, person, row.id, "decide this hold")
    body = HoldDecided(
        point=row.id,
        subject=doing.found.subject,
        step=step.id,
        outcome="refused" if refuse else "released",
        reason="; ".join(text for text in (refuse.strip(), note.strip(), doing.order) if text),
        decided_by=person,
        observed_at=utc_text(doing.observed),
        meaning=REFUSAL_MEANING if refuse else HOLD_MEANING,
    )
    making.keep(body, about(making.view, row, doing.found.subject))
    word = f"refused: {refuse}" if refuse else "released"
    return StepOutcome(True, (), (f"{row.label}: hold “{step.title}” is {word}.",))
