"""Rosettes: round trips, numbering, spare grids, uncertain readings, bad input."""

from __future__ import annotations

from math import pi

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from uncertainties import ufloat

from gaugelog.physics import plane, rosette
from gaugelog.physics.plane import PlaneStrain
from gaugelog.physics.validity import OutOfDomain

STRAIN = st.floats(min_value=-2e-3, max_value=2e-3)
ANGLE = st.floats(min_value=-pi, max_value=pi)
NUMBERINGS: tuple[rosette.Numbering, ...] = ("counter-clockwise", "clockwise")


@given(STRAIN, STRAIN, STRAIN, st.sampled_from(["rectangular", "delta"]))
def test_a_state_comes_back_from_its_readings(
    x: float, y: float, shear: float, pattern: str
) -> None:
    state, angles = PlaneStrain(x, y, shear), rosette.grid_angles(pattern)
    readings = [plane.strain_along(state, angle) for angle in angles]
    found = rosette.rosette_state(readings, angles)
    assert [x, y, shear] == pytest.approx([found.x, found.y, found.shear], abs=1e-14)


@given(STRAIN, STRAIN, STRAIN)
def test_the_closed_forms_agree_with_least_squares(one: float, two: float, three: float) -> None:
    for state, pattern in (
        (rosette.rectangular_state(one, two, three), "rectangular"),
        (rosette.delta_state(one, two, three), "delta"),
    ):
        found = rosette.rosette_state([one, two, three], rosette.grid_angles(pattern))
        assert [state.x, state.y, state.shear] == pytest.approx(
            [found.x, found.y, found.shear], abs=1e-14
        )


def test_uncertain_readings_pass_through_the_same_formula() -> None:
    readings = [ufloat(400e-6, 4e-6), ufloat(300e-6, 3e-6), ufloat(-200e-6, 2e-6)]
    found = plane.principal_strains(rosette.rectangular_state(*readings))
    step = 1e-9

    def largest(values: list[float]) -> float:
        return float(plane.principal_strains(rosette.rectangular_state(*values)).largest)

    plain = [reading.nominal_value for reading in readings]
    slopes = [
        (
            largest([v + step * (i == j) for j, v in enumerate(plain)])
            - largest([v - step * (i == j) for j, v in enumerate(plain)])
        )
        / (2 * step)
        for i in range(3)
    ]
    wanted = sum((slope * r.std_dev) ** 2 for slope, r in zip(slopes, readings, strict=True)) ** 0.5
    assert wanted == pytest.approx(found.largest.std_dev, rel=1e-6)


@pytest.mark.parametrize(
    ("readings", "angles", "named"),
    [
        ([1e-4, 2e-4, 3e-4], [0.0, 0.0, 1.0], "angles"),
        ([1e-4, 2e-4, 3e-4], [0.0, pi, 1.0], "angles"),
        ([1e-4, 2e-4], [0.0, 1.0], "angles"),
        ([1e-4, 2e-4, 3e-4], [0.0, 1.0], "angles"),
        ([1e-4, float("nan"), 3e-4], [0.0, 1.0, 2.0], "reading 2"),
        ([1e-4, 2e-4, 3e-4], [0.0, float("inf"), 2.0], "angle 2"),
    ],
)
def test_bad_input_names_its_argument(
    readings: list[float], angles: list[float], named: str
) -> None:
    with pytest.raises(OutOfDomain, match=named):
        rosette.rosette_state(readings, angles)


@pytest.mark.parametrize("pattern", ["rectangular", "delta"])
@given(STRAIN, STRAIN, STRAIN)
def test_clockwise_numbering_mirrors_the_direction(
    pattern: str, one: float, two: float, three: float
) -> None:
    directions = []
    for numbering in NUMBERINGS:
        angles = rosette.grid_angles(pattern, numbering)
        state = rosette.rosette_state([one, two, three], angles)
        directions.append((state.x, state.y, state.shear))
    (x, y, shear), (mirrored_x, mirrored_y, mirrored_shear) = directions
    assert [x, y, -shear] == pytest.approx([mirrored_x, mirrored_y, mirrored_shear], abs=1e-15)


@given(STRAIN, STRAIN, STRAIN, st.lists(ANGLE, min_size=1, max_size=4))
def test_spare_grids_that_agree_leave_nothing(
    x: float, y: float, shear: float, more: list[float]
) -> None:
    state = PlaneStrain(x, y, shear)
    angles = [*rosette.grid_angles("delta"), *more]
    fit = rosette.fit_rosette([plane.strain_along(state, angle) for angle in angles], angles)
    assert [0.0] * len(angles) == pytest.approx(list(fit.residuals), abs=1e-15)
    assert () == rosette.fit_rosette_notices(fit, 1e-12)


def test_a_spare_grid_that_disagrees_is_noticed() -> None:
    angles = [0.0, pi / 4, pi / 2, 3 * pi / 4]
    fit = rosette.fit_rosette([400e-6, 300e-6, -200e-6, -85e-6], angles)
    assert 7.5e-6 == pytest.approx(fit.scatter)
    told = rosette.fit_rosette_notices(fit, 5e-6)[0].message
    assert "scatter by 7.5 µm/m" in told
    assert "more than 5 µm/m" in told
    assert () == rosette.fit_rosette_notices(fit, 8e-6)
    three = rosette.fit_rosette([400e-6, 300e-6, -200e-6], angles[:3])
    assert () == rosette.fit_rosette_notices(three, 0.0)


def test_arrays_of_readings_give_arrays_of_states() -> None:
    readings = np.array([[400.0, -200.0], [300.0, 300.0], [-200.0, 400.0]]) * 1e-6
    many = rosette.fit_rosette(list(readings), rosette.grid_angles("rectangular")).state
    for place in (0, 1):
        one = rosette.rectangular_state(*readings[:, place])
        assert [one.x, one.y, one.shear] == pytest.approx(
            [many.x[place], many.y[place], many.shear[place]], abs=1e-18
        )


@pytest.mark.parametrize(
    ("arguments", "named"),
    [
        (("star",), "pattern must be one of tee, rectangular, delta, not star"),
        (("delta", "left"), "numbering must be one of"),
        (("delta", "clockwise", "below"), "seen_from must be one of"),
    ],
)
def test_an_unknown_pattern_is_named(arguments: tuple[str, ...], named: str) -> None:
    with pytest.raises(OutOfDomain, match=named):
        rosette.grid_angles(*arguments)  # type: ignore[arg-type]
