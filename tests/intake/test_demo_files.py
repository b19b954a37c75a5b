"""The demo's files: their README says what every column and choice is, and they tell a job."""

from __future__ import annotations

import re
from itertools import chain
from pathlib import Path

import pytest

from gaugelog.intake.campaign import WIRES
from gaugelog.intake.circuits import ARRANGEMENTS
from gaugelog.intake.circuits import COLUMNS as CIRCUITS
from gaugelog.intake.criteria import STAGES
from gaugelog.intake.grids import COLUMNS as GRIDS
from gaugelog.intake.route import shipped_routes
from gaugelog.intake.stock import CONSUMABLE_COLUMNS, LOT_COLUMNS
from gaugelog.intake.typed import parse_quantity

DEMO = Path(__file__).parents[2] / "demo_project"
README = (DEMO / "README.md").read_text(encoding="utf-8")


@pytest.mark.parametrize(
    "column",
    sorted({*GRIDS.known, *CIRCUITS.known, *LOT_COLUMNS.known, *CONSUMABLE_COLUMNS.others}),
)
def test_the_readme_explains_every_column(column: str) -> None:
    explained = column.startswith("arm") or column in {"circuit"}
    assert explained or f"`{column}`" in README


@pytest.mark.parametrize("word", [*STAGES, *WIRES, *ARRANGEMENTS, *shipped_routes()])
def test_the_readme_names_every_choice(word: str) -> None:
    assert word in " ".join(README.split())


def test_every_file_of_the_demo_is_in_the_readme() -> None:
    files = {
        str(path.relative_to(DEMO))
        for path in chain(DEMO.glob("*"), DEMO.glob("*/*"))
        if path.is_file() and path.name != "README.md"
    }
    assert set() == {file for file in files if f"`{file}`" not in README}


@pytest.mark.parametrize(
    "text", [each for each in re.findall(r'`"([^"]+)"`', README) if each[0].isdigit()]
)
def test_quantities_in_the_readme_are_understood(text: str) -> None:
    units = ("GPa", "MPa", "ppm/K", "kg/m3")
    assert parse_quantity(text, units).unit in units
