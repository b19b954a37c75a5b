"""Dynamics: waves that run along a part, and how fast a grid and its module follow.

A grid is taken to follow the surface at once; what limits it is its length, over which a wave
takes time to run. Speeds are of elastic waves in the part.
"""

from __future__ import annotations

from math import log, pi

from gaugelog.physics._maths import Number, hypot, sqrt
from gaugelog.physics.averaging import length_for_loss, sine_average, sine_average_notices
from gaugelog.physics.validity import (
    Notice,
    finite,
    largest,
    not_negative,
    positive,
    strictly_between,
)

LONG_WAVE = 0.1
"""Largest diameter over wavelength at which a bar counts as thin (common practice)."""
RISE_SHARE = 0.8
"""From 10 to 90 % of an even ramp."""
RISE_BANDWIDTH = log(9) / (2 * pi)
"""Rise time times corner frequency of a first-order low pass, 0.35."""


def bar_wave_speed(modulus: Number, density: Number) -> Number:
    """Speed of a long wave in a thin bar: √(E/ρ).

    Holds while the wave is long against the bar's diameter. Units: Pa and kg/m³ in, m/s out.
    Source: Kolsky, Stress Waves in Solids (from memory).

    >>> round(bar_wave_speed(200e9, 7850.0), 1)
    5047.5
    """
    return sqrt(positive("modulus", modulus) / positive("density", density))


def plate_wave_speed(modulus: Number, density: Number, poisson: Number) -> Number:
    """Speed of a long wave in a thin plate: √(E/(ρ(1 − ν²))).

    Units: Pa, kg/m³ and ratio in, m/s out. Source: Kolsky, Stress Waves in Solids (from memory).
    """
    strictly_between("poisson", poisson, -1.0, 1.0)
    return bar_wave_speed(modulus, density) / sqrt(1 - poisson**2)


def torsion_wave_speed(modulus: Number, density: Number, poisson: Number) -> Number:
    """Speed of a twist along a round shaft: √(G/ρ) with G = E/(2(1 + ν)).

    `modulus` is Young's. Units: Pa, kg/m³ and ratio in, m/s out. Source: Kolsky, Stress Waves in
    Solids (from memory).
    """
    strictly_between("poisson", poisson, -1.0, 1.0)
    return bar_wave_speed(modulus, density) / sqrt(2 * (1 + poisson))


def strain_of_velocity(velocity: Number, speed: Number) -> Number:
    """Strain behind a wave front from how fast the bar's matter moves there.

    −v/c for a velocity counted along the wave: matter pushed ahead is compressed. Units: m/s in,
    ratio out. Source: Kolsky, Stress Waves in Solids (from memory).
    """
    return -finite("velocity", velocity) / positive("speed", speed)


def wave_average(length: Number, frequency: Number, speed: Number) -> Number:
    """Part of a running wave's amplitude that a grid shows: sin(πLf/c)/(πLf/c).

    Units: metre, hertz and m/s in, ratio out. Source: as `averaging.sine_average`, λ = c/f.
    """
    return sine_average(length, positive("speed", speed) / positive("frequency", frequency))


def frequency_for_loss(length: Number, speed: Number, loss: Number) -> Number:
    """Highest frequency that a grid shows with no more than a permitted loss of amplitude.

    x c/L, with x of `averaging.length_for_loss`. Units: metre, m/s and ratio in, hertz out.
    Source: `wave_average` turned round.

    >>> round(frequency_for_loss(0.003, 5000.0, 0.01) / 1e3, 2)  # kHz
    130.15
    """
    return length_for_loss(loss) * positive("speed", speed) / positive("length", length)


def transit_time(length: Number, speed: Number) -> Number:
    """Time a wave front takes to pass a grid: L/c.

    Units: metre and m/s in, second out. Source: definition.
    """
    return positive("length", length) / positive("speed", speed)


def grid_rise_time(length: Number, speed: Number, own: Number = 0.0) -> Number:
    """Rise time, 10 to 90 %, that a grid shows of a sudden wave front: 0.8 L/c + own.

    The mean over the grid rises evenly while the front passes. `own` is what grid and bond add
    by themselves, seconds; up to 0.5 µs is reckoned with (common practice). Units: metre, m/s
    and second in, second out. Source: the integral of a step; Oi 1966, Experimental Mechanics 6
    (from memory).
    """
    return RISE_SHARE * transit_time(length, speed) + not_negative("own", own)


def rise_of_corner(corner: Number) -> Number:
    """Rise time, 10 to 90 %, of a first-order low pass: ln 9/(2π f) = 0.35/f.

    Units: hertz in, second out. Source: step response 1 − exp(−2πft); Horowitz and Hill, The Art
    of Electronics (from memory).
    """
    return RISE_BANDWIDTH / positive("corner", corner)


def corner_for_rise(rise: Number) -> Number:
    """Corner of a first-order low pass from its rise time, 10 to 90 %: 0.35/t.

    Units: second in, hertz out. Source: as `rise_of_corner`, turned round.
    """
    return RISE_BANDWIDTH / positive("rise", rise)


def combined_rise(*parts: Number) -> Number:
    """Rise time of parts one behind another: the root of the sum of their squares.

    Exact for Gaussian parts, near for others. Units: second. Source: Elmore 1948, Journal of
    Applied Physics 19 (from memory).
    """
    total: Number = 0.0
    for part in parts:
        total = hypot(total, not_negative("parts", part))
    return total


def first_order_gain(frequency: Number, corner: Number) -> Number:
    """Part of an amplitude that a first-order low pass leaves: 1/√(1 + (f/fc)²).

    Units: hertz in, ratio out. Source: Horowitz and Hill, The Art of Electronics (from memory).
    """
    ratio = not_negative("frequency", frequency) / positive("corner", corner)
    return 1 / sqrt(1 + ratio**2)


def corner_for_loss(frequency: Number, loss: Number) -> Number:
    """Corner of a first-order low pass that takes no more than `loss` at a frequency.

    f (1 − loss)/√(1 − (1 − loss)²). Units: hertz and ratio in, hertz out.
    Source: `first_order_gain` turned round.
    """
    left = 1 - strictly_between("loss", loss, 0.0, 1.0)
    return positive("frequency", frequency) * left / sqrt(1 - left**2)


def bar_wave_speed_notices(
    frequency: Number, diameter: Number, speed: Number
) -> tuple[Notice, ...]:
    """A notice where a wave is shorter than ten diameters of its bar and so runs slower."""
    waves = positive("frequency", frequency) * positive("diameter", diameter)
    crowded = largest(waves / positive("speed", speed))
    if crowded <= LONG_WAVE:
        return ()
    message = (
        f"The wave is {1 / crowded:.2g} diameters long; under {1 / LONG_WAVE:g} it runs "
        "noticeably slower than in a thin bar and its front spreads."
    )
    return (Notice("bar wave speed", message, "Kolsky, Stress Waves in Solids (from memory)"),)


def wave_average_notices(length: Number, frequency: Number, speed: Number) -> tuple[Notice, ...]:
    """A notice where the wave is so short that the grid does not show what it is."""
    return sine_average_notices(length, positive("speed", speed) / positive("frequency", frequency))
