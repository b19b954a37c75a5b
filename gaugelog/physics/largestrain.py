"""Large strain on annealed constantan: the factor grows with strain as 2 + ε.

Stretched far, the wire keeps its volume and its resistivity, so its resistance goes as the square
of its length: ΔR/R = (1 + ε)² − 1. A grid whose factor begins at K instead of 2 adds the same ε².
"""

from __future__ import annotations

from gaugelog.physics._maths import Number, nominal, sqrt
from gaugelog.physics._order import any_of
from gaugelog.physics.validity import (
    Notice,
    above,
    finite,
    largest,
    not_zero,
    positive,
    strictly_between,
)

LARGE_STRAIN = 0.01
"""Strain from which the growth of the factor is worth correcting (common practice)."""
LARGE_STRAIN_SOURCE = (
    "Dally and Riley, Experimental Stress Analysis, post-yield grids (from memory)"
)


def factor_at_strain(factor: Number, strain: Number) -> Number:
    """Factor over a whole large strain: K + ε, 2 + ε for a factor of 2.

    Units: ratios. Source: resistance of a wire of constant volume; Dally and Riley, Experimental
    Stress Analysis (from memory).

    >>> round(factor_at_strain(2.0, 0.1), 6)
    2.1
    """
    return positive("factor", factor) + above("strain", strain, -1.0)


def large_change(factor: Number, strain: Number) -> Number:
    """Relative change of resistance under large strain: ΔR/R = K ε + ε².

    Units: ratios. Source: as `factor_at_strain`.

    >>> round(large_change(2.0, 0.1), 6)
    0.21
    """
    return factor_at_strain(factor, strain) * strain


def large_strain(factor: Number, change: Number) -> Number:
    """Strain from a relative change of resistance: 2x/(K + √(K² + 4x)).

    √(1 + x) − 1 for a factor of 2. Units: ratios. Source: `large_change` turned round.
    """
    above("change", change, -1.0)
    under = positive("factor", factor) ** 2 + 4 * change
    return 2 * change / (factor + sqrt(above("factor² + 4 change", under, 0.0)))


def large_strain_of_indicated(indicated: Number, setting: Number, factor: Number) -> Number:
    """Strain of a quarter bridge under large strain from what a linear instrument shows.

    First the bridge is undone, x = 2 K′ε′/(2 − K′ε′) with the instrument's setting K′, then the
    factor's growth. Units: ratios. Source: `bridge.output_ratio` and `large_strain`.

    >>> round(large_strain_of_indicated(0.0950226, 2.0, 2.0), 6)
    0.1
    """
    shown = not_zero("setting", setting) * finite("indicated", indicated)
    strictly_between("setting times indicated", shown, -2.0, 2.0)
    return large_strain(factor, 2 * shown / (2 - shown))


def large_change_notices(strain: Number, limit: Number) -> tuple[Notice, ...]:
    """A notice where a grid is strained beyond the limit its lot gives, a ratio."""
    finite("strain", strain)
    if not any_of(abs(nominal(strain)) > nominal(positive("limit", limit))):
        return ()
    message = (
        f"A strain of {largest(strain):.1%} is beyond the {largest(limit):.1%} this grid bears; "
        "it may read on after its foil or its bond has begun to fail."
    )
    return (Notice("large strain", message, LARGE_STRAIN_SOURCE),)


def factor_at_strain_notices(strain: Number) -> tuple[Notice, ...]:
    """A notice where a constant factor would misread a large strain."""
    found = largest(finite("strain", strain))
    if found <= LARGE_STRAIN:
        return ()
    message = (
        f"At {found:.1%} strain the factor of an annealed constantan grid has grown by "
        f"{found / 2:.1%}, and the foil does not come back to its zero."
    )
    return (Notice("large strain", message, LARGE_STRAIN_SOURCE),)
