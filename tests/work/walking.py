"""Walking a point by the ids of its steps, whatever their number, and one more person to do it."""

from __future__ import annotations

from gaugelog.work import people, steps
from gaugelog.work.people import Newcomer
from tests.work.job import WALK, WORD, Job


def here(job: Job, point: str = "FB-1") -> str:
    """The id of the step that is open at a point; empty at the end of its route."""
    found = steps.next_step(job.book, point)
    return found.step.id if found.step is not None else ""


def typed_here(job: Job, point: str = "FB-1") -> tuple[str, dict[str, str]]:
    """Who types what at the step that is open."""
    return WALK[steps.next_step(job.book, point).number - 1]


def walk_to(job: Job, step: str, point: str = "FB-1", gauge: str = "K7-03/1") -> None:
    """Do every step before `step`; to the end of the route when that is empty.

    What was measured before is measured again with a reason.
    """
    while here(job, point) not in {step, ""}:
        who, typed = typed_here(job, point)
        given = {**typed, "gauge": gauge} if "gauge" in typed else typed
        job.do(who, given, point, reason="again")


def enrol(job: Job, person: str, *roles: str) -> None:
    """Enrol one more person, whose key lies with the others."""
    job.keys[person] = people.enrol(
        job.book,
        job.keys["c.ward"],
        job.folder.unlock_authority(WORD),
        job.folder,
        newcomer=Newcomer(person, f"Name of {person}", "NN", roles),
        passphrase=WORD,
    )
