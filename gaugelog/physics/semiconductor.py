"""Semiconductor grids: a factor of either sign, bent by strain and falling with temperature.

ΔR/R = (T₀/T) K ε + (T₀/T)² C ε², with the factor K and the second-order term C given at T₀.
Doped p, K is positive; doped n, negative.
"""

from __future__ import annotations

from gaugelog.physics._maths import Number, magnitude, nominal, sqrt, where
from gaugelog.physics._order import all_of, any_of
from gaugelog.physics.temperature import ABSOLUTE_ZERO
from gaugelog.physics.validity import (
    Notice,
    OutOfDomain,
    above,
    finite,
    largest,
    not_zero,
)

REFERENCE_CELSIUS = 25.0
"""Temperature at which factors are usually given, °C (common practice)."""
STRAIN_NOTED = 0.003
"""Strain up to which a bonded semiconductor grid is used without worry (common practice)."""
SEMICONDUCTOR_SOURCE = "Window and Holister, Strain Gauge Technology (from memory)"


def factor_at(factor: Number, celsius: Number, reference: Number = REFERENCE_CELSIUS) -> Number:
    """Factor at another temperature: K T₀/T, absolute temperatures.

    Units: ratio and °C in, ratio out; for moderate doping, about −50 to 150 °C.
    Source: Window and Holister, Strain Gauge Technology (from memory).

    >>> round(factor_at(120.0, 50.0), 2)
    110.72
    """
    return not_zero("factor", factor) * _cooling(celsius, reference)


def second_order_at(
    second: Number, celsius: Number, reference: Number = REFERENCE_CELSIUS
) -> Number:
    """Second-order term at another temperature: C (T₀/T)².

    Units: ratio and °C in, ratio out. Source: as `factor_at`.
    """
    return finite("second", second) * _cooling(celsius, reference) ** 2


def semiconductor_change(factor: Number, second: Number, strain: Number) -> Number:
    """Relative change of resistance: ΔR/R = K ε + C ε².

    `factor` and `second` at the grid's temperature. Units: ratios.
    Source: Window and Holister, Strain Gauge Technology (from memory).

    >>> round(semiconductor_change(119.5, 4000.0, 0.001), 4)
    0.1235
    """
    finite("strain", strain)
    return strain * (not_zero("factor", factor) + finite("second", second) * strain)


def semiconductor_strain(factor: Number, second: Number, change: Number) -> Number:
    """Strain from a relative change of resistance: 2x/(K ± √(K² + 4 C x)), sign as K's.

    The root that goes through nothing. A change beyond the turn of the parabola is refused.
    Units: ratios. Source: `semiconductor_change` turned round.
    """
    not_zero("factor", factor)
    under = factor**2 + 4 * finite("second", second) * finite("change", change)
    if not all_of(nominal(under) > 0):
        raise OutOfDomain("change", "is beyond what this grid can reach at any strain.")
    root = where(nominal(factor) > 0, sqrt(under), -sqrt(under))
    return 2 * change / (factor + root)


def slope_at(factor: Number, second: Number, strain: Number) -> Number:
    """Factor for small changes about a strain the grid already bears: K + 2 C ε.

    Units: ratios. Source: derivative of `semiconductor_change`.
    """
    return not_zero("factor", factor) + 2 * finite("second", second) * finite("strain", strain)


def factor_for_prestrain(factor: Number, second: Number, strain: Number) -> Number:
    """Factor of a grid that bonding has left strained, as ΔR over its bonded resistance.

    (K + 2 C ε₀)/(1 + K ε₀ + C ε₀²). Units: ratios. Source: derivative of `semiconductor_change`
    over the resistance there.
    """
    borne = 1 + semiconductor_change(factor, second, strain)
    return slope_at(factor, second, strain) / above("resistance under strain", borne, 0.0)


def semiconductor_notices(
    factor: Number, second: Number, strain: Number, celsius: Number = REFERENCE_CELSIUS
) -> tuple[Notice, ...]:
    """Notices for strain near the turn of the parabola or too large, and for temperature."""
    found = []
    turn = magnitude(not_zero("factor", factor))
    bend = magnitude(2 * finite("second", second) * finite("strain", strain))
    if any_of(nominal(bend) > nominal(turn) / 2):
        found.append("At this strain the second-order term is over a quarter of the signal.")
    if largest(strain) > STRAIN_NOTED:
        found.append("Over 3000 µm/m a semiconductor grid may break.")
    plain = nominal(finite("celsius", celsius))
    if any_of((plain < -50) | (plain > 150)):
        found.append("The factor goes as 1/T from about -50 to 150 °C only.")
    return tuple(Notice("semiconductor grid", each, SEMICONDUCTOR_SOURCE) for each in found)


def _cooling(celsius: Number, reference: Number) -> Number:
    """T₀/T in absolute temperatures."""
    first = above("reference", reference, ABSOLUTE_ZERO) - ABSOLUTE_ZERO
    return first / (above("celsius", celsius, ABSOLUTE_ZERO) - ABSOLUTE_ZERO)
