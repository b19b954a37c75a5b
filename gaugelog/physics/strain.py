"""Strain, gauge factor and change of resistance: the definitions everything else rests on.

Strain is a ratio (m/m). A gauge factor is the ratio of relative change of resistance to strain.
"""

from __future__ import annotations

from gaugelog.physics._maths import Number, expm1, log1p
from gaugelog.physics.validity import above, finite, not_zero, positive


def relative_change(factor: Number, strain: Number) -> Number:
    """Relative change of resistance of a grid under strain: ΔR/R = K ε.

    Units: ratios. Source: ASTM E251, definition of the gauge factor (from memory).

    >>> relative_change(2.0, 0.0001)
    0.0002
    """
    return not_zero("factor", factor) * finite("strain", strain)


def resistance_change(resistance: Number, factor: Number, strain: Number) -> Number:
    """Change of a grid's resistance under strain: ΔR = R K ε.

    Units: ohm. Source: ASTM E251, definition of the gauge factor (from memory).
    """
    return positive("resistance", resistance) * relative_change(factor, strain)


def strain_from_resistances(before: Number, after: Number, factor: Number) -> Number:
    """Strain that took a grid from one resistance to another: ε = (R1 − R0)/(R0 K).

    Units: ohm in, ratio out. Source: ASTM E251, definition of the gauge factor (from memory).
    """
    positive("before", before)
    positive("after", after)
    return (after - before) / (before * not_zero("factor", factor))


def resistance_shift(before: Number, after: Number) -> Number:
    """Relative shift of a grid's resistance between two stages: (R1 − R0)/R0.

    Units: ohm in, ratio out; positive when the resistance rose, as on bonding.
    Source: arithmetic; that bonding is judged by it is common practice.
    """
    return (positive("after", after) - positive("before", before)) / before


def true_strain(strain: Number) -> Number:
    """True (logarithmic) strain of an engineering strain: ln(1 + ε).

    Units: ratios; the engineering strain must exceed −1.
    Source: any mechanics of materials text, such as Dieter, Mechanical Metallurgy (from memory).
    """
    return log1p(above("strain", strain, -1.0))


def engineering_strain(true: Number) -> Number:
    """Engineering strain of a true strain: exp(ε) − 1.

    Units: ratios. Source: as `true_strain`, turned round.
    """
    return expm1(finite("true", true))


def micrometres_per_metre(strain: Number) -> Number:
    """A strain ratio in µm/m, the unit people read: ε · 10⁶.

    Source: unit conversion.
    """
    return finite("strain", strain) * 1e6


def from_micrometres_per_metre(value: Number) -> Number:
    """A strain ratio from µm/m: value · 10⁻⁶.

    Source: unit conversion.
    """
    return finite("value", value) * 1e-6
