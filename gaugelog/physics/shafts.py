"""Shafts in torsion: strain at a gauge under a torque, and the torque from a shear pair.

Linear elastic, solid or hollow round shafts. SI: N m, metre, pascal; angles in radians. The shear
strain is the engineering one, γ, twice the strain at 45° to the axis.
"""

from __future__ import annotations

from math import pi

from gaugelog.physics._maths import Number, nominal, sin
from gaugelog.physics._order import all_of, smaller
from gaugelog.physics.validity import OutOfDomain, finite, not_negative, positive


def polar_modulus(outer: Number, inner: Number = 0.0) -> Number:
    """Section modulus of a round shaft in torsion: Wp = π (D⁴ − d⁴)/(16 D).

    Units: diameters in m, m³ out. Source: Gere, Mechanics of Materials, torsion (from memory).

    >>> round(polar_modulus(0.05) * 1e9, 1)
    24543.7
    """
    positive("outer", outer)
    smaller("inner", not_negative("inner", inner), "outer", outer)
    return pi * (outer**4 - inner**4) / (16 * outer)


def shear_stress(torque: Number, outer: Number, inner: Number = 0.0) -> Number:
    """Shear stress at the surface of a shaft: τ = T/Wp.

    Units: N m, m in, Pa out. Source: Gere, Mechanics of Materials, torsion formula (from memory).
    """
    return finite("torque", torque) / polar_modulus(outer, inner)


def shear_strain(torque: Number, stiffness: Number, outer: Number, inner: Number = 0.0) -> Number:
    """Shear strain at the surface of a shaft: γ = T/(G Wp).

    `stiffness` is the shear modulus G (`stress.shear_modulus`). Units: N m, Pa, m in, ratio
    (engineering shear) out.
    Source: Gere, Mechanics of Materials, torsion formula (from memory).
    """
    return shear_stress(torque, outer, inner) / positive("stiffness", stiffness)


def strain_on_shaft(
    torque: Number, stiffness: Number, angle: Number, outer: Number, inner: Number = 0.0
) -> Number:
    """Strain of a gauge at an angle to a shaft's axis: ε = (γ/2) sin 2θ.

    γ/2 at 45°, −γ/2 at −45°, nothing along or across. Units: N m, Pa, radian, m in, ratio out.
    Source: Gere, Mechanics of Materials, strains in pure shear (from memory).
    """
    shear = shear_strain(torque, stiffness, outer, inner)
    return shear / 2 * sin(2 * finite("angle", angle))


def torque_from_strain(
    strain: Number, stiffness: Number, angle: Number, outer: Number, inner: Number = 0.0
) -> Number:
    """Torque from one gauge at an angle to the axis: T = 2 G Wp ε/sin 2θ.

    Units: ratio, Pa, radian, m in, N m out. Source: as `strain_on_shaft`, turned round.
    """
    turn = sin(2 * finite("angle", angle))
    if not all_of(abs(nominal(turn)) > 1e-9):
        raise OutOfDomain(
            "angle", "must not lie along or across the axis, where torsion is unfelt."
        )
    return torque_from_shear(2 * finite("strain", strain) / turn, stiffness, outer, inner)


def torque_from_pair(
    plus: Number, minus: Number, stiffness: Number, outer: Number, inner: Number = 0.0
) -> Number:
    """Torque from a shear pair at +45° and −45°: T = G Wp (ε₊ − ε₋).

    What the two have in common (axial force, bending, temperature) cancels. Units: ratios, Pa, m
    in, N m out. Source: Gere, Mechanics of Materials, strains in pure shear (from memory).
    """
    shear = finite("plus", plus) - finite("minus", minus)
    return torque_from_shear(shear, stiffness, outer, inner)


def torque_from_shear(
    shear: Number, stiffness: Number, outer: Number, inner: Number = 0.0
) -> Number:
    """Torque of a known surface shear strain: T = G Wp γ.

    Units: ratio (engineering shear), Pa, m in, N m out. Source: as `shear_strain`, turned round.
    """
    positive("stiffness", stiffness)
    return finite("shear", shear) * stiffness * polar_modulus(outer, inner)
