"""A grid beside a hole: from the edge to far away, and a long grid like a short one."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics import holeedge
from gaugelog.physics.validity import OutOfDomain
from tests.physics.kinds import assert_takes_every_kind

RADIUS = st.floats(1e-3, 0.1)
POISSON = st.floats(0.0, 0.5)
PART = st.floats(0.01, 3.0)


@given(RADIUS, POISSON)
def test_strain_falls_from_the_edge_to_a_third_of_it(radius: float, poisson: float) -> None:
    assert 1.0 == pytest.approx(holeedge.hole_edge_strain(radius, 0.0, poisson))
    found = holeedge.hole_edge_strain(radius, 1e4 * radius, poisson)
    assert 1 / 3 == pytest.approx(found, rel=1e-6)


@given(RADIUS, PART, PART, POISSON)
def test_the_mean_lies_between_the_strains_at_both_sides(
    radius: float, near: float, width: float, poisson: float
) -> None:
    """While strain still falls: to two radii at least it does."""
    first, last = near * radius / 3, (near + width) * radius / 3
    found = holeedge.hole_edge_average(radius, first, last - first, poisson)
    sides = [holeedge.hole_edge_strain(radius, each, poisson) for each in (first, last)]
    assert min(sides) - 1e-9 <= found <= max(sides) + 1e-9


@given(RADIUS, PART, PART, POISSON, st.floats(0.1, 10.0))
def test_only_proportions_count(
    radius: float, near: float, width: float, poisson: float, scale: float
) -> None:
    once = holeedge.hole_edge_average(radius, near * radius, width * radius, poisson)
    scaled = radius * scale
    again = holeedge.hole_edge_average(scaled, near * scaled, width * scaled, poisson)
    assert once == pytest.approx(again)


@given(RADIUS, PART, POISSON)
def test_a_narrow_grid_shows_the_strain_under_it(
    radius: float, near: float, poisson: float
) -> None:
    point = holeedge.hole_edge_strain(radius, near * radius, poisson)
    found = holeedge.hole_edge_average(radius, near * radius, 1e-5 * radius, poisson)
    assert point == pytest.approx(found, rel=1e-4)


@given(PART, PART, POISSON)
def test_a_short_grid_is_the_limit_of_a_long_one(near: float, width: float, poisson: float) -> None:
    short = holeedge.hole_edge_average(1.0, near, width, poisson)
    found = holeedge.hole_grid_average(1.0, near, width, 1e-4, poisson)
    assert short == pytest.approx(found, rel=1e-6)


def test_a_longer_grid_beside_the_edge_shows_less() -> None:
    means = [holeedge.hole_grid_average(5.0, 0.5, 1.0, length, 0.3) for length in (1.0, 3.0, 6.0)]
    assert sorted(means, reverse=True) == means


def test_every_formula_takes_floats_arrays_and_uncertain_numbers() -> None:
    assert_takes_every_kind(holeedge.hole_edge_strain, 0.005, 0.001, 0.3)
    assert_takes_every_kind(holeedge.hole_edge_average, 0.005, 0.0005, 0.0015, 0.3)


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: holeedge.hole_edge_strain(0.0, 1.0, 0.3), "radius must be greater than zero"),
        (lambda: holeedge.hole_edge_strain(1.0, -1.0, 0.3), "distance must not be negative"),
        (lambda: holeedge.hole_edge_strain(1.0, 1.0, 0.6), "poisson must lie between -1 and 0.5"),
        (lambda: holeedge.hole_edge_average(1.0, -0.1, 1.0, 0.3), "near must not be negative"),
        (lambda: holeedge.hole_edge_average(1.0, 0.1, 0.0, 0.3), "width must be greater"),
        (lambda: holeedge.hole_edge_average(1.0, 0.1, 1.0, 2.0), "poisson must lie between"),
        (lambda: holeedge.hole_grid_average(1.0, 0.1, 1.0, 0.0, 0.3), "length must be greater"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
