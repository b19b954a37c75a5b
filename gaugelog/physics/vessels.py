"""Pressure vessels: stresses and strains of thin and thick walls, and the pressure from a strain.

Linear elastic, isotropic, far from ends and welds; a closed vessel unless `closed` is false. SI:
pascal and metre. Pressure counts above the outside's.
"""

from __future__ import annotations

from dataclasses import dataclass

from gaugelog.physics._maths import Number, nominal
from gaugelog.physics._order import any_of, at_most, smaller
from gaugelog.physics.validity import Notice, between, finite, not_negative, positive

VESSELS_SOURCE = "Gere, Mechanics of Materials, pressure vessels (from memory)"
THIN = 0.1
"""Wall over mean radius up to which a wall counts as thin."""


@dataclass(frozen=True, slots=True)
class WallStress:
    """Stresses in a wall, pascal: round the vessel, along it, and through the wall."""

    hoop: Number
    axial: Number
    radial: Number


@dataclass(frozen=True, slots=True)
class WallStrain:
    """Strains at a wall's surface, ratios: round the vessel and along it."""

    hoop: Number
    axial: Number


def thin_cylinder_stress(
    pressure: Number, radius: Number, wall: Number, closed: bool = True
) -> WallStress:
    """Stresses of a thin cylinder at its outside: hoop p r/t, axial half of that when closed.

    Units: Pa, m in, Pa out; for t/r up to 0.1 (see `thin_wall_notices`).
    Source: Gere, Mechanics of Materials, thin-walled pressure vessels (from memory).

    >>> thin_cylinder_stress(1e6, 0.5, 0.01)
    WallStress(hoop=50000000.0, axial=25000000.0, radial=0.0)
    """
    hoop = finite("pressure", pressure) * positive("radius", radius) / positive("wall", wall)
    return WallStress(hoop, hoop / 2 if closed else hoop * 0, hoop * 0)


def thin_sphere_stress(pressure: Number, radius: Number, wall: Number) -> WallStress:
    """Stresses of a thin sphere at its outside: p r/(2 t) in every direction of the wall.

    Units: Pa, m in, Pa out; for t/r up to 0.1 (see `thin_wall_notices`).
    Source: Gere, Mechanics of Materials, thin-walled pressure vessels (from memory).
    """
    both = finite("pressure", pressure) * positive("radius", radius) / (2 * positive("wall", wall))
    return WallStress(both, both, both * 0)


def thick_cylinder_stress(
    pressure: Number,
    inner: Number,
    outer: Number,
    at: Number,
    closed: bool = True,
    outside_pressure: Number = 0.0,
) -> WallStress:
    """Lamé's stresses of a thick cylinder at radius `at`: A + B/r², A − B/r², axial A when closed.

    A = (p ri² − q ro²)/(ro² − ri²), B = (p − q) ri² ro²/(ro² − ri²). Units: Pa and radii in m in,
    Pa out. Source: Timoshenko, Strength of Materials II, thick-walled cylinder (from memory).
    """
    smaller("inner", positive("inner", inner), "outer", positive("outer", outer))
    at_most("at", positive("at", at), "outer", outer)
    at_most("inner", inner, "at", at)
    finite("pressure", pressure)
    finite("outside_pressure", outside_pressure)
    ring = outer**2 - inner**2
    mean = (pressure * inner**2 - outside_pressure * outer**2) / ring
    spread = (pressure - outside_pressure) * inner**2 * outer**2 / ring / at**2
    return WallStress(mean + spread, mean if closed else mean * 0, mean - spread)


def wall_strain(stress: WallStress, modulus: Number, poisson: Number) -> WallStrain:
    """Strains of a wall from its stresses by Hooke's law: ε = (σ − ν (the other two))/E.

    Units: Pa in, ratios out. Source: Gere, Mechanics of Materials, Hooke's law in three
    dimensions (from memory).
    """
    positive("modulus", modulus)
    between("poisson", poisson, -1.0, 0.5)
    hoop = (stress.hoop - poisson * (stress.axial + stress.radial)) / modulus
    axial = (stress.axial - poisson * (stress.hoop + stress.radial)) / modulus
    return WallStrain(hoop, axial)


def pressure_from_hoop(
    strain: Number,
    modulus: Number,
    poisson: Number,
    radius: Number,
    wall: Number,
    closed: bool = True,
) -> Number:
    """Pressure in a thin cylinder from the strain round it: p = ε E t/(r (1 − ν/2)).

    Without ends the bracket is 1. Units: ratio, Pa, m in, Pa out.
    Source: as `thin_cylinder_stress` and `wall_strain`, turned round.
    """
    per_pascal = wall_strain(thin_cylinder_stress(1.0, radius, wall, closed), modulus, poisson)
    return finite("strain", strain) / per_pascal.hoop


def pressure_from_axial(
    strain: Number, modulus: Number, poisson: Number, radius: Number, wall: Number
) -> Number:
    """Pressure in a thin closed cylinder from the strain along it: p = ε E t/(r (1/2 − ν)).

    Poisson's ratio must stay below 0.5, where the strain along vanishes. Units: ratio, Pa, m in,
    Pa out. Source: as `thin_cylinder_stress` and `wall_strain`, turned round.

    >>> round(pressure_from_axial(170e-6, 10e6, 0.33, 200.0, 1.0), 6)
    50.0
    """
    smaller("poisson", poisson, "0.5", 0.5)
    per_pascal = wall_strain(thin_cylinder_stress(1.0, radius, wall), modulus, poisson)
    return finite("strain", strain) / per_pascal.axial


def thin_wall_notices(radius: Number, wall: Number) -> tuple[Notice, ...]:
    """A notice for a wall too thick for the thin-wall formulas."""
    share = nominal(not_negative("wall", wall)) / nominal(positive("radius", radius))
    if not any_of(share > THIN):
        return ()
    message = "The wall is thicker than a tenth of the radius; use the thick cylinder."
    return (Notice("thin wall", message, VESSELS_SOURCE),)
