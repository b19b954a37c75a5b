"""Weldable grids: a grid on a metal carrier that is spot-welded on, and how strain gets into it.

Strain enters the carrier from its edges through the joint, as shear; near a free end the carrier
lags behind the part. The same holds for a thick backing in a soft adhesive. What the fixed cable
takes of the factor is `leads.effective_factor`.
"""

from __future__ import annotations

from gaugelog.physics._maths import Number, exp, magnitude, nominal, sqrt
from gaugelog.physics._order import all_of, at_most
from gaugelog.physics.validity import (
    Notice,
    OutOfDomain,
    finite,
    not_zero,
    positive,
)

LAG_SOURCE = "Volkersen 1938, shear lag of a joint (from memory)"
_LAG_NOTED = 0.01
"""Part of the strain that lag must take before a notice names it."""


def spot_joint_stiffness(spot: Number, pitch: Number, rows: Number) -> Number:
    """Shear stiffness of a spot-welded joint per area: k/(p b).

    `spot` is the stiffness of one weld, N/m; `pitch` from weld to weld along the strain and
    `rows` from row to row across it, metre. Units: Pa/m out. Source: definition, welds spread
    evenly.
    """
    return positive("spot", spot) / (positive("pitch", pitch) * positive("rows", rows))


def bond_stiffness(shear_modulus: Number, thickness: Number) -> Number:
    """Shear stiffness of an adhesive layer per area: G/h.

    Units: Pa and metre in, Pa/m out. Source: simple shear; Volkersen 1938 (from memory).
    """
    return positive("shear_modulus", shear_modulus) / positive("thickness", thickness)


def lag_length(joint: Number, modulus: Number, thickness: Number) -> Number:
    """Length over which a carrier takes up the part's strain: √(E t/κ).

    At this distance from a free end 63 % has come across. `joint` is κ in Pa/m; `modulus` and
    `thickness` are the carrier's. The part is taken as stiff. Units: Pa and metre in, metre out.
    Source: Volkersen 1938, shear lag of a joint (from memory).

    >>> round(1e3 * lag_length(bond_stiffness(1e9, 50e-6), 200e9, 125e-6), 3)  # mm
    1.118
    """
    stretch = positive("modulus", modulus) * positive("thickness", thickness)
    return sqrt(stretch / positive("joint", joint))


def carrier_strain(position: Number, carrier: Number, lag: Number) -> Number:
    """Strain of a carrier at a place along it, as a part of the part's strain.

    1 − cosh(x/λ)/cosh(L/2λ), with x from the carrier's middle. Units: metre in, ratio out.
    Source: Volkersen 1938, shear lag of a joint (from memory).
    """
    half = positive("carrier", carrier) / 2 / positive("lag", lag)
    place = magnitude(finite("position", position)) / lag
    at_most("position", place, "half the carrier", half)
    return 1 - exp(place - half) * (1 + exp(-2 * place)) / (1 + exp(-2 * half))


def grid_transfer(grid: Number, carrier: Number, lag: Number) -> Number:
    """Mean strain of a grid in the middle of its carrier, as a part of the part's strain.

    1 − sinh(g/2λ)/((g/2λ) cosh(L/2λ)). Units: metre in, ratio out.
    Source: the integral of `carrier_strain`.

    >>> round(grid_transfer(0.006, 0.020, 0.001), 4)
    0.9997
    """
    at_most("grid", positive("grid", grid), "the carrier", positive("carrier", carrier))
    short, half = grid / 2 / positive("lag", lag), carrier / 2 / lag
    lost = exp(short - half) * (1 - exp(-2 * short)) / (1 + exp(-2 * half))
    return 1 - lost / short


def factor_on_part(factor: Number, transfer: Number) -> Number:
    """Factor of a welded grid for the strain of the part: the bare grid's times its transfer.

    Where the maker's factor was found on welded samples it holds the transfer already.
    Units: ratios. Source: definition.
    """
    return not_zero("factor", factor) * positive("transfer", transfer)


def transfer_of_sample(indicated: Number, applied: Number) -> Number:
    """Transfer found on a sample: strain shown over strain known to be applied.

    Units: ratios. Source: ASTM E251, factor by a sample of the lot (from memory).
    """
    found = finite("indicated", indicated) / not_zero("applied", applied)
    if not all_of(nominal(found) > 0):
        raise OutOfDomain("indicated", "must have the sign of the strain applied.")
    return found


def grid_transfer_notices(grid: Number, carrier: Number, lag: Number) -> tuple[Notice, ...]:
    """A notice where a carrier is so short or so loosely joined that the grid lags."""
    least = 1 - grid_transfer(grid, carrier, lag)
    if all_of(nominal(least) <= _LAG_NOTED):
        return ()
    message = (
        "The carrier's ends lie so near the grid that more than 1 % of the strain does not "
        "reach it; calibrate a sample welded alike."
    )
    return (Notice("weldable grid", message, LAG_SOURCE),)
