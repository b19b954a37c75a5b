"""Heat in a grid, held to printed cases, the trade's table of heat sinks and a simulator."""

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest
from scipy import constants
from scipy.optimize import brentq

from gaugelog.physics import excitation
from gaugelog.physics.network import Network, Resistor
from tests.foreign import needs
from tests.outside.cases import case
from tests.outside.spice import Bench, voltages

CHECKS = (
    excitation.from_watts_per_square_inch,
    excitation.watts_per_square_inch,
    excitation.heat_sink,
    excitation.grid_power,
    excitation.current_power,
    excitation.power_density,
    excitation.largest_supply,
    excitation.largest_current,
    excitation.supply_current,
    excitation.power_density_notices,
)


@pytest.mark.parametrize("identifier", ["C10-01", "C10-03"])
def test_an_arm_of_an_equal_bridge_is_heated_as_the_case_says(identifier: str) -> None:
    given = case(identifier)
    supply, grid = given.value("V"), given.value("R")
    power = excitation.grid_power(supply, grid)
    given.expect("P", 1e3 * power)
    assert power == pytest.approx(excitation.current_power(supply / 2 / grid, grid))


def test_density_and_largest_supply_are_those_of_the_case() -> None:
    given = case("C10-04")
    length, width = given.value("L") * 1e-3, given.value("W") * 1e-3
    power = excitation.grid_power(given.value("V"), given.value("R"))
    given.expect("density", 1e-3 * excitation.power_density(power, length, width))
    allowed = given.value("P_allow") * 1e3
    found = excitation.largest_supply(allowed, given.value("R"), length, width)
    given.expect("V_max", found)
    current = excitation.largest_current(allowed, given.value("R"), length, width)
    assert found / 2 / given.value("R") == pytest.approx(current)


def test_densities_convert_by_the_exact_inch() -> None:
    given = case("C10-05")
    for inches, expected in zip(
        given.value("W_per_in2"), given.expected["kW_per_m2"]["value"], strict=True
    ):
        found = excitation.from_watts_per_square_inch(inches)
        assert expected == pytest.approx(1e-3 * found, abs=1e-6)
        assert inches == pytest.approx(excitation.watts_per_square_inch(expected * 1e3))


def test_the_square_inch_is_that_of_scipys_constants() -> None:
    """SciPy, scipy.constants.inch."""
    assert constants.inch**2 == excitation.SQUARE_INCH


@pytest.mark.parametrize(
    ("name", "steady", "most"),
    [
        ("heavy aluminium or copper", 2.0, 5.0),
        ("thick steel", 1.0, 2.0),
        ("thin stainless or titanium", 0.5, 1.0),
        ("filled plastic or composite", 0.1, 0.2),
        ("plain plastic", 0.01, 0.02),
    ],
)
def test_heat_sinks_are_those_of_the_trades_table(name: str, steady: float, most: float) -> None:
    """Common practice: grid power densities for static accuracy, in W/in² (from memory)."""
    sink = excitation.heat_sink(name)
    assert steady == pytest.approx(excitation.watts_per_square_inch(sink.steady))
    assert most == pytest.approx(excitation.watts_per_square_inch(sink.most))
    assert () == excitation.power_density_notices(0.99 * sink.steady, sink)
    assert "common practice" == excitation.power_density_notices(1.01 * sink.most, sink)[0].source


@needs("ngspice")
def test_heat_and_current_are_those_of_a_circuit_simulator(tmp_path: Path) -> None:
    """Four arms and a wire in series with arm 1, solved by ngspice at 1 V."""
    draw = np.random.default_rng(7)
    trials = [tuple(float(value) for value in draw.uniform(50, 2000, 5)) for _ in range(100)]
    benches = [
        Bench(
            Network(
                (
                    Resistor("wire", "low", "tab", wire / 100),
                    Resistor("arm 1", "tab", "plus", one),
                    Resistor("arm 2", "plus", "high", two),
                    Resistor("arm 3", "high", "minus", three),
                    Resistor("arm 4", "minus", "low", four),
                )
            ),
            supply=("high", "low"),
        )
        for one, two, three, four, wire in trials
    ]
    found = voltages(benches, tmp_path)
    for (one, two, three, four, wire), volts in zip(trials, found, strict=True):
        heat = (volts["plus"] - volts["tab"]) ** 2 / one
        assert heat == pytest.approx(excitation.grid_power(1.0, one, two, wire / 100), rel=1e-9)
        current = (1 - volts["plus"]) / two + (1 - volts["minus"]) / three
        bare = excitation.supply_current(1.0, one + wire / 100, two, three, four)
        assert current == pytest.approx(bare, rel=1e-9)


def test_the_largest_supply_is_where_a_numeric_solver_finds_the_limit() -> None:
    """SciPy, brentq on the density of an unequal branch."""

    def over(supply: float) -> float:
        power = excitation.grid_power(supply, 120.0, 350.0)
        return float(excitation.power_density(power, 0.006, 0.003) - 1550.0)

    expected = brentq(over, 0.1, 100.0, xtol=1e-12)
    found = excitation.largest_supply(1550.0, 120.0, 0.006, 0.003, 350.0)
    assert expected == pytest.approx(found, rel=1e-9)
