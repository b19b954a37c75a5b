"""Rosettes and plane strain held to published worked examples and to NumPy's eigenvalues."""

from __future__ import annotations

from math import degrees, radians

import numpy as np
import pytest

from gaugelog.physics import plane, rosette
from gaugelog.physics.plane import PlaneStrain
from tests.outside.cases import Case, case

CHECKS = (
    plane.strain_along,
    plane.shear_along,
    plane.turned,
    plane.mohr_circle,
    plane.principal_strains,
    plane.principal_strains_notices,
    rosette.grid_angles,
    rosette.rectangular_state,
    rosette.delta_state,
    rosette.tee_state,
    rosette.rosette_state,
    rosette.fit_rosette,
    rosette.fit_rosette_notices,
)
MICRO = 1e6


def _readings(found: Case) -> list[float]:
    return [each / MICRO for each in found.value("e")]


def _angles(found: Case, name: str = "angles") -> list[float]:
    return [radians(each) for each in found.value(name)]


def _state(found: Case) -> PlaneStrain:
    return PlaneStrain(*(found.value(name) / MICRO for name in ("ex", "ey", "gxy")))


def _expect_state(found: Case, state: PlaneStrain) -> None:
    for name, value in (("ex", state.x), ("ey", state.y), ("gxy", state.shear)):
        if name in found.expected:
            found.expect(name, value * MICRO)


def _expect_principal(found: Case, state: PlaneStrain) -> None:
    principal = plane.principal_strains(state)
    assert principal.angle is not None
    circle = plane.mohr_circle(state)
    for name, value in (
        ("e1", principal.largest * MICRO),
        ("e2", principal.smallest * MICRO),
        ("theta_p", degrees(principal.angle)),
        ("theta_p1", degrees(principal.angle)),
        ("gmax", principal.max_shear * MICRO),
        ("e_avg", circle.centre * MICRO),
    ):
        if name in found.expected:
            found.expect(name, value)


@pytest.mark.parametrize("identifier", ["C08-02", "C08-06", "C08-10"])
def test_delta_rosettes_of_textbooks(identifier: str) -> None:
    found = case(identifier)
    for state in (
        rosette.delta_state(*_readings(found)),
        rosette.rosette_state(_readings(found), _angles(found)),
    ):
        _expect_state(found, state)
        _expect_principal(found, state)


def test_a_rectangular_rosette_with_a_large_negative_middle_reading() -> None:
    found = case("C08-08")
    _expect_principal(found, rosette.rectangular_state(*_readings(found)))


@pytest.mark.parametrize("identifier", ["C08-01", "C08-13", "C08-14", "C08-19"])
def test_principal_strains_of_textbooks(identifier: str) -> None:
    found = case(identifier)
    _expect_principal(found, _state(found))


def test_the_fourth_grid_of_a_rosette_follows_from_three() -> None:
    found = case("C08-05")
    readings = [found.value(name) / MICRO for name in ("e_p45", "e_0", "e_90")]
    angles = [radians(45), 0.0, radians(90)]
    state = rosette.rosette_state(readings, angles)
    found.expect("e_m45", plane.strain_along(state, radians(-45)) * MICRO)
    _expect_principal(found, state)


def test_strain_in_a_given_direction() -> None:
    found = case("C08-11")
    for place, wanted in enumerate(found.expected["e_n"]["value"]):
        state = PlaneStrain(*(found.value(name)[place] / MICRO for name in ("ex", "ey", "gxy")))
        strain = plane.strain_along(state, radians(found.value("theta")[place])) * MICRO
        assert wanted == pytest.approx(strain, rel=0, abs=found.expected["e_n"]["tol_abs"])


def test_awkward_directions_of_a_rectangular_rosette() -> None:
    found = case("C08-16")
    readings = np.array(found.value("readings")).reshape(3, 3) / MICRO
    angles = [plane.principal_strains(rosette.rectangular_state(*row)).angle for row in readings]
    assert found.expected["theta_p1"]["value"] == pytest.approx(
        [degrees(angle) for angle in angles[:2] if angle is not None]
    )
    assert found.expected["indeterminate"]["value"] == [float(angle is None) for angle in angles]


def test_grids_built_at_other_angles_than_nominal() -> None:
    found = case("C08-17")
    for angles, wanted in (("nominal", "nominal_state"), ("actual", "actual_state")):
        state = rosette.rosette_state(_readings(found), _angles(found, angles))
        values = [state.x * MICRO, state.y * MICRO, state.shear * MICRO]
        tolerance = found.expected[wanted]["tol_abs"]
        assert found.expected[wanted]["value"] == pytest.approx(values, rel=0, abs=tolerance)


def test_a_tee_in_principal_axes_is_its_own_state() -> None:
    # ASTM E1561: two grids serve where the principal directions are known.
    found = plane.principal_strains(rosette.tee_state(300e-6, -90e-6))
    assert found.largest == 300e-6
    assert found.smallest == pytest.approx(-90e-6)
    assert found.angle == 0.0


def test_principal_strains_are_the_eigenvalues_of_the_tensor() -> None:
    # Independent program: NumPy's symmetric eigenvalue solver, 10 000 states.
    rng = np.random.default_rng(20261201)
    x, y, shear = rng.normal(0, 1e-3, (3, 10_000))
    tensors = np.array([[x, shear / 2], [shear / 2, y]]).transpose(2, 0, 1)
    values, vectors = np.linalg.eigh(tensors)
    found = plane.principal_strains(PlaneStrain(x, y, shear))
    assert np.allclose(found.largest, values[:, 1], rtol=0, atol=1e-15)
    assert np.allclose(found.smallest, values[:, 0], rtol=0, atol=1e-15)
    assert found.angle is not None
    directions = np.array([np.cos(found.angle), np.sin(found.angle)]).T
    parallel = np.abs(np.einsum("ij,ij->i", directions, vectors[:, :, 1]))
    assert np.allclose(parallel, 1.0, rtol=0, atol=1e-9)


def test_a_turned_state_is_the_turned_tensor() -> None:
    # Independent program: NumPy matrix product Q E Qᵀ.
    angle, state = 0.7, PlaneStrain(400e-6, -150e-6, 230e-6)
    turn = np.array([[np.cos(angle), np.sin(angle)], [-np.sin(angle), np.cos(angle)]])
    tensor = np.array([[state.x, state.shear / 2], [state.shear / 2, state.y]])
    wanted = turn @ tensor @ turn.T
    found = plane.turned(state, angle)
    assert [wanted[0, 0], wanted[1, 1], 2 * wanted[0, 1]] == pytest.approx(
        [found.x, found.y, found.shear]
    )
    assert plane.shear_along(state, angle) == pytest.approx(2 * wanted[0, 1])


def test_the_mean_of_four_grids_at_half_right_angles_is_that_of_either_pair() -> None:
    # Invariant of rotation (Timoshenko and Goodier, from memory): ε0 + ε90 = ε45 + ε135.
    angles = [radians(each) for each in (0.0, 45.0, 90.0, 135.0)]
    readings = [400.0, 300.0, -200.0, -85.0]
    spare = readings[0] + readings[2] - readings[1] - readings[3]
    found = rosette.fit_rosette(readings, angles)
    wanted = [spare / 4, -spare / 4, spare / 4, -spare / 4]
    assert wanted == pytest.approx(list(found.residuals))
    assert abs(spare) / 2 == pytest.approx(found.scatter)


def test_many_grids_are_fitted_as_numpy_fits_them() -> None:
    # Independent program: numpy.linalg.lstsq.
    angles = np.radians([0.0, 30.0, 75.0, 110.0, 160.0])
    readings = np.array([310.0, 402.0, 77.0, -180.0, 20.0]) / MICRO
    rows = np.array([np.cos(angles) ** 2, np.sin(angles) ** 2, np.sin(angles) * np.cos(angles)]).T
    wanted, squares, *_ = np.linalg.lstsq(rows, readings, rcond=None)
    found = rosette.fit_rosette(list(readings), list(angles))
    assert list(wanted) == pytest.approx([found.state.x, found.state.y, found.state.shear])
    assert found.scatter == pytest.approx(float(np.sqrt(squares[0] / 2)))
    assert () == rosette.fit_rosette_notices(found, 1.01 * np.sqrt(squares[0] / 2))
    told = rosette.fit_rosette_notices(found, 0.99 * np.sqrt(squares[0] / 2))
    assert f"{MICRO * np.sqrt(squares[0] / 2):.3g} µm/m" in told[0].message


def test_numbering_and_viewing_side_turn_the_angles() -> None:
    # ASTM E1561 numbers counter-clockwise; a mirror turns the other way (common practice).
    plain = rosette.grid_angles("rectangular")
    assert [0.0, 45.0, 90.0] == pytest.approx([degrees(each) for each in plain])
    delta, tee = rosette.grid_angles("delta"), rosette.grid_angles("tee")
    assert [0.0, 60.0, 120.0] == pytest.approx([degrees(each) for each in delta])
    assert [0.0, 90.0] == pytest.approx([degrees(each) for each in tee])
    for pattern in ("rectangular", "delta", "tee"):
        mirrored = rosette.grid_angles(pattern, "clockwise")
        assert mirrored == rosette.grid_angles(pattern, seen_from="other side")
        assert rosette.grid_angles(pattern, "clockwise", "other side") == pytest.approx(
            rosette.grid_angles(pattern)
        )


def test_strain_beyond_one_per_cent_is_noticed() -> None:
    # ASTM E1561, scope: formulas for small strain.
    assert plane.principal_strains_notices(PlaneStrain(5e-3, 0.0, 0.0)) == ()
    assert "1 %" in plane.principal_strains_notices(PlaneStrain(2e-2, 0.0, 0.0))[0].message
