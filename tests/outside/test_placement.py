"""Misplaced grids, held to printed cases, to NumPy's tensors and to SciPy's roots."""

from __future__ import annotations

import math

import numpy as np
import pytest
from scipy import optimize

from gaugelog.physics import placement
from tests.outside.cases import case

CHECKS = (
    placement.misalignment_error,
    placement.misalignment_share,
    placement.uniaxial_misalignment,
    placement.field_misalignment,
    placement.largest_misalignment,
    placement.misplacement_error,
    placement.axis_error,
    placement.misalignment_notices,
)


@pytest.mark.parametrize("identifier", ["C09-01", "C09-03", "C09-04"])
def test_a_turned_grid_errs_as_the_case_says(identifier: str) -> None:
    given = case(identifier)
    off, intended = math.radians(given.value("beta")), math.radians(given.value("intended"))
    found = placement.uniaxial_misalignment(given.value("nu"), intended, off)
    given.expect("error_percent", 100 * found)


def strain_along(tensor: np.ndarray, angle: float) -> float:
    """Strain in a direction, n·ε·n."""
    normal = np.array([math.cos(angle), math.sin(angle)])
    return float(normal @ tensor @ normal)


def test_errors_are_those_of_a_strain_tensor() -> None:
    """NumPy: n·ε·n in two directions, and the tensor's eigenvalues, 1000 random fields."""
    draw = np.random.default_rng(9)
    for x, y, shear, intended, off in draw.uniform(-1, 1, (1000, 5)):
        tensor = np.array([[x, shear / 2], [shear / 2, y]]) * 1e-3
        meant, shown = (strain_along(tensor, angle) for angle in (intended, intended + off))
        found = placement.field_misalignment(x * 1e-3, y * 1e-3, shear * 1e-3, intended, off)
        assert shown - meant == pytest.approx(found, abs=1e-15)
        values, vectors = np.linalg.eigh(tensor)
        axis = math.atan2(vectors[1, 1], vectors[0, 1])
        pair = float(values[1]), float(values[0]), intended - axis, off
        assert shown - meant == pytest.approx(placement.misalignment_error(*pair), abs=1e-15)
        if abs(meant) > 1e-5:
            share = placement.misalignment_share(*pair)
            assert shown / meant - 1 == pytest.approx(share, rel=1e-9, abs=1e-9)


@pytest.mark.parametrize("intended", [0.0, 0.3, math.pi / 4, 1.2, -0.5])
def test_the_largest_turn_is_where_scipy_finds_the_error(intended: float) -> None:
    """scipy.optimize.brentq on either side; the nearer crossing is the answer."""
    permitted = 20e-6
    fine = np.linspace(0, math.pi / 2, 4001)
    crossings = []
    for side in (1, -1):
        errors = placement.misalignment_error(1e-3, -3e-4, intended, side * fine)
        after = int(np.argmax(abs(errors) > permitted))
        crossings.append(
            optimize.brentq(
                lambda turn, side=side: (
                    abs(placement.misalignment_error(1e-3, -3e-4, intended, side * turn))
                    - permitted
                ),
                fine[after - 1],
                fine[after],
                xtol=1e-14,
            )
        )
    found = placement.largest_misalignment(1e-3, -3e-4, intended, permitted)
    assert min(crossings) == pytest.approx(found, rel=1e-8)


def test_an_error_of_place_is_the_gradient_of_numpy() -> None:
    """numpy.gradient of a plane field, and a step of 2 mm along x and −1 mm along y."""
    x, y = np.meshgrid(np.linspace(0, 0.01, 11), np.linspace(0, 0.01, 11), indexing="ij")
    field = 0.05 * x - 0.02 * y
    steps = np.gradient(field, 0.001)
    found = placement.misplacement_error(steps[0][3, 5], steps[1][3, 5], 0.002, -0.001)
    assert field[5, 4] - field[3, 5] == pytest.approx(found)


def test_an_axis_is_the_angle_between_lines() -> None:
    """NumPy: the cosine of the angle between two lines is that of their unit vectors, unsigned."""
    for installed, planned in np.random.default_rng(4).uniform(-7, 7, (200, 2)):
        ahead = abs(
            math.cos(installed) * math.cos(planned) + math.sin(installed) * math.sin(planned)
        )
        found = placement.axis_error(installed, planned)
        assert math.acos(min(1.0, ahead)) == pytest.approx(abs(found), abs=1e-7)


def test_a_turn_of_ten_degrees_is_no_longer_a_fault_of_alignment() -> None:
    """Common practice: gauges are laid to within a few degrees; 10° is planned anew."""
    assert () == placement.misalignment_notices(math.radians(5))
    assert 1 == len(placement.misalignment_notices(math.radians(11)))
