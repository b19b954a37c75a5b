"""Heat in a grid: proportions, limits, round trips, and the words for too much of it."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics import excitation
from gaugelog.physics.excitation import HEAT_SINKS, HeatSink
from gaugelog.physics.validity import OutOfDomain
from tests.physics.kinds import assert_takes_every_kind

GRID = st.floats(30.0, 10_000.0)
SUPPLY = st.floats(0.1, 30.0)
SIDE = st.floats(2e-4, 0.2)
DENSITY = st.floats(1.0, 1e5)


def test_the_grid_of_the_issue_is_judged_as_the_issue_says() -> None:
    """Grid 3.0 × 2.5 mm, quarter bridge, 5 V, limit 2 W/in²."""
    limit = excitation.from_watts_per_square_inch(2.0)
    sink = HeatSink("the article", limit, limit)
    cool, hot = (excitation.grid_power(5.0, grid) for grid in (350.0, 120.0))
    assert 17.86e-3 == pytest.approx(cool, abs=5e-6)
    assert 52.1e-3 == pytest.approx(hot, abs=5e-5)
    density = excitation.power_density(cool, 0.003, 0.0025)
    assert 2.38e3 == pytest.approx(density, abs=5.0)
    assert () == excitation.power_density_notices(density, sink)
    refused = excitation.power_density_notices(excitation.power_density(hot, 0.003, 0.0025), sink)
    assert "6.94 kW/m² on the article is above 3.1 kW/m²" in refused[0].message
    largest = excitation.largest_supply(limit, 120.0, 0.003, 0.0025)
    assert 3.34 == pytest.approx(largest, abs=5e-3)


@given(DENSITY, GRID, SIDE, SIDE, GRID)
def test_the_largest_supply_gives_just_the_permitted_density(
    density: float, grid: float, length: float, width: float, neighbour: float
) -> None:
    supply = excitation.largest_supply(density, grid, length, width, neighbour)
    power = excitation.grid_power(supply, grid, neighbour)
    assert density == pytest.approx(excitation.power_density(power, length, width))


@given(DENSITY, GRID, SIDE, SIDE)
def test_the_largest_current_gives_just_the_permitted_density(
    density: float, grid: float, length: float, width: float
) -> None:
    current = excitation.largest_current(density, grid, length, width)
    power = excitation.current_power(current, grid)
    assert density == pytest.approx(excitation.power_density(power, length, width))


@given(SUPPLY, GRID)
def test_heat_grows_with_the_square_of_the_supply(supply: float, grid: float) -> None:
    once = excitation.grid_power(supply, grid)
    assert 4 * once == pytest.approx(excitation.grid_power(2 * supply, grid))
    assert once == pytest.approx(excitation.grid_power(-supply, grid))


@given(SUPPLY, GRID, GRID, st.floats(0.0, 50.0))
def test_wires_and_a_larger_neighbour_spare_the_grid(
    supply: float, grid: float, neighbour: float, wires: float
) -> None:
    bare = excitation.grid_power(supply, grid, neighbour)
    assert bare >= excitation.grid_power(supply, grid, neighbour, wires)
    assert bare > excitation.grid_power(supply, grid, 2 * neighbour)


@given(SUPPLY, st.tuples(GRID, GRID, GRID, GRID))
def test_the_arms_turn_into_heat_all_that_the_supply_delivers(
    supply: float, arms: tuple[float, float, float, float]
) -> None:
    one, two, three, four = arms
    heat = (
        excitation.grid_power(supply, one, two)
        + excitation.grid_power(supply, two, one)
        + excitation.grid_power(supply, three, four)
        + excitation.grid_power(supply, four, three)
    )
    assert supply * excitation.supply_current(supply, *arms) == pytest.approx(heat)


@given(DENSITY)
def test_units_of_density_go_there_and_back(density: float) -> None:
    inches = excitation.watts_per_square_inch(density)
    assert density == pytest.approx(excitation.from_watts_per_square_inch(inches))


def test_a_better_heat_sink_allows_more() -> None:
    allowed = [(sink.steady, sink.most) for sink in HEAT_SINKS.values()]
    assert sorted(allowed, reverse=True) == allowed


def test_between_steady_and_most_the_notice_says_that_it_depends() -> None:
    sink = excitation.heat_sink("thick steel")
    middle = excitation.power_density_notices((sink.steady + sink.most) / 2, sink)
    over = excitation.power_density_notices(sink.most * 1.01, sink)
    assert "above 1.55 kW/m² and depends on" in middle[0].message
    assert "above 3.1 kW/m² and heats the grid" in over[0].message
    assert () == excitation.power_density_notices(sink.steady, sink)


def test_every_formula_takes_floats_arrays_and_uncertain_numbers() -> None:
    assert_takes_every_kind(excitation.grid_power, 5.0, 350.0, 351.0, 1.0)
    assert_takes_every_kind(excitation.current_power, 0.01, 350.0)
    assert_takes_every_kind(excitation.power_density, 0.018, 0.003, 0.0025)
    assert_takes_every_kind(excitation.largest_supply, 3100.0, 120.0, 0.003, 0.0025, 121.0)
    assert_takes_every_kind(excitation.supply_current, 5.0, 350.0, 351.0, 352.0, 353.0)


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: excitation.grid_power(5.0, 0.0), "grid must be greater than zero"),
        (lambda: excitation.grid_power(math.nan, 350.0), "supply must be a finite number"),
        (lambda: excitation.grid_power(5.0, 350.0, -1.0), "neighbour must be greater"),
        (lambda: excitation.grid_power(5.0, 350.0, 350.0, -1.0), "wires must not be negative"),
        (lambda: excitation.current_power(math.inf, 350.0), "current must be a finite number"),
        (lambda: excitation.power_density(-1.0, 1.0, 1.0), "power must not be negative"),
        (lambda: excitation.power_density(1.0, 0.0, 1.0), "length must be greater than zero"),
        (lambda: excitation.power_density(1.0, 1.0, 0.0), "width must be greater than zero"),
        (lambda: excitation.largest_supply(0.0, 1.0, 1.0, 1.0), "density must be greater"),
        (lambda: excitation.supply_current(1.0, 1.0, 1.0, 0.0, 1.0), "arm_3 must be greater"),
        (lambda: excitation.heat_sink("cheese"), "heat_sink must be one of heavy aluminium"),
        (lambda: HeatSink("odd", 2.0, 1.0), "steady must not exceed most"),
        (lambda: HeatSink("odd", 0.0, 1.0), "steady must be greater than zero"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
