"""Coverage factors: how many standard uncertainties hold a share of a t-distribution."""

from __future__ import annotations

from math import atan2, cos, floor, inf, pi, sin, sqrt
from statistics import NormalDist

from gaugelog.physics.validity import OutOfDomain, positive_or_infinite, strictly_between

_MANY = 1000
"""Degrees of freedom from which the normal distribution, corrected, is exact to 1e-7."""


def coverage_factor(confidence: float, dof: float = inf) -> float:
    """The k for which ±k u holds a share `confidence` of the t-distribution.

    `dof` is cut to a whole number, as the GUM has it. Source: JCGM 100:2008, G.3 and G.4.1;
    large numbers by Abramowitz and Stegun 26.7.5 (from memory).

    >>> round(coverage_factor(0.99, 16.7), 2)
    2.92
    """
    strictly_between("confidence", confidence, 0.0, 1.0)
    if positive_or_infinite("dof", dof) < 1:
        raise OutOfDomain("dof", f"must be at least 1, not {dof:g}.")
    normal = NormalDist().inv_cdf((1 + confidence) / 2)
    if dof >= _MANY:
        return _t_of_many(normal, dof)
    return _t_quantile(confidence, floor(dof))


def t_confidence(t: float, dof: int) -> float:
    """Share of a t-distribution within ±t, for a whole number of degrees of freedom.

    Source: Abramowitz and Stegun 26.7.3 and 26.7.4 (from memory).
    """
    positive_or_infinite("dof", dof)
    return _confidence_at(atan2(abs(t), sqrt(dof)), dof)


def _t_quantile(confidence: float, dof: int) -> float:
    """By halving the angle whose tangent is t/√ν, where the share grows steadily."""
    low, high = 0.0, pi / 2
    for _ in range(60):
        middle = (low + high) / 2
        if _confidence_at(middle, dof) < confidence:
            low = middle
        else:
            high = middle
    return sqrt(dof) * sin(low) / cos(low)


def _t_of_many(normal: float, dof: float) -> float:
    """The quantile for many degrees of freedom from the normal one, in powers of 1/ν."""
    if dof == inf:
        return normal
    first = (normal**3 + normal) / 4
    second = (5 * normal**5 + 16 * normal**3 + 3 * normal) / 96
    return normal + first / floor(dof) + second / floor(dof) ** 2


def _confidence_at(angle: float, dof: int) -> float:
    """A(t|ν) as a finite series in cos θ, θ = arctan(t/√ν)."""
    odd = dof % 2
    square = cos(angle) ** 2
    term = cos(angle) if odd else 1.0
    total = term if dof > 1 else 0.0
    for step in range(2 + odd, dof, 2):
        term *= square * (step - 1) / step
        total += term
    return 2 / pi * (angle + sin(angle) * total) if odd else sin(angle) * total
