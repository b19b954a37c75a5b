"""Checks that are predicted, then compared: lead loop, zero offset, shunt."""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import dataclass

from gaugelog.errors import Refused
from gaugelog.ledger.campaign import Channel
from gaugelog.ledger.circuits import CircuitPlanned
from gaugelog.ledger.readings import LimitFound, Verdict
from gaugelog.physics.conformity import Judgement, Words
from gaugelog.physics.prediction import output
from gaugelog.rules.digits import quantity
from gaugelog.rules.limits import Basis, criteria_for
from gaugelog.rules.shunt import SOURCE as SHUNT_SOURCE
from gaugelog.rules.shunt import judge_shunt, shunt_place
from gaugelog.rules.verdicts import VERSION, Judged, Taken, blocks
from gaugelog.rules.wired import Wired
from gaugelog.rules.zero import SOURCE as ZERO_SOURCE
from gaugelog.rules.zero import judge_zero

LOOP_SOURCE = "two wires of the reel's Ω/m, between the two pins that end at one tab"


@dataclass(frozen=True, slots=True)
class Expected:
    """What predictions are made from: criteria and lot, circuit as planned and wired, channel."""

    basis: Basis
    planned: CircuitPlanned
    wired: Wired
    channel: Channel


def judge_prediction(known: Expected, check: str, stage: str, taken: Taken) -> Judged:
    """Judge a reading against what this circuit predicts; the prediction is kept as the limit.

    The tolerance is k = 2 of both uncertainties, never under the criteria's figure. Raises
    Refused when the check asks for something the circuit does not have.
    """
    least = _least_tolerance(known, check, stage)
    return _judged(known, _COMPARE[check](known, taken, least))


@dataclass(frozen=True, slots=True)
class _Comparison:
    """A reading beside its prediction (None where there can be none); SI units."""

    check: str
    unit: str
    source: str
    predicted: float | None
    tolerance: float
    judgement: Judgement
    hint: str


def _zero(known: Expected, taken: Taken, least: float) -> _Comparison:
    found = judge_zero(
        known.wired.circuit,
        taken.si,
        setting=known.wired.factor,
        predicted_uncertainty=_zero_uncertainty(known.wired),
        measured_uncertainty=taken.on.uncertainty(taken.si),
        least_tolerance=least,
        name=known.planned.arrangement,
        poisson=known.wired.poisson,
    )
    return _Comparison(
        "zero offset",
        "mV/V",
        ZERO_SOURCE,
        found.predicted,
        found.tolerance,
        found.judgement,
        found.hint,
    )


def _zero_uncertainty(wired: Wired) -> float:
    """By the change of output for the uncertainty of each grid, in quadrature; V/V."""
    circuit = wired.circuit
    base = float(output(circuit))
    total = 0.0
    for name, uncertainty in wired.uncertainties.items():
        moved = circuit.altered(name, circuit.element(name).resistance + uncertainty)
        total += (float(output(moved)) - base) ** 2
    return math.sqrt(total)


def _shunt(known: Expected, taken: Taken, least: float) -> _Comparison:
    spec = known.channel.shunt
    if spec is None:
        raise Refused(
            f"Channel {known.channel.label} has no shunt in the plan.",
            "Give its value, arm and pins in campaign.toml, or skip the step.",
        )
    found = judge_shunt(
        known.wired.circuit,
        spec.value.si(),
        shunt_place(known.wired.circuit, spec.between),
        taken.si,
        setting=known.wired.factor,
        least_tolerance=least,
        uncertainty=taken.on.uncertainty(taken.si),
        name=known.planned.arrangement,
        poisson=known.wired.poisson,
    )
    return _Comparison(
        "shunt",
        "um/m",
        SHUNT_SOURCE,
        found.predicted,
        found.tolerance,
        found.judgement,
        found.hint,
    )


def _loop(known: Expected, taken: Taken, least: float) -> _Comparison:
    demand_pair(known)
    predicted = _loop_predicted(known)
    tolerance = max(least, 2 * taken.on.uncertainty(taken.si))
    excess = taken.si - predicted
    inside = abs(excess) <= tolerance
    judgement = Judgement(
        Words.PASS if inside else Words.FAIL, None, tolerance - abs(excess), 0.0, ""
    )
    if inside:
        hint = ""
    elif excess > 0:
        hint = "Look for a bad joint, a longer or a thinner cable."
    else:
        hint = "Look for wires that touch, or a shorter cable."
    return _Comparison("lead loop", "ohm", LOOP_SOURCE, predicted, tolerance, judgement, hint)


def demand_pair(known: Expected) -> None:
    """Raise Refused unless two wires of the circuit end at one tab."""
    layout = known.wired.circuit.layout
    if len(set(layout.wires.values())) == len(layout.wires):
        raise Refused(
            f"No two of the {len(layout.wires)} wires of this circuit "
            f"({known.planned.arrangement}) end at one tab: there is no loop of wires alone.",
            "Skip the step with that reason.",
        )


def _loop_predicted(known: Expected) -> float:
    leads = known.planned.leads
    return 2 * leads.resistance_per_length.si() * leads.length.si()


_COMPARE: dict[str, Callable[[Expected, Taken, float], _Comparison]] = {
    "zero offset": _zero,
    "shunt": _shunt,
    "lead loop": _loop,
}


def _least_tolerance(known: Expected, check: str, stage: str) -> float:
    """The criteria's figure, SI; a figure in per cent is of what the reel predicts."""
    figures = [item.at_most for item in criteria_for(known.basis, check, stage)]
    found = [figure for figure in figures if figure is not None]
    if not found:
        return 0.0
    return found[0].si() * (_loop_predicted(known) if found[0].unit == "%" else 1.0)


def _judged(known: Expected, found: _Comparison) -> Judged:
    criteria = known.basis.criteria
    limits: tuple[LimitFound, ...] = ()
    reason = found.judgement.reason
    if found.predicted is not None:
        low, high = (
            quantity(found.predicted + sign * found.tolerance, found.unit, 6) for sign in (-1, 1)
        )
        limits = (
            LimitFound(
                origin="prediction", at_least=low, at_most=high, source=found.source, rules=True
            ),
        )
        told = quantity(found.predicted, found.unit, 4)
        reason = f"Predicted {told}, tolerance ±{quantity(found.tolerance, found.unit, 3)}."
    verdict = Verdict(
        word=found.judgement.word.value,
        blocks=blocks(found.judgement.word, criteria),
        coverage=criteria.coverage,
        reason=f"{reason} {found.hint}".strip(),
        rule=f"{found.check} {VERSION}",
    )
    return Judged(limits, verdict)
