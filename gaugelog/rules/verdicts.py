"""The verdict of a reading: value, uncertainty and limits in; word, probability and reason out."""

from __future__ import annotations

from dataclasses import dataclass
from math import nan

from gaugelog.ledger.base import Quantity
from gaugelog.ledger.campaign import CriteriaAgreed
from gaugelog.ledger.checks import SIGNED
from gaugelog.ledger.readings import LimitFound, Qualifier, Verdict
from gaugelog.physics.change import difference_uncertainty, relative_change
from gaugelog.physics.conformity import Judgement, Limits, Words, judge, undecided
from gaugelog.rules.accuracy import RangeTaken
from gaugelog.rules.digits import decimal_text, quantity
from gaugelog.rules.limits import Basis, limits_for, strictest

VERSION = 1
"""Of every rule here; raise it when a rule decides otherwise."""


@dataclass(frozen=True, slots=True)
class Taken:
    """A reading as understood: value in SI (None for an overload), qualifier, unit, range."""

    value: Quantity | None
    qualifier: Qualifier
    on: RangeTaken

    @property
    def si(self) -> float:
        """The value, or the end of the range for an overload."""
        return self.on.range.high.si() if self.value is None else self.value.si()

    @property
    def unit(self) -> str:
        """The unit the value was typed in."""
        return self.on.range.high.unit if self.value is None else self.value.unit


@dataclass(frozen=True, slots=True)
class Judged:
    """What is kept with a reading: the limits, the verdict, and the result that was judged."""

    limits: tuple[LimitFound, ...]
    verdict: Verdict
    result: Quantity | None = None


def judge_value(basis: Basis, check: str, stage: str, taken: Taken) -> Judged:
    """Judge a reading by its own value against the limits of its check and stage."""
    limits = limits_for(basis, check, stage)
    if check in SIGNED:
        limits = _both_ways(limits)
    allowed = strictest(limits)
    uncertainty = taken.on.uncertainty(taken.si)
    if allowed is None:
        return Judged((), _unlimited(f"{check} {VERSION}"))
    found = judge(
        taken.si,
        uncertainty,
        allowed,
        qualifier=taken.qualifier,
        coverage=float(basis.criteria.coverage),
    )
    rule = f"{check} {VERSION}"
    return Judged(limits, _verdict(found, basis.criteria, uncertainty, taken.unit, rule))


@dataclass(frozen=True, slots=True)
class Worked:
    """A result worked out of a reading and what was entered beside it; SI units.

    `told` says how, in a sentence, or is empty.
    """

    value: float
    uncertainty: float
    unit: str
    told: str = ""


def judge_worked(basis: Basis, check: str, stage: str, worked: Worked) -> Judged:
    """Judge a result worked out of a reading against the limits of its check and stage."""
    limits = limits_for(basis, check, stage)
    if check in SIGNED:
        limits = _both_ways(limits)
    allowed, rule = strictest(limits), f"{check} {VERSION}"
    result = quantity(worked.value, worked.unit, 4)
    if allowed is None:
        verdict = _unlimited(rule)
    else:
        coverage = float(basis.criteria.coverage)
        found = judge(worked.value, worked.uncertainty, allowed, coverage=coverage)
        verdict = _verdict(found, basis.criteria, worked.uncertainty, worked.unit, rule)
    reason = f"{worked.told} {verdict.reason}".strip()
    return Judged(limits, verdict.model_copy(update={"reason": reason}), result)


def worded(basis: Basis, check: str, found: Judgement, result: Quantity | None = None) -> Judged:
    """A word that no figure of the criteria gave: nothing to compare, or no answer at all."""
    verdict = _verdict(found, basis.criteria, None, "1", f"{check} {VERSION}")
    return Judged((), verdict, result)


def only_a_bound(taken: Taken) -> bool:
    """Whether a reading is no value: beyond the range, or typed as more or less than one."""
    return taken.value is None or taken.qualifier != "="


def judge_change(basis: Basis, stage: str, before: Taken, after: Taken) -> Judged:
    """Judge a resistance by its change against an earlier one, in per cent of the earlier.

    On one range of one meter under one certificate, gain and offset errors cancel
    (`change.difference_uncertainty`).
    """
    limits = _both_ways(limits_for(basis, "resistance", stage))
    allowed = strictest(limits)
    rule = f"resistance change {VERSION}"
    if allowed is None:
        return Judged((), _unlimited(rule))
    if after.qualifier != "=" or before.qualifier != "=":
        return Judged(limits, _changed_beyond(basis, after, allowed, rule))
    share = float(relative_change(before.si, after.si))
    same = before.on == after.on
    first, second = before.on.accuracy, after.on.accuracy
    spread = float(
        difference_uncertainty(
            before.si,
            after.si,
            same,
            first.gain_fraction,
            first.offset,
            first.resolution,
            other=second,
        )
    )
    uncertainty = spread / before.si
    found = judge(share, uncertainty, allowed, coverage=float(basis.criteria.coverage))
    verdict = _verdict(found, basis.criteria, uncertainty, "%", rule)
    return Judged(limits, verdict, quantity(share, "%", 4))


def _both_ways(limits: tuple[LimitFound, ...]) -> tuple[LimitFound, ...]:
    """A change may be at most so much either way: the upper figure stands for both sides."""
    return tuple(
        limit
        if limit.at_most is None or limit.at_least is not None
        else limit.model_copy(
            update={"at_least": Quantity(value=f"-{limit.at_most.value}", unit=limit.at_most.unit)}
        )
        for limit in limits
    )


def _changed_beyond(basis: Basis, after: Taken, allowed: Limits, rule: str) -> Verdict:
    if after.qualifier in {">", "overload"} and allowed.upper is not None:
        why = "The meter reads beyond its range: the grid or its leads are open."
        found = Judgement(Words.FAIL, None, nan, nan, why)
    else:
        found = undecided("A change needs two values, and one of them is only a bound.")
    return _verdict(found, basis.criteria, None, "%", rule)


def _unlimited(rule: str) -> Verdict:
    return Verdict(
        word="pass",
        blocks=False,
        reason="Recorded; the criteria set no limit for this check at this stage.",
        rule=rule,
    )


def _verdict(
    found: Judgement, criteria: CriteriaAgreed, uncertainty: float | None, unit: str, rule: str
) -> Verdict:
    known = uncertainty is not None and found.guard_band == found.guard_band  # not NaN
    return Verdict(
        word=found.word.value,
        blocks=blocks(found.word, criteria),
        probability=None if found.probability is None else decimal_text(found.probability, 4),
        standard_uncertainty=quantity(uncertainty or 0.0, unit, 4) if known else None,
        guard_band=quantity(found.guard_band, unit, 4) if known else None,
        coverage=criteria.coverage,
        reason=found.reason,
        rule=rule,
    )


def blocks(word: Words, criteria: CriteriaAgreed) -> bool:
    """Whether a word keeps the work from going on, by what the criteria say of it."""
    if word is Words.PASS:
        return False
    if word is Words.CONDITIONAL_PASS:
        return criteria.conditional_pass == "blocks"
    if word is Words.CONDITIONAL_FAIL:
        return criteria.conditional_fail == "blocks"
    return True
