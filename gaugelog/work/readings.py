"""A reading taken in a step: plausible, on a range, judged against its limits, with its attempt."""

from __future__ import annotations

from gaugelog.errors import Fault, Faulty, Refused
from gaugelog.intake.typed import TypedReading
from gaugelog.journal.ids import new_id
from gaugelog.ledger.base import Quantity
from gaugelog.ledger.campaign import CampaignRow, CriteriaAgreed, CriteriaRow
from gaugelog.ledger.checks import CHECKS
from gaugelog.ledger.instruments import InstrumentAdded
from gaugelog.ledger.points import GridRow, PointPlanned
from gaugelog.ledger.readings import LimitFound, ReadingTaken
from gaugelog.ledger.routes import LEAD_TEMPERATURE
from gaugelog.ledger.stock import GaugeRow, LotReceived, LotRow
from gaugelog.rules.accuracy import RangeTaken
from gaugelog.rules.digits import probability_text
from gaugelog.rules.limits import Basis
from gaugelog.rules.plausible import demand_plausible
from gaugelog.rules.shift import in_force
from gaugelog.rules.verdicts import Judged, Taken
from gaugelog.rules.voltage import range_within, voltage_bounds
from gaugelog.rules.windows import time_of
from gaugelog.work.judging import Observation, judge_mark, judge_reading, latest


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
    span = None
    if not CHECKS[check].attribute:
        bounds = voltage_bounds(basis, check, seen.step.stage)
        span = range_within(bounds, instrument, check, typed.quantity, typed.qualifier)
    earlier = latest(seen, check, seen.step.stage)
    if earlier is not None and not seen.reason.strip():
        raise Faulty([Fault(where, "was measured before.", "Say why again, with --reason.")])
    judged, compared = _judged(seen, basis, check, typed, span)
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
        range=span.range.name if span is not None else "",
        test_voltage=span.range.test_voltage if span is not None else None,
        conditions=_conditions(seen, check),
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


def _judged(
    seen: Observation, basis: Basis, check: str, typed: TypedReading, span: RangeTaken | None
) -> tuple[Judged, str | None]:
    if span is None:
        return judge_mark(seen, basis, typed.typed), None
    return judge_reading(seen, basis, check, Taken(typed.quantity, typed.qualifier, span))


def _conditions(seen: Observation, check: str) -> dict[str, Quantity]:
    """What was entered beside a reading and belongs to it."""
    wanted = (*CHECKS[check].beside, *((LEAD_TEMPERATURE,) if check == "zero drift" else ()))
    return {each: seen.beside[each] for each in wanted if each in seen.beside}


def explain(reading: ReadingTaken) -> list[str]:
    """The verdict in plain lines: limits with the one that ruled, margin, probability, why."""
    verdict = reading.verdict
    lines = []
    if reading.result is not None:
        word = "change" if reading.check == "resistance" else "judged"
        lines.append(f"{word} {reading.result}")
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
    return [*lines, verdict.reason, *(f"LOOK INTO: {flag}" for flag in verdict.flags)]


def _limit_line(limit: LimitFound) -> str:
    sides = []
    if limit.at_least is not None:
        sides.append(f"at least {limit.at_least}")
    if limit.at_most is not None:
        sides.append(f"at most {limit.at_most}")
    ruled = "ruling" if limit.rules else "also"
    return f"{ruled} limit: {' and '.join(sides)} by {limit.origin} ({limit.source})"


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
