"""Deeds about meters in use: check one on a reference at the start of a shift."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from datetime import date

from gaugelog.errors import ExitCode, Fault, Faulty
from gaugelog.intake.instruments import QUANTITY_UNITS
from gaugelog.intake.typed import parse_quantity
from gaugelog.journal.clock import Moment
from gaugelog.journal.ids import new_id
from gaugelog.journal.keys import Signer
from gaugelog.ledger.base import Quantity
from gaugelog.ledger.checks import CHECKS
from gaugelog.ledger.instruments import InstrumentAdded, InstrumentRow, ReferenceValue
from gaugelog.ledger.points import PointRow
from gaugelog.ledger.readings import ReadingRow
from gaugelog.ledger.shiftchecks import MeterChecked, MeterCheckRow
from gaugelog.ledger.view import View
from gaugelog.rules.accuracy import range_of
from gaugelog.rules.digits import quantity
from gaugelog.rules.shift import COVERAGE, RULE, agreement
from gaugelog.rules.who import demand_role
from gaugelog.rules.windows import local_text, time_of
from gaugelog.work.doing import day_of, observed_at, utc_text
from gaugelog.work.logbook import Logbook


@dataclass(frozen=True, slots=True)
class Checked:
    """A check of a meter that was kept, and what to say of it."""

    fact: MeterChecked
    lines: tuple[str, ...]

    @property
    def exit_code(self) -> ExitCode:
        """OK when the meter agrees, TROUBLE when it does not."""
        return ExitCode.OK if self.fact.outcome == "pass" else ExitCode.TROUBLE


def check(
    logbook: Logbook,
    signer: Signer,
    *,
    meter: str,
    reference: str,
    reads: str,
    value: str = "",
    note: str = "",
    at: str = "",
) -> Checked:
    """Keep what a meter reads on a reference, judged by what both leave uncertain.

    `value` says which of the reference's values, where it has several; `at` when, if not now.
    Raises Faulty naming what is wrong with what was typed, Refused without a fitting role.
    """
    with logbook.deed(signer) as deed:
        demand_role(deed.view, signer.person, "technician", "custodian")
        when = observed_at(at, deed.moment)
        day = day_of(when, deed.moment)
        read_on, known = _instruments(deed.view, meter, reference, day)
        chosen = _chosen(read_on, known, value)
        found = _typed(reads, chosen.quantity)
        span = range_of(read_on, chosen.quantity, found)
        judged = agreement(span, found, chosen)
        fact = MeterChecked(
            id=new_id(),
            instrument=read_on.id,
            label=read_on.label,
            quantity=chosen.quantity,
            range=span.range.name,
            reference=known.id,
            reference_label=known.label,
            value=chosen.value,
            value_uncertainty=judged.known_uncertainty,
            typed=reads.strip(),
            reads=found,
            off=judged.off,
            at_most=judged.at_most,
            score=judged.score,
            outcome="pass" if judged.passes else "fail",
            rule=RULE,
            note=note,
            observed_at=utc_text(when),
            checked_by=signer.person,
        )
        deed.keep(fact, [read_on.id, known.id])
        return Checked(fact, tuple(_told(deed.view, fact, deed.moment)))


def checks(logbook: Logbook, meter: str = "") -> list[MeterChecked]:
    """The checks of a meter, or of all, as they were entered. Raises Faulty for an unknown one."""
    with logbook.reading() as view:
        rows = view.all(MeterCheckRow)
        if meter:
            wanted = _known(view, meter, "METER").id
            rows = [row for row in rows if row.instrument == wanted]
        return [MeterChecked.model_validate_json(row.data) for row in rows]


def _instruments(
    view: View, meter: str, reference: str, day: date
) -> tuple[InstrumentAdded, InstrumentAdded]:
    """The meter and the reference, both in date. Raises Faulty with what is wrong with each."""
    found: list[InstrumentAdded] = []
    faults: list[Fault] = []
    for where, label in (("meter", meter), ("reference", reference)):
        try:
            row = _known(view, label, where)
            body = InstrumentAdded.model_validate_json(row.data)
            faults += [Fault(where, what, "Take another.") for what in _out_of_date(body, day)]
            found.append(body)
        except Faulty as error:
            faults += error.faults
    if len(found) > 1 and found[0].id == found[1].id:
        faults.append(Fault("reference", "is the meter itself.", "Name what it is read on."))
    if faults:
        raise Faulty(faults)
    return found[0], found[1]


def _known(view: View, label: str, where: str) -> InstrumentRow:
    row = view.instrument(label)
    if row is None:
        what = f"no instrument is called “{label}”."
        raise Faulty([Fault(where, what, "See `gaugelog instrument list`.")])
    return row


def _out_of_date(body: InstrumentAdded, day: date) -> Iterator[str]:
    if date.fromisoformat(body.due) < day:
        yield f"{body.label} was due for calibration on {body.due}."
    if date.fromisoformat(body.calibrated_on) > day:
        yield f"{body.label} was calibrated only on {body.calibrated_on}."


def _chosen(meter: InstrumentAdded, known: InstrumentAdded, value: str) -> ReferenceValue:
    """The value of the reference that was read; asked for where several could be meant."""
    if not known.values:
        remedy = "Enter its values with [[instrument.value]]."
        raise Faulty([Fault("reference", f"{known.label} has no known value.", remedy)])
    measured = {span.quantity for span in meter.ranges}
    fitting = [each for each in known.values if each.quantity in measured]
    if not fitting:
        kinds = ", ".join(dict.fromkeys(each.quantity for each in known.values))
        raise Faulty([Fault("meter", f"{meter.label} does not measure {kinds}.", "Take another.")])
    meant = [each for each in fitting if not value.strip() or _is(each, value)]
    if len(meant) != 1:
        shown = "; ".join(str(each.value) for each in fitting)
        what = f"{known.label} has several." if not value.strip() else f"“{value}” is none of them."
        raise Faulty([Fault("value", what, f"Known of {known.label}: {shown}.")])
    return meant[0]


def _is(known: ReferenceValue, value: str) -> bool:
    try:
        typed = parse_quantity(value, QUANTITY_UNITS[known.quantity])
    except Faulty:
        return False
    return abs(typed.si() - known.value.si()) <= 1e-9 * abs(known.value.si())


def _typed(reads: str, measured: str) -> Quantity:
    try:
        return parse_quantity(reads, QUANTITY_UNITS[measured])
    except Faulty as error:
        raise Faulty([Fault("reads", each.what, each.remedy) for each in error.faults]) from None


def _told(view: View, fact: MeterChecked, now: Moment) -> Iterator[str]:
    most = quantity(fact.at_most.si(), fact.at_most.unit, 3)
    yield (
        f"{fact.label} on {fact.reference_label}, {fact.value}: reads {fact.reads}, "
        f"{fact.off} off; at most {most} either way (k = {COVERAGE}): {fact.outcome.upper()}"
    )
    if fact.outcome == "fail":
        yield from _in_doubt(view, fact, now)


def _in_doubt(view: View, fact: MeterChecked, now: Moment) -> Iterator[str]:
    """What was read with the meter since it last passed."""
    passed = [
        row.observed_at
        for row in view.all(MeterCheckRow, instrument=fact.instrument, quantity=fact.quantity)
        if row.outcome == "pass" and row.observed_at <= fact.observed_at
    ]
    since = max(passed, default="")
    rows = [
        row
        for row in view.all(ReadingRow, instrument=fact.instrument)
        if CHECKS[row.check].quantity == fact.quantity and since <= row.observed_at
    ]
    if rows:
        labels = ", ".join(_labels(view, rows))
        when = f"since it passed at {local_text(time_of(since), now)}" if since else "before"
        counted = f"{len(rows)} reading{'s'[: len(rows) > 1]}"
        yield f"In doubt: {counted} taken with it {when}, of {labels}. Measure again."
    yield f"Put {fact.label} away, or find the cause and check it again."


def _labels(view: View, rows: Sequence[ReadingRow]) -> list[str]:
    points = dict.fromkeys(row.point for row in rows)
    found = [view.get(PointRow, each) for each in points]
    return [row.label for row in found if row is not None]
