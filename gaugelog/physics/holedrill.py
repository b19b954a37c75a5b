"""Residual stress by drilling a hole in the middle of a rosette, stress uniform with depth.

Grids 1 and 3 stand at a right angle and the line of grid 2 halves it. Strains are ratios,
stresses pascal. Coefficients of a through hole come from Kirsch's field averaged over the real
grid (`kirsch.through_hole_coefficients`); those of a blind hole are typed from the user's own copy
of the standard.
"""

from __future__ import annotations

from dataclasses import dataclass

from gaugelog.physics._maths import Number, arctan2, hypot, is_array, nominal, where
from gaugelog.physics.validity import Notice, above, finite, largest, positive

E837 = "ASTM E837 (from memory)"
ECCENTRICITY_ALLOWED = 0.004
"""Of the gauge circle's diameter (ASTM E837, from memory)."""
YIELD_THICK, YIELD_THROUGH = 0.8, 0.5
"""Part of the yield strength up to which a blind and a through hole are satisfactory (E837)."""
HOLE_RANGE = (0.3, 0.5)
"""Hole over gauge circle for which the standard tabulates coefficients (from memory)."""


@dataclass(frozen=True, slots=True)
class DrilledStress:
    """Residual stress, pascal: E837's P, Q and T, the principal stresses and their direction.

    `angle` is that of the largest stress, radians in (−π/2, π/2], from grid 1 positive towards
    the line of grid 2; None (NaN in an array) where every direction is the same.
    """

    mean: Number
    difference: Number
    shear: Number
    largest: Number
    smallest: Number
    angle: Number | None


def combination_strains(e1: Number, e2: Number, e3: Number) -> tuple[Number, Number, Number]:
    """E837's combination strains: p = (ε3 + ε1)/2, q = (ε3 − ε1)/2, t = (ε3 + ε1 − 2 ε2)/2.

    Units: ratios. Source: ASTM E837, uniform stress, combination strains (from memory).
    """
    finite("e1", e1)
    finite("e2", e2)
    finite("e3", e3)
    return (e3 + e1) / 2, (e3 - e1) / 2, (e3 + e1 - 2 * e2) / 2


def uniform_stress(
    e1: Number,
    e2: Number,
    e3: Number,
    a_bar: Number,
    b_bar: Number,
    modulus: Number,
    poisson: Number,
) -> DrilledStress:
    """Uniform residual stress from three relieved strains and the coefficients of the hole.

    P = −E p/(ā (1 + ν)), Q = −E q/b̄, T = −E t/b̄, principal stresses P ± √(Q² + T²). Units:
    ratios and Pa in, Pa out. Source: ASTM E837, uniform stress (from memory).

    >>> round(uniform_stress(-1e-4, -1e-4, -1e-4, 0.158, 0.454, 200e9, 0.3).largest / 1e6, 2)
    97.37
    """
    p, q, t = combination_strains(e1, e2, e3)
    above("poisson", poisson, -1.0)
    stiffness = positive("modulus", modulus)
    mean = -stiffness * p / (positive("a_bar", a_bar) * (1 + poisson))
    difference = -stiffness * q / positive("b_bar", b_bar)
    shear = -stiffness * t / b_bar
    radius = _radius(difference, shear)
    angle = _direction(difference, shear, radius, mean)
    return DrilledStress(mean, difference, shear, mean + radius, mean - radius, angle)


def eccentricity_notices(eccentricity: Number, circle: Number) -> tuple[Notice, ...]:
    """A notice for a hole that misses the rosette's middle by more than 0.004 of its circle.

    Both in one length unit. Source: ASTM E837, centring of the hole (from memory).
    """
    share = largest(eccentricity) / positive("circle", circle)
    if share <= ECCENTRICITY_ALLOWED:
        return ()
    message = (
        f"The hole misses the middle by {share:.4f} of the gauge circle; "
        f"{ECCENTRICITY_ALLOWED} is allowed, and the stresses are off."
    )
    return (Notice("hole drilling", message, E837),)


def hole_size_notices(hole_diameter: Number, circle: Number) -> tuple[Notice, ...]:
    """A notice for a hole outside 0.3 to 0.5 of the gauge circle, where no table reaches.

    Both in one length unit. Source: ASTM E837, tables of coefficients (from memory).
    """
    share = largest(positive("hole_diameter", hole_diameter)) / positive("circle", circle)
    low, high = HOLE_RANGE
    if low <= share <= high:
        return ()
    message = f"The hole is {share:.3f} of the gauge circle; the tables reach from {low} to {high}."
    return (Notice("hole drilling", message, E837),)


def near_yield_notices(
    found: DrilledStress, yield_strength: Number, through: bool = False
) -> tuple[Notice, ...]:
    """A notice for stresses so near yield that the hole's edge flows and they read too high.

    Compared are the larger principal stress and the von Mises stress. Units: Pa.
    Source: ASTM E837, 80 % of yield in thick and 50 % in thin material (from memory).
    """
    big, small = nominal(found.largest), nominal(found.smallest)
    mises = (big**2 - big * small + small**2) ** 0.5
    share = max(largest(big), largest(small), largest(mises)) / positive(
        "yield_strength", yield_strength
    )
    allowed = YIELD_THROUGH if through else YIELD_THICK
    if share <= allowed:
        return ()
    message = (
        f"The stress is {share:.0%} of the yield strength; above {allowed:.0%} "
        "the hole's edge yields and the result is too high."
    )
    return (Notice("hole drilling", message, E837),)


def _radius(difference: Number, shear: Number) -> Number:
    """√(Q² + T²); where both vanish the root has no slope, and an uncertain number needs one."""
    if not is_array(difference) and nominal(difference) == 0 and nominal(shear) == 0:
        return difference * 0
    return hypot(difference, shear)


def _direction(difference: Number, shear: Number, radius: Number, mean: Number) -> Number | None:
    """Half of atan2(−T, −Q); nothing where the stress is alike in every direction.

    Taken from 0.0, not negated: a negative zero would turn π/2 into −π/2.
    """
    alike = nominal(radius) <= 1e-12 * abs(nominal(mean))
    if is_array(alike):
        return where(alike, float("nan"), arctan2(0.0 - shear, 0.0 - difference) / 2)
    return None if alike else arctan2(0.0 - shear, 0.0 - difference) / 2
