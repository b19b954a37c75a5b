"""Stiffening: a grid, its backing and adhesive carry load that the thin or soft part should.

The layer stands for all of them together and is taken to cover the part's width. It lies on one
side; whether the part may bend on that account makes a difference.
"""

from __future__ import annotations

from gaugelog.physics._maths import Number, nominal
from gaugelog.physics._order import any_of
from gaugelog.physics.validity import Notice, finite, not_negative, positive, strictly_between

STIFFENING_SOURCE = "Timoshenko, Strength of Materials, beams of two materials (from memory)"
_STIFFENING_NOTED = 0.01
"""Part of the strain that stiffening must take before a notice names it."""


def held_tension_share(
    modulus: Number, thickness: Number, layer_modulus: Number, layer_thickness: Number
) -> Number:
    """Strain left in a pulled strip that is kept straight: E t/(E t + E' t').

    Also for layers on both sides, `layer_thickness` being both together. Units: Pa and metre in,
    ratio out. Source: springs side by side; Timoshenko, Strength of Materials (from memory).

    >>> round(held_tension_share(3e9, 0.001, 4e9, 60e-6), 4)
    0.9259
    """
    part = positive("modulus", modulus) * positive("thickness", thickness)
    return part / (part + _layer(layer_modulus, layer_thickness))


def free_tension_share(
    modulus: Number, thickness: Number, layer_modulus: Number, layer_thickness: Number
) -> Number:
    """Strain in the layer's middle in a pulled strip free to bend, over the bare strip's.

    The strip is pulled through its own middle; the layer on one side shifts the neutral line and
    bends it. Units: Pa and metre in, ratio out. Source: Timoshenko, Strength of Materials,
    beams of two materials (from memory).
    """
    part = positive("modulus", modulus) * positive("thickness", thickness)
    axial, middle, bending = _section(modulus, thickness, layer_modulus, layer_thickness)
    height = (thickness + layer_thickness) / 2
    # The pull acts at the part's middle, off the section's own, and so bends the layer's side in.
    return part * (1 / axial - middle * (height - middle) / bending)


def bending_share(
    modulus: Number, thickness: Number, layer_modulus: Number, layer_thickness: Number
) -> Number:
    """Strain in the layer's middle over that of the bare surface, the moment being the same.

    The layer stiffens, and it lies farther out: on a stiff part this is more than 1. Units: Pa
    and metre in, ratio out. Source: Timoshenko, Strength of Materials, beams of two materials
    (from memory).
    """
    _, middle, bending = _section(modulus, thickness, layer_modulus, layer_thickness)
    bare = modulus * thickness**3 / 12 / (thickness / 2)
    return ((thickness + layer_thickness) / 2 - middle) * bare / bending


def height_share(thickness: Number, height: Number) -> Number:
    """Strain of a grid that lies `height` above a bent surface, over the surface's: 1 + 2h/t.

    The part bends about its middle and the layers stiffen it not at all. Units: metre in, ratio
    out. Source: plane sections stay plane; Timoshenko, Strength of Materials (from memory).

    >>> round(height_share(0.001, 50e-6), 6)
    1.1
    """
    return 1 + 2 * not_negative("height", height) / positive("thickness", thickness)


def surface_strain(indicated: Number, thickness: Number, height: Number) -> Number:
    """Strain of a bent surface from that of the grid above it: ε t/(t + 2h).

    Units: ratio and metre in, ratio out. Source: `height_share` turned round.
    """
    return finite("indicated", indicated) / height_share(thickness, height)


def thinnest_part(
    modulus: Number, layer_modulus: Number, layer_thickness: Number, permitted: Number
) -> Number:
    """Thickness of a strip, kept straight, that a layer stiffens by no more than permitted.

    E' t' (1 − p)/(p E), p the part of the strain lost. Units: Pa, metre and ratio in, metre out.
    Source: `held_tension_share` turned round.
    """
    strictly_between("permitted", permitted, 0.0, 1.0)
    layer = _layer(layer_modulus, layer_thickness)
    return layer * (1 - permitted) / (permitted * positive("modulus", modulus))


def held_tension_share_notices(
    modulus: Number, thickness: Number, layer_modulus: Number, layer_thickness: Number
) -> tuple[Notice, ...]:
    """A notice where stiffening takes more than 1 % of the strain."""
    left = nominal(held_tension_share(modulus, thickness, layer_modulus, layer_thickness))
    if not any_of(1 - left > _STIFFENING_NOTED):
        return ()
    return (
        Notice(
            "stiffening",
            "The installation stiffens the part so that more than 1 % of the strain is lost; "
            "for a grid much smaller than the part the loss is local and less certain.",
            STIFFENING_SOURCE,
        ),
    )


def _layer(modulus: Number, thickness: Number) -> Number:
    return not_negative("layer_modulus", modulus) * not_negative("layer_thickness", thickness)


def _section(
    modulus: Number, thickness: Number, layer_modulus: Number, layer_thickness: Number
) -> tuple[Number, Number, Number]:
    """Tensile stiffness, height of the neutral line over the part's middle, bending stiffness.

    All a unit of width.
    """
    part = positive("modulus", modulus) * positive("thickness", thickness)
    layer = _layer(layer_modulus, layer_thickness)
    height = (thickness + layer_thickness) / 2
    middle = layer * height / (part + layer)
    own = part * (thickness**2 / 12 + middle**2)
    above = layer * (layer_thickness**2 / 12 + (height - middle) ** 2)
    return part + layer, middle, own + above
