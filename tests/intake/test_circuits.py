"""Circuits: arms as people write them, wires and channels by their labels."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.ledger.base import Quantity
from gaugelog.ledger.circuits import Element
from tests.intake.conftest import change, lines_of, places_of, set_cell, understood


def first_arm(plan: Path, text: str) -> tuple[Element, ...]:
    """The first circuit's first arm, where the file gives it as `text`."""
    set_cell(plan / "circuits.csv", 2, "arm1", text)
    return understood(plan).circuits[0].arms[0]


def refusal(plan: Path, column: str, text: str) -> str:
    """The one line that refuses `text` in a column of the first circuit."""
    set_cell(plan / "circuits.csv", 2, column, text)
    (line,) = lines_of(lambda: understood(plan))
    assert line.startswith(f"circuits.csv, row 2, column {column}: ")
    return line


def test_an_arm_is_elements_in_series(plan: Path) -> None:
    grid, trim = first_arm(plan, "grid FB-1 + trim 0.5 ohm")
    assert ("grid", "trim") == (grid.kind, trim.kind)
    assert Quantity(value="0.5", unit="ohm") == trim.resistance


@pytest.mark.parametrize(
    "text", ["grid FB-1", "GRID fb-1", "gauge FB-1", "gage FB-1", "grid  FB-1"]
)
def test_a_grid_is_named_by_its_point_whatever_the_case(plan: Path, text: str) -> None:
    (grid,) = first_arm(plan, text)
    assert understood(plan).points[0].grids[0].id == grid.grid


def test_a_resistor_is_inside_the_module_only_where_it_says_so(plan: Path) -> None:
    arms = understood(plan).circuits[0].arms
    assert [True, True, True] == [arm[0].inside_module for arm in arms[1:]]
    (outside,) = first_arm(plan, "completion 350 Ω")
    assert not outside.inside_module


@pytest.mark.parametrize(
    ("text", "what"),
    [
        ("", "is missing."),
        ("grid FB-9", "grids.csv has no grid “FB-9”."),
        ("grid", "grids.csv has no grid “”."),
        ("coil 5 ohm", "“coil 5 ohm” is no element of an arm."),
        ("module 350", "“350” has no unit."),
        ("module 350 mohm", "milli or mega?"),
        ("trim 0 ohm", "“0 ohm” must be above 0."),
    ],
)
def test_what_is_no_arm_is_told(plan: Path, text: str, what: str) -> None:
    assert what in refusal(plan, "arm1", text)


def test_a_grid_twice_in_a_circuit_is_told(plan: Path) -> None:
    assert "names a grid twice" in refusal(plan, "arm1", "grid FB-1 + grid FB-1")


def test_a_channel_that_no_module_has_lists_those_there_are(plan: Path) -> None:
    assert "no channel M1/7. It has m1/1, m1/2." in refusal(plan, "channel", "7")


@pytest.mark.parametrize(
    ("text", "what"),
    [
        ("W3", "“W3” is no wire=mark."),
        ("signal+=", "“signal+=” is no wire=mark."),
        ("earth=W9", "“earth=W9” names no wire. Wires: supply+, supply-"),
        ("signal+=a; signal+=b", "signal+ stands twice."),
    ],
)
def test_marks_that_name_no_wire_are_told(plan: Path, text: str, what: str) -> None:
    assert what in refusal(plan, "marks", text)


def test_the_arrangement_is_one_that_is_known(plan: Path) -> None:
    assert "is not one of quarter two-wire" in refusal(plan, "arrangement", "octopus")


def test_circuits_are_looked_at_without_the_files_they_name(plan: Path) -> None:
    (plan / "grids.csv").unlink()
    change(plan / "campaign.toml", "[campaign]", "[campaign")
    set_cell(plan / "circuits.csv", 3, "length_m", "-9")
    found = places_of(lambda: understood(plan))
    assert ["campaign.toml", "grids.csv", "circuits.csv, row 3, column length_m"] == found


@pytest.mark.parametrize(
    ("arrangement", "wires"),
    [
        ("quarter two-wire", "2"),
        ("quarter three-wire", "3"),
        ("half bending", "3"),
        ("half with dummy", "5"),
        ("opposite arms", "4"),
        ("full torsion", "6"),
    ],
)
def test_every_arrangement_is_planned_with_as_many_wires_as_it_needs(
    plan: Path, arrangement: str, wires: str
) -> None:
    set_cell(plan / "circuits.csv", 2, "arrangement", arrangement)
    set_cell(plan / "circuits.csv", 2, "wires", wires)
    assert arrangement == understood(plan).circuits[0].arrangement


def test_wires_that_the_arrangement_has_no_use_for_are_told(plan: Path) -> None:
    set_cell(plan / "circuits.csv", 2, "arrangement", "half bending")
    line = refusal(plan, "wires", "2")
    assert "of circuit half bending must number 3 or 5, not 2." in line
