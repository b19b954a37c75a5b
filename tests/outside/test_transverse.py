"""Transverse sensitivity held to published cases and to a general solver."""

from __future__ import annotations

from math import radians

import numpy as np
import pytest

from gaugelog.physics import transverse
from gaugelog.physics.plane import PlaneStrain, strain_along
from tests.outside.cases import case

CHECKS = (
    transverse.indicated_strain,
    transverse.single_grid_strain,
    transverse.uncorrected_error,
    transverse.tee_strains,
    transverse.rectangular_strains,
    transverse.delta_strains,
    transverse.corrected_state,
    transverse.corrected_strains,
    transverse.shear_pair_factor,
)
MICRO = 1e6


def test_a_delta_rosette_corrected_by_a_university_example() -> None:
    found = case("C07-01")
    readings = tuple(each / MICRO for each in found.value("e"))
    angles = [radians(each) for each in found.value("angles")]
    kt, poisson = found.value("Kt"), found.value("nu0")
    found.expect("corrected_1", transverse.delta_strains(readings, kt, poisson)[0] * MICRO)
    general = transverse.corrected_strains(readings, angles, [kt] * 3, poisson)
    found.expect("corrected_1", general[0] * MICRO)


@pytest.mark.parametrize("identifier", ["C07-02", "C07-03"])
def test_the_error_of_a_single_grid(identifier: str) -> None:
    found = case(identifier)
    kt, ratio, poisson = found.value("Kt"), found.value("ratio_et_ea"), found.value("nu0")
    found.expect("error_percent", 100 * transverse.uncorrected_error(kt, ratio, poisson))
    indicated = transverse.indicated_strain(1e-3, ratio * 1e-3, kt, poisson)
    found.expect("error_percent", 100 * (indicated / 1e-3 - 1))
    corrected = transverse.single_grid_strain(indicated, kt, ratio, poisson)
    assert corrected == pytest.approx(1e-3)


def test_a_tee_rosette() -> None:
    found = case("C07-06")
    one, two = (each / MICRO for each in found.value("e"))
    k1, k2 = found.value("Kt")
    strains = transverse.tee_strains((one, two), (k1, k2), found.value("nu0"))
    tolerance = found.expected["corrected"]["tol_abs"]
    assert found.expected["corrected"]["value"] == pytest.approx(
        [each * MICRO for each in strains], rel=0, abs=tolerance
    )


def test_a_rectangular_rosette() -> None:
    found = case("C07-08")
    one, two, three = (each / MICRO for each in found.value("e"))
    kt, poisson = found.value("Kt"), found.value("nu0")
    strains = transverse.rectangular_strains((one, two, three), kt, poisson)
    angles = [radians(each) for each in found.value("angles")]
    general = transverse.corrected_strains((one, two, three), angles, [kt] * 3, poisson)
    for result in (strains, general):
        assert found.expected["corrected"]["value"] == pytest.approx(
            [each * MICRO for each in result], rel=0, abs=found.expected["corrected"]["tol_abs"]
        )


def test_the_factor_of_a_shear_pair() -> None:
    found = case("C07-09")
    found.expect("factor", transverse.shear_pair_factor(found.value("Kt"), found.value("nu0")))


def test_grids_of_their_own_sensitivity_are_solved_as_numpy_solves_them() -> None:
    # Independent program: numpy.linalg.solve on the three equations of the definition.
    angles, kts, poisson = [0.0, radians(60), radians(120)], [0.01, -0.005, 0.02], 0.285
    truth = PlaneStrain(700e-6, -200e-6, 350e-6)
    readings = [
        transverse.indicated_strain(
            strain_along(truth, angle), strain_along(truth, angle + np.pi / 2), kt, poisson
        )
        for angle, kt in zip(angles, kts, strict=True)
    ]
    rows = [
        [
            (np.cos(a) ** 2 + k * np.sin(a) ** 2) / (1 - poisson * k),
            (np.sin(a) ** 2 + k * np.cos(a) ** 2) / (1 - poisson * k),
            (1 - k) * np.sin(a) * np.cos(a) / (1 - poisson * k),
        ]
        for a, k in zip(angles, kts, strict=True)
    ]
    wanted = np.linalg.solve(np.array(rows), np.array(readings))
    found = transverse.corrected_state(readings, angles, kts, poisson)
    assert list(wanted) == pytest.approx([found.x, found.y, found.shear])
    assert [truth.x, truth.y, truth.shear] == pytest.approx([found.x, found.y, found.shear])


def test_spare_grids_are_fitted_as_numpy_fits_them() -> None:
    # Independent program: numpy.linalg.lstsq on the equations of the definition, each divided by
    # (1 − Kt)/(1 − ν0 Kt), so that its residual is one of strain along the grid.
    angles = np.radians([0.0, 45.0, 90.0, 135.0, 20.0])
    kt, poisson = 0.02, 0.285
    readings = np.array([410.0, 262.0, -155.0, 8.0, 401.0]) / MICRO
    along = np.array([np.cos(angles) ** 2, np.sin(angles) ** 2, np.sin(angles) * np.cos(angles)]).T
    rows = along + kt / (1 - kt) * np.array([1.0, 1.0, 0.0])
    right = readings * (1 - poisson * kt) / (1 - kt)
    wanted, *_ = np.linalg.lstsq(rows, right, rcond=None)
    strains = transverse.corrected_strains(list(readings), list(angles), [kt] * 5, poisson)
    found = transverse.corrected_state(list(readings), list(angles), [kt] * 5, poisson)
    assert list(wanted) == pytest.approx([found.x, found.y, found.shear])
    assert list(right - rows @ wanted) == pytest.approx(list(strains - along @ wanted))
