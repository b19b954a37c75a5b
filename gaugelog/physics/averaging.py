"""Averaging: a grid shows the mean of the strain over its length and width, not that of a point.

The strain at a peak is more than the mean round it, so a grid too long shows too little.
"""

from __future__ import annotations

from math import pi

from gaugelog.physics._maths import Number, cos, is_array, nominal, sin, sqrt, where
from gaugelog.physics._order import any_of
from gaugelog.physics.validity import (
    Notice,
    between,
    finite,
    largest,
    not_negative,
    positive,
    strictly_between,
)

_SERIES_BELOW = 1e-4
"""Angles for which 1 − y²/6 is sin(y)/y to the last digit."""
_NEWTON_STEPS = 8
_LOSS_NOTED = 0.01
"""Part of a peak that averaging must take before a notice names it."""


def sine_average(length: Number, wavelength: Number) -> Number:
    """Part of a sine wave's amplitude that a grid along it shows: sin(πL/λ)/(πL/λ).

    The same for the crest of a standing wave and for the amplitude of a travelling one. It falls
    to nothing where the wave is as long as the grid, and past that it changes sign. Units:
    metre in, ratio out. Source: the mean of a cosine over its middle; Doebelin, Measurement
    Systems (from memory).

    >>> round(sine_average(0.1, 1.0), 6)
    0.983632
    """
    return _sinc(pi * not_negative("length", length) / positive("wavelength", wavelength))


def length_for_loss(loss: Number) -> Number:
    """Length of a grid, in wavelengths, at which the amplitude shown falls by `loss`.

    The root of sin(πx)/(πx) = 1 − loss between 0 and 1, by Newton's method; about √(6 loss)/π for
    a small loss. `loss` lies from 10⁻⁶ to less than 1. Units: ratios. Source: `sine_average`
    turned round.

    >>> round(length_for_loss(0.01), 6)
    0.078087
    """
    between("loss", loss, 1e-6, 1.0)
    strictly_between("loss", loss, 0.0, 1.0)
    angle = sqrt(6 * nominal(loss))
    for _ in range(_NEWTON_STEPS):
        angle = _newton(angle, nominal(loss))
    # The last step alone carries the uncertainty of `loss`; the root's slope is that of this step.
    return _newton(angle, loss) / pi


def longest_grid(wavelength: Number, loss: Number) -> Number:
    """Longest grid that shows a sine wave with no more than a permitted loss of amplitude.

    Units: metre and ratio in, metre out. Source: `sine_average` turned round.
    """
    return positive("wavelength", wavelength) * length_for_loss(loss)


def parabola_average(length: Number, reach: Number, offset: Number = 0.0) -> Number:
    """Mean over a grid as a part of a parabolic peak: 1 − L²/(12a²) − (d/a)².

    The strain is ε₀(1 − (x/a)²): `reach` a is where it would come to nothing; `offset` d is how
    far the grid's middle lies off the peak. Units: metre in, ratio out.
    Source: the integral of a parabola.

    >>> round(parabola_average(0.006, 0.020), 6)
    0.9925
    """
    spread = (positive("length", length) / positive("reach", reach)) ** 2 / 12
    return 1 - spread - (finite("offset", offset) / reach) ** 2


def reach_of_peak(distance: Number, fallen: Number) -> Number:
    """`reach` of a parabolic peak from its fall at one distance: a = x/√(1 − ε(x)/ε₀).

    `fallen` is the strain there as a part of the peak's, less than 1. Units: metre and ratio in,
    metre out. Source: the equation of the parabola.
    """
    strictly_between("fallen", fallen, -1.0, 1.0)
    return positive("distance", distance) / sqrt(1 - fallen)


def linear_average(strain: Number, gradient: Number, offset: Number) -> Number:
    """Mean over a grid in a strain that changes evenly: the strain at the grid's middle.

    ε + g d, with `strain` at the point wanted and `offset` d from there to the grid's middle, at
    any length of grid. Units: ratio, 1/m and m in, ratio out. Source: the integral of a line.
    """
    return finite("strain", strain) + finite("gradient", gradient) * finite("offset", offset)


def sine_average_notices(length: Number, wavelength: Number) -> tuple[Notice, ...]:
    """A notice where a grid is so long that the wave does not show what it is.

    From half a wavelength the loss is more than a third; from a whole one the sign is wrong.
    """
    ratio = nominal(positive("length", length) / positive("wavelength", wavelength))
    if not any_of(ratio > 0.5):
        return ()
    message = (
        f"The grid is {largest(ratio):.2g} of the wavelength; beyond a half its mean tells "
        "little of the amplitude, and from a whole one not even the sign."
    )
    return (Notice("sine average", message, "the mean of a cosine over its middle"),)


def parabola_average_notices(length: Number, reach: Number) -> tuple[Notice, ...]:
    """A notice where averaging takes more than 1 % of a peak's height."""
    loss = largest(1 - parabola_average(length, reach))
    if loss <= _LOSS_NOTED:
        return ()
    message = f"Averaging over the grid takes {loss:.1%} of the peak; a shorter grid shows more."
    return (Notice("parabola average", message, "the integral of a parabola"),)


def _newton(angle: Number, loss: Number) -> Number:
    """A step towards the root of sin(y)/y − 1 + loss."""
    slope = (cos(angle) - _sinc(angle)) / angle
    return angle - (_sinc(angle) - 1 + loss) / slope


def _sinc(angle: Number) -> Number:
    """sin(y)/y, and 1 − y²/6 near nothing, where the quotient has no meaning."""
    plain = nominal(angle)
    near = abs(plain) < _SERIES_BELOW
    if not is_array(plain):
        return 1 - angle**2 / 6 if near else sin(angle) / angle
    safe = where(near, 1.0, angle)
    return where(near, 1 - angle**2 / 6, sin(safe) / safe)
