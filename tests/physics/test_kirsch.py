"""The field about a drilled hole, and its average over a grid."""

from __future__ import annotations

import math

import numpy
import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics.kirsch import (
    TYPE_A,
    DrillGrid,
    kirsch_stress,
    relieved_strain,
    through_hole_coefficients,
)
from gaugelog.physics.validity import OutOfDomain

ANGLE = st.floats(-math.pi, math.pi)


@given(st.floats(-1e9, 1e9), ANGLE)
def test_the_edge_of_the_hole_is_free(stress: float, angle: float) -> None:
    radial, _, shear = kirsch_stress(stress, 0.5, angle, 0.5)
    assert (0.0, 0.0) == pytest.approx((radial, shear), abs=1e-6)


@given(ANGLE)
def test_far_from_the_hole_the_plate_is_merely_pulled(angle: float) -> None:
    radial, around, shear = kirsch_stress(1.0, 1e5, angle, 0.5)
    assert math.cos(angle) ** 2 == pytest.approx(radial, abs=1e-8)
    assert math.sin(angle) ** 2 == pytest.approx(around, abs=1e-8)
    assert -math.sin(2 * angle) / 2 == pytest.approx(shear, abs=1e-8)


@given(st.floats(0.501, 10.0), ANGLE, ANGLE)
def test_turning_plate_and_pull_together_changes_nothing(
    radius: float, place: float, pull: float
) -> None:
    """Mirrored about the grid's axis, the relief along it is the same."""
    x, y = radius * math.cos(place), radius * math.sin(place)
    found = relieved_strain(x, y, pull, 0.5, 0.3)
    assert found == pytest.approx(relieved_strain(x, -y, -pull, 0.5, 0.3), abs=1e-9)
    assert found == pytest.approx(relieved_strain(-x, -y, pull, 0.5, 0.3), abs=1e-9)


def test_a_grid_along_the_pull_is_relieved_of_tension() -> None:
    assert relieved_strain(1.0, 0.0, 0.0, 0.4, 0.3) < 0


@given(st.floats(0.5, 20.0))
def test_coefficients_depend_on_proportions_only(circle: float) -> None:
    scaled = through_hole_coefficients(0.4 * circle, TYPE_A.scaled(circle), 0.3)
    assert through_hole_coefficients(0.4, TYPE_A, 0.3) == pytest.approx(scaled)


def test_bigger_holes_relieve_more() -> None:
    found = [through_hole_coefficients(size, TYPE_A, 0.3) for size in (0.3, 0.4, 0.5)]
    assert sorted(found) == found


def test_the_first_coefficient_hardly_knows_poissons_ratio() -> None:
    one, other = (through_hole_coefficients(0.4, TYPE_A, nu) for nu in (0.2, 0.4))
    assert one[0] == pytest.approx(other[0])
    assert one[1] != pytest.approx(other[1], rel=0.01)


def test_an_array_of_points_has_the_relief_of_each() -> None:
    x = numpy.array([0.6, 1.0])
    assert [relieved_strain(each, 0.1, 0.2, 0.4, 0.3) for each in x] == pytest.approx(
        list(relieved_strain(x, 0.1, 0.2, 0.4, 0.3))
    )


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: kirsch_stress(1.0, 0.4, 0.0, 0.5), "hole_radius must not exceed radius"),
        (lambda: kirsch_stress(1.0, 0.4, 0.0, 0.0), "hole_radius must be greater than zero"),
        (lambda: kirsch_stress(1.0, 0.6, math.inf, 0.5), "angle must be a finite number"),
        (lambda: relieved_strain(1.0, 0.0, 0.0, 0.5, -1.0), "poisson must be greater than -1"),
        (lambda: DrillGrid(0.6, 0.4, 0.3), "near must be smaller than far"),
        (lambda: DrillGrid(0.3, 0.6, 0.0), "width must be greater than zero"),
        (
            lambda: through_hole_coefficients(0.8, TYPE_A, 0.3),
            "hole_diameter must not exceed twice the grid's near end, not 0.8",
        ),
        (lambda: through_hole_coefficients(0.4, TYPE_A, 0.6), "poisson must lie between"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
