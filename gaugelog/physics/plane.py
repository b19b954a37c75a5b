"""A plane state of strain: in any direction, its principal values, Mohr's circle.

Angles are in radians, counter-clockwise from the x axis as seen by the viewer of the gauges.
Shear is engineering shear, the change of a right angle.
"""

from __future__ import annotations

from dataclasses import dataclass
from math import pi

from gaugelog.physics._maths import Number, arctan2, cos, hypot, is_array, nominal, sin, where
from gaugelog.physics._order import any_of
from gaugelog.physics.validity import Notice, finite, largest

NO_DIRECTION = 1e-9
"""Radius of Mohr's circle, as a part of its centre, up to which no direction is told."""

SMALL_STRAIN = 0.01
"""Strain beyond which the formulas for small strain are left (ASTM E1561, scope)."""


@dataclass(frozen=True, slots=True)
class PlaneStrain:
    """Strain along x and y, and engineering shear between them; ratios and radians."""

    x: Number
    y: Number
    shear: Number

    def __post_init__(self) -> None:
        finite("x", self.x)
        finite("y", self.y)
        finite("shear", self.shear)


@dataclass(frozen=True, slots=True)
class PrincipalStrains:
    """The principal values of a state.

    `angle` is the direction of the larger, from −π/2 (left out) to π/2; None for a state that is
    alike in every direction (NaN in an array). `max_shear` is the largest in-plane shear.
    """

    largest: Number
    smallest: Number
    angle: Number | None
    max_shear: Number


@dataclass(frozen=True, slots=True)
class MohrCircle:
    """Mohr's circle of a state: centre (mean strain) and radius (half the largest shear)."""

    centre: Number
    radius: Number


def strain_along(state: PlaneStrain, angle: Number) -> Number:
    """Strain in a direction: (εx + εy)/2 + (εx − εy)/2 cos 2θ + γ/2 sin 2θ.

    `angle` in radians. Source: Timoshenko and Goodier, Theory of Elasticity, strain at a point
    (from memory); ASTM E1561.
    """
    double = 2 * finite("angle", angle)
    mean, half = (state.x + state.y) / 2, (state.x - state.y) / 2
    return mean + half * cos(double) + state.shear / 2 * sin(double)


def shear_along(state: PlaneStrain, angle: Number) -> Number:
    """Engineering shear between a direction and its normal: γ cos 2θ − (εx − εy) sin 2θ.

    `angle` in radians. Source: as `strain_along`.
    """
    double = 2 * finite("angle", angle)
    return state.shear * cos(double) - (state.x - state.y) * sin(double)


def turned(state: PlaneStrain, angle: Number) -> PlaneStrain:
    """The same state in axes turned by `angle`, radians. Source: as `strain_along`."""
    return PlaneStrain(
        strain_along(state, angle), strain_along(state, angle + pi / 2), shear_along(state, angle)
    )


def mohr_circle(state: PlaneStrain) -> MohrCircle:
    """Centre and radius of Mohr's circle of strain: (εx + εy)/2 and √((εx − εy)² + γ²)/2.

    Source: Timoshenko and Goodier, Theory of Elasticity, strain at a point (from memory).
    """
    return MohrCircle((state.x + state.y) / 2, hypot(state.x - state.y, state.shear) / 2)


def principal_strains(state: PlaneStrain) -> PrincipalStrains:
    """Largest and smallest strain, the direction of the largest, and the largest shear.

    The direction is ½ atan2(γ, εx − εy), so its quadrant is right; a state alike in every
    direction has none. Source: ASTM E1561, with the two-argument arctangent.

    >>> found = principal_strains(PlaneStrain(0.0, 0.0, 2e-4))
    >>> round(found.largest * 1e6), round(found.angle * 57.29578)
    (100, 45)
    """
    circle = mohr_circle(state)
    return PrincipalStrains(
        circle.centre + circle.radius,
        circle.centre - circle.radius,
        _direction(state, circle),
        2 * circle.radius,
    )


def _direction(state: PlaneStrain, circle: MohrCircle) -> Number | None:
    alike = nominal(circle.radius) <= NO_DIRECTION * abs(nominal(circle.centre))
    if not (is_array(alike) and alike.ndim):
        return None if alike else _angle(state)
    # A pass over a million states is saved wherever there is nothing to replace.
    return where(alike, float("nan"), _angle(state)) if alike.any() else _angle(state)


def _angle(state: PlaneStrain) -> Number:
    """½ atan2(γ, εx − εy); −π/2 is the same direction as π/2, and the latter is told."""
    angle = arctan2(state.shear, state.x - state.y) / 2
    turned_back = nominal(angle) <= -pi / 2
    return where(turned_back, angle + pi, angle) if any_of(turned_back) else angle


def principal_strains_notices(state: PlaneStrain) -> tuple[Notice, ...]:
    """A notice where strain is beyond what the formulas for small strain hold for."""
    found = principal_strains(state)
    size = max(largest(found.largest), largest(found.smallest))
    if size <= SMALL_STRAIN:
        return ()
    message = (
        f"A strain of {100 * size:.2g} % is beyond {100 * SMALL_STRAIN:g} %, where the formulas "
        "for small strain hold."
    )
    return (Notice("principal strains", message, "ASTM E1561, scope"),)
