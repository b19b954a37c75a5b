"""Conformity of a measured value with its limits, the measurement's uncertainty counted.

The four words and the guard band are those of ILAC-G8:09/2019 (non-binary statement with guard
band w = k u), the probability is that of JCGM 106:2012 with a flat prior: before the measurement
nothing is taken to be known, and the value is then normal about the reading.
"""

from __future__ import annotations

import importlib
import math
from dataclasses import dataclass
from enum import Enum

from gaugelog.physics._maths import Number, is_array, is_uncertain
from gaugelog.physics.validity import OutOfDomain, finite, not_negative, one_of, positive

PRIOR = "flat prior, normal distribution about the reading (JCGM 106:2012, 7)"
"""What the probability of conformance takes for granted; printed beside it."""

QUALIFIERS = ("=", ">", "<", "overload")
"""A value as read; a bound the value lies above or below; the end of the meter's range passed."""

_ROUNDING = 1e-9
"""Part of a value that the arithmetic may lose: a reading typed on its limit lies on it."""


class Words(Enum):
    """The words of ILAC-G8, and one more for what cannot be decided."""

    PASS = "pass"  # noqa: S105
    CONDITIONAL_PASS = "conditional pass"  # noqa: S105
    CONDITIONAL_FAIL = "conditional fail"
    FAIL = "fail"
    UNDECIDED = "undecided"


@dataclass(frozen=True, slots=True)
class Limits:
    """The tolerance limits of a quantity in its own unit; either may be missing, not both."""

    lower: float | None
    upper: float | None

    def __post_init__(self) -> None:
        if self.lower is None and self.upper is None:
            raise OutOfDomain("limits", "must have a lower or an upper limit.")
        for name, limit in (("lower", self.lower), ("upper", self.upper)):
            if limit is not None:
                finite(name, limit)
        if self.lower is not None and self.upper is not None and self.lower > self.upper:
            raise OutOfDomain("lower", "limit must not exceed the upper limit.")

    def margin(self, value: float) -> float:
        """Distance from `value` to the nearer limit: positive inside, negative outside."""
        below = math.inf if self.lower is None else value - self.lower
        above = math.inf if self.upper is None else self.upper - value
        return min(below, above)


@dataclass(frozen=True, slots=True)
class Judgement:
    """A value held against its limits.

    `probability` is that of conformance, None for a censored reading. `margin` is the distance to
    the nearer limit (positive inside, NaN if no value is known) and `guard_band` is k u, both in
    the value's unit. `reason` is a sentence for a person.
    """

    word: Words
    probability: float | None
    margin: float
    guard_band: float
    reason: str


_REASONS = {
    Words.PASS: "The value lies inside the limit by the guard band or more.",
    Words.CONDITIONAL_PASS: "The value lies inside the limit by less than the guard band.",
    Words.CONDITIONAL_FAIL: "The value lies beyond the limit, but not by more than the guard band.",
    Words.FAIL: "The value lies beyond the limit by more than the guard band.",
}


def judge(
    value: float,
    standard_uncertainty: float,
    limits: Limits,
    *,
    qualifier: str = "=",
    coverage: float = 2.0,
) -> Judgement:
    """The word for a reading, its probability of conformance, and why.

    For a censored reading `value` is the bound that was read (for an overload the end of the
    range, or NaN if it is not known) and `standard_uncertainty` that at the bound. Units: those
    of the value throughout.
    Source: ILAC-G8:09/2019, non-binary statement with guard band; JCGM 106:2012, 7.

    >>> judge(11.0, 0.635, Limits(10.0, None)).word
    <Words.CONDITIONAL_PASS: 'conditional pass'>
    """
    one_of("qualifier", qualifier, QUALIFIERS)
    if qualifier == "overload" and math.isnan(value):
        return undecided("The meter overloaded, and the end of its range is not known.")
    finite("value", value)
    width = guard_band(standard_uncertainty, coverage)
    if qualifier == "=":
        return _judge_value(value, standard_uncertainty, limits, width)
    return _judge_bound(value, limits, width, above=qualifier != "<")


def undecided(reason: str) -> Judgement:
    """The judgement of a reading that lacks something needed to decide; `reason` says what.

    Source: common practice; no word is given without a limit, a value and its uncertainty.
    """
    return Judgement(Words.UNDECIDED, None, math.nan, math.nan, reason)


def guard_band(standard_uncertainty: Number, coverage: float = 2.0) -> Number:
    """Width of the guard band: w = k u.

    Units: those of the uncertainty. With k = 2 a pass is wrong in at most 2.5 % of cases.
    Source: ILAC-G8:09/2019, guard band w = U.

    >>> guard_band(0.5)
    1.0
    """
    not_negative("standard_uncertainty", standard_uncertainty)
    return positive("coverage", coverage) * standard_uncertainty


def probability_of_conformance(
    value: Number, standard_uncertainty: Number, limits: Limits
) -> Number:
    """Probability that the true value lies within the limits: Φ((U − y)/u) − Φ((L − y)/u).

    Floats or arrays; a zero uncertainty gives 0 or 1. The prior is flat and the distribution
    normal (`PRIOR`). Source: JCGM 106:2012, 7.3 and 7.4.

    >>> round(probability_of_conformance(12.0, 0.6928, Limits(10.0, None)), 3)
    0.998
    """
    finite("value", value)
    not_negative("standard_uncertainty", standard_uncertainty)
    if is_uncertain(value):
        raise OutOfDomain("value", "must be the plain estimate; give its uncertainty apart.")
    if is_array(value) or is_array(standard_uncertainty):
        numpy = importlib.import_module("numpy")
        each = numpy.frompyfunc(lambda y, u: _probability(y, u, limits), 2, 1)
        return each(value, standard_uncertainty).astype(float)
    return _probability(value, standard_uncertainty, limits)


def _judge_value(value: float, uncertainty: float, limits: Limits, width: float) -> Judgement:
    margin = limits.margin(value)
    slack = _ROUNDING * _scale(value, limits)
    word = _word(margin, width, slack)
    reason = _REASONS[word]
    if word is Words.CONDITIONAL_PASS and not _can_pass(limits, width, slack):
        reason += " The limits lie too close together for this uncertainty: nothing could pass."
    return Judgement(word, _probability(value, uncertainty, limits), margin, width, reason)


def _word(margin: float, width: float, slack: float) -> Words:
    if margin >= width - slack:
        return Words.PASS
    if margin >= -slack:
        return Words.CONDITIONAL_PASS
    return Words.CONDITIONAL_FAIL if margin >= -width - slack else Words.FAIL


def _judge_bound(bound: float, limits: Limits, width: float, above: bool) -> Judgement:
    """The word for a value known only to lie above (or below) a bound.

    The bound less its uncertainty must pass, or must lie beyond the far limit to fail.
    """
    slack = _ROUNDING * _scale(bound, limits)
    near, far = (limits.lower, limits.upper) if above else (limits.upper, limits.lower)
    sign = 1 if above else -1
    sure = bound - sign * width
    margin = limits.margin(bound)
    if far is not None and sign * (sure - far) > slack:
        why = "The value lies past the bound, and the bound already lies beyond the limit."
        return Judgement(Words.FAIL, None, margin, width, why)
    if far is None and near is not None and sign * (sure - near) >= -slack:
        why = "The bound less its uncertainty lies inside the limit, and the value lies past it."
        return Judgement(Words.PASS, None, margin, width, why)
    why = "The reading is only a bound, and the limit may lie on either side of the value."
    return Judgement(Words.UNDECIDED, None, margin, width, why)


def _scale(value: float, limits: Limits) -> float:
    return max(abs(value), abs(limits.lower or 0.0), abs(limits.upper or 0.0))


def _can_pass(limits: Limits, width: float, slack: float) -> bool:
    if limits.lower is None or limits.upper is None:
        return True
    return limits.upper - limits.lower >= 2 * (width - slack)


def _probability(value: float, uncertainty: float, limits: Limits) -> float:
    """Of one reading; the tails are taken from the far side so that none is lost to rounding."""
    if uncertainty == 0:
        return 1.0 if limits.margin(value) >= 0 else 0.0
    low = -math.inf if limits.lower is None else (limits.lower - value) / uncertainty
    high = math.inf if limits.upper is None else (limits.upper - value) / uncertainty
    if low > 0:
        low, high = -high, -low
    return _normal(high) - _normal(low)


def _normal(z: float) -> float:
    """Standard normal distribution function Φ."""
    return 0.5 * math.erfc(-z / math.sqrt(2))
