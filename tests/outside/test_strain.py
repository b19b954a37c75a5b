"""Strain and gauge factor, held to their definitions in ASTM E251 and to textbook examples."""

from __future__ import annotations

import pytest

from gaugelog.physics import strain
from tests.outside.cases import case

CHECKS = (
    strain.relative_change,
    strain.resistance_change,
    strain.strain_from_resistances,
    strain.resistance_shift,
    strain.true_strain,
    strain.engineering_strain,
    strain.micrometres_per_metre,
    strain.from_micrometres_per_metre,
)


def test_a_350_ohm_grid_changes_as_the_definition_says() -> None:
    given = case("C01-01")
    resistance, factor = given.value("R"), given.value("GF")
    wanted = strain.from_micrometres_per_metre(given.value("strain"))
    given.expect("dR", strain.resistance_change(resistance, factor, wanted))
    given.expect("dR_over_R", strain.relative_change(factor, wanted))


def test_a_120_ohm_grid_changes_as_the_tutorial_prints() -> None:
    given = case("C01-02")
    factor, wanted = given.value("GF"), given.value("strain") * 1e-6
    given.expect("dR", strain.resistance_change(given.value("R"), factor, wanted))
    given.expect("dR_percent", 100 * strain.relative_change(factor, wanted))


def test_the_textbook_bar_in_tension_comes_out() -> None:
    """Figliola and Beasley, chapter 11, first strain gauge example (from memory)."""
    given = case("C01-04")
    area = given.value("b") * given.value("h") * 1e-6
    stress = given.value("F") * 1e3 / area
    wanted = stress / (given.value("E") * 1e9)
    given.expect("stress", stress / 1e6)
    given.expect("strain", strain.micrometres_per_metre(wanted))
    given.expect("dR", strain.resistance_change(given.value("R"), given.value("GF"), wanted))


def test_strain_comes_back_from_two_resistances() -> None:
    given = case("C01-05")
    found = strain.strain_from_resistances(given.value("R0"), given.value("R1"), given.value("GF"))
    given.expect("strain", strain.micrometres_per_metre(found))


def test_true_strain_is_the_logarithm() -> None:
    given = case("C01-07")
    found = strain.true_strain(given.value("e"))
    given.expect("true_strain", found)
    assert given.value("e") == pytest.approx(strain.engineering_strain(found), rel=1e-14)


def test_one_strain_reads_the_same_in_every_unit() -> None:
    given = case("C01-08")
    found = strain.micrometres_per_metre(given.value("strain"))
    given.expect("um_per_m", found)
    given.expect("mm_per_m", found / 1e3)
    given.expect("percent", found / 1e4)


def test_the_shift_on_bonding_is_judged_as_the_case_does() -> None:
    given = case("C12-04")
    shift = 100 * strain.resistance_shift(given.value("R_before"), given.value("R_after"))
    given.expect("shift_percent", shift)
    accepted = [float(shift <= limit) for limit in given.value("limit_percent")]
    assert given.expected["accept"]["value"] == accepted
