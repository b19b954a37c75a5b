"""Placement: what a grid shows when it lies a little turned, or a little beside its place.

Angles are radians, counted one way throughout. A field of strain is its two principal strains;
an angle "intended" is from the direction of the first.
"""

from __future__ import annotations

from math import acos, cos, pi

from gaugelog.physics._maths import Number, nominal, sin
from gaugelog.physics._maths import cos as cosine
from gaugelog.physics.arrangements import POISSON_HIGH, POISSON_LOW
from gaugelog.physics.validity import (
    Notice,
    OutOfDomain,
    between,
    finite,
    largest,
    not_zero,
    positive,
)

TURN_NOTED = 10 * pi / 180
"""Turn from which a grid is rather in another place than badly aligned, rad."""


def misalignment_error(first: Number, second: Number, intended: Number, off: Number) -> Number:
    """Strain shown less strain meant, for a grid turned by `off` from its intended direction.

    (ε₁ − ε₂)/2 [cos 2(φ + β) − cos 2φ]. Units: ratios and radians in, ratio out.
    Source: Mohr's circle; Timoshenko and Goodier, Theory of Elasticity (from memory).

    >>> round(1e6 * misalignment_error(1e-3, -0.3e-3, 0.0, 0.0872665), 2)
    -9.87
    """
    radius = (finite("first", first) - finite("second", second)) / 2
    finite("intended", intended)
    return -2 * radius * sin(2 * intended + finite("off", off)) * sin(off)


def misalignment_share(first: Number, second: Number, intended: Number, off: Number) -> Number:
    """`misalignment_error` as a part of the strain meant, which must not be nothing.

    Units: ratios and radians in, ratio out. Source: as `misalignment_error`.
    """
    error = misalignment_error(first, second, intended, off)
    middle, radius = (first + second) / 2, (first - second) / 2
    meant = middle + radius * cosine(2 * intended)
    return error / not_zero("strain in the intended direction", meant)


def uniaxial_misalignment(poisson: Number, intended: Number, off: Number) -> Number:
    """`misalignment_share` in uniaxial stress; −(1 + ν) sin²β for a grid meant along it.

    Units: ratio and radians in, ratio out. Source: as `misalignment_error`, ε₂ = −ν ε₁.
    """
    between("poisson", poisson, POISSON_LOW, POISSON_HIGH)
    return misalignment_share(1.0, -poisson, intended, off)


def field_misalignment(
    strain_x: Number, strain_y: Number, shear: Number, intended: Number, off: Number
) -> Number:
    """Strain shown less strain meant in a field given by εx, εy and γxy.

    `intended` is from x towards y. Units: ratios and radians in, ratio out.
    Source: transformation of plane strain; Timoshenko and Goodier (from memory).
    """
    difference = finite("strain_x", strain_x) - finite("strain_y", strain_y)
    middle = 2 * finite("intended", intended) + finite("off", off)
    turned = finite("shear", shear) * cosine(middle) - difference * sin(middle)
    return turned * sin(off)


def largest_misalignment(first: float, second: float, intended: float, permitted: float) -> float:
    """Turn, to whichever side is worse, that makes a permitted error of strain; at most π/2.

    Units: ratios and radians in, radians out; π/2 where no turn makes so large an error.
    Source: `misalignment_error` turned round.

    >>> round(largest_misalignment(1e-3, -0.3e-3, 0.0, 10e-6), 4)
    0.0878
    """
    radius = abs(finite("first", first) - finite("second", second)) / 2
    positive("permitted", permitted)
    start = 2 * finite("intended", intended)
    if permitted >= 2 * radius:
        return pi / 2
    found = [pi / 2]
    for level in (cos(start) + permitted / radius, cos(start) - permitted / radius):
        if abs(level) <= 1:
            found += [_nearest_turn(sign * acos(level) - start) / 2 for sign in (1, -1)]
    return min(found)


def misplacement_error(
    gradient_x: Number, gradient_y: Number, off_x: Number, off_y: Number
) -> Number:
    """Strain shown less strain meant, for a grid beside its place: gx dx + gy dy.

    Gradients of the strain along the grid, per metre; offsets in metre. Ratio out.
    Source: first term of Taylor's series.
    """
    along = finite("gradient_x", gradient_x) * finite("off_x", off_x)
    return along + finite("gradient_y", gradient_y) * finite("off_y", off_y)


def axis_error(installed: Number, planned: Number) -> Number:
    """Turn of a grid's axis from its plan, −π/2 to π/2: a grid has no head and no tail.

    Units: radians. Source: definition.
    """
    turn = finite("installed", installed) - finite("planned", planned)
    return turn - pi * ((nominal(turn) + pi / 2) // pi)


def misalignment_notices(off: Number) -> tuple[Notice, ...]:
    """A notice where a grid is turned so far that it should be planned anew, not corrected."""
    found = largest(finite("off", off))
    if found <= TURN_NOTED:
        return ()
    message = (
        f"The grid is turned by {found * 180 / pi:.1f}°; over {TURN_NOTED * 180 / pi:.0f}° take "
        "the direction it has as its direction, rather than correct for it."
    )
    return (Notice("misalignment", message, "common practice"),)


def _nearest_turn(angle: float) -> float:
    """The size of an angle once whole turns are taken off; nothing at all counts as a turn."""
    size = abs((angle + pi) % (2 * pi) - pi)
    if size == 0:
        raise OutOfDomain("permitted", "must be greater than rounding.")
    return size
