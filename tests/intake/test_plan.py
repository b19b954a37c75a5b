"""A plan's four files: understood together, every fault of all of them named to its cell."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.intake.plan import load_plan
from tests.intake.conftest import change, counter, faults_of, lines_of, set_cell, understood


def test_the_demos_plan_is_understood(plan: Path) -> None:
    facts = understood(plan)
    assert [point.label for point in facts.points] == ["FB-1", "FB-2"]
    assert facts.points[0].lot == "lot1"
    assert facts.points[0].article == facts.campaign.articles[0].id
    assert facts.points[0].route == facts.routes[0].id
    assert facts.circuits[0].grids == (facts.points[0].grids[0].id,)
    assert facts.circuits[0].leads.marks["signal+"] == "W2"
    assert set(facts.digests) == set(facts.files)


def test_references_that_lead_nowhere_are_named(plan: Path) -> None:
    change(plan / "grids.csv", "FB-1,girder,midspan", "FB-1,girdle,midspan")
    change(plan / "grids.csv", "FB-2,girder,support", "FB-2,girder,nowhere")
    change(plan / "grids.csv", "L-3504", "L-9999")
    change(plan / "circuits.csv", "grid FB-1", "grid FB-7")
    change(plan / "circuits.csv", "M1,2", "M1,9")
    where = {fault.where for fault in faults_of(lambda: understood(plan))}
    assert where == {
        "grids.csv, row 2, column article",
        "grids.csv, row 2, column lot",
        "grids.csv, row 3, column zone",
        "circuits.csv, row 2, column arm1",
        "circuits.csv, row 3, column channel",
    }


def test_files_that_are_missing_are_all_named(plan: Path) -> None:
    (plan / "criteria.toml").unlink()
    (plan / "circuits.csv").unlink()
    where = [fault.where for fault in faults_of(lambda: understood(plan))]
    assert where == ["criteria.toml", "circuits.csv"]


def test_a_file_that_is_no_folder_is_told(tmp_path: Path) -> None:
    assert "is no folder" in faults_of(lambda: understood(tmp_path / "none"))[0].what


def test_columns_missing_unknown_and_double_are_named(plan: Path) -> None:
    change(plan / "grids.csv", "point,article,zone", "point,article,colour,point")
    found = faults_of(lambda: understood(plan))
    told = [fault.what for fault in found if fault.where.startswith("grids.csv")]
    assert "has no column zone." in told
    assert "“colour” is no column." in told
    assert "point stands twice." in told


@pytest.mark.parametrize(
    ("old", "new", "column"),
    [
        (",-50,600,", ",600,-50,", "strain_max_um_per_m"),
        (",-5,35,5,", ",35,-5,5,", "temperature_max_degC"),
        (",-5,35,5,", ",-5,35,0,", "permitted_error_um_per_m"),
        (",-5,35,5,", ",-5,35,nan,", "permitted_error_um_per_m"),
        (",-5,35,5,", ',-5,"35,5",5,', "temperature_max_degC"),
        ("static", "sometimes", "load"),
        ("FB-1,", "FB 1,", "point"),
        ("FB-2,", "fb-1,", "point"),
        (",0,1,2,L", ",0,-1,2,L", "place_tolerance_mm"),
    ],
)
def test_a_slip_in_a_cell_is_named_to_its_column(
    plan: Path, old: str, new: str, column: str
) -> None:
    change(plan / "grids.csv", old, new)
    where = {
        fault.where.rsplit(", column ", 1)[-1] for fault in faults_of(lambda: understood(plan))
    }
    assert column in where


@pytest.mark.parametrize(
    ("old", "new", "place"),
    [
        ('"206 GPa"', "206", "article[1].material.modulus"),
        ('"206 GPa"', '"206 furlongs"', "article[1].material.modulus"),
        ('surroundings = "field"', 'surroundings = "moon"', "campaign.surroundings"),
        ('range = "10 mV/V"', 'range = "10 V"', "module[1].channel[1].range"),
        ('label = "2"', 'label = "1"', "module[1].channel[2].label"),
        ('client = "', 'customer = "', "campaign.client"),
    ],
)
def test_a_slip_in_the_campaign_is_named_to_its_key(
    plan: Path, old: str, new: str, place: str
) -> None:
    change(plan / "campaign.toml", old, new)
    assert f"campaign.toml, {place}" in {
        fault.where for fault in faults_of(lambda: understood(plan))
    }


@pytest.mark.parametrize(
    ("old", "new", "place"),
    [
        ("coverage = 2", "coverage = 9", "decision.coverage"),
        ('"goes on"', '"perhaps"', "decision.conditional_pass"),
        ('at_most = "0.3 %"', "at_most = 0.3", "check[2].at_most"),
        ('physics = ["lot tolerance"]', 'physics = ["magic"]', "check[1].physics"),
        ('physics = ["lot tolerance"]', "", "check[1].at_least"),
        ('surroundings = "field"', 'surroundings = "laboratory"', "check[4].kind"),
        ('source = "lot certificate"', "", "check[1].source"),
    ],
)
def test_a_slip_in_the_criteria_is_named_to_its_key(
    plan: Path, old: str, new: str, place: str
) -> None:
    change(plan / "criteria.toml", old, new)
    assert f"criteria.toml, {place}" in {
        fault.where for fault in faults_of(lambda: understood(plan))
    }


def test_a_label_that_is_faulty_is_looked_up_nowhere(plan: Path) -> None:
    for column in ("article", "zone", "lot", "route"):
        set_cell(plan / "grids.csv", 2, column, "")
    where = [fault.where for fault in faults_of(lambda: understood(plan))]
    assert sorted(where) == sorted(
        f"grids.csv, row 2, column {column}" for column in ("article", "zone", "lot", "route")
    )


def test_of_many_names_that_would_fit_only_the_first_are_listed(plan: Path) -> None:
    set_cell(plan / "grids.csv", 2, "lot", "L-0000")
    lots = {f"L-{number}": "id" for number in range(3000, 4000)}
    (line,) = lines_of(lambda: load_plan(plan, lots=lots, new_id=counter()))
    assert "L-3011 … (1000 in all)" in line
    assert len(line) < 250
