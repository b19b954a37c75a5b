"""A grid beside a hole: how much of the strain at the edge it shows.

The field is Kirsch's, about a round hole in a wide plate that is pulled; the grid lies along the
pull, at the place where the edge is strained most. Its near side keeps some distance from the
edge and its far side lies in strain that has fallen.
"""

from __future__ import annotations

import importlib

from gaugelog.physics._maths import Number
from gaugelog.physics.kirsch import relieved_strain
from gaugelog.physics.validity import between, not_negative, positive

EDGE_FACTOR = 3.0
"""Stress at the edge over that far away (Kirsch 1898)."""
_NODES = 32
"""Of the Gauss–Legendre rule in each direction."""


def hole_edge_strain(radius: Number, distance: Number, poisson: Number) -> Number:
    """Strain along the pull beside the hole, as a part of the strain at its edge.

    [2 + q + 3q² − 3ν(q − q²)]/6 with q = (a/(a + d))²: 1 at the edge, 1/3 far away. `distance`
    is from the edge. Units: metre in, ratio out. Source: Kirsch 1898; Timoshenko and Goodier,
    Theory of Elasticity (from memory).

    >>> hole_edge_strain(0.005, 0.0, 0.3)
    1.0
    """
    between("poisson", poisson, -1.0, 0.5)
    reach = positive("radius", radius) + not_negative("distance", distance)
    near = (radius / reach) ** 2
    return (2 + near + 3 * near**2 - 3 * poisson * (near - near**2)) / 6


def hole_edge_average(radius: Number, near: Number, width: Number, poisson: Number) -> Number:
    """Mean over the width of a short grid beside the hole, as a part of the strain at its edge.

    `near` is from the edge to the first strand. Units: metre in, ratio out.
    Source: the integral of `hole_edge_strain` in closed form.
    """
    between("poisson", poisson, -1.0, 0.5)
    inner = positive("radius", radius) + not_negative("near", near)
    outer = inner + positive("width", width)
    rise = _primitive(radius, outer, poisson) - _primitive(radius, inner, poisson)
    return rise / (2 * EDGE_FACTOR * width)


def hole_grid_average(
    radius: float, near: float, width: float, length: float, poisson: float
) -> float:
    """Mean over a whole grid beside the hole, as a part of the strain at its edge.

    Like `hole_edge_average`, and over `length` along the pull too. Units: metre in, ratio out.
    Source: Kirsch 1898, integrated over the rectangle by the Gauss–Legendre rule.
    """
    numpy = importlib.import_module("numpy")
    between("poisson", poisson, -1.0, 0.5)
    points, weights = numpy.polynomial.legendre.leggauss(_NODES)
    inner = positive("radius", radius) + not_negative("near", near)
    across = inner + positive("width", width) * (points + 1) / 2
    along = positive("length", length) * points / 2
    x, y = along[:, None], across[None, :]
    strain = (1 + relieved_strain(x, y, 0.0, radius, poisson)) / EDGE_FACTOR
    return float(weights @ strain @ weights / 4)


def _primitive(radius: Number, reach: Number, poisson: Number) -> Number:
    """Integral over r of 2 + q + 3q² − 3ν(q − q²), with q = (a/r)²."""
    first = radius**2 / reach
    third = radius**4 / reach**3
    return 2 * reach - first - third + poisson * (3 * first - third)
