"""Bars and beams held to printed exercises, and to a beam integrated by SciPy."""

from __future__ import annotations

import numpy
import pytest
from scipy.integrate import dblquad

from gaugelog.physics import loads
from gaugelog.physics.loads import (
    bar_force,
    bar_modulus,
    bar_strain,
    bending_moment,
    bending_notices,
    bending_strain,
    bending_stress,
    cantilever_load,
    cantilever_moment,
    four_point_moment,
    lateral_strain,
    rectangle_modulus,
    round_modulus,
    simply_supported_moment,
)
from tests.outside.cases import case

CHECKS = (
    loads.bar_strain,
    loads.bar_force,
    loads.bar_modulus,
    loads.lateral_strain,
    loads.rectangle_modulus,
    loads.round_modulus,
    loads.bending_stress,
    loads.bending_strain,
    loads.bending_moment,
    loads.cantilever_moment,
    loads.cantilever_load,
    loads.simply_supported_moment,
    loads.four_point_moment,
    loads.bending_notices,
)


def test_a_plastic_rod_has_the_modulus_and_narrowing_hibbeler_prints() -> None:
    """Hibbeler, Mechanics of Materials, chapter 10 problem (from memory)."""
    rod = case("C15-06")
    radius, strain = rod.value("radius") * 1e-3, rod.value("strain") * 1e-6
    area = numpy.pi * radius**2
    modulus = bar_modulus(rod.value("P"), strain, area)
    rod.expect("E", modulus * 1e-9)
    rod.expect("dd", lateral_strain(strain, rod.value("nu")) * 2 * radius * 1e3)
    assert strain == pytest.approx(bar_strain(rod.value("P"), modulus, area))
    assert rod.value("P") == pytest.approx(bar_force(strain, modulus, area))


def test_two_gauges_on_a_cantilever_find_the_load_of_the_exercise() -> None:
    """A posted university exercise; P = (e1 − e2) E b h²/(6 Δx)."""
    beam = case("C15-08")
    section = rectangle_modulus(beam.value("b") * 1e-3, beam.value("h") * 1e-3)
    found = cantilever_load(
        beam.value("e1") * 1e-6,
        beam.value("e2") * 1e-6,
        beam.value("dx") * 1e-3,
        beam.value("E") * 1e9,
        section,
    )
    beam.expect("P", found)
    moment = bending_moment(beam.value("e1") * 1e-6, beam.value("E") * 1e9, section)
    assert moment == pytest.approx(cantilever_moment(found, moment / found))


def test_four_point_bending_strains_as_its_formula_says() -> None:
    """ε = 6M/(b h² E), M = F a/2 (from memory)."""
    beam = case("C15-11")
    section = rectangle_modulus(beam.value("b") * 1e-3, beam.value("h") * 1e-3)
    moment = four_point_moment(beam.value("F"), beam.value("arm") * 1e-3)
    beam.expect("M", moment)
    beam.expect("stress", bending_stress(moment, section) * 1e-6)
    beam.expect("strain", bending_strain(moment, beam.value("E") * 1e9, section) * 1e6)


def test_section_moduli_are_the_integrals_that_define_them() -> None:
    """SciPy, dblquad of y² over the section, over the distance of the surface."""
    rectangle = dblquad(lambda y, _: y**2, -0.015, 0.015, -0.003, 0.003)[0] / 0.003
    assert rectangle == pytest.approx(rectangle_modulus(0.03, 0.006))
    tube = dblquad(lambda r, a: r**3 * numpy.sin(a) ** 2, 0, 2 * numpy.pi, 0.01, 0.02)[0] / 0.02
    assert tube == pytest.approx(round_modulus(0.04, 0.02))


def test_moments_of_a_beam_are_those_of_the_forces_on_one_side() -> None:
    """Statics solved by NumPy: reactions from two equations, moment by the free-body cut."""
    random = numpy.random.default_rng(15)
    for _ in range(200):
        load, span = random.uniform(1, 100), random.uniform(1, 5)
        load_at, gauge_at = random.uniform(0, span, 2)
        balance = numpy.array([[1.0, 1.0], [0.0, span]])
        left = numpy.linalg.solve(balance, numpy.array([load, load * load_at]))[0]
        moment = left * gauge_at - (load * (gauge_at - load_at) if gauge_at > load_at else 0)
        assert moment == pytest.approx(simply_supported_moment(load, span, load_at, gauge_at))


def test_a_beam_ten_times_as_long_as_deep_is_slender() -> None:
    """Gere, Mechanics of Materials: shear counts little in slender beams (from memory)."""
    assert () == bending_notices(0.06, 0.006)
    assert 1 == len(bending_notices(0.05, 0.006))
