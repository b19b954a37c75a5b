"""A reading taken in a step: plausible, on a range, judged against its limits, with its attempt."""

from __future__ import annotations

from dataclasses import dataclass

from gaugelog.errors import Fault, Faulty, Refused
from gaugelog.intake.typed import TypedReading
from gaugelog.journal.ids import new_id
from gaugelog.ledger.campaign import (
    CampaignRow,
    Channel,
    ChannelRow,
    CriteriaAgreed,
    CriteriaRow,
)
from gaugelog.ledger.checks import CHECKS
from gaugelog.ledger.instruments import InstrumentAdded
from gaugelog.ledger.points import GridRow, PointPlanned, PointRow
from gaugelog.ledger.readings import LimitFound, ReadingRow, ReadingTaken
from gaugelog.ledger.routes import RouteStep
from gaugelog.ledger.stock import GaugeRow, LotReceived, LotRow
from gaugelog.ledger.view import View
from gaugelog.rules.accuracy import range_for, taken_on
from gaugelog.rules.certificate import certificate_at
from gaugelog.rules.digits import probability_text
from gaugelog.rules.limits import Basis, criteria_for
from gaugelog.rules.plausible import demand_plausible
from gaugelog.rules.predicted import Expected, judge_prediction
from gaugelog.rules.shift import in_force
from gaugelog.rules.verdicts import Judged, Taken, judge_change, judge_value
from gaugelog.rules.voltage import range_within, voltage_bounds
from gaugelog.rules.windows import time_of
from gaugelog.rules.wired import planned_circuit, wired

RECEIVED = "received"
"""The stage that a change of resistance is counted from."""


@dataclass(frozen=True, slots=True)
class Observation:
    """Who took a reading, when (UTC text), in which step of which point, on which subject."""

    view: View
    point: PointRow
    step: RouteStep
    subject: str
    observed_at: str
    observed_by: str
    reason: str


def reading_taken(
    seen: Observation, check: str, typed: TypedReading, instrument: InstrumentAdded, gauge: str
) -> ReadingTaken:
    """The fact of a reading, judged. `gauge` is the id of the gauge it was taken on.

    Raises Faulty when it can't be a reading of this gauge or lacks a reason, Refused when what
    it is judged by is missing.
    """
    where = f"point {seen.point.label}, step {seen.step.id}, {check}"
    basis = _basis(seen, gauge)
    demand_plausible(check, typed.quantity, basis.lot, where)
    bounds = voltage_bounds(basis, check, seen.step.stage)
    span = range_within(bounds, instrument, check, typed.quantity, typed.qualifier)
    taken = Taken(typed.quantity, typed.qualifier, span)
    earlier = _latest(seen, check, seen.step.stage)
    if earlier is not None and not seen.reason.strip():
        raise Faulty([Fault(where, "was measured before.", "Say why again, with --reason.")])
    judged, compared = _judge(seen, basis, check, taken)
    return ReadingTaken(
        id=new_id(),
        point=seen.point.id,
        subject=seen.subject,
        step=seen.step.id,
        check=check,
        stage=seen.step.stage,
        attempt=1 + (earlier.attempt if earlier is not None else 0),
        typed=typed.typed,
        qualifier=typed.qualifier,
        value=typed.quantity,
        gauge=gauge,
        instrument=instrument.id,
        range=span.range.name,
        test_voltage=span.range.test_voltage,
        observed_at=seen.observed_at,
        observed_by=seen.observed_by,
        reason=seen.reason if earlier is not None else "",
        repeats=earlier.id if earlier is not None else None,
        compared_with=compared,
        shift_check=_checked(seen, basis, check, instrument) or None,
        result=judged.result,
        limits=judged.limits,
        verdict=judged.verdict,
    )


def _checked(seen: Observation, basis: Basis, check: str, instrument: InstrumentAdded) -> str:
    when, measured = time_of(seen.observed_at), CHECKS[check].quantity
    return in_force(seen.view, instrument.id, measured, when, basis.criteria.shift_check)


def explain(reading: ReadingTaken) -> list[str]:
    """The verdict in plain lines: limits with the one that ruled, margin, probability, why."""
    verdict = reading.verdict
    lines = []
    if reading.result is not None:
        lines.append(f"change {reading.result}")
    lines += [_limit_line(limit) for limit in reading.limits]
    if verdict.standard_uncertainty is not None:
        lines.append(
            f"u = {verdict.standard_uncertainty}, guard band {verdict.guard_band} "
            f"(k = {verdict.coverage})"
        )
    if verdict.probability is not None:
        chance = probability_text(verdict.probability)
        equals = "" if chance[0] in "<>" else "= "
        lines.append(f"P {equals}{chance}, the probability of conformance (flat prior)")
    return [*lines, verdict.reason]


def _limit_line(limit: LimitFound) -> str:
    sides = []
    if limit.at_least is not None:
        sides.append(f"at least {limit.at_least}")
    if limit.at_most is not None:
        sides.append(f"at most {limit.at_most}")
    ruled = "ruling" if limit.rules else "also"
    return f"{ruled} limit: {' and '.join(sides)} by {limit.origin} ({limit.source})"


def _judge(seen: Observation, basis: Basis, check: str, taken: Taken) -> tuple[Judged, str | None]:
    if CHECKS[check].judged == "prediction":
        return judge_prediction(_expected(seen, basis), check, seen.step.stage, taken), None
    if not _judges_change(basis, check, seen.step.stage):
        return judge_value(basis, check, seen.step.stage, taken), None
    row = _latest(seen, check, RECEIVED)
    if row is None:
        raise Refused(
            f"{seen.point.label} has no {check} as received to compare with.",
            "Measure it as received first.",
        )
    before = _taken_before(seen.view, row)
    return judge_change(basis, seen.step.stage, before, taken), row.id


def _expected(seen: Observation, basis: Basis) -> Expected:
    """What the circuit of this step predicts from: its plan, its readings, its channel."""
    planned = planned_circuit(seen.view, seen.subject)
    channel = seen.view.get(ChannelRow, planned.channel)
    if channel is None:
        raise Refused("The channel of this circuit is not known.", "Check the journal.")
    spec = Channel.model_validate_json(channel.data)
    return Expected(basis, planned, wired(seen.view, planned), spec)


def _judges_change(basis: Basis, check: str, stage: str) -> bool:
    figures = [item.at_most or item.at_least for item in criteria_for(basis, check, stage)]
    return check == "resistance" and any(
        figure is not None and figure.unit == "%" for figure in figures
    )


def _taken_before(view: View, row: ReadingRow) -> Taken:
    reading = ReadingTaken.model_validate_json(row.data)
    body = certificate_at(view, reading.instrument, row.seq)
    span = next((taken_on(body, item) for item in body.ranges if item.name == reading.range), None)
    if span is None:
        span = range_for(body, reading.check, reading.value, reading.qualifier)
    return Taken(reading.value, reading.qualifier, span)


def _latest(seen: Observation, check: str, stage: str) -> ReadingRow | None:
    rows = seen.view.all(ReadingRow, subject=seen.subject, check=check, stage=stage, latest=1)
    return rows[-1] if rows else None


def _basis(seen: Observation, gauge: str) -> Basis:
    piece = seen.view.get(GaugeRow, gauge) if gauge else None
    if piece is None:
        raise Refused(
            f"No gauge was taken for {seen.point.label} yet.", "Enter the gauge in its step first."
        )
    lot, grid = seen.view.get(LotRow, piece.lot), seen.view.get(GridRow, seen.subject)
    campaign = seen.view.get(CampaignRow, seen.point.campaign)
    criteria = seen.view.get(CriteriaRow, campaign.criteria) if campaign is not None else None
    if lot is None or campaign is None or criteria is None:
        raise Refused("The lot or the criteria of this point are not known.", "Check the journal.")
    return Basis(
        PointPlanned.model_validate_json(seen.point.data),
        LotReceived.model_validate_json(lot.data),
        CriteriaAgreed.model_validate_json(criteria.data),
        campaign.surroundings,
        grid.number if grid is not None else 1,
    )
