"""Leakage, held to a technical note's figure, parallel resistance and a circuit simulator."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.physics import leakage
from gaugelog.physics.network import Network, Resistor
from tests.foreign import needs
from tests.outside.cases import case
from tests.outside.spice import Bench, voltages

CHECKS = (
    leakage.leakage_strain,
    leakage.leakage_drift,
    leakage.insulation_needed,
    leakage.insulation_fall,
    leakage.grid_to_grid_strain,
    leakage.shield_leak_strain,
    leakage.leakage_strain_notices,
)


def test_falling_insulation_drifts_as_the_technical_note_prints() -> None:
    given = case("C05-01")
    found = leakage.leakage_drift(
        given.value("R"), given.value("GF"), given.value("Ri1") * 1e6, given.value("Ri2") * 1e6
    )
    given.expect("error", 1e6 * found)


@pytest.mark.parametrize("identifier", ["C05-02", "C05-04"])
def test_a_leak_across_the_grid_reads_as_parallel_resistance(identifier: str) -> None:
    given = case(identifier)
    grid, factor, insulation = given.value("R"), given.value("GF"), given.value("Ri") * 1e6
    strain = leakage.leakage_strain(grid, factor, insulation)
    given.expect("error", 1e6 * strain)
    assert insulation == pytest.approx(leakage.insulation_needed(grid, factor, strain))


def test_the_laboratory_minimum_costs_next_to_nothing() -> None:
    given = case("C12-03")
    for grid, error in zip(given.value("R"), given.expected["error"]["value"], strict=True):
        found = leakage.leakage_strain(grid, given.value("GF"), given.value("Ri") * 1e6)
        assert error == pytest.approx(1e6 * found, abs=5e-5)


def test_insulation_that_falls_fifteenfold_is_seen() -> None:
    """25, 18, then 1.2 GΩ: a fall of more than tenfold is looked into (common practice)."""
    assert 1.39 == pytest.approx(leakage.insulation_fall(25e9, 18e9), abs=0.01)
    assert 15.0 == pytest.approx(leakage.insulation_fall(18e9, 1.2e9))
    assert () == leakage.leakage_strain_notices(1.2e9)
    assert "100 MΩ" in leakage.leakage_strain_notices(50e6)[0].message


def _two_quarters(grid: float, leak: Resistor) -> Network:
    """Two quarter bridges, one and two, on one supply, with a leak between them."""
    halves = tuple(
        Resistor(f"{part} {name}", *ends, grid)
        for name in ("one", "two")
        for part, ends in (("grid", ("low", name)), ("completion", (name, "high")))
    )
    return Network((*halves, leak))


@needs("ngspice")
@pytest.mark.parametrize("insulation", [1e5, 1e7, 1e9])
@pytest.mark.parametrize(("tab", "potential"), [("low", 0.0), ("high", 1.0)])
def test_a_leak_to_another_grids_supply_tab_reads_as_the_simulator_says(
    tab: str, potential: float, insulation: float, tmp_path: Path
) -> None:
    grid, factor = 350.0, 2.1
    network = _two_quarters(grid, Resistor("leak", "one", tab, insulation))
    volts = voltages([Bench(network, supply=("high", "low"))], tmp_path)[0]
    expected = (volts["one"] - 0.5) * 4 / factor
    found = leakage.grid_to_grid_strain(grid, factor, insulation, 0.5, potential)
    assert expected == pytest.approx(found, abs=1e-9 * abs(expected) + 1e-14)


@needs("ngspice")
def test_a_leak_between_two_signal_tabs_reads_as_the_simulator_says(tmp_path: Path) -> None:
    """The second grid is strained by 2 %, so that the tabs differ."""
    grid, factor, insulation = 350.0, 2.1, 1e6
    network = _two_quarters(grid, Resistor("leak", "one", "two", insulation)).changed(
        "grid two", grid * 1.042
    )
    volts = voltages([Bench(network, supply=("high", "low"))], tmp_path)[0]
    other, source = 1.042 / 2.042, grid * 1.042 / 2.042
    found = leakage.grid_to_grid_strain(grid, factor, insulation, 0.5, other, source)
    assert (volts["one"] - 0.5) * 4 / factor == pytest.approx(found, rel=1e-6)


@needs("ngspice")
def test_a_leak_to_a_driven_shield_reads_as_the_simulator_says(tmp_path: Path) -> None:
    """The shield is held at a quarter of the supply by a stiff divider."""
    grid, factor, insulation = 120.0, 2.0, 20e6
    network = _two_quarters(grid, Resistor("leak", "one", "shield", insulation)).joined(
        Resistor("lower", "low", "shield", 1e-3), Resistor("upper", "shield", "high", 3e-3)
    )
    volts = voltages([Bench(network, supply=("high", "low"))], tmp_path)[0]
    found = leakage.shield_leak_strain(grid, factor, insulation, 0.25)
    assert (volts["one"] - 0.5) * 4 / factor == pytest.approx(found, rel=1e-6)
    assert 0.0 == leakage.shield_leak_strain(grid, factor, insulation, 0.5)
