"""Start-of-shift checks: how a meter agrees with a known value, and how long that speaks for it."""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from datetime import datetime, timedelta

from gaugelog.journal.clock import Moment
from gaugelog.ledger.base import Quantity
from gaugelog.ledger.campaign import CampaignRow, CriteriaAgreed, CriteriaRow, ShiftDemand
from gaugelog.ledger.instruments import InstrumentAdded, InstrumentRow, ReferenceValue
from gaugelog.ledger.shiftchecks import MeterCheckRow
from gaugelog.ledger.view import View
from gaugelog.physics.agreement import combined, e_number
from gaugelog.rules.accuracy import RangeTaken
from gaugelog.rules.digits import decimal_text, quantity
from gaugelog.rules.windows import local_text, time_of

RULE = "shift check 1"
COVERAGE = 2
USUAL = timedelta(hours=12)
"""How long a check speaks for a meter where the criteria say nothing. Common practice."""


@dataclass(frozen=True, slots=True)
class Agreement:
    """How a meter agrees with a known value; all in the unit that was read."""

    off: Quantity
    at_most: Quantity
    known_uncertainty: Quantity
    score: str
    passes: bool


def agreement(span: RangeTaken, reads: Quantity, reference: ReferenceValue) -> Agreement:
    """Judge a reading of a known value: E_n of 1 or less agrees (ISO 13528, 9.7).

    The meter's accuracy on `span` and the reference's uncertainty, each expanded with k = 2.
    """
    known = reference.uncertainty.si() * COVERAGE / float(reference.coverage)
    measured = COVERAGE * span.uncertainty(reads.si())
    off = reads.si() - reference.value.si()
    score = float(e_number(off, measured, known))
    unit = reads.unit
    most = float(combined(measured, known))
    return Agreement(
        quantity(off, unit),
        quantity(most, unit),
        quantity(known, unit),
        decimal_text(score, 4),
        score <= 1,
    )


def shift_demand(view: View, campaign: str) -> ShiftDemand | None:
    """What the criteria of a campaign (by its id) ask of meters; None where they ask nothing."""
    row = view.get(CampaignRow, campaign)
    criteria = view.get(CriteriaRow, row.criteria) if row is not None else None
    if criteria is None:
        return None
    return CriteriaAgreed.model_validate_json(criteria.data).shift_check


def speaking(
    view: View, instrument: str, measured: str, observed: datetime
) -> MeterCheckRow | None:
    """The last check of what a meter measures, before something was observed; None without one."""
    rows = view.all(MeterCheckRow, instrument=instrument, quantity=measured)
    before = [row for row in rows if time_of(row.observed_at) <= observed]
    return max(before, key=lambda row: (row.observed_at, row.seq)) if before else None


def in_force(
    view: View, instrument: str, measured: str, observed: datetime, demand: ShiftDemand | None
) -> str:
    """The id of the check that speaks for a meter's reading: passed, and young enough; or empty."""
    row = speaking(view, instrument, measured, observed)
    longest = timedelta(seconds=demand.within.si()) if demand is not None else USUAL
    good = row is not None and row.outcome == "pass" and _age(row, observed) <= longest
    return row.id if row is not None and good else ""


def why_unchecked(
    view: View,
    meter: InstrumentAdded,
    measured: Iterable[str],
    observed: datetime,
    demand: ShiftDemand | None,
    now: Moment,
) -> list[str]:
    """Why a meter may not be read by the criteria, a sentence a quantity; empty when it may."""
    asked = [each for each in measured if demand is not None and each in demand.of]
    return [
        why
        for each in asked
        if demand is not None and (why := _why(view, meter, each, observed, demand, now))
    ]


def _why(
    view: View,
    meter: InstrumentAdded,
    measured: str,
    observed: datetime,
    demand: ShiftDemand,
    now: Moment,
) -> str:
    row = speaking(view, meter.id, measured, observed)
    wanted = f"the criteria ask for one within {demand.within} ({demand.source})"
    if row is None:
        return f"{meter.label} has no start-of-shift check of {measured}; {wanted}."
    if row.outcome == "fail":
        reference = view.get(InstrumentRow, row.reference)
        on = f" on {reference.label}" if reference is not None else ""
        when = local_text(time_of(row.observed_at), now)
        return f"{meter.label} failed its check of {measured}{on} at {when}."
    age = _age(row, observed)
    if age > timedelta(seconds=demand.within.si()):
        hours = age.total_seconds() / 3600
        return f"{meter.label} was checked for {measured} {hours:.1f} h before; {wanted}."
    return ""


def _age(row: MeterCheckRow, observed: datetime) -> timedelta:
    return observed - time_of(row.observed_at)
