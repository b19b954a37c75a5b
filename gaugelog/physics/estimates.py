"""What is known of one quantity: its value, its standard uncertainty, and the shape behind it.

An estimate stands for a probability distribution, as JCGM 100 and 101 have it: a meter's accuracy
is rectangular, the mean of readings is normal (a t-distribution when the readings are few).
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from enum import Enum
from itertools import combinations
from math import inf, sqrt
from statistics import correlation, fmean, stdev

from gaugelog.physics import change
from gaugelog.physics.validity import OutOfDomain, finite, not_negative

Correlations = Mapping[tuple[str, str], float]
"""Correlation coefficients by pairs of names; a pair that is not there is not correlated."""


class Shape(Enum):
    """The shape of a distribution, with its kurtosis (fourth moment over variance squared)."""

    NORMAL = ("normal", 3.0)
    RECTANGULAR = ("rectangular", 1.8)
    TRIANGULAR = ("triangular", 2.4)
    ARCSINE = ("arcsine", 1.5)

    @property
    def word(self) -> str:
        """Its name as a budget prints it."""
        return self.value[0]

    @property
    def kurtosis(self) -> float:
        """3 for the normal distribution, less for bounded ones."""
        return self.value[1]


@dataclass(frozen=True, slots=True)
class Estimate:
    """A quantity as known: value and standard uncertainty in its unit, shape, degrees of freedom.

    Few degrees of freedom make a normal shape a t-distribution in a simulation.
    """

    value: float
    uncertainty: float
    shape: Shape = Shape.NORMAL
    dof: float = inf

    def __post_init__(self) -> None:
        finite("value", self.value)
        not_negative("uncertainty", self.uncertainty)
        if not self.dof > 0:
            raise OutOfDomain("dof", f"must be greater than zero, not {self.dof:g}.")


def exactly(value: float) -> Estimate:
    """An estimate without uncertainty. Source: definition."""
    return Estimate(value, 0.0)


def normal(value: float, uncertainty: float, dof: float = inf) -> Estimate:
    """A normal estimate of known standard uncertainty, as a certificate's U/k.

    Source: JCGM 100:2008, 4.3.3.
    """
    return Estimate(value, uncertainty, Shape.NORMAL, dof)


def rectangular(value: float, half_width: float, dof: float = inf) -> Estimate:
    """An estimate that lies anywhere within ±a: u = a/√3. Source: JCGM 100:2008, 4.3.7."""
    return Estimate(value, change.rectangular(half_width), Shape.RECTANGULAR, dof)


def triangular(value: float, half_width: float, dof: float = inf) -> Estimate:
    """An estimate within ±a, likeliest in the middle: u = a/√6. Source: JCGM 100:2008, 4.3.9."""
    return Estimate(value, change.triangular(half_width), Shape.TRIANGULAR, dof)


def arcsine(value: float, amplitude: float, dof: float = inf) -> Estimate:
    """An estimate that swings by ±a like a regulated temperature: u = a/√2.

    Source: JCGM 101:2008, 6.4.6.
    """
    return Estimate(value, not_negative("amplitude", amplitude) / sqrt(2), Shape.ARCSINE, dof)


def from_readings(readings: Sequence[float]) -> Estimate:
    """The mean of repeated readings: u = s/√n with n − 1 degrees of freedom.

    Source: JCGM 100:2008, 4.2.3.

    >>> from_readings([1.0, 2.0, 3.0]).value
    2.0
    """
    count = len(readings)
    if count < 2:
        raise OutOfDomain("readings", "must be two or more to tell how they scatter.")
    for reading in readings:
        finite("readings", reading)
    return normal(fmean(readings), stdev(readings) / sqrt(count), count - 1)


def from_joint_readings(
    series: Mapping[str, Sequence[float]],
) -> tuple[dict[str, Estimate], dict[tuple[str, str], float]]:
    """Means of quantities read together, and how their means are correlated.

    Every series has a reading from each set of observations, in one order. A quantity that does
    not scatter is correlated with none. Source: JCGM 100:2008, 5.2.3 and H.2.
    """
    lengths = {len(readings) for readings in series.values()}
    if len(lengths) > 1:
        raise OutOfDomain("series", "must all hold the same number of readings.")
    estimates = {name: from_readings(readings) for name, readings in series.items()}
    pairs = {
        (one, other): correlation(series[one], series[other])
        for one, other in combinations(series, 2)
        if estimates[one].uncertainty and estimates[other].uncertainty
    }
    return estimates, pairs
