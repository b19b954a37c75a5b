"""Curved surfaces: what bending a grid round them does, at bonding and with temperature.

A radius is positive where the surface is convex along the grid and negative where it is hollow;
a flat surface has an infinite one.
"""

from __future__ import annotations

from dataclasses import dataclass
from math import isinf

from gaugelog.physics._maths import Number
from gaugelog.physics.validity import Notice, between, finite, largest, not_negative, not_zero

_STRAIN_NOTED = 0.005
"""Bonding strain from which a grid's own limit should be looked up (common practice)."""


@dataclass(frozen=True, slots=True)
class Layer:
    """A layer between surface and grid: thickness (m), expansion (1/K), Poisson's ratio."""

    thickness: float
    expansion: float
    poisson: float

    def __post_init__(self) -> None:
        not_negative("thickness", self.thickness)
        finite("expansion", self.expansion)
        between("poisson", self.poisson, 0.0, 0.49)


def bonding_strain(radius: Number, height: Number) -> Number:
    """Strain that a grid is left with when it is bent round a surface: h/r.

    `height` is from the gauge's own neutral line to the foil, half the thickness of a plain
    backing; negative where the foil lies inside. Units: metre in, ratio out.
    Source: bending of a thin strip; Timoshenko, Strength of Materials (from memory).

    >>> round(1e6 * bonding_strain(0.010, 15e-6))
    1500
    """
    return finite("height", height) * _bend(radius)


def layer_growth(layer: Layer, part_expansion: Number, rise: Number) -> Number:
    """Growth of a layer's thickness when it warms on a part that holds its length and width.

    t ΔT [α(1 + ν) − 2ν αs]/(1 − ν): what it may not do along the surface it does upwards.
    Units: 1/K and K in, metre out. Source: Hooke's law with thermal strain; Timoshenko and
    Goodier, Theory of Elasticity (from memory).
    """
    free = layer.expansion * (1 + layer.poisson)
    held = 2 * layer.poisson * finite("part_expansion", part_expansion)
    return layer.thickness * finite("rise", rise) * (free - held) / (1 - layer.poisson)


def curved_thermal_strain(
    radius: Number, layers: tuple[Layer, ...], part_expansion: Number, rise: Number
) -> Number:
    """Thermal output that curvature adds: the growth of the layers under the grid over r.

    Layers that swell lift the grid on to a larger circle, so on a convex surface it is
    stretched. Units: metre, 1/K and K in, ratio out. Source: geometry of a circle and
    `layer_growth`; that small radii need it is common practice.
    """
    grown: Number = 0.0
    for layer in layers:
        grown = grown + layer_growth(layer, part_expansion, rise)
    return grown * _bend(radius)


def height_over_curved(radius: Number, height: Number) -> Number:
    """Strain of a grid above a round surface that swells evenly, over the surface's: r/(r + h).

    As a pipe under pressure: the layers keep their thickness while the radius grows. Units:
    metre in, ratio out. Source: geometry of a circle.
    """
    return 1 / (1 + not_negative("height", height) * _bend(radius))


def bonding_strain_notices(radius: Number, height: Number) -> tuple[Notice, ...]:
    """A notice where bending round the surface uses up much of what a grid bears."""
    found = largest(bonding_strain(radius, height))
    if found <= _STRAIN_NOTED:
        return ()
    message = (
        f"Bending it round this radius strains the grid by {found:.1%} before it measures; "
        "what it may bear later is less by that, and its resistance moves on bonding."
    )
    return (Notice("curvature", message, "common practice"),)


def _bend(radius: Number) -> Number:
    """One over the radius, nothing where it is infinite."""
    if isinstance(radius, int | float) and isinf(radius):
        return 0.0
    return 1 / not_zero("radius", radius)
