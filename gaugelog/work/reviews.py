"""Deeds about a point's record: submit it, accept it, return it; hand it out."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass

from gaugelog.errors import Refused
from gaugelog.journal.append import touched_since
from gaugelog.journal.keys import Signer
from gaugelog.journal.storage.port import Reader
from gaugelog.ledger.points import GridRow, PointRow
from gaugelog.ledger.reviews import PointAccepted, PointReturned, PointSubmitted, RecordRow
from gaugelog.ledger.view import View
from gaugelog.rules.amended import under_amendment
from gaugelog.rules.barred import demand_place_free
from gaugelog.rules.flagged import flags_at
from gaugelog.rules.progress import demand_changes_seen, demand_complete, demand_step
from gaugelog.rules.untouched import demand_untouched
from gaugelog.rules.who import demand_role, demand_second_person
from gaugelog.work.doing import point_row
from gaugelog.work.kept import demand_meaning, demand_reason
from gaugelog.work.logbook import Deed, Logbook
from gaugelog.work.ports import RecordMaker, RecordRequest, Stamp


@dataclass(frozen=True, slots=True)
class SignedOff:
    """A sign-off that was kept: the record's revision and the journal's new head, as printed.

    `flags` are what was seen at the point and not judged, to be looked into.
    """

    revision: int
    head: str
    flags: tuple[str, ...] = ()


@dataclass(frozen=True, slots=True)
class RecordFile:
    """A record as a file to hand out."""

    pdf: bytes
    file_name: str
    description: str


def submit(
    logbook: Logbook, signer: Signer, maker: RecordMaker, *, point: str, meaning: str
) -> SignedOff:
    """Draw and sign the record of a point, and hand it to review.

    The page is drawn before the transaction, from a snapshot; if the point was touched
    meanwhile nothing is kept. Raises Refused when the point is not ready, MachineTrouble when
    pages can't be drawn.
    """
    demand_meaning(meaning)
    # The head comes first: what is kept after it, even before the view opens, counts as a touch.
    head = logbook.head().printed
    with logbook.reading() as view:
        row = point_row(view, point)
        demand_role(view, signer.person, "technician")
        demand_complete(view, row)
        flags = flags_at(view, row)
        request = _request(view, row, head, meaning, logbook)
        pdf = maker.submitted(view, request, signer)
    with logbook.deed(signer) as deed:
        _demand_untouched(deed, row, request)
        demand_complete(deed.view, row)
        file = logbook.evidence.put(pdf)
        amended = under_amendment(deed.view, row.id)
        body = PointSubmitted(
            point=row.id,
            revision=request.revision,
            file=file,
            head=request.head,
            meaning=meaning,
            submitted_by=signer.person,
            reason=amended.reason if amended else "",
            revises=amended.revision if amended else None,
        )
        deed.keep(body, _about(deed.view, row), evidence=[file])
    return SignedOff(request.revision, logbook.head().printed, flags)


def accept(
    logbook: Logbook, signer: Signer, maker: RecordMaker, *, point: str, meaning: str
) -> SignedOff:
    """Add the reviewer's signature to the submitted record; the point is accepted.

    Raises Refused when nothing is submitted, or the reviewer did a step of the point.
    """
    demand_meaning(meaning)
    with logbook.reading() as view, logbook.storage.reading() as reader:
        row, record = under_review(view, point, signer.person, "accept it")
        _demand_fit(view, reader, logbook.chain, row, record)
        flags = flags_at(view, row)
        stamp = Stamp(
            signer.person,
            view.name(signer.person),
            meaning,
            logbook.clock.now(),
            logbook.head().printed,
        )
    pdf = maker.accepted(logbook.evidence.get(record.submitted_file), stamp, signer)
    with logbook.deed(signer) as deed:
        latest, now = under_review(deed.view, point, signer.person, "accept it")
        if now.id != record.id:
            raise Refused(f"{point} was submitted anew meanwhile.", "Look at it again.")
        _demand_fit(deed.view, deed.writer, deed.chain, latest, now)
        # Only now: a file with both signatures is never left behind by a deed that was refused.
        file = logbook.evidence.put(pdf)
        body = PointAccepted(
            point=row.id,
            revision=record.revision,
            file=file,
            head=stamp.head,
            meaning=meaning,
            accepted_by=signer.person,
        )
        deed.keep(body, _about(deed.view, row), evidence=[file])
    return SignedOff(record.revision, logbook.head().printed, flags)


def give_back(
    logbook: Logbook, signer: Signer, *, point: str, reason: str, redo_from: str = ""
) -> None:
    """Return a submitted point with a reason; work goes on from step `redo_from`, if named.

    Raises Faulty without a reason, Refused when nothing is submitted, the reviewer did a step, or
    the step is unknown.
    """
    demand_reason(reason)
    with logbook.deed(signer) as deed:
        row, record = under_review(deed.view, point, signer.person, "return it")
        if redo_from:
            demand_step(deed.view, row, redo_from)
        body = PointReturned(
            point=row.id,
            revision=record.revision,
            reason=reason,
            redo_from=redo_from,
            returned_by=signer.person,
        )
        deed.keep(body, _about(deed.view, row))


def record(logbook: Logbook, *, point: str, revision: int | None = None) -> RecordFile:
    """The newest (or that) revision of a point's signed record, as it was kept.

    Raises Refused when there is none.
    """
    with logbook.reading() as view:
        row = point_row(view, point)
        rows = [
            item
            for item in view.all(RecordRow, point=row.id)
            if revision is None or item.revision == revision
        ]
    if not rows:
        raise Refused(
            f"{point} has no such record.", "See `gaugelog record`, or draw a draft with --draft."
        )
    found = rows[-1]
    file = found.accepted_file or found.submitted_file
    return RecordFile(
        logbook.evidence.get(file),
        f"{row.label}-r{found.revision}",
        f"revision {found.revision}, {found.state}, {_validity(found)}; SHA-256 {file}",
    )


def _validity(found: RecordRow) -> str:
    """What a record's signatures are worth in its state."""
    if found.accepted_file:
        return "both signatures"
    return {"submitted": "one signature, not yet valid"}.get(found.state, "never valid")


def draft(logbook: Logbook, maker: RecordMaker, *, point: str) -> RecordFile:
    """The record as it stands now, marked as a draft on every page."""
    head = logbook.head().printed
    with logbook.reading() as view:
        row = point_row(view, point)
        pdf = maker.draft(view, _request(view, row, head, "", logbook))
    return RecordFile(pdf, f"{row.label}-draft", "a draft, not signed")


def records(logbook: Logbook) -> list[dict[str, str]]:
    """Every record: point, revision, state, who signed, head, digest of the newest file, why.

    The reason is that of its return or amendment, else that of the revision it is.
    """
    with logbook.reading() as view:
        labels = {row.id: row.label for row in view.all(PointRow)}
        return [
            {
                "point": labels[item.point],
                "revision": str(item.revision),
                "state": item.state,
                "submitted_by": item.submitted_by,
                "accepted_by": item.accepted_by,
                "head": item.accepted_head or item.submitted_head,
                "sha256": item.accepted_file or item.submitted_file,
                "reason": item.reason or item.revision_reason,
            }
            for item in view.all(RecordRow)
        ]


def under_review(view: View, point: str, person: str, what: str) -> tuple[PointRow, RecordRow]:
    """The point and the record that `person` may judge; `what` says what for.

    Raises Refused when they may not, or nothing is submitted.
    """
    row = point_row(view, point)
    demand_role(view, person, "reviewer")
    demand_second_person(view, person, row.id, what)
    rows = view.all(RecordRow, point=row.id)
    if not rows or rows[-1].state != "submitted":
        raise Refused(f"{point} is not under review.", "It must be submitted first.")
    if rows[-1].submitted_by == person:
        raise Refused(
            f"{person} signed this record and can't {what}.",
            "Have a second person review it; the two signatures are of two people.",
        )
    return row, rows[-1]


def _request(view: View, row: PointRow, head: str, meaning: str, logbook: Logbook) -> RecordRequest:
    revision = 1 + max((item.revision for item in view.all(RecordRow, point=row.id)), default=0)
    now = logbook.clock.now()
    return RecordRequest(row.id, revision, head, now, meaning, logbook.evidence)


def unfit(
    view: View, reader: Reader, chain: str, row: PointRow, record: RecordRow
) -> Iterator[Refused]:
    """Everything that keeps a submitted record from being accepted, whoever looks.

    What it tells no longer holds at the point, or `chain` holds more of it than it can tell.
    """
    demands: tuple[Callable[[], None], ...] = (
        lambda: demand_untouched(view, row, record),
        lambda: demand_changes_seen(row),
        lambda: demand_place_free(view, row),
        lambda: _demand_told(view, reader, chain, row, record),
    )
    for demand in demands:
        try:
            demand()
        except Refused as error:
            yield error


def _demand_fit(view: View, reader: Reader, chain: str, row: PointRow, record: RecordRow) -> None:
    """Raise Refused with the first that keeps a record from being accepted."""
    for refused in unfit(view, reader, chain, row, record):
        raise refused


def _demand_told(view: View, reader: Reader, chain: str, row: PointRow, record: RecordRow) -> None:
    """Raise Refused when the journal holds more about the point than its record can tell."""
    later = touched_since(reader, _about(view, row), record.seq, chain)
    if later:
        raise Refused(
            f"{row.label} changed since its record was submitted (entry {later[0].header.seq}, "
            f"{later[0].header.kind}).",
            "Return it; it is submitted anew with what is new.",
        )


def _demand_untouched(deed: Deed, row: PointRow, request: RecordRequest) -> None:
    since = int(request.head.partition(":")[0])
    touched = touched_since(deed.writer, _about(deed.view, row), since, deed.chain)
    if touched:
        raise Refused(
            f"{row.label} changed while its record was drawn (entry {touched[0].header.seq}).",
            "Look at it and submit again; nothing was kept.",
        )


def _about(view: View, row: PointRow) -> list[str]:
    return [row.id, *(grid.id for grid in view.all(GridRow, point=row.id))]
