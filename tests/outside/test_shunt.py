"""Shunt calibration, held to a recorder manual's table, bridge algebra and a circuit simulator."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.physics import resistors, shunt
from gaugelog.physics.network import Network, Resistor
from tests.foreign import needs
from tests.outside.cases import case
from tests.outside.spice import Bench, voltages
from tests.outside.test_bridge import four_arms

CHECKS = (
    shunt.shunted,
    shunt.relative_step,
    shunt.simulated_strain,
    shunt.shunt_for_strain,
    shunt.shunt_output,
    shunt.shunt_indicated_strain,
    shunt.shunt_at_module_strain,
    shunt.shunt_indicated_strain_notices,
    resistors.nearest_e96,
    resistors.warmed,
    resistors.resistor_span,
)


@pytest.mark.parametrize("grid", [120, 350])
def test_shunts_for_wanted_strains_are_those_of_the_recorder_manual(grid: int) -> None:
    given = case("C04-01")
    printed = given.expected[f"Rs_{grid}"]["value"]
    for strain, ohm in zip(given.value("strain"), printed, strict=True):
        found = shunt.shunt_for_strain(float(grid), given.value("GF"), strain * 1e-6)
        assert ohm == pytest.approx(found, abs=0.5)
        back = shunt.simulated_strain(float(grid), given.value("GF"), found)
        assert -strain == pytest.approx(1e6 * back)


@pytest.mark.parametrize("grid", [120, 350])
def test_shunts_indicate_what_the_recorder_manual_prints(grid: int) -> None:
    """The manual prints sizes; a shunt across the grid indicates compression."""
    given = case("C04-04")
    printed = given.expected[f"eps_{grid}"]["value"]
    for ohm, strain in zip(given.value(f"Rs_{grid}"), printed, strict=True):
        found = shunt.shunt_indicated_strain(float(grid), ohm, given.value("GF"))
        assert -strain == pytest.approx(1e6 * found, abs=0.5)


def test_a_1000_ohm_grid_needs_the_shunt_of_the_case() -> None:
    given = case("C04-05")
    found = shunt.shunt_for_strain(
        given.value("R"), given.value("GF"), given.value("strain") * 1e-6
    )
    given.expect("Rs", found)


def test_100_kilohm_across_350_ohm_simulates_what_the_case_says() -> None:
    given = case("C04-06")
    found = shunt.simulated_strain(given.value("R"), given.value("GF"), given.value("Rs"))
    given.expect("simulated", 1e6 * found)
    step = shunt.relative_step(given.value("R"), given.value("Rs"))
    assert given.expected["simulated"]["value"] == pytest.approx(-1e6 * step / given.value("GF"))


def test_a_full_bridge_steps_as_the_case_says() -> None:
    given = case("C04-09")
    given.expect("mV_per_V", 1e3 * shunt.shunt_output(given.value("R"), given.value("Rs")))


@needs("ngspice")
@pytest.mark.parametrize("arm", [1, 2, 3, 4])
def test_a_shunt_over_any_arm_steps_as_the_simulator_says(arm: int, tmp_path: Path) -> None:
    grid, across, factor = 120.0, 59880.0, 2.05
    corners = [("low", "plus"), ("plus", "high"), ("high", "minus"), ("minus", "low")]
    whole = four_arms((grid, grid, grid, grid)).joined(Resistor("shunt", *corners[arm - 1], across))
    volts = voltages([Bench(whole, supply=("high", "low"))], tmp_path)[0]
    step = volts["plus"] - volts["minus"]
    assert step == pytest.approx(shunt.shunt_output(grid, across, arm), abs=1e-12)
    shown = shunt.shunt_indicated_strain(grid, across, factor, arm, "full bending")
    assert step / factor == pytest.approx(shown, abs=1e-12)
    arms = [1.0, 1.0, 1.0, 1.0]
    arms[arm - 1] = shunt.shunted(grid, across) / grid
    one, two, three, four = arms
    bare = voltages([Bench(four_arms((one, two, three, four)), supply=("high", "low"))], tmp_path)
    assert step == pytest.approx(bare[0]["plus"] - bare[0]["minus"], abs=1e-12)


@needs("ngspice")
@pytest.mark.parametrize("wire", [0.01, 1.5, 8.0])
def test_a_shunt_at_the_module_over_reads_as_the_simulator_says(
    wire: float, tmp_path: Path
) -> None:
    """Three-wire circuit: the shunt joins the supply pin and the signal pin."""
    grid, across, lead = 120.0, 59880.0, wire
    drawn = Network(
        (
            Resistor("w1", "low", "a", lead),
            Resistor("grid", "a", "b", grid),
            Resistor("w2", "b", "half", lead),
            Resistor("w3", "b", "plus", lead),
            Resistor("completion", "half", "high", grid),
            Resistor("shunt", "low", "plus", across),
        )
    )
    volts = voltages([Bench(drawn, supply=("high", "low"))], tmp_path)[0]
    expected = (volts["plus"] - 0.5) * 4 / 2.0
    found = shunt.shunt_at_module_strain(grid, wire, across, 2.0)
    assert expected == pytest.approx(found, abs=1e-10)


def test_a_large_step_is_noticed() -> None:
    """C04-04: 6 kΩ on 120 Ω simulates −9804 and indicates −9901 µm/m; a notice says so."""
    assert () == shunt.shunt_indicated_strain_notices(120.0, 60000.0)
    assert "0.98%" in shunt.shunt_indicated_strain_notices(120.0, 6000.0)[0].message


def test_e96_values_are_those_of_iec_60063() -> None:
    """Twelve of the 96 values of IEC 60063, from memory; each is nearest to itself."""
    for value in (100, 102, 105, 121, 150, 178, 221, 332, 475, 499, 681, 976):
        for decade in (0.01, 1.0, 1e3):
            assert value * decade == pytest.approx(resistors.nearest_e96(value * decade))
    assert 174e3 == resistors.nearest_e96(174650.0)
    assert 60.4e3 == resistors.nearest_e96(59880.0)
    assert 96 == len(set(resistors.E96))


def test_tolerance_and_heat_carry_a_resistor_as_its_data_sheet_terms_say() -> None:
    """IEC 60115-1 terms (from memory): 100 kΩ ± 0.1 %, 25 ppm/K over 40 K, also ± 0.1 %."""
    assert 100e3 * 1.001 == pytest.approx(resistors.warmed(100e3, 25e-6, 40.0))
    span = resistors.resistor_span(100e3, 0.001, -25e-6, 40.0)
    assert 100e3 * 0.999**2 == pytest.approx(span.least)
    assert 100e3 * 1.001**2 == pytest.approx(span.most)
