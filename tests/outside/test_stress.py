"""Stress from strain held to published worked examples and to matrix algebra."""

from __future__ import annotations

from math import degrees

import numpy as np
import pytest

from gaugelog.physics import plane, rosette, stress
from gaugelog.physics.plane import PlaneStrain
from tests.outside.cases import case

CHECKS = (
    stress.shear_modulus,
    stress.isotropic_stress,
    stress.orthotropic_stress,
    stress.turned_stress,
    stress.principal_stresses,
    stress.von_mises,
)
MICRO, MEGA = 1e6, 1e-6


def test_stresses_of_an_aluminium_rosette() -> None:
    found = case("C08-01")
    state = PlaneStrain(*(found.value(name) / MICRO for name in ("ex", "ey", "gxy")))
    modulus, poisson = found.value("E") * 1e9, found.value("nu")
    found.expect("G", stress.shear_modulus(modulus, poisson) * MEGA)
    result = stress.isotropic_stress(state, modulus, poisson)
    found.expect("sigma_y", result.y * MEGA)
    found.expect("tau_xy", result.shear * MEGA)


def test_principal_stresses_of_a_delta_rosette_in_us_units() -> None:
    found = case("C08-06")
    state = rosette.delta_state(*(each / MICRO for each in found.value("e")))
    result = stress.isotropic_stress(state, found.value("E_psi"), found.value("nu"))
    principal = stress.principal_stresses(result)
    found.expect("s1", principal.largest)
    found.expect("s2", principal.smallest)


def test_a_rosette_on_steel_and_the_same_with_grids_exchanged() -> None:
    # Worked by hand from ASTM E1561 and Hooke's law: 0/45/90 reads 400, 300, −200 µm/m.
    state = rosette.rectangular_state(400e-6, 300e-6, -200e-6)
    principal = plane.principal_strains(state)
    assert principal.angle is not None
    assert [460.6, -260.6] == pytest.approx(
        [principal.largest * MICRO, principal.smallest * MICRO], abs=0.05
    )
    assert degrees(principal.angle) == pytest.approx(16.8, abs=0.05)
    result = stress.isotropic_stress(state, 206e9, 0.3)
    main = stress.principal_stresses(result)
    assert [86.6, -27.7, 77.0] == pytest.approx(
        [main.largest * MEGA, main.smallest * MEGA, result.x * MEGA], abs=0.05
    )
    exchanged = rosette.rectangular_state(-200e-6, 300e-6, 400e-6)
    angle = plane.principal_strains(exchanged).angle
    assert angle is not None
    assert degrees(angle) == pytest.approx(73.2, abs=0.05)
    along = stress.isotropic_stress(exchanged, 206e9, 0.3).x * MEGA
    assert along == pytest.approx(-18.1, abs=0.05)


def test_an_orthotropic_layer_by_its_compliance_matrix() -> None:
    # Independent program: NumPy inverts the compliance matrix of Jones, Mechanics of Composite
    # Materials (constants of a carbon layer, invented).
    along, across, poisson, shear = 138e9, 9.0e9, 0.3, 6.9e9
    compliance = np.array(
        [[1 / along, -poisson / along, 0], [-poisson / along, 1 / across, 0], [0, 0, 1 / shear]]
    )
    strain = np.array([800e-6, -250e-6, 420e-6])
    wanted = np.linalg.solve(compliance, strain)
    found = stress.orthotropic_stress(PlaneStrain(*strain), along, across, poisson, shear)
    assert list(wanted) == pytest.approx([found.x, found.y, found.shear])


def test_turned_and_principal_stresses_are_those_of_the_tensor() -> None:
    # Independent program: NumPy, Q S Qᵀ and its symmetric eigenvalue solver.
    angle, given = -0.4, stress.PlaneStress(80e6, -35e6, 27e6)
    turn = np.array([[np.cos(angle), np.sin(angle)], [-np.sin(angle), np.cos(angle)]])
    tensor = np.array([[given.x, given.shear], [given.shear, given.y]])
    wanted = turn @ tensor @ turn.T
    found = stress.turned_stress(given, angle)
    assert [wanted[0, 0], wanted[1, 1], wanted[0, 1]] == pytest.approx(
        [found.x, found.y, found.shear]
    )
    values, vectors = np.linalg.eigh(tensor)
    ends = stress.principal_stresses(given)
    assert list(values) == pytest.approx([ends.smallest, ends.largest])
    assert ends.angle is not None
    assert vectors[1, 1] / vectors[0, 1] == pytest.approx(np.tan(ends.angle))


def test_steel_has_the_shear_modulus_of_the_tables() -> None:
    """Gere, Mechanics of Materials, table of moduli: steel 200 GPa, 0.3, 77 GPa (from memory)."""
    assert 77e9 == pytest.approx(stress.shear_modulus(200e9, 0.30), rel=0.01)


def test_equal_moduli_make_an_orthotropic_layer_isotropic() -> None:
    # Hooke's law with E1 = E2 and G = E/(2 (1 + ν)); Jones, Mechanics of Composite Materials (from
    # memory)
    state = PlaneStrain(500e-6, -100e-6, 300e-6)
    plain = stress.isotropic_stress(state, 70e9, 0.33)
    layer = stress.orthotropic_stress(state, 70e9, 70e9, 0.33, stress.shear_modulus(70e9, 0.33))
    assert [plain.x, plain.y, plain.shear] == pytest.approx([layer.x, layer.y, layer.shear])


def test_the_equivalent_stress_of_pure_shear_is_root_three_times_it() -> None:
    # von Mises, plane stress: uniaxial gives σ, pure shear √3 τ (Timoshenko, from memory).
    assert stress.von_mises(stress.PlaneStress(100e6, 0.0, 0.0)) == pytest.approx(100e6)
    assert stress.von_mises(stress.PlaneStress(0.0, 0.0, 50e6)) == pytest.approx(3**0.5 * 50e6)
