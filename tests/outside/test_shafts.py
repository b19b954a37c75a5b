"""Torsion held to printed exercises and to NumPy's rotation of the strain tensor."""

from __future__ import annotations

import math

import numpy
import pytest
from scipy.integrate import quad

from gaugelog.physics import shafts
from gaugelog.physics.loadcell import sensitivity
from gaugelog.physics.shafts import (
    polar_modulus,
    shear_strain,
    shear_stress,
    strain_on_shaft,
    torque_from_pair,
    torque_from_shear,
    torque_from_strain,
)
from tests.outside.cases import case

CHECKS = (
    shafts.polar_modulus,
    shafts.shear_stress,
    shafts.shear_strain,
    shafts.strain_on_shaft,
    shafts.torque_from_strain,
    shafts.torque_from_pair,
    shafts.torque_from_shear,
)


def test_one_gauge_at_twenty_degrees_finds_the_printed_torque() -> None:
    """Textbook exercise 9.19, torque measurement on a circular shaft, worked solution."""
    shaft = case("C15-01")
    found = torque_from_strain(
        shaft.value("strain") * 1e-6,
        shaft.value("G") * 1e9,
        math.radians(shaft.value("angle")),
        shaft.value("d") * 1e-3,
    )
    shaft.expect("T", found * 1e-3)


def test_a_tool_steel_shaft_strains_as_hibbeler_prints() -> None:
    """Hibbeler, Mechanics of Materials, chapter 10 problem (from memory)."""
    shaft = case("C15-03")
    torque, stiffness = shaft.value("T") * 1e3, shaft.value("G") * 1e9
    outer = 2 * shaft.value("radius") * 1e-3
    plus, minus = (
        strain_on_shaft(torque, stiffness, math.radians(angle), outer) for angle in (45, -45)
    )
    shaft.expect("e_p45", plus)
    shaft.expect("e_m45", minus)
    assert torque == pytest.approx(torque_from_pair(plus, minus, stiffness, outer))


def test_a_torque_gives_the_bridge_output_of_its_formula() -> None:
    """γ = 16T/(π d³ G) and a full torsion bridge (from memory)."""
    shaft = case("C15-10")
    torque, stiffness = shaft.value("T"), shaft.value("G") * 1e9
    outer = shaft.value("d") * 1e-3
    shaft.expect("gamma", shear_strain(torque, stiffness, outer) * 1e6)
    strain = strain_on_shaft(torque, stiffness, math.radians(45), outer)
    shaft.expect("e45", strain * 1e6)
    shaft.expect("mV_per_V", 1e3 * sensitivity(strain, shaft.value("GF"), "full torsion"))


def test_a_tube_resists_as_its_stresses_integrate() -> None:
    """SciPy, quad: torque as the integral of τ r dA with the stress growing with the radius."""
    outer, inner, stress = 0.05, 0.03, 60e6
    torque = quad(lambda r: stress * r / (outer / 2) * r * 2 * math.pi * r, inner / 2, outer / 2)[0]
    assert torque == pytest.approx(stress * polar_modulus(outer, inner))
    assert stress == pytest.approx(shear_stress(torque, outer, inner))


def test_slanted_gauges_feel_the_rotated_tensor() -> None:
    """NumPy: n·ε·n with the tensor of pure shear."""
    shear = shear_strain(500.0, 79.3e9, 0.05)
    tensor = numpy.array([[0, shear / 2], [shear / 2, 0]])
    for angle in numpy.linspace(-1.5, 1.5, 31):
        along = numpy.array([math.cos(angle), math.sin(angle)])
        found = strain_on_shaft(500.0, 79.3e9, angle, 0.05)
        assert along @ tensor @ along == pytest.approx(found, abs=1e-18)
    assert 500.0 == pytest.approx(torque_from_shear(shear, 79.3e9, 0.05))
