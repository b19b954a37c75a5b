"""Deeds about photos: keep one as evidence, by itself or with the step that asks for it."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from gaugelog.errors import Fault, Faulty, Refused
from gaugelog.intake.pictures import Picture
from gaugelog.journal.ids import new_id
from gaugelog.journal.keys import Signer
from gaugelog.ledger.photos import PhotoKept, PhotoRow
from gaugelog.ledger.points import PointRow
from gaugelog.ledger.progress import open_step
from gaugelog.ledger.readings import ReadingTaken
from gaugelog.ledger.view import View
from gaugelog.rules.progress import demand_step, remedy_for, route_for, state_of
from gaugelog.rules.who import demand_role
from gaugelog.work.doing import about, observed_at, point_row, utc_text
from gaugelog.work.inputs import LONGEST_TEXT
from gaugelog.work.kept import text_to_keep
from gaugelog.work.logbook import Deed, Logbook

_AT_REST = frozenset({"planned", "awaiting review", "accepted", "withdrawn", "removed"})
"""States in which nothing is added to what the point's record shows."""


@dataclass(frozen=True, slots=True)
class Shows:
    """What a photo shows: the point, step and subject, the piece, the readings it came with."""

    point: PointRow
    step: str
    subject: str
    gauge: str
    observed_at: str
    readings: Sequence[ReadingTaken] = ()
    note: str = ""


def add(
    logbook: Logbook,
    signer: Signer,
    pictures: Sequence[Picture],
    *,
    point: str,
    step: str = "",
    note: str = "",
    at: str = "",
) -> list[PhotoKept]:
    """Keep photos of a point, or of a step of it that was come to; all of them or none.

    `at` is when they were taken, if not now. Raises Refused when the point is at rest or the step
    lies ahead, Faulty for a time or text that can't be kept.
    """
    if len(note) > LONGEST_TEXT:
        what = f"has {len(note)} characters; {LONGEST_TEXT} are kept at most."
        raise Faulty([Fault("note", what, "Say what the photo shows.")])
    with logbook.deed(signer) as deed:
        row = point_row(deed.view, point)
        demand_role(deed.view, signer.person, "technician")
        _demand_open(deed.view, row)
        if step:
            _demand_come_to(deed.view, row, step)
        when = utc_text(observed_at(at, deed.moment))
        shows = Shows(row, step, row.id, row.gauge, when, (), note)
        return [keep_photo(deed, shows, each) for each in pictures]


def kept(logbook: Logbook, point: str = "") -> list[tuple[str, PhotoKept]]:
    """The photos of a point, or of all, each with the label of its point; as they were entered.

    Raises Refused when there is no such point.
    """
    with logbook.reading() as view:
        rows = [point_row(view, point)] if point else view.all(PointRow)
        labels = {row.id: row.label for row in rows}
        photos = [row for row in view.all(PhotoRow) if row.point in labels]
        return [(labels[row.point], PhotoKept.model_validate_json(row.data)) for row in photos]


def keep_photo(deed: Deed, shows: Shows, picture: Picture) -> PhotoKept:
    """Keep one photo within a deed: its file as it is, and the fact that names it."""
    fact = PhotoKept(
        id=new_id(),
        point=shows.point.id,
        step=shows.step,
        subject=shows.subject or None,
        readings=tuple(reading.id for reading in shows.readings),
        gauge=shows.gauge or None,
        file=deed.evidence.put(picture.data),
        name=text_to_keep(picture.name),
        format=picture.format,
        width=picture.width,
        height=picture.height,
        size=len(picture.data),
        note=shows.note,
        observed_at=shows.observed_at,
        kept_by=deed.signer.person,
    )
    others = [each for each in (fact.id, fact.gauge, *fact.readings) if each]
    concerned = about(deed.view, shows.point, shows.subject, *others)
    deed.keep(fact, concerned, evidence=[fact.file])
    return fact


def _demand_open(view: View, row: PointRow) -> None:
    state = state_of(view, row)
    if state in _AT_REST:
        raise Refused(
            f"{row.label} is {state}; no photo can be added now.",
            remedy_for(row.label, state),
        )


def _demand_come_to(view: View, row: PointRow, step: str) -> None:
    """A photo shows what was done or is in hand, not what lies ahead."""
    wanted = demand_step(view, row, step)
    at_hand = open_step(view.known(), row.model_dump())
    if at_hand is not None and at_hand.number <= route_for(view, row).steps.index(wanted):
        raise Refused(
            f"“{wanted.title}” of {row.label} lies ahead; the work is at “{at_hand.step.title}”.",
            f"See `gaugelog step next {row.label}`.",
        )
