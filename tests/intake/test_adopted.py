"""Routes that points name: shipped or the planner's own, each read once and told once."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.intake.route import shipped_routes
from tests.intake.conftest import change, lines_of, set_cell, understood

LABEL = "room-temperature-bond-metal"
ROUTE = shipped_routes()[LABEL]


@pytest.fixture
def own(plan: Path) -> Path:
    """A planner's own route with a label of its own, which both points follow."""
    file = plan / "own.toml"
    file.write_bytes(ROUTE.replace(LABEL.encode(), b"own-practice", 1))
    for row in (2, 3):
        set_cell(plan / "grids.csv", row, "route", "own.toml")
    return file


def test_two_points_share_one_route(plan: Path) -> None:
    facts = understood(plan)
    assert 1 == len(facts.routes)
    assert {facts.routes[0].id} == {point.route for point in facts.points}


def test_a_shipped_route_may_be_named_in_any_letter_case(plan: Path) -> None:
    set_cell(plan / "grids.csv", 2, "route", LABEL.upper())
    assert 1 == len(understood(plan).routes)


def test_an_own_route_is_kept_with_the_plans_files(plan: Path, own: Path) -> None:
    facts = understood(plan)
    assert own.read_bytes() == facts.files["own.toml"]
    assert facts.digests["own.toml"] == facts.routes[0].file


def test_an_own_and_a_shipped_route_stand_beside_each_other(plan: Path, own: Path) -> None:
    set_cell(plan / "grids.csv", 2, "route", LABEL)
    facts = understood(plan)
    assert {LABEL, "own-practice"} == {route.label for route in facts.routes}
    assert 6 == len(facts.files)


def test_a_changed_copy_needs_a_label_of_its_own(plan: Path) -> None:
    (plan / "own.toml").write_bytes(ROUTE + b"# changed\n")
    set_cell(plan / "grids.csv", 3, "route", "own.toml")
    (line,) = lines_of(lambda: understood(plan))
    assert line.startswith(f"own.toml: has the label {LABEL}, as")


def test_the_faults_of_a_route_are_told_once_and_each_row_that_names_it(
    plan: Path, own: Path
) -> None:
    change(own, 'edition = "2"', "edition = 2")
    first, second = lines_of(lambda: understood(plan))
    assert first.startswith("own.toml, edition: ")
    assert "grids.csv, row 3, column route: “own.toml” can't be used, as said above." == second


@pytest.mark.parametrize(
    ("named", "what"),
    [
        ("none.toml", "none.toml: can't be read"),
        ("campaign.toml", "“campaign.toml” is no route, but a file of the plan."),
        ("./campaign.toml", "is no route, but a file of the plan."),
        ("../own.toml", "lies outside the plan's folder."),
        ("/etc/own.toml", "lies outside the plan's folder."),
        ("C:\\own.toml", "lies outside the plan's folder."),
        ("cold weld", "no route is called “cold weld”."),
    ],
)
def test_a_route_that_is_none_is_told(plan: Path, named: str, what: str) -> None:
    set_cell(plan / "grids.csv", 2, "route", named)
    (line,) = lines_of(lambda: understood(plan))
    assert what in line
