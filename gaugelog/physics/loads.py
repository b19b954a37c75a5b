"""Loads on bars and beams, and the strain they make at a gauge.

Linear elastic, small deflection. SI throughout: newton, metre, pascal, N m; strain is a ratio,
tension positive. A bending strain is that of the stretched surface; the other is its opposite.
"""

from __future__ import annotations

from math import pi

from gaugelog.physics._maths import Number, nominal
from gaugelog.physics._order import at_most, smaller
from gaugelog.physics.validity import (
    Notice,
    between,
    finite,
    largest,
    not_negative,
    not_zero,
    positive,
)

LOADS_SOURCE = "Gere, Mechanics of Materials, beams (from memory)"
SLENDER = 10.0
"""Span over depth from which the bending formula is trusted (common practice)."""


def bar_strain(force: Number, modulus: Number, area: Number) -> Number:
    """Strain along a bar under tension: ε = F/(E A).

    Units: N, Pa, m² in, ratio out. Source: Gere, Mechanics of Materials, axially loaded members
    (from memory).

    >>> round(1e6 * bar_strain(10e3, 200e9, 100e-6), 9)
    500.0
    """
    positive("modulus", modulus)
    return finite("force", force) / (modulus * positive("area", area))


def bar_force(strain: Number, modulus: Number, area: Number) -> Number:
    """Force in a bar of a known strain: F = E A ε.

    Units: ratio, Pa, m² in, N out. Source: as `bar_strain`, turned round.
    """
    positive("modulus", modulus)
    return finite("strain", strain) * modulus * positive("area", area)


def bar_modulus(force: Number, strain: Number, area: Number) -> Number:
    """Modulus of elasticity from a pulled bar: E = F/(A ε).

    Units: N, ratio, m² in, Pa out. Source: ASTM E111, definition of Young's modulus (from memory).
    """
    return finite("force", force) / (positive("area", area) * not_zero("strain", strain))


def lateral_strain(strain: Number, poisson: Number) -> Number:
    """Strain across a bar that is strained along: −ν ε; times the width it is the narrowing.

    Units: ratios. Source: Gere, Mechanics of Materials, Poisson's ratio (from memory).
    """
    return -between("poisson", poisson, -1.0, 0.5) * finite("strain", strain)


def rectangle_modulus(width: Number, depth: Number) -> Number:
    """Section modulus of a rectangle bent over its depth: W = b h²/6.

    Units: m in, m³ out. Source: Gere, Mechanics of Materials, properties of areas (from memory).
    """
    return positive("width", width) * positive("depth", depth) ** 2 / 6


def round_modulus(outer: Number, inner: Number = 0.0) -> Number:
    """Section modulus of a round bar or tube: W = π (D⁴ − d⁴)/(32 D).

    Units: diameters in m, m³ out. Source: Gere, Mechanics of Materials, properties of areas (from
    memory).
    """
    positive("outer", outer)
    smaller("inner", not_negative("inner", inner), "outer", outer)
    return pi * (outer**4 - inner**4) / (32 * outer)


def bending_stress(moment: Number, section_modulus: Number) -> Number:
    """Stress at the stretched surface: σ = M/W.

    Units: N m, m³ in, Pa out; positive for a moment that stretches the gauged surface.
    Source: Gere, Mechanics of Materials, flexure formula (from memory).
    """
    return finite("moment", moment) / positive("section_modulus", section_modulus)


def bending_strain(moment: Number, modulus: Number, section_modulus: Number) -> Number:
    """Strain at the stretched surface along the beam: ε = M/(E W).

    Units: N m, Pa, m³ in, ratio out. Source: Gere, Mechanics of Materials, flexure formula (from
    memory).
    """
    return bending_stress(moment, section_modulus) / positive("modulus", modulus)


def bending_moment(strain: Number, modulus: Number, section_modulus: Number) -> Number:
    """Moment of a known surface strain: M = E W ε.

    Units: ratio, Pa, m³ in, N m out. Source: as `bending_strain`, turned round.
    """
    positive("section_modulus", section_modulus)
    return finite("strain", strain) * positive("modulus", modulus) * section_modulus


def cantilever_moment(load: Number, distance: Number) -> Number:
    """Moment of a cantilever at a gauge: M = F x, with x from the load to the gauge's middle.

    Units: N, m in, N m out. Source: Gere, Mechanics of Materials, bending moments (from memory).
    """
    return finite("load", load) * not_negative("distance", distance)


def cantilever_load(
    nearer_root: Number,
    nearer_load: Number,
    spacing: Number,
    modulus: Number,
    section_modulus: Number,
) -> Number:
    """Tip load from two gauges along a cantilever: F = (ε1 − ε2) E W/Δx.

    Where the load sits does not matter. Units: ratios, m, Pa, m³ in, N out.
    Source: Gere, Mechanics of Materials, shear force as slope of the moment (from memory).
    """
    moment = bending_moment(nearer_root - nearer_load, modulus, section_modulus)
    return moment / positive("spacing", spacing)


def simply_supported_moment(
    load: Number, span: Number, load_at: Number, gauge_at: Number
) -> Number:
    """Moment under a gauge of a beam on two supports with one load between them.

    M = F (L − a) x/L before the load and F a (L − x)/L beyond it, both places from the left
    support. Units: N, m in, N m out. Source: Gere, Mechanics of Materials, bending moments (from
    memory).
    """
    finite("load", load)
    positive("span", span)
    at_most("load_at", not_negative("load_at", load_at), "the span", span)
    at_most("gauge_at", not_negative("gauge_at", gauge_at), "the span", span)
    # The nearer of the two places to the left support sets which side of the load the gauge is.
    first = (load_at + gauge_at - abs(load_at - gauge_at)) / 2
    last = load_at + gauge_at - first
    return load * first * (span - last) / span


def four_point_moment(load: Number, arm: Number) -> Number:
    """Moment between the inner rollers of four-point bending: M = F a/2.

    `load` is the whole force, `arm` the distance of an inner from an outer roller. Units: N, m in,
    N m out. Source: ASTM C1161, four-point flexure (from memory).
    """
    return finite("load", load) * positive("arm", arm) / 2


def bending_notices(span: Number, depth: Number) -> tuple[Notice, ...]:
    """A notice for a beam too stubby for the bending formula."""
    positive("span", span)
    slenderness = 1 / largest(nominal(positive("depth", depth)) / nominal(span))
    if slenderness >= SLENDER:
        return ()
    message = (
        f"The beam is only {slenderness:.1f} times as long as deep; shear and the supports "
        "disturb the strain that the bending formula gives."
    )
    return (Notice("bending strain", message, LOADS_SOURCE),)
