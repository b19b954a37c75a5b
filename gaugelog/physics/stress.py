"""Plane stress from a plane state of strain: isotropic and orthotropic materials."""

from __future__ import annotations

from dataclasses import dataclass

from gaugelog.physics._maths import Number, nominal, sqrt
from gaugelog.physics._order import all_of
from gaugelog.physics.plane import PlaneStrain, principal_strains, turned
from gaugelog.physics.validity import OutOfDomain, above, between, finite, positive


@dataclass(frozen=True, slots=True)
class PlaneStress:
    """Normal stress along x and y, and shear stress; pascal."""

    x: Number
    y: Number
    shear: Number

    def __post_init__(self) -> None:
        finite("x", self.x)
        finite("y", self.y)
        finite("shear", self.shear)


@dataclass(frozen=True, slots=True)
class PrincipalStresses:
    """The principal stresses in the plane, pascal, and the direction of the larger, radians.

    `angle` is as in `plane.PrincipalStrains`. In an isotropic material it is the direction of
    the larger strain; in an orthotropic one it need not be.
    """

    largest: Number
    smallest: Number
    angle: Number | None


def shear_modulus(modulus: Number, poisson: Number) -> Number:
    """Shear modulus of an isotropic material: E/(2 (1 + ν)); pascal.

    Source: Timoshenko and Goodier, Theory of Elasticity (from memory).
    """
    above("poisson", between("poisson", poisson, -1.0, 0.5), -1.0)
    return positive("modulus", modulus) / (2 * (1 + poisson))


def isotropic_stress(state: PlaneStrain, modulus: Number, poisson: Number) -> PlaneStress:
    """Plane stress of an isotropic material: σx = E (εx + ν εy)/(1 − ν²), τ = G γ.

    Units: ratio and pascal. Source: Hooke's law in plane stress; Timoshenko and Goodier (from
    memory).
    """
    shear = shear_modulus(modulus, poisson) * state.shear
    stiff = modulus / (1 - poisson**2)
    return PlaneStress(
        stiff * (state.x + poisson * state.y), stiff * (state.y + poisson * state.x), shear
    )


def orthotropic_stress(
    state: PlaneStrain, along: Number, across: Number, poisson: Number, shear: Number
) -> PlaneStress:
    """Plane stress of an orthotropic layer in its own axes, from its four constants.

    `along` and `across` are the moduli E1 and E2, `poisson` is ν12, `shear` is G12; ν21 follows
    from ν12/E1 = ν21/E2. Units: ratio and pascal. Source: Jones, Mechanics of Composite
    Materials, reduced stiffnesses (from memory).
    """
    positive("along", along)
    minor = finite("poisson", poisson) * positive("across", across) / along
    left = 1 - poisson * minor
    if not all_of(nominal(left) > 0):
        raise OutOfDomain("poisson", "is too large for these moduli: no such material can be.")
    return PlaneStress(
        (along * state.x + minor * along * state.y) / left,
        (across * state.y + poisson * across * state.x) / left,
        positive("shear", shear) * state.shear,
    )


def turned_stress(stress: PlaneStress, angle: Number) -> PlaneStress:
    """The same stress in axes turned by `angle`, radians; pascal.

    A stress turns as a strain does whose shear is twice as large. Source: Timoshenko and
    Goodier, Theory of Elasticity, stress at a point (from memory).
    """
    found = turned(_as_strain(stress), angle)
    return PlaneStress(found.x, found.y, found.shear / 2)


def principal_stresses(stress: PlaneStress) -> PrincipalStresses:
    """Principal stresses: (σx + σy)/2 ± √((σx − σy)²/4 + τ²), at ½ atan2(2τ, σx − σy).

    Units: pascal, radians. Source: Mohr's circle; Timoshenko and Goodier, Theory of Elasticity
    (from memory).
    """
    found = principal_strains(_as_strain(stress))
    return PrincipalStresses(found.largest, found.smallest, found.angle)


def von_mises(stress: PlaneStress) -> Number:
    """Equivalent stress by distortion energy: √(σx² − σx σy + σy² + 3 τ²); pascal.

    Source: von Mises in plane stress; Timoshenko, Strength of Materials (from memory).
    """
    return sqrt(stress.x**2 - stress.x * stress.y + stress.y**2 + 3 * stress.shear**2)


def _as_strain(stress: PlaneStress) -> PlaneStrain:
    return PlaneStrain(stress.x, stress.y, 2 * stress.shear)
