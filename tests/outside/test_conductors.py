"""Resistance of wires, held to IEC 60028, ASTM B258 and IEC 60228 as printed or reprinted."""

from __future__ import annotations

import math

import pytest

from gaugelog.physics import conductors
from tests.outside.cases import case

CHECKS = (
    conductors.from_reel,
    conductors.from_loop,
    conductors.from_awg,
    conductors.from_mm2,
    conductors.awg_diameter,
    conductors.awg_per_metre,
    conductors.iec_60228_per_metre,
    conductors.per_metre_of_area,
    conductors.at_temperature,
    conductors.at_temperature_notices,
    conductors.iec_60228_to_20_celsius,
)


def test_copper_is_the_annealed_copper_of_iec_60028() -> None:
    given = case("C03-01")
    given.expect("resistivity_20C", conductors.COPPER_RESISTIVITY * 1e6)
    given.expect("conductivity", 1e-6 / conductors.COPPER_RESISTIVITY)
    given.expect("alpha_20", conductors.COPPER_COEFFICIENT)
    assert 0.017241 == pytest.approx(conductors.per_metre_of_area(1e-6), abs=5e-7)


def test_awg_wires_have_the_resistance_of_the_reprinted_table() -> None:
    given = case("C03-03")
    wanted = given.expected["ohm_per_km"]
    for awg, printed, tolerance in zip(
        given.value("awg"), wanted["value"], wanted["tol_abs"], strict=True
    ):
        assert printed == pytest.approx(1e3 * conductors.awg_per_metre(awg), abs=tolerance)
        wire = conductors.from_awg(1000.0, awg)
        assert printed == pytest.approx(wire.resistance, abs=tolerance)
        assert "ASTM B258" in wire.basis


def test_awg_diameters_are_those_of_astm_b258() -> None:
    """Millimetres of 0000, 10, 20, 30 and 40 AWG, ASTM B258 table of diameters (from memory)."""
    printed = {-3: 11.684, 10: 2.588, 20: 0.812, 30: 0.255, 40: 0.0799}
    for awg, millimetres in printed.items():
        assert millimetres == pytest.approx(1e3 * conductors.awg_diameter(awg), rel=2e-3)


@pytest.mark.parametrize("kind", ["class2", "class5", "class5_tinned"])
def test_sizes_have_the_largest_resistance_of_iec_60228(kind: str) -> None:
    given = case("C03-04")
    name = {"class2": "class 2", "class5": "class 5", "class5_tinned": "class 5 tinned"}[kind]
    for mm2, printed in zip(given.value("area"), given.expected[kind]["value"], strict=True):
        assert printed == pytest.approx(1e3 * conductors.iec_60228_per_metre(mm2, name))
        wire = conductors.from_mm2(1000.0, mm2, name)
        assert printed == pytest.approx(wire.resistance)
        assert "IEC 60228" in wire.basis


def test_every_size_of_the_table_has_more_than_its_areas_resistance() -> None:
    """IEC 60228 gives the largest resistance, which exceeds ρ/A by up to 35 % (case C03-04)."""
    for mm2 in case("C03-04").value("area"):
        bare = conductors.per_metre_of_area(mm2 * 1e-6)
        for name in ("class 1", "class 2", "class 5", "class 5 tinned"):
            assert 1.0 < conductors.iec_60228_per_metre(mm2, name) / bare < 1.36


def test_a_size_the_table_lacks_is_taken_from_its_area() -> None:
    """50 m of 0.14 mm² at 0.017241 Ω·mm²/m (IEC 60028): 6.157 Ω."""
    wire = conductors.from_mm2(50.0, 0.14)
    assert 50 * 0.017241 / 0.14 == pytest.approx(wire.resistance, rel=3e-5)
    assert "IEC 60028" in wire.basis


def test_copper_gains_28_percent_from_20_to_90_degrees() -> None:
    given = case("C03-06")
    found = conductors.at_temperature(1.0, given.value("t"), given.value("alpha"))
    given.expect("rise_percent", 100 * (found - 1))


def test_copper_has_the_resistance_of_the_copper_wire_tables_at_other_temperatures() -> None:
    """Zero resistance would lie at −234.5 °C for IACS copper: (234.5 + t)/254.5 (NBS copper
    wire tables, from memory)."""
    for celsius in (-40.0, 0.0, 60.0, 120.0):
        expected = (234.5 + celsius) / 254.5
        assert expected == pytest.approx(conductors.at_temperature(1.0, celsius), rel=2e-3)
    assert () == conductors.at_temperature_notices(20.0)
    assert 1 == len(conductors.at_temperature_notices(260.0))


def test_the_temperature_factors_of_iec_60228_come_out() -> None:
    """IEC 60228, table of correction factors: 10 °C 1.042, 15 °C 1.020, 30 °C 0.962 (from
    memory)."""
    for celsius, factor in ((10.0, 1.042), (15.0, 1.020), (20.0, 1.000), (30.0, 0.962)):
        found = conductors.iec_60228_to_20_celsius(1.0, celsius)
        assert factor == pytest.approx(found, abs=6e-4)


def test_reel_and_loop_give_one_wire() -> None:
    """Arithmetic: 25 m at 0.128 Ω/m is 3.2 Ω, a loop of two such wires 6.4 Ω."""
    reel, loop = conductors.from_reel(25.0, 0.128), conductors.from_loop(6.4)
    assert 3.2 == pytest.approx(reel.resistance)
    assert 3.2 == pytest.approx(loop.resistance)
    assert math.isclose(reel.resistance, loop.resistance)
    assert reel.basis != loop.basis
