"""Points with several grids, and dummies: a row a grid, the same point in each row."""

from __future__ import annotations

from pathlib import Path

import pytest

from tests.intake.conftest import change, lines_of, set_cell, understood

PATTERNED = {"pattern": "rectangular", "numbering": "counter-clockwise", "seen_from": "gauge side"}
"""What the first row of a rosette says besides its point."""


def rosette(plan: Path, count: int = 3, **cells: str) -> Path:
    """The plan with a rosette at FB-1: a row a grid, the later ones with nothing but the number."""
    file = plan / "grids.csv"
    for column, cell in ({"grid": "1"} | PATTERNED | cells).items():
        set_cell(file, 2, column, cell)
    for number in range(2, count + 1):
        text = file.read_text(encoding="utf-8")
        commas = text.partition("\n")[0].count(",")
        file.write_text(f"{text}FB-1{',' * commas}\n", encoding="utf-8")
        set_cell(file, 2 + number, "grid", str(number))
    for number in range(1, count + 1):
        set_cell(plan / "circuits.csv", 2, f"arm{number}", f"grid FB-1.{number}")
    return plan


def test_a_point_has_a_row_for_each_grid(plan: Path) -> None:
    point = understood(rosette(plan)).points[0]
    assert ["FB-1.1", "FB-1.2", "FB-1.3"] == [grid.label for grid in point.grids]
    assert [1, 2, 3] == [grid.number for grid in point.grids]
    assert ("rectangular", "counter-clockwise", "gauge side") == (
        point.pattern,
        point.numbering,
        point.seen_from,
    )


def test_a_point_of_one_grid_is_what_it_was(plan: Path) -> None:
    point = understood(plan).points[0]
    assert ["FB-1"] == [grid.label for grid in point.grids]
    assert ("single", "", "", False) == (
        point.pattern,
        point.numbering,
        point.seen_from,
        point.dummy,
    )


def test_arms_name_the_grids_of_a_point(plan: Path) -> None:
    facts = understood(rosette(plan))
    wired = [arm[0].grid for arm in facts.circuits[0].arms[:3]]
    assert [grid.id for grid in facts.points[0].grids] == wired


def test_an_arm_that_names_a_whole_rosette_is_told_its_grids(plan: Path) -> None:
    set_cell(rosette(plan) / "circuits.csv", 2, "arm1", "grid FB-1")
    (line,) = lines_of(lambda: understood(plan))
    assert "no grid “FB-1”. The grids of that point are FB-1.1, FB-1.2, FB-1.3" in line


def test_the_rows_of_a_point_may_stand_in_any_order(plan: Path) -> None:
    rosette(plan)
    for row, number in ((2, "3"), (4, "1"), (5, "2")):
        set_cell(plan / "grids.csv", row, "grid", number)
    point = understood(plan).points[0]
    assert ["FB-1.1", "FB-1.2", "FB-1.3"] == [grid.label for grid in point.grids]


def test_a_later_row_that_repeats_the_point_is_understood(plan: Path) -> None:
    set_cell(rosette(plan) / "grids.csv", 4, "permitted_error_um_per_m", "5.0")
    set_cell(plan / "grids.csv", 4, "numbering", "Counter-clockwise")
    assert understood(plan).points[0].permitted_error.value == "5"


@pytest.mark.parametrize(
    ("column", "cell"),
    [
        ("zone", "support"),
        ("strain_max_um_per_m", "700"),
        ("permitted_error_um_per_m", "6"),
        ("pattern", "delta"),
        ("numbering", "clockwise"),
        ("lot", "L-1"),
    ],
)
def test_a_later_row_that_says_something_else_is_told(plan: Path, column: str, cell: str) -> None:
    set_cell(rosette(plan) / "grids.csv", 4, column, cell)
    (line,) = lines_of(lambda: understood(plan))
    assert line.startswith(f"grids.csv, row 4, column {column}: differs from grids.csv, row 2")


@pytest.mark.parametrize(
    ("row", "column", "cell", "what"),
    [
        (4, "grid", "1", "1 stands twice. First at grids.csv, row 2."),
        (4, "grid", "", "column grid: is missing."),
        (4, "grid", "two", "“two” is no whole number."),
        (2, "pattern", "tee", "is tee, which has 2 grids; the point has 3 rows."),
        (2, "pattern", "", "is single, which has 1 grid; the point has 3 rows."),
        (2, "numbering", "", "are numbered one way round. Say counter-clockwise or clockwise."),
        (2, "numbering", "left", "“left” is not one of counter-clockwise, clockwise."),
        (2, "seen_from", "", "Say gauge side or other side."),
    ],
)
def test_grids_that_do_not_make_up_the_pattern_are_told(
    plan: Path, row: int, column: str, cell: str, what: str
) -> None:
    set_cell(rosette(plan) / "grids.csv", row, column, cell)
    assert any(what in line for line in lines_of(lambda: understood(plan)))


def test_a_pattern_with_too_few_rows_is_told(plan: Path) -> None:
    set_cell(plan / "grids.csv", 2, "pattern", "tee")
    (line,) = lines_of(lambda: understood(plan))
    assert "column pattern: is tee, which has 2 grids; the point has one row." in line


def test_the_same_label_without_numbers_stands_twice(plan: Path) -> None:
    set_cell(plan / "grids.csv", 3, "point", "fb-1")
    lines = lines_of(lambda: understood(plan))
    assert lines[0].startswith("grids.csv, row 3, column point: “FB-1” stands twice.")
    assert not any("differs" in line for line in lines)


def test_a_point_called_like_a_grid_of_another_is_told(plan: Path) -> None:
    set_cell(rosette(plan) / "grids.csv", 3, "point", "FB-1.2")
    set_cell(plan / "circuits.csv", 3, "arm1", "grid FB-1.2")
    lines = lines_of(lambda: understood(plan))
    assert ["grids.csv, row 3, column point: “FB-1.2” is a grid of FB-1 too."] == [
        line.partition(" Call")[0] for line in lines
    ]


def test_a_dummy_says_so_and_feels_no_strain(plan: Path) -> None:
    set_cell(plan / "grids.csv", 3, "dummy", "yes")
    told = lines_of(lambda: understood(plan))
    assert [
        "grids.csv, row 3, column strain_min_um_per_m: -300 µm/m for a dummy, which lies where "
        "there is no strain. Give 0, or say no in the column dummy.",
        "grids.csv, row 3, column strain_max_um_per_m: 300 µm/m for a dummy, which lies where "
        "there is no strain. Give 0, or say no in the column dummy.",
    ] == told
    change(plan / "grids.csv", ",-300,300,", ",0,0,")
    assert [False, True] == [point.dummy for point in understood(plan).points]
