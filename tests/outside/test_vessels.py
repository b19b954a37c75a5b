"""Pressure vessels held to printed exercises and to Lamé's problem integrated by SciPy."""

from __future__ import annotations

import numpy
import pytest
from scipy.integrate import quad, solve_bvp

from gaugelog.physics import vessels
from gaugelog.physics.vessels import (
    pressure_from_axial,
    pressure_from_hoop,
    thick_cylinder_stress,
    thin_cylinder_stress,
    thin_sphere_stress,
    thin_wall_notices,
    wall_strain,
)
from tests.outside.cases import case

CHECKS = (
    vessels.thin_cylinder_stress,
    vessels.thin_sphere_stress,
    vessels.thick_cylinder_stress,
    vessels.wall_strain,
    vessels.pressure_from_hoop,
    vessels.pressure_from_axial,
    vessels.thin_wall_notices,
)


def test_a_can_held_the_pressure_that_gere_prints() -> None:
    """Gere, Mechanics of Materials, problem 8.3, beverage can (from memory)."""
    can = case("C15-05")
    found = pressure_from_axial(
        can.value("strain") * 1e-6, can.value("E_psi"), can.value("nu"), can.value("r_over_t"), 1.0
    )
    can.expect("p", found)


def test_a_sphere_strains_as_its_formula_says() -> None:
    """ε = p r (1 − ν)/(2 t E) (from memory)."""
    sphere = case("C15-12")
    stress = thin_sphere_stress(
        sphere.value("p") * 1e6, sphere.value("r") * 1e-3, sphere.value("t") * 1e-3
    )
    sphere.expect("stress", stress.hoop * 1e-6)
    strain = wall_strain(stress, sphere.value("E") * 1e9, sphere.value("nu"))
    sphere.expect("strain", strain.hoop * 1e6)
    assert strain.hoop == strain.axial


def test_a_thick_wall_carries_what_the_pressure_pushes() -> None:
    """SciPy, quad: the hoop stress over the wall bears p ri, the axial one the lids."""
    pressure, inner, outer = 50e6, 0.1, 0.18
    hoop = quad(lambda r: thick_cylinder_stress(pressure, inner, outer, r).hoop, inner, outer)[0]
    assert pressure * inner == pytest.approx(hoop)
    axial = quad(
        lambda r: thick_cylinder_stress(pressure, inner, outer, r).axial * 2 * numpy.pi * r,
        inner,
        outer,
    )[0]
    assert pressure * numpy.pi * inner**2 == pytest.approx(axial)


def test_a_thick_wall_solves_the_equation_of_equilibrium() -> None:
    """SciPy, solve_bvp of (r σ)'' r + (r σ)' = (r σ)/r, radial stress given at both faces."""
    pressure, inner, outer = 1.0, 1.0, 2.0

    def slope(r: numpy.ndarray, y: numpy.ndarray) -> numpy.ndarray:
        return numpy.vstack([y[1], y[0] / r**2 - y[1] / r])

    def faces(bore: numpy.ndarray, skin: numpy.ndarray) -> numpy.ndarray:
        return numpy.array([bore[0] + pressure * inner, skin[0]])

    r = numpy.linspace(inner, outer, 200)
    solution = solve_bvp(slope, faces, r, numpy.zeros((2, r.size)), tol=1e-8)
    for at in (1.0, 1.3, 1.7, 2.0):
        product, hoop = solution.sol(at)
        found = thick_cylinder_stress(pressure, inner, outer, at)
        assert product / at == pytest.approx(found.radial, abs=1e-6)
        assert hoop == pytest.approx(found.hoop, abs=1e-6)


def test_the_ratio_of_hoop_to_axial_strain_is_the_textbooks() -> None:
    """Gere: ε1/ε2 = (2 − ν)/(1 − 2ν) for a thin closed cylinder (from memory)."""
    strain = wall_strain(thin_cylinder_stress(2e6, 0.5, 0.01), 200e9, 0.3)
    assert 1.7 / 0.4 == pytest.approx(strain.hoop / strain.axial)
    assert 2e6 == pytest.approx(pressure_from_hoop(strain.hoop, 200e9, 0.3, 0.5, 0.01))


def test_a_wall_is_thin_up_to_a_tenth_of_the_radius() -> None:
    """Gere: a vessel counts as thin-walled when r/t exceeds 10 (from memory)."""
    assert () == thin_wall_notices(10.0, 1.0)
    assert 1 == len(thin_wall_notices(9.0, 1.0))
