"""Lead wires, held to textbook lead-wire analysis and to a circuit simulator."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.physics import leads
from gaugelog.physics.network import Network, Resistor
from tests.foreign import needs
from tests.outside.cases import case
from tests.outside.spice import Bench, voltages

CHECKS = (
    leads.desensitisation,
    leads.sensitivity_loss,
    leads.correction_factor,
    leads.effective_factor,
    leads.added_gauge_strain,
    leads.temperature_strain,
    leads.sensitivity_drift,
    leads.initial_offset,
    leads.initial_strain,
    leads.initial_offset_strain,
    leads.desensitisation_notices,
)
SUPPLY, SIGNAL = ("high", "low"), ("plus", "minus")


def test_two_wires_take_what_the_textbook_says() -> None:
    given = case("C03-08")
    grid, wire, layout = given.value("Rg"), given.value("RL_each"), "quarter two-wire"
    given.expect("factor", leads.desensitisation(layout, grid, wire))
    given.expect("effective_GF", leads.effective_factor(layout, grid, wire, given.value("GF")))


def test_two_warming_wires_read_as_the_case_says() -> None:
    given = case("C03-07")
    grid, wires, factor = given.value("Rg"), 2 * given.value("RL_each"), given.value("GF")
    alpha, rise = given.value("alpha"), given.value("dT")
    given.expect("dR_leads", wires * alpha * rise)
    strain = leads.added_gauge_strain(grid, wires, alpha, rise, factor)
    given.expect("equivalent_gauge_strain", 1e6 * strain)
    shown = leads.temperature_strain(grid, wires, 0.0, alpha, rise, factor)
    given.expect("indicated", 1e6 * shown)


def test_two_wires_offset_the_bridge_as_the_case_says() -> None:
    given = case("C03-13")
    grid, wires, factor = given.value("Rg"), 2 * given.value("RL_each"), given.value("GF")
    given.expect("equivalent_linear", 1e6 * leads.initial_strain(grid, wires, factor))
    given.expect("indicated_exact", 1e6 * leads.initial_offset_strain(grid, wires, factor))
    ratio = leads.initial_offset(grid, wires, grid)
    given.expect("indicated_exact", 4e6 * ratio / factor)
    assert (
        "8264 µm/m" in leads.desensitisation_notices("quarter two-wire", grid, wires / 2)[0].message
    )


DRAWN = {
    "quarter two-wire": "w low a, w plus b, g a b, r plus high, r high minus, r minus low",
    "quarter three-wire": "w low a, w half b, 0 plus b, g a b, r half high, r high minus, "
    "r minus low",
    "half three-wire": "w low a, w high c, w plus b, g a b, o b c, r high minus, r minus low",
    "full four-wire": "w low a, w high c, w plus b, w minus d, g a b, o b c, g c d, o d a",
}
"""Circuits as drawn in Dally and Riley (from memory): w a wire, g a grid, o one that shrinks."""


def _output(layout: str, grid: float, wire: float, change: float, folder: Path) -> float:
    value = {"w": wire, "0": 1e-3, "g": grid * (1 + change), "o": grid * (1 - change), "r": grid}
    drawn = Network(
        tuple(
            Resistor(f"r{place}", start, end, value[what])
            for place, (what, start, end) in enumerate(
                stroke.split() for stroke in DRAWN[layout].split(", ")
            )
        )
    )
    volts = voltages([Bench(drawn, supply=SUPPLY)], folder)[0]
    return volts["plus"] - volts["minus"]


@needs("ngspice")
@pytest.mark.parametrize("layout", ["quarter three-wire", "half three-wire", "full four-wire"])
def test_the_loss_is_the_simulators_slope(layout: str, tmp_path: Path) -> None:
    grid, wire = 350.0, 6.0
    with_wires, without = (
        _output(layout, grid, each, 1e-3, tmp_path) - _output(layout, grid, each, -1e-3, tmp_path)
        for each in (wire, 1e-3)
    )
    expected = with_wires / without
    assert expected == pytest.approx(leads.desensitisation(layout, grid, wire), rel=2e-5)
    assert 1 - expected == pytest.approx(leads.sensitivity_loss(layout, grid, wire), abs=2e-5)
    assert 1 / expected == pytest.approx(leads.correction_factor(layout, grid, wire), rel=2e-5)
    warm = _output(layout, grid, wire * 1.15, 1e-3, tmp_path)
    warm -= _output(layout, grid, wire * 1.15, -1e-3, tmp_path)
    drift = leads.sensitivity_drift(layout, grid, wire, 0.005, 30.0)
    assert warm / with_wires - 1 == pytest.approx(drift, abs=2e-6)


@needs("ngspice")
def test_a_two_wire_offset_is_the_simulators(tmp_path: Path) -> None:
    volts = _output("quarter two-wire", 120.0, 6.157, 0.0, tmp_path)
    assert volts == pytest.approx(leads.initial_offset(120.0, 2 * 6.157, 120.0), abs=1e-12)


def test_remote_sense_makes_the_loss_good() -> None:
    """The module measures the supply at the bridge, so wires take nothing (common practice)."""
    for layout in ("half five-wire", "full six-wire"):
        assert 1.0 == leads.desensitisation(layout, 350.0, 10.0)
