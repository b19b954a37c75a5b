"""The fold from entries to tables: each kind of fact changes rows in its own pure way."""

from __future__ import annotations

import json
import sqlite3
from collections.abc import Iterable, Iterator
from functools import cache
from typing import Any

from pydantic import ConfigDict, create_model
from pydantic_core import from_json

from gaugelog.errors import GaugelogError, StorageTrouble
from gaugelog.journal.check.report import Trouble
from gaugelog.journal.collection import no_collection
from gaugelog.journal.entry import Entry
from gaugelog.journal.order import ledger_order
from gaugelog.journal.storage.sqlite import SqliteReader
from gaugelog.ledger import (
    campaign,
    circuits,
    dispositions,
    instruments,
    notes,
    papers,
    people,
    photos,
    points,
    readings,
    restored,
    reviews,
    revisions,
    routes,
    schema,
    shiftchecks,
    standing,
    steps,
    stock,
)
from gaugelog.ledger.base import FactBody
from gaugelog.ledger.buffer import Buffer
from gaugelog.ledger.rights import Judge, Rights
from gaugelog.ledger.rows import Apply, At, Change, Known, Row

_FOLD: dict[tuple[str, int], tuple[type[FactBody], Apply]] = {
    (body.kind, body.version): (body, function)
    for body, function in (
        (people.PersonEnrolled, people.apply_person_enrolled),
        (people.PersonLeft, people.apply_person_left),
        (stock.LotReceived, stock.apply_lot_received),
        (stock.PacksReceived, stock.apply_packs_received),
        (stock.ConsumableReceived, stock.apply_consumable_received),
        (instruments.InstrumentAdded, instruments.apply_instrument_added),
        (campaign.CampaignPlanned, campaign.apply_campaign_planned),
        (campaign.CriteriaAgreed, campaign.apply_criteria_agreed),
        (campaign.PlanLoaded, campaign.apply_plan_loaded),
        (campaign.PlanReleased, revisions.apply_plan_released),
        (revisions.PlanRevised, revisions.apply_plan_revised),
        (revisions.ChangeSeen, revisions.apply_change_seen),
        (routes.RouteAdopted, routes.apply_route_adopted),
        (points.PointPlanned, points.apply_point_planned),
        (circuits.CircuitPlanned, circuits.apply_circuit_planned),
        (steps.StepDone, steps.apply_step_done),
        (steps.StepSkipped, steps.apply_step_skipped),
        (steps.HoldDecided, steps.apply_hold_decided),
        (steps.StepReopened, steps.apply_step_reopened),
        (readings.ReadingSeen, readings.apply_reading_taken),
        (reviews.PointSubmitted, reviews.apply_point_submitted),
        (reviews.PointAccepted, reviews.apply_point_accepted),
        (reviews.PointReturned, reviews.apply_point_returned),
        (reviews.PointReopened, reviews.apply_point_reopened),
        (dispositions.DispositionMade, dispositions.apply_disposition_made),
        (shiftchecks.MeterChecked, shiftchecks.apply_meter_checked),
        (papers.CertificateKept, papers.apply_certificate_kept),
        (photos.PhotoKept, photos.apply_photo_kept),
        (notes.NoteLeft, notes.apply_note_left),
        (standing.StandingSet, standing.apply_standing_set),
        (restored.LogbookRestored, restored.apply_logbook_restored),
    )
}
"""Kind and version of a fact to its body and how it changes the tables."""

_PAST_THE_PROGRAM = "It was written past the program: ask who signed it, and have it put right."

_STEP = 8
"""The step of the journal's check that compares the ledger."""


def apply(known: Known, entry: Entry, judge: Judge | None = None) -> Iterator[Change]:
    """How one entry changes the tables, given what is known before it; `judge` looks at it first.

    Kinds that this version does not know, and withheld bodies, change nothing.
    """
    # The check reads headers strictly; here a plain look at the same bytes is enough.
    header = from_json(entry.header_bytes)
    found = _FOLD.get((header["kind"], header["version"]))
    if found is None or entry.body_bytes is None:
        return
    model, function = found
    body = _body_of(model).model_validate_json(entry.body_bytes)
    at = At(
        header["seq"],
        header["time"],
        header["actor"],
        header["boot"],
        header["uptime_ms"],
        _text_of(entry.body_bytes, body),
    )
    if judge is not None:
        judge(known, at, body.fact)
    yield from function(known, at, body.fact)


@cache
def _body_of(model: type[FactBody]) -> type[Any]:
    """An entry's body with this fact in it: bytes are read and validated in one go."""
    config = ConfigDict(extra="allow")
    return create_model(f"BodyOf{model.__name__}", fact=(model, ...), __config__=config)


def _text_of(body_bytes: bytes, body: Any) -> str:
    """The fact as JSON, cut out of the body: its keys are sorted, so `salt` follows `fact`."""
    if not body.model_extra.keys() <= _USUAL:
        fact = json.loads(body_bytes)["fact"]
        return json.dumps(fact, ensure_ascii=False, separators=(",", ":"), sort_keys=True)
    start = body_bytes.index(b'"fact":') + len(b'"fact":')
    return body_bytes[start : body_bytes.rindex(b',"salt":')].decode()


_USUAL = frozenset({"about", "evidence", "salt", "sheets"})


def keep(connection: sqlite3.Connection, entries: Iterable[Entry]) -> None:
    """Let the tables follow new entries, in the open transaction."""
    buffer = Buffer(lambda table, row_id: schema.load_row(connection, table, row_id))
    for entry in entries:
        buffer.take(apply(buffer, entry))
    schema.write(connection, buffer)


def fold(
    entries: Iterable[Entry], *, one_chain: bool = False, judge: Judge | None = None
) -> Buffer:
    """The whole ledger from the whole journal, in memory; `judge` looks at each fact before.

    With `one_chain` the entries are those of a single chain, in its own order already. Raises
    StorageTrouble naming an entry that can't be followed.
    """
    buffer = Buffer()
    with no_collection():
        for entry in entries if one_chain else ledger_order(entries):
            try:
                buffer.take(apply(buffer, entry, judge))
            except (LookupError, ValueError, TypeError) as error:
                raise _unfoldable(entry, error) from error
    return buffer


def _unfoldable(entry: Entry, error: Exception) -> StorageTrouble:
    """What an entry says can't be followed: a newer program's, or bytes that were altered."""
    try:
        place = f"Entry {entry.header.seq} ({entry.header.kind})"
    except GaugelogError:
        place = "An entry whose header can't be read"
    first = str(error).splitlines()[0] if str(error) else type(error).__name__
    return StorageTrouble(
        f"{place} can't be followed by this version: {first}.",
        "Update Gaugelog, or see what `gaugelog journal check` finds.",
    )


def rebuild(reader: SqliteReader) -> None:
    """Throw the tables away and write them anew, in the open transaction of `reader`."""
    buffer = fold(reader.entries(), one_chain=len(reader.chains()) == 1)
    connection = reader.connection
    schema.create_tables(connection)
    schema.write(connection, buffer)


def compare(reader: SqliteReader) -> list[Trouble]:
    """Rebuild the ledger in memory; name what nobody might say, and each row that differs."""
    connection = reader.connection
    found: list[Trouble] = []
    rights = Rights()

    def judge(known: Known, at: At, fact: FactBody) -> None:
        found.extend(
            Trouble(_STEP, f"entry {at.seq} ({fact.kind})", what, _PAST_THE_PROGRAM)
            for what in rights.misgivings(known, at, fact)
        )

    wanted = fold(reader.entries(), one_chain=len(reader.chains()) == 1, judge=judge).rows
    return found + [
        trouble
        for table in schema.names()
        for trouble in _differences(
            table,
            {key: row for key, row in wanted.get(table, {}).items() if row is not None},
            {str(row["id"]): row for row in schema.load_rows(connection, table)},
        )
    ]


def _differences(table: str, wanted: dict[str, Row], found: dict[str, Row]) -> Iterator[Trouble]:
    remedy = "The journal is right: rebuild the ledger with `gaugelog journal rebuild`."
    for key in sorted(wanted.keys() | found.keys()):
        where = f"table {table}, row {key}"
        if key not in found:
            yield Trouble(_STEP, where, "The row is missing from the table.", remedy)
        elif key not in wanted:
            yield Trouble(_STEP, where, "No entry of the journal gives this row.", remedy)
        elif wanted[key] != found[key]:
            columns = [name for name in wanted[key] if wanted[key][name] != found[key].get(name)]
            what = f"It differs from the journal in {', '.join(columns)}."
            yield Trouble(_STEP, where, what, remedy)
