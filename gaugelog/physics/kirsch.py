"""A round hole in a pulled plate: Kirsch's field, and what a grid beside the hole feels of it.

This is a through hole's relief, exact in plane stress; a blind hole's has no closed form.
"""

from __future__ import annotations

import importlib
from dataclasses import dataclass
from math import pi

from gaugelog.physics._maths import Number, arctan2, cos, hypot, sin
from gaugelog.physics._order import at_most, smaller
from gaugelog.physics.validity import above, between, finite, positive

_NODES = 24
"""Of the Gauss–Legendre rule in each direction: exact to rounding for grids off the hole."""


@dataclass(frozen=True, slots=True)
class DrillGrid:
    """A grid that points at the hole: its near and far end from the middle, and its width.

    All in one unit, that of the hole's diameter.
    """

    near: float
    far: float
    width: float

    def __post_init__(self) -> None:
        smaller("near", positive("near", self.near), "far", positive("far", self.far))
        positive("width", self.width)

    def scaled(self, circle: float) -> DrillGrid:
        """The same layout on a gauge circle of another diameter."""
        positive("circle", circle)
        return DrillGrid(self.near * circle, self.far * circle, self.width * circle)


TYPE_A = DrillGrid(near=0.3455, far=0.6545, width=0.309)
"""Layout of the standard's rosette type A on a gauge circle of diameter 1 (ASTM E837)."""


def kirsch_stress(
    stress: Number, radius: Number, angle: Number, hole_radius: Number
) -> tuple[Number, Number, Number]:
    """Stress about a round hole in a wide pulled plate: radial, round the hole, and shear.

    `angle` is from the pull, radians; `radius` from the hole's middle, at least `hole_radius`.
    Units: Pa in and out, lengths alike. Source: Kirsch 1898; Timoshenko and Goodier, Theory of
    Elasticity (from memory).
    """
    finite("stress", stress)
    at_most("hole_radius", positive("hole_radius", hole_radius), "radius", radius)
    inside = (hole_radius / radius) ** 2
    cosine, sine = cos(2 * finite("angle", angle)), sin(2 * angle)
    radial = stress / 2 * ((1 - inside) + (1 - 4 * inside + 3 * inside**2) * cosine)
    around = stress / 2 * ((1 + inside) - (1 + 3 * inside**2) * cosine)
    shear = -stress / 2 * (1 + 2 * inside - 3 * inside**2) * sine
    return radial, around, shear


def relieved_strain(
    x: Number, y: Number, angle: Number, hole_radius: Number, poisson: Number
) -> Number:
    """Strain along x at a point when a hole is drilled at the origin of a pulled plate.

    For a pull of unit stress over modulus (σ/E = 1) at `angle` from x, radians: Kirsch's field
    less the field without hole, by Hooke's law for plane stress. Lengths alike, ratio out.
    Source: Kirsch 1898; Timoshenko and Goodier, Theory of Elasticity (from memory).
    """
    above("poisson", poisson, -1.0)
    place = arctan2(y, x)
    from_pull = place - angle
    holed = kirsch_stress(1.0, hypot(x, y), from_pull, hole_radius)
    whole = (1 + cos(2 * from_pull)) / 2, (1 - cos(2 * from_pull)) / 2, -sin(2 * from_pull) / 2
    radial, around, shear = (after - before for after, before in zip(holed, whole, strict=True))
    along_radius = radial - poisson * around
    along_circle = around - poisson * radial
    slide = 2 * (1 + poisson) * shear
    cosine, sine = cos(place), sin(place)
    return along_radius * cosine**2 + along_circle * sine**2 - slide * sine * cosine


def through_hole_coefficients(
    hole_diameter: float, grid: DrillGrid, poisson: float
) -> tuple[float, float]:
    """ā and b̄ of a through hole: Kirsch's relieved strain averaged over the whole grid.

    Gauss–Legendre over the grid's rectangle. Units: the hole's diameter in the grid's unit; none
    out. Source: ASTM E837, through-hole coefficients (from memory), by Kirsch's field.

    >>> a_bar, b_bar = through_hole_coefficients(0.4, TYPE_A, 0.3)
    >>> round(a_bar, 3), round(b_bar, 3)
    (0.158, 0.454)
    """
    radius = positive("hole_diameter", hole_diameter) / 2
    at_most("hole_diameter", hole_diameter, "twice the grid's near end", 2 * grid.near)
    between("poisson", poisson, -1.0, 0.5)
    along = _average(grid, 0.0, radius, poisson)
    across = _average(grid, pi / 2, radius, poisson)
    return -(along + across) / (1 + poisson), -(along - across)


def _average(grid: DrillGrid, angle: float, hole_radius: float, poisson: float) -> float:
    """Relieved strain along the grid, averaged over its rectangle."""
    nodes, weights = importlib.import_module("numpy.polynomial.legendre").leggauss(_NODES)
    half = (grid.far - grid.near) / 2
    x = grid.near + half * (1 + nodes)
    y = grid.width / 2 * nodes
    relieved = relieved_strain(x[:, None], y[None, :], angle, hole_radius, poisson)
    return float(weights @ relieved @ weights) / 4
