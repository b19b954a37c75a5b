"""A plan with a fault in nearly every cell: all are named to their place in one go."""

from __future__ import annotations

from pathlib import Path

import pytest

from tests.intake.conftest import change, places_of, set_cell, understood
from tests.intake.test_workbook import table_of, xlsx

CAMPAIGN = {
    'label = "TARN-BRIDGE"': ('label = "TARN BRIDGE"', "campaign.label"),
    'title = "Load test of the Tarnwick footbridge"': ("title = 7", "campaign.title"),
    'client = "Borough': ('customer = "Borough', "campaign.client"),
    'surroundings = "field"': ('surroundings = "moon"', "campaign.surroundings"),
    'label = "girder"': ('label = "main/girder"', "article[1].label"),
    'drawing = "TW-2217-S-014"': ("drawing = 2026-01-01", "article[1].drawing"),
    'drawing_revision = "C"': ("", "article[1].drawing_revision"),
    'modulus = "206 GPa"': ('modulus = "206"', "article[1].material.modulus"),
    "poisson_ratio = 0.3": ("poisson_ratio = 3", "article[1].material.poisson_ratio"),
    'expansion = "11.7 ppm/K"': ("expansion = 11.7", "article[1].material.expansion"),
    '"7850 kg/m3"': ('"7850 kg"', "article[1].material.density"),
    'source = "client': ("source = true #", "article[1].material.source"),
    '"80 degC"': ('"hot"', "article[1].surface.largest_process_temperature"),
    '["chlorinated solvents"]': ('"chlorinated"', "article[1].surface.forbidden_cleaners"),
    'label = "support"': ('label = "Midspan"', "article[1].zone[2].label"),
    'serial = "QB4-00317"': ("serial = 317", "module[1].serial"),
    'excitation = "2.5 V"': ('excitation = "-2.5 V"', "module[1].channel[1].excitation"),
    'range = "10 mV/V"': ('range = "10,5 mV/V"', "module[1].channel[1].range"),
    'completion = "350 ohm"\n': (
        'completion = "350 mohm"\n',
        "module[1].channel[1].completion",
    ),
    'label = "2"': ('label = "1"', "module[1].channel[2].label"),
}
CRITERIA = {
    "coverage = 2": ("coverage = 20", "decision.coverage"),
    '"goes on"': ('"maybe"', "decision.conditional_pass"),
    'conditional_fail = "blocks"': ("", "decision.conditional_fail"),
    'source = "lot certificate"': ("", "check[1].source"),
    'at_most = "0.3 %"': ("at_most = 0.3", "check[2].at_most"),
    'expected = "20 Gohm"': ('expected = "20 mohm"', "check[3].expected"),
    'largest_test_voltage = "50 V"': (
        'largest_test_voltage = "50 A"',
        "check[3].largest_test_voltage",
    ),
    'physics = ["permitted error"]': ('physics = ["luck"]', "check[3].physics"),
}
GRIDS = {
    (2, "point"): "FB 1",
    (2, "purpose"): "",
    (2, "load"): "sometimes",
    (2, "strain_min_um_per_m"): "nan",
    (2, "strain_max_um_per_m"): "1e99",
    (2, "temperature_min_degC"): "-300",
    (2, "temperature_max_degC"): "35,5",
    (2, "permitted_error_um_per_m"): "0",
    (2, "x_mm"): "12 mm",
    (2, "place_tolerance_mm"): "-1",
    (2, "axis_tolerance_deg"): "none",
    (2, "lot"): "L-0000",
    (2, "route"): "cold-weld",
    (3, "strain_max_um_per_m"): "-301",
    (3, "temperature_max_degC"): "-6",
    (3, "datum"): "x" * 501,
    (3, "axis_deg"): "",
}
CIRCUITS = {
    (2, "circuit"): "C 1",
    (2, "arrangement"): "octopus",
    (2, "arm2"): "module 350",
    (2, "arm3"): "coil 5 ohm",
    (2, "arm4"): "",
    (2, "wires"): "three",
    (2, "length_m"): "0",
    (2, "wire_ohm_per_m"): "0,055",
    (2, "marks"): "earth=W9",
    (3, "arm1"): "grid FB-7",
    (3, "arm2"): "module 350 mohm",
    (3, "wires"): "99",
    (3, "length_m"): "",
    (3, "channel"): "9",
    (3, "cable"): "CB 19",
}


def _as_workbook(file: Path) -> None:
    """The table as a spreadsheet in its place, numbers as numbers where they are."""
    file.with_suffix(".xlsx").write_bytes(xlsx(table_of(file)))
    file.unlink()


@pytest.mark.parametrize("kind", ["csv", "xlsx"])
def test_sixty_faults_of_four_files_are_each_named_to_their_place(plan: Path, kind: str) -> None:
    expected = set()
    for name, slips in (("campaign.toml", CAMPAIGN), ("criteria.toml", CRITERIA)):
        for before, (after, key) in slips.items():
            change(plan / name, before, after)
            expected.add(f"{name}, {key}")
    for name, cells in (("grids.csv", GRIDS), ("circuits.csv", CIRCUITS)):
        for (row, column), text in cells.items():
            set_cell(plan / name, row, column, text)
            expected.add(f"{name.replace('csv', kind)}, row {row}, column {column}")
        if kind == "xlsx":
            _as_workbook(plan / name)
    found = places_of(lambda: understood(plan))
    assert 60 == len(expected)
    assert set() == expected - set(found)
    # What follows from a fault, not a fault of its own: the key that was misspelt, and labels
    # that lead nowhere because the label itself is faulty.
    consequences = set(found) - expected
    assert {
        "campaign.toml, campaign.customer",
        f"grids.{kind}, row 2, column article",
        f"grids.{kind}, row 3, column article",
        f"grids.{kind}, row 3, column zone",
        f"circuits.{kind}, row 2, column arm1",
    } >= consequences, consequences
