"""Drift of a zero: what is left when the warming of the grid is taken off, per time.

Strains are ratios, times seconds, temperatures °C.
"""

from __future__ import annotations

from collections.abc import Sequence
from math import sqrt

from gaugelog.physics._maths import Number
from gaugelog.physics.temperature import mismatch_output, output_at_setting, referred_output
from gaugelog.physics.validity import OutOfDomain, finite, not_negative

LEAST = 2
"""Readings that a rate needs."""


def drift_rate(times: Sequence[float], zeros: Sequence[float]) -> float:
    """Rate of a drifting zero: the least-squares slope of the zeros over their times, 1/s.

    Source: least squares; for two readings it is their difference over the time between.

    >>> round(drift_rate((0.0, 1800.0), (1e-6, 4e-6)) * 3600 * 1e6, 6)  # µm/m in an hour
    6.0
    """
    spread = _spread(times, zeros)
    middle = sum(times) / len(times)
    return sum((time - middle) * zero for time, zero in zip(times, zeros, strict=True)) / spread


def rate_uncertainty(times: Sequence[float], each: float) -> float:
    """Standard uncertainty of `drift_rate` when each zero has the standard uncertainty `each`.

    u/√Σ(t − t̄)². Units: ratio in, 1/s out. Source: least squares of independent readings; JCGM
    100:2008, H.3 (slope).
    """
    return not_negative("each", each) / sqrt(_spread(times, times))


def warming_output(
    start: Number,
    end: Number,
    coefficients: Sequence[float],
    measured_with: Number,
    setting: Number,
    article: Number,
    matched_to: Number,
) -> Number:
    """Change of thermal output between two temperatures, as the instrument shows it; ratio.

    The lot's polynomial belongs to the material the lot is matched to; what the article expands
    otherwise comes on top. Empty `coefficients`: the curve is not known and is taken as flat.
    Units: °C; coefficients as `polynomial_output`; expansions 1/K.
    Source: `referred_output`, `output_at_setting` and `mismatch_output`, added.
    """
    rise = finite("end", end) - finite("start", start)
    other = mismatch_output(article, matched_to, rise)
    if not coefficients:
        return other
    return output_at_setting(referred_output(end, coefficients, start), measured_with, setting) + (
        other
    )


def _spread(times: Sequence[float], zeros: Sequence[float]) -> float:
    if len(times) < LEAST or len(times) != len(zeros):
        raise OutOfDomain("times", "must be two or more, one for each zero.")
    middle = sum(times) / len(times)
    spread = sum((finite("times", time) - middle) ** 2 for time in times)
    if spread == 0:
        raise OutOfDomain("times", "must not all be the same.")
    return spread
