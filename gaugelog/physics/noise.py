"""Noise and resolution: the smallest strain a circuit can show.

Noise is effective (r.m.s.) unless a name says peak to peak; all of it is taken as white.
"""

from __future__ import annotations

from math import pi, sin

from gaugelog.physics._maths import Number, hypot, magnitude, sqrt
from gaugelog.physics.bridge import ARM_NAMES
from gaugelog.physics.temperature import ABSOLUTE_ZERO
from gaugelog.physics.validity import (
    OutOfDomain,
    above,
    not_negative,
    not_zero,
    positive,
)

BOLTZMANN = 1.380649e-23
"""Boltzmann constant, J/K (exact since the SI of 2019)."""
PEAK_TO_PEAK = 6.6
"""Peak to peak over effective value, so that normal noise stays inside 99.9 % of the time."""


def source_resistance(arm_1: Number, arm_2: Number, arm_3: Number, arm_4: Number) -> Number:
    """Resistance a bridge shows to its amplifier: R1R2/(R1 + R2) + R3R4/(R3 + R4).

    One arm's value when all are equal; the supply is taken to have none. Units: ohm.
    Source: Thévenin's theorem.
    """
    for name, value in zip(ARM_NAMES, (arm_1, arm_2, arm_3, arm_4), strict=True):
        positive(name, value)
    return arm_1 * arm_2 / (arm_1 + arm_2) + arm_3 * arm_4 / (arm_3 + arm_4)


def johnson_noise(resistance: Number, celsius: Number, bandwidth: Number) -> Number:
    """Thermal noise of a resistance: √(4 k T R B).

    `bandwidth` is the noise bandwidth. Units: ohm, °C and Hz in, volt out. Source: Nyquist 1928,
    Physical Review 32; Johnson 1928.

    >>> round(1e9 * johnson_noise(1000.0, 26.85, 1.0), 2)  # nV
    4.07
    """
    kelvin = above("celsius", celsius, ABSOLUTE_ZERO) - ABSOLUTE_ZERO
    power = 4 * BOLTZMANN * kelvin * not_negative("bandwidth", bandwidth)
    return sqrt(power * positive("resistance", resistance))


def noise_bandwidth(corner: Number, order: int = 1) -> Number:
    """Noise bandwidth of a Butterworth low pass: fc (π/2n)/sin(π/2n).

    π/2 times the corner for order 1, the corner itself for a high order. Units: hertz.
    Source: the integral of 1/(1 + (f/fc)^2n); Horowitz and Hill, The Art of Electronics (from
    memory).

    >>> round(noise_bandwidth(100.0), 2)
    157.08
    """
    if not isinstance(order, int) or order < 1:
        raise OutOfDomain("order", f"must be a whole number of 1 or more, not {order}.")
    half = pi / (2 * order)
    return positive("corner", corner) * half / sin(half)


def amplifier_noise(density: Number, bandwidth: Number) -> Number:
    """Noise of an amplifier referred to its input: e √B.

    Units: V/√Hz and Hz in, volt out. Source: definition of noise density.
    """
    return not_negative("density", density) * sqrt(not_negative("bandwidth", bandwidth))


def combined_noise(*parts: Number) -> Number:
    """Independent noises together: the root of the sum of their squares.

    Units: those of the parts. Source: variances of independent variables add.
    """
    total: Number = 0.0
    for part in parts:
        total = hypot(total, not_negative("parts", part))
    return total


def strain_noise(
    noise: Number, supply: Number, factor: Number, bridge_factor: Number = 1.0
) -> Number:
    """Noise of a bridge's output as strain: 4 e/(E |K| B).

    Units: volt and ratios in, ratio out. Source: as `bridge.indicated_strain`.
    """
    divisor = positive("supply", supply) * not_zero("factor", factor)
    divisor = magnitude(divisor) * positive("bridge_factor", bridge_factor)
    return 4 * not_negative("noise", noise) / divisor


def peak_to_peak(effective: Number) -> Number:
    """Span that normal noise keeps inside 99.9 % of the time: 6.6 times its effective value.

    Source: normal distribution, ± 3.3 standard deviations.
    """
    return PEAK_TO_PEAK * not_negative("effective", effective)


def averaged_noise(effective: Number, count: int) -> Number:
    """Noise of the mean of `count` independent readings: e/√n.

    Source: variance of a mean; JCGM 100, 4.2.3.
    """
    if not isinstance(count, int) or count < 1:
        raise OutOfDomain("count", f"must be a whole number of 1 or more, not {count}.")
    return not_negative("effective", effective) / sqrt(float(count))


def noise_at_bandwidth(effective: Number, bandwidth: Number, wanted: Number) -> Number:
    """White noise of one bandwidth as it would be at another: e √(B₂/B₁).

    Hum and drift are not white and do not follow it. Units: those of the noise; both bandwidths
    in hertz. Source: a white noise's power goes with the bandwidth; as `amplifier_noise`.

    >>> noise_at_bandwidth(0.4e-6, 400.0, 100.0)
    2e-07
    """
    ratio = not_negative("wanted", wanted) / positive("bandwidth", bandwidth)
    return not_negative("effective", effective) * sqrt(ratio)


def digital_step(span: Number, bits: int) -> Number:
    """Smallest step of a converter: its whole span over 2ⁿ.

    A span of ±10 mV/V is 20 mV/V. Units: those of the span. Source: definition; IEEE Std 1241
    (from memory).
    """
    if not isinstance(bits, int) or not 1 <= bits <= 64:
        raise OutOfDomain("bits", f"must be a whole number from 1 to 64, not {bits}.")
    return positive("span", span) / 2**bits


def step_noise(step: Number) -> Number:
    """Noise that rounding to a step adds: q/√12.

    Source: standard deviation of a rectangular distribution; JCGM 100, 4.3.7.
    """
    return not_negative("step", step) / sqrt(12.0)


def bandwidth_for_noise(noise: Number, resistance: Number, celsius: Number) -> Number:
    """Noise bandwidth at which thermal noise alone reaches a value: e²/(4 k T R).

    Units: volt, ohm and °C in, hertz out. Source: as `johnson_noise`, turned round.
    """
    return (not_negative("noise", noise) / johnson_noise(resistance, celsius, 1.0)) ** 2
