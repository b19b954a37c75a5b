"""Qualifications: steps are done by people who hold what they need, and while it lasts."""

from __future__ import annotations

import json
from datetime import date

from gaugelog.errors import Refused
from gaugelog.ledger.people import PersonRow, Qualification
from gaugelog.ledger.routes import RouteStep
from gaugelog.ledger.view import View


def qualifications_of(view: View, person: str) -> tuple[Qualification, ...]:
    """What a person is or was qualified for; nothing when unknown."""
    row = view.get(PersonRow, person)
    held = json.loads(row.qualifications) if row is not None else []
    return tuple(Qualification.model_validate(each) for each in held)


def demand_qualified(view: View, person: str, step: RouteStep, day: date) -> None:
    """Raise Refused unless the person holds, on that day, the qualification the step names.

    Where it names none, any that is in force will do; nobody works on after the last has lapsed.
    """
    if not step.qualification:
        _demand_one_in_force(view, person, day)
        return
    wanted = step.qualification.casefold()
    held = [
        each for each in qualifications_of(view, person) if each.name.strip().casefold() == wanted
    ]
    if any(not has_lapsed(each, day) for each in held):
        return
    if held:
        ended = max(str(each.until) for each in held)
        what = f"The qualification “{step.qualification}” of {person} ended on {ended}"
    else:
        what = f"{person} has no qualification “{step.qualification}”"
    raise Refused(
        f"{what}; “{step.title}” needs it.",
        "Have it done by someone who is qualified, or have the custodian enrol the person anew.",
    )


def _demand_one_in_force(view: View, person: str, day: date) -> None:
    held = qualifications_of(view, person)
    if held and all(has_lapsed(each, day) for each in held):
        last = max(held, key=lambda each: str(each.until))
        raise Refused(
            f"{person} has no qualification in force: “{last.name}” ended on {last.until}.",
            "Have it done by someone who is qualified, or have the custodian enrol the person "
            "anew.",
        )


def lapsed_flags(view: View, person: str, day: date) -> list[str]:
    """What lapsed of a person's qualifications while another is still in force."""
    return [
        f"The qualification “{each.name}” of {person} ended on {each.until}."
        for each in qualifications_of(view, person)
        if has_lapsed(each, day)
    ]


def has_lapsed(held: Qualification, day: date) -> bool:
    """Whether a qualification had ended before a day; it lasts to the end of its last one."""
    return held.until is not None and date.fromisoformat(held.until) < day
