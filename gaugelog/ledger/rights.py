"""Who may say what, asked again on replay: a signature proves who wrote, not that they might.

The rules refuse such a deed before it is kept. This looks at what *was* kept, so that one written
past the program with a good key does not pass for the work of another person.
"""

from __future__ import annotations

import json
from collections import defaultdict
from collections.abc import Callable, Iterator
from dataclasses import dataclass

from gaugelog.ledger.base import FactBody
from gaugelog.ledger.rows import At, Known

Judge = Callable[[Known, At, FactBody], None]
"""Looks at a fact with what was known before it."""


@dataclass(frozen=True, slots=True)
class Right:
    """What a kind of fact asks of its writer.

    `named` is the field that names the person, who must be the writer; `roles` are those of which
    one is needed; `second` asks for somebody who did no step of the point.
    """

    named: str = ""
    roles: frozenset[str] = frozenset()
    second: bool = False


def _right(named: str, *roles: str, second: bool = False) -> Right:
    return Right(named, frozenset(roles), second)


RIGHTS: dict[str, Right] = {
    "step.done": _right("done_by", "technician"),
    "step.skipped": _right("skipped_by", "technician", "planner"),
    "step.reopened": _right("reopened_by", "technician"),
    "hold.decided": _right("decided_by", "technician", "reviewer", second=True),
    "photo.kept": _right("kept_by", "technician"),
    "point.submitted": _right("submitted_by", "technician"),
    "point.accepted": _right("accepted_by", "reviewer", second=True),
    "point.returned": _right("returned_by", "reviewer", second=True),
    "point.reopened": _right("reopened_by", "technician"),
    "change.seen": _right("seen_by", "reviewer", second=True),
    "disposition.made": _right("decided_by", "technician", "planner", "reviewer"),
    "reading.taken": _right("observed_by", "technician"),
    "note.left": _right("left_by", "technician", "planner", "reviewer"),
    "meter.checked": _right("checked_by", "technician", "custodian"),
    "certificate.kept": _right("kept_by", "planner", "technician", "custodian"),
    "instrument.added": _right("", "planner", "technician", "custodian"),
    "lot.received": _right("", "planner", "technician", "custodian"),
    "consumable.received": _right("", "planner", "technician", "custodian"),
    "standing.set": _right("set_by"),
    "criteria.agreed": _right("", "planner"),
    "plan.loaded": _right("", "planner"),
    "plan.revised": _right("", "planner"),
    "plan.released": _right("", "planner"),
    "person.enrolled": _right("", "custodian"),
    "person.left": _right("", "custodian"),
}
"""By kind; a kind that is not here asks for nothing but a certificate in force."""


class Rights:
    """Asks fact after fact, and remembers who took a reading at which point."""

    def __init__(self) -> None:
        self._readers: dict[str, set[str]] = defaultdict(set)

    def misgivings(self, known: Known, at: At, fact: FactBody) -> Iterator[str]:
        """What its writer had no right to, each in a sentence; nothing where all is well."""
        point = getattr(fact, "point", "")
        if fact.kind == "reading.taken":
            self._readers[point].add(at.actor)
        right = RIGHTS.get(fact.kind)
        if right is not None:
            yield from _asked(known, at, fact, right)
            if right.second and self._did_work(known, at, point):
                yield f"{at.actor} did a step of this point, which asks for a second person."

    def _did_work(self, known: Known, at: At, point: str) -> bool:
        row = known.get("point", point)
        workers = json.loads(row["workers"]) if row is not None else []
        return at.actor in workers or at.actor in self._readers[point]


def _asked(known: Known, at: At, fact: FactBody, right: Right) -> Iterator[str]:
    named = getattr(fact, right.named) if right.named else at.actor
    if named != at.actor:
        yield f"It names {named} as the one who acted, but {at.actor} signed it."
    yield from _roles(known, at, _of_standing(fact) or right)
    yield from _second_signature(known, at, fact)


def _of_standing(fact: FactBody) -> Right | None:
    """Anyone may stop the use of stock; to free it takes more than a technician."""
    if getattr(fact, "standing", "") == "free":
        return _right("set_by", "planner", "reviewer", "custodian")
    return None


def _roles(known: Known, at: At, right: Right) -> Iterator[str]:
    row = known.get("person", at.actor)
    if row is None:
        # The custodian of a new logbook is enrolled by the deed that begins it.
        if right.roles and right.roles != {"custodian"}:
            yield f"{at.actor} was not enrolled then."
    elif not row["active"]:
        yield f"{at.actor} was no longer active then."
    elif right.roles and not right.roles & set(json.loads(row["roles"])):
        yield f"{at.actor} did not have the role {' or '.join(sorted(right.roles))} then."


def _second_signature(known: Known, at: At, fact: FactBody) -> Iterator[str]:
    revision = getattr(fact, "revision", None)
    record = known.get("record", f"{getattr(fact, 'point', '')}/{revision}")
    if fact.kind == "point.accepted" and record and record["submitted_by"] == at.actor:
        yield f"{at.actor} signed this record already; the two signatures are of two people."
