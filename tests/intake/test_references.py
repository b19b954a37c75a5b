"""References with their known values, and the criteria that ask for a check of meters."""

from __future__ import annotations

from pathlib import Path

from gaugelog.intake.criteria import read_criteria
from gaugelog.intake.instruments import load_instruments
from gaugelog.ledger.campaign import CriteriaAgreed
from tests.intake.conftest import DEMO, counter, faults_of

BOX = """[[instrument]]
label = "RB-1"
type = "decade resistor"
maker = "Corriemoor Instruments"
serial = "11-2001"
certificate_number = "CAL-26-0700"
calibrated_by = "Dunmarrow Calibration Laboratory"
calibrated_on = 2026-06-15
due = 2027-06-15
"""
VALUE = (
    '[[instrument.value]]\nquantity = "resistance"\nvalue = "350 ohm"\nuncertainty = "0.02 ohm"\n'
)


def _file(folder: Path, text: str) -> Path:
    path = folder / "references.toml"
    path.write_text(text, encoding="utf-8")
    return path


def criteria(shift: str) -> CriteriaAgreed:
    """The small job's criteria with this text about checks of meters."""
    data = (DEMO / "plan" / "criteria.toml").read_text(encoding="utf-8") + shift
    faults: list[object] = []
    found = read_criteria("criteria.toml", data.encode(), "c", counter(), faults)  # type: ignore[arg-type]
    assert [] == faults
    return found


def test_a_reference_has_known_values_and_needs_no_range(tmp_path: Path) -> None:
    (box,) = load_instruments(_file(tmp_path, BOX + VALUE + VALUE + "coverage = 3\n"), counter())
    assert () == box.ranges
    assert [("350 Ω", "0.02 Ω", "2"), ("350 Ω", "0.02 Ω", "3")] == [
        (str(each.value), str(each.uncertainty), each.coverage) for each in box.values
    ]


def test_what_has_neither_range_nor_value_is_told(tmp_path: Path) -> None:
    (fault,) = faults_of(lambda: load_instruments(_file(tmp_path, BOX), counter()))
    assert "references.toml, instrument[1].range" == fault.where


def test_every_slip_of_a_known_value_is_told(tmp_path: Path) -> None:
    text = VALUE.replace("0.02 ohm", "0 ohm").replace('"350 ohm"', "350") + 'colour = "red"\n'
    found = faults_of(lambda: load_instruments(_file(tmp_path, BOX + text), counter()))
    assert {"value", "uncertainty", "colour"} == {each.where.rpartition(".")[2] for each in found}


def test_criteria_may_ask_for_a_check_of_meters() -> None:
    demand = criteria(
        '\n[shift_check]\nwithin = "12 h"\nof = ["resistance"]\nsource = "common practice"\n'
    ).shift_check
    assert demand is not None
    assert ("12 h", ("resistance",)) == (str(demand.within), demand.of)
    assert criteria("").shift_check is None


def test_slips_in_what_criteria_ask_of_meters_are_told_at_once() -> None:
    data = (DEMO / "plan" / "criteria.toml").read_text(encoding="utf-8")
    data += '\n[shift_check]\nwithin = "12 V"\nof = ["torque"]\nfrom = "x"\n'
    faults: list[object] = []
    read_criteria("criteria.toml", data.encode(), "c", counter(), faults)  # type: ignore[arg-type]
    where = {str(fault).partition(":")[0].rpartition(".")[2] for fault in faults}
    assert {"within", "of", "from", "source"} == where
