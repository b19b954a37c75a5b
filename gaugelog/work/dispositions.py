"""Deeds that decide what becomes of a point: replace its gauge, or withdraw it."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from gaugelog.errors import Refused
from gaugelog.journal.keys import Signer
from gaugelog.ledger.dispositions import DispositionMade
from gaugelog.ledger.points import PointRow
from gaugelog.ledger.readings import ReadingRow
from gaugelog.ledger.sharing import points_in
from gaugelog.ledger.steps import was_mounted
from gaugelog.ledger.view import View
from gaugelog.rules.amended import record_in_force
from gaugelog.rules.progress import remedy_for, route_for, state_of
from gaugelog.rules.taken import circuits_of
from gaugelog.rules.who import demand_role
from gaugelog.work.doing import about, point_row
from gaugelog.work.kept import demand_meaning, demand_reason
from gaugelog.work.logbook import Logbook


def replace(
    logbook: Logbook, signer: Signer, *, point: str, reason: str, meaning: str
) -> DispositionMade:
    """Give up the gauge in place; a new piece is taken, and the place prepared anew.

    An accepted record stays, and the next one revises it. Raises Faulty without a reason or a
    meaning, Refused when no gauge is bonded there, or the point is under review or withdrawn.
    """
    demand_reason(reason)
    demand_meaning(meaning)
    with logbook.deed(signer) as deed:
        row = point_row(deed.view, point)
        demand_role(deed.view, signer.person, "technician", "planner", "reviewer")
        _demand_open(deed.view, row)
        _demand_mounted(deed.view, row)
        accepted = record_in_force(deed.view, row.id)
        circuits = circuits_of(deed.view, row.id)
        body = DispositionMade(
            point=row.id,
            disposition="replace",
            reason=reason,
            gauge=row.gauge,
            readings=tuple(_latest(deed.view, row.id, circuits)),
            circuits=tuple(circuits),
            revision=accepted.revision if accepted is not None else None,
            decided_by=signer.person,
            meaning=meaning,
        )
        others = [each for circuit in circuits for each in points_in(deed.view.known(), circuit)]
        deed.keep(body, about(deed.view, row, row.id, row.gauge, *circuits, *others))
    return body


def withdraw(
    logbook: Logbook, signer: Signer, *, point: str, reason: str, meaning: str
) -> DispositionMade:
    """Withdraw a point: no more is done there, and nothing is measured.

    What was kept of it stays. Raises Faulty without a reason or a meaning, Refused when the point
    is under review or withdrawn, or the one who acts is neither planner nor reviewer.
    """
    demand_reason(reason)
    demand_meaning(meaning)
    with logbook.deed(signer) as deed:
        row = point_row(deed.view, point)
        demand_role(deed.view, signer.person, "planner", "reviewer")
        _demand_open(deed.view, row)
        body = DispositionMade(
            point=row.id,
            disposition="withdraw",
            reason=reason,
            gauge=row.gauge or None,
            decided_by=signer.person,
            meaning=meaning,
        )
        gauge = [row.gauge] if row.gauge else []
        deed.keep(body, about(deed.view, row, row.id, *gauge))
    return body


def left_behind(logbook: Logbook, made: DispositionMade) -> list[str]:
    """Labels of other points of the circuits whose records, submitted or accepted, are behind."""
    with logbook.reading() as view:
        known = view.known()
        others = (each for circuit in made.circuits for each in points_in(known, circuit))
        rows = [view.get(PointRow, each) for each in dict.fromkeys(others) if each != made.point]
        behind = {"awaiting review", "accepted"}
        return [row.label for row in rows if row is not None and state_of(view, row) in behind]


def _latest(view: View, point: str, circuits: Sequence[str]) -> Iterator[str]:
    """The latest readings of a point, and of its circuits wherever they were taken."""
    found = view.all(ReadingRow, point=point, latest=1)
    found += [row for each in circuits for row in view.all(ReadingRow, subject=each, latest=1)]
    yield from dict.fromkeys(row.id for row in found)


def _demand_open(view: View, row: PointRow) -> None:
    state = state_of(view, row)
    if state in {"awaiting review", "withdrawn", "planned"}:
        raise Refused(f"{row.label} is {state}.", remedy_for(row.label, state))


def _demand_mounted(view: View, row: PointRow) -> None:
    known = view.known()
    if row.gauge and was_mounted(known, row.model_dump()):
        return
    steps = route_for(view, row).steps
    taking = next((step.id for step in steps if any(i.kind == "gauge" for i in step.inputs)), "")
    raise Refused(
        f"No gauge is bonded at {row.label} yet.",
        f"Take another with `gaugelog step redo {row.label} {taking}`, or scrap the piece.",
    )
