"""How a reading is judged: by its value, its change, a prediction, or with what stands beside."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass, field, replace

from gaugelog.errors import Refused
from gaugelog.journal.clock import Moment
from gaugelog.ledger.base import Quantity
from gaugelog.ledger.campaign import Channel, ChannelRow
from gaugelog.ledger.checks import CHECKS
from gaugelog.ledger.points import PointRow
from gaugelog.ledger.readings import ReadingRow, ReadingTaken
from gaugelog.ledger.routes import (
    BANDWIDTH,
    EXPECTED_SIGN,
    FIRST_WIRE,
    PRESSED,
    ZERO_BEFORE,
    RouteStep,
)
from gaugelog.ledger.view import View
from gaugelog.physics.conformity import undecided
from gaugelog.rules.accuracy import range_for, taken_on
from gaugelog.rules.certificate import certificate_at
from gaugelog.rules.drifting import judge_drift
from gaugelog.rules.insulated import fall_flags
from gaugelog.rules.limits import Basis, criteria_for
from gaugelog.rules.noisy import Quiet, judge_noise
from gaugelog.rules.predicted import Expected, demand_pair, judge_prediction
from gaugelog.rules.press import Pressed, judge_press
from gaugelog.rules.proof import judge_channel, judge_polarity
from gaugelog.rules.symmetry import judge_symmetry
from gaugelog.rules.verdicts import Judged, Taken, judge_change, judge_value, worded
from gaugelog.rules.watched import warmth_of, zero_seen, zeros_before
from gaugelog.rules.wired import planned_circuit, wired

RECEIVED = "received"
"""The stage that a change of resistance is counted from."""


@dataclass(frozen=True, slots=True)
class Observation:
    """Who took a reading, when (UTC text), in which step of which point, on which subject.

    `beside` and `texts` are what else was entered in the step, by the type of the input; `now`
    is when it is entered.
    """

    view: View
    point: PointRow
    step: RouteStep
    subject: str
    observed_at: str
    observed_by: str
    reason: str
    now: Moment
    beside: Mapping[str, Quantity] = field(default_factory=dict)
    texts: Mapping[str, str] = field(default_factory=dict)


def judge_reading(
    seen: Observation, basis: Basis, check: str, taken: Taken
) -> tuple[Judged, str | None]:
    """The verdict of a reading, and the id of the earlier one that it is held against, if any.

    Raises Refused when what it is judged by is missing.
    """
    if CHECKS[check].judged == "prediction":
        return judge_prediction(expected(seen, basis), check, seen.step.stage, taken), None
    if _judges_change(basis, check, seen.step.stage):
        return _judge_change(seen, basis, check, taken)
    if check in _BESIDE and _complete(seen, check):
        return _BESIDE[check](seen, basis, taken), None
    judged = judge_value(basis, check, seen.step.stage, taken)
    return (_trended(seen, judged, taken) if check == "insulation" else judged), None


def judge_mark(seen: Observation, basis: Basis, answered: str) -> Judged:
    """The verdict of a channel's label as it answered."""
    planned = planned_circuit(seen.view, seen.subject)
    return judge_channel(basis, _channel(seen.view, planned.channel).label, answered)


def expected(seen: Observation, basis: Basis) -> Expected:
    """What the circuit of this step predicts from: its plan, its readings, its channel."""
    planned = planned_circuit(seen.view, seen.subject)
    spec = Channel.model_validate_json(_channel(seen.view, planned.channel).data)
    return Expected(basis, planned, wired(seen.view, planned), spec)


def latest(seen: Observation, check: str, stage: str) -> ReadingRow | None:
    """The last attempt of a check at a stage on this subject."""
    rows = seen.view.all(ReadingRow, subject=seen.subject, check=check, stage=stage, latest=1)
    return rows[-1] if rows else None


def _complete(seen: Observation, check: str) -> bool:
    """Whether all was entered that the check needs; route cards from before may not ask for it."""
    if check == "polarity":
        return EXPECTED_SIGN in seen.texts
    return all(each in seen.beside for each in CHECKS[check].beside)


def _symmetry(seen: Observation, basis: Basis, taken: Taken) -> Judged:
    demand_pair(expected(seen, basis))
    return judge_symmetry(basis, seen.step.stage, seen.beside[FIRST_WIRE].si(), taken)


def _press(seen: Observation, basis: Basis, taken: Taken) -> Judged:
    found = Pressed(seen.beside[ZERO_BEFORE].si(), seen.beside[PRESSED].si())
    return judge_press(basis, seen.step.stage, found, taken)


def _noise(seen: Observation, basis: Basis, taken: Taken) -> Judged:
    known = expected(seen, basis)
    quiet = Quiet(known.wired.resistance, known.channel.excitation.si(), known.wired.factor)
    return judge_noise(basis, seen.step.stage, seen.beside[BANDWIDTH].si(), taken, quiet)


def _polarity(seen: Observation, basis: Basis, taken: Taken) -> Judged:
    return judge_polarity(basis, seen.texts[EXPECTED_SIGN], taken)


def _drift(seen: Observation, basis: Basis, taken: Taken) -> Judged:
    before = zeros_before(seen.view, seen.point, seen.step, seen.subject, seen.now)
    if before is None:
        why = "The clock was set since the watch began: the time between the zeros is not known."
        return worded(basis, "zero drift", undecided(why))
    now = zero_seen(taken.value, seen.beside, seen.observed_at) if taken.value else before[-1]
    planned = planned_circuit(seen.view, seen.subject)
    warmth = warmth_of(seen.view, planned, wired(seen.view, planned))
    return judge_drift(basis, seen.step.stage, [*before, now], taken, warmth)


_BESIDE: dict[str, Callable[[Observation, Basis, Taken], Judged]] = {
    "lead symmetry": _symmetry,
    "press": _press,
    "noise": _noise,
    "polarity": _polarity,
    "zero drift": _drift,
}


def _trended(seen: Observation, judged: Judged, taken: Taken) -> Judged:
    rows = seen.view.all(ReadingRow, subject=seen.subject, check="insulation", latest=1)
    earlier = [ReadingTaken.model_validate_json(row.data) for row in rows]
    others = [
        each
        for each in earlier
        if each.stage != seen.step.stage and each.gauge in {None, seen.point.gauge}
    ]
    flags = fall_flags(others, seen.step.stage, taken.value, taken.qualifier)
    return replace(judged, verdict=judged.verdict.model_copy(update={"flags": flags}))


def _channel(view: View, channel: str) -> ChannelRow:
    row = view.get(ChannelRow, channel)
    if row is None:
        raise Refused("The channel of this circuit is not known.", "Check the journal.")
    return row


def _judges_change(basis: Basis, check: str, stage: str) -> bool:
    figures = [item.at_most or item.at_least for item in criteria_for(basis, check, stage)]
    return check == "resistance" and any(
        figure is not None and figure.unit == "%" for figure in figures
    )


def _judge_change(
    seen: Observation, basis: Basis, check: str, taken: Taken
) -> tuple[Judged, str | None]:
    row = latest(seen, check, RECEIVED)
    if row is None:
        raise Refused(
            f"{seen.point.label} has no {check} as received to compare with.",
            "Measure it as received first.",
        )
    before = _taken_before(seen.view, row)
    return judge_change(basis, seen.step.stage, before, taken), row.id


def _taken_before(view: View, row: ReadingRow) -> Taken:
    reading = ReadingTaken.model_validate_json(row.data)
    body = certificate_at(view, reading.instrument, row.seq)
    span = next((taken_on(body, item) for item in body.ranges if item.name == reading.range), None)
    if span is None:
        span = range_for(body, reading.check, reading.value, reading.qualifier)
    return Taken(reading.value, reading.qualifier, span)
