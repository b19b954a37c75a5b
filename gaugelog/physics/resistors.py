"""Resistors to buy: the nearest of the E96 series, and how far tolerance and heat may carry it."""

from __future__ import annotations

import math
from dataclasses import dataclass

from gaugelog.physics._maths import Number, magnitude
from gaugelog.physics.validity import above, finite, not_negative, positive

E96 = tuple(round(10 ** (step / 96), 2) for step in range(96))
"""The 96 values of one decade. Source: IEC 60063 (rounded powers of the 96th root of ten)."""


@dataclass(frozen=True, slots=True)
class Span:
    """The least and the most that a value may be, in the unit of the value."""

    least: Number
    most: Number


def nearest_e96(resistance: float) -> float:
    """The value of the E96 series nearest to a resistance, by ratio; ohm.

    Source: IEC 60063 (from memory that every E96 value is the rounded power).

    >>> nearest_e96(174650.0)
    174000.0
    """
    positive("resistance", resistance)
    decade = math.floor(math.log10(resistance))
    values = [each * 10.0**power for power in (decade - 1, decade, decade + 1) for each in E96]
    nearest = min(values, key=lambda value: abs(math.log(value / resistance)))
    return float(f"{nearest:.3g}")


def warmed(resistance: Number, coefficient: Number, rise: Number) -> Number:
    """Resistance after a rise of temperature: R (1 + α ΔT).

    Units: ohm, 1/K, K. Source: definition of the temperature coefficient; IEC 60115-1 (from
    memory).
    """
    change = finite("coefficient", coefficient) * finite("rise", rise)
    return positive("resistance", resistance) * (1 + above("coefficient times rise", change, -1.0))


def resistor_span(
    resistance: Number, tolerance: Number, coefficient: Number = 0.0, rise: Number = 0.0
) -> Span:
    """The least and the most a resistor may be: R (1 ± tolerance)(1 ± |α ΔT|).

    `tolerance` is a ratio (0.001 for 0.1 %); `coefficient`, in 1/K, counts either way.
    Source: IEC 60115-1, meaning of tolerance and temperature coefficient (from memory).
    """
    above("tolerance below one", 1 - not_negative("tolerance", tolerance), 0.0)
    drift = magnitude(finite("coefficient", coefficient) * finite("rise", rise))
    return Span(
        warmed(resistance, -drift, 1.0) * (1 - tolerance),
        warmed(resistance, drift, 1.0) * (1 + tolerance),
    )
