"""Instrument files: each range with its accuracy; units are named, never guessed."""

from __future__ import annotations

from pathlib import Path

from gaugelog.intake.instruments import load_instruments
from tests.intake.conftest import DEMO, change, counter, faults_of


def _copy(folder: Path) -> Path:
    target = folder / "instruments.toml"
    target.write_bytes((DEMO / "instruments.toml").read_bytes())
    return target


def test_the_demos_meters_are_understood() -> None:
    found = load_instruments(DEMO / "instruments.toml", counter())
    assert [item.label for item in found] == ["RM-2", "IT-5", "QB-1"]
    assert str(found[0].ranges[0].offset) == "0.1 Ω"


def test_all_faults_are_named_at_once(tmp_path: Path) -> None:
    file = _copy(tmp_path)
    change(file, 'gain = "0.05 %"', "gain = 0.05")
    change(file, "due = 2027-06-15", "due = 2025-06-15")
    change(file, 'label = "IT-5"', 'label = "RM-2"')
    change(file, 'resolution = "1 Mohm"', 'resolution = "1 mohm"')
    change(file, 'test_voltage = "50 V"', 'test_voltage = "50 V"\ncolour = "red"')
    found = faults_of(lambda: load_instruments(file, counter()))
    assert {fault.where for fault in found} == {
        "instruments.toml, instrument[1].range[1].gain",
        "instruments.toml, instrument[1].due",
        "instruments.toml, instrument[2].label",
        "instruments.toml, instrument[2].range[1].resolution",
        "instruments.toml, instrument[2].range[1].colour",
    }


def test_a_slip_in_the_toml_is_told_with_line_and_column(tmp_path: Path) -> None:
    file = _copy(tmp_path)
    change(file, "due = 2027-06-15", "due = ")
    found = faults_of(lambda: load_instruments(file, counter()))
    assert "line" in found[0].what
    assert "column" in found[0].what


def test_an_empty_file_is_told(tmp_path: Path) -> None:
    file = tmp_path / "instruments.toml"
    file.write_text("  \n", encoding="utf-8")
    assert "is empty" in faults_of(lambda: load_instruments(file, counter()))[0].what
