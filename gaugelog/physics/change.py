"""Change between two readings of one quantity, and what the meters leave uncertain in it.

A meter's accuracy ±(gain · reading + offset) is one rectangular width. Between two readings on
one range of one meter the offset cancels and the gain counts of the difference only; two meters
err each in its own way.
"""

from __future__ import annotations

from dataclasses import dataclass
from math import sqrt

from gaugelog.physics._maths import Number, magnitude
from gaugelog.physics._maths import sqrt as root
from gaugelog.physics.validity import finite, not_negative, positive


@dataclass(frozen=True, slots=True)
class Accuracy:
    """A meter's accuracy on one range: ±(`gain_fraction` of reading + `offset`), `resolution`.

    `offset` and `resolution` (one step of the display) are in the reading's unit.
    """

    gain_fraction: float
    offset: float
    resolution: float

    def __post_init__(self) -> None:
        not_negative("gain_fraction", self.gain_fraction)
        not_negative("offset", self.offset)
        not_negative("resolution", self.resolution)

    def uncertainty(self, value: Number) -> Number:
        """Standard uncertainty of one reading `value`, in its unit."""
        return instrument_uncertainty(value, self.gain_fraction, self.offset, self.resolution)


def rectangular(half_width: Number) -> Number:
    """Standard uncertainty of a value that lies anywhere within ±a: a/√3.

    Units: those of the half width. Source: JCGM 100:2008, 4.3.7.

    >>> round(rectangular(1.0), 5)
    0.57735
    """
    return not_negative("half_width", half_width) / sqrt(3)


def triangular(half_width: Number) -> Number:
    """Standard uncertainty of a value within ±a, likeliest in the middle: a/√6.

    Units: those of the half width. Source: JCGM 100:2008, 4.3.9.
    """
    return not_negative("half_width", half_width) / sqrt(6)


def resolution_uncertainty(resolution: Number) -> Number:
    """Standard uncertainty that the last digit of a display leaves: δ/√12.

    `resolution` is one step of the display. Source: JCGM 100:2008, F.2.2.1.
    """
    return rectangular(not_negative("resolution", resolution) / 2)


def instrument_uncertainty(
    value: Number, gain_fraction: float, offset: float, resolution: float
) -> Number:
    """Standard uncertainty of one reading of a meter ±(gain · reading + offset).

    u² = ((g|x| + o)/√3)² + (δ/√12)²: the accuracy is one rectangular width, the display's step
    another. Units: those of the reading. Source: JCGM 100:2008, 4.3.7 and F.2.2.1.

    >>> round(instrument_uncertainty(12.0, 0.1, 0.0, 0.0), 4)
    0.6928
    """
    not_negative("gain_fraction", gain_fraction)
    not_negative("offset", offset)
    not_negative("resolution", resolution)
    width = magnitude(finite("value", value)) * gain_fraction + offset
    return root(width**2 / 3 + resolution**2 / 12)


def relative_change(before: Number, after: Number) -> Number:
    """Change as a part of the earlier value: (x1 − x0)/x0.

    Units: any in, ratio out. Source: arithmetic; that bonding is judged by it is common practice.

    >>> round(relative_change(350.4, 351.2), 5)
    0.00228
    """
    return (finite("after", after) - positive("before", before)) / before


def difference_uncertainty(
    before: Number,
    after: Number,
    same_meter_and_range: bool,
    gain_fraction: float,
    offset: float,
    resolution: float,
    *,
    other: Accuracy | None = None,
) -> Number:
    """Standard uncertainty of `after` − `before`.

    One meter on one range: the offset cancels, the gain acts on the difference, the display
    rounds twice. Two meters: both in full; `other` is the accuracy of the second, by default
    the same. Units: those of the readings. Source: JCGM 100:2008, 5.2 and F.1.2.3 (correlation
    by a common instrument).

    >>> round(difference_uncertainty(350.4, 351.2, True, 0.0005, 0.1, 0.01), 3)
    0.004
    >>> round(difference_uncertainty(350.4, 351.2, False, 0.0005, 0.1, 0.01), 3)
    0.225
    """
    first = Accuracy(gain_fraction, offset, resolution)
    if same_meter_and_range:
        return _by_one_meter(finite("after", after) - finite("before", before), first)
    second = first if other is None else other
    return root(first.uncertainty(before) ** 2 + second.uncertainty(after) ** 2)


def _by_one_meter(difference: Number, accuracy: Accuracy) -> Number:
    gain = accuracy.gain_fraction * magnitude(difference)
    return root(gain**2 / 3 + accuracy.resolution**2 / 6)
