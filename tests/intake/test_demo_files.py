"""The demo's files: their README says what every column and choice is, and they tell a job."""

from __future__ import annotations

import re
import shutil
from itertools import chain
from pathlib import Path

import pytest

from gaugelog.intake.campaign import WIRES
from gaugelog.intake.circuits import ARRANGEMENTS
from gaugelog.intake.circuits import COLUMNS as CIRCUITS
from gaugelog.intake.consumables import CONSUMABLE_COLUMNS
from gaugelog.intake.criteria import STAGES
from gaugelog.intake.grids import COLUMNS as GRIDS
from gaugelog.intake.lots import LOT_COLUMNS
from gaugelog.intake.plan import load_plan
from gaugelog.intake.route import shipped_routes
from gaugelog.intake.stock import load_stock
from gaugelog.intake.typed import parse_quantity
from tests.intake.conftest import counter
from tests.intake.test_workbook import table_of, xlsx

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


def _as_spreadsheet(file: Path) -> None:
    """The table as a spreadsheet program saves it, numbers as numbers, in place of the text."""
    file.with_suffix(".xlsx").write_bytes(xlsx(table_of(file)))
    file.unlink()


def test_the_plan_saved_as_spreadsheets_loads_the_same(tmp_path: Path) -> None:
    stock = load_stock([DEMO / "lots.csv"], counter())
    lots = {lot.label: lot.id for lot in stock.lots}
    from_text = load_plan(DEMO / "plan", lots=lots, new_id=counter())
    folder = Path(shutil.copytree(DEMO / "plan", tmp_path / "plan"))
    for name in ("grids", "circuits"):
        _as_spreadsheet(folder / f"{name}.csv")
    from_sheets = load_plan(folder, lots=lots, new_id=counter())
    assert (15, 14) == (len(from_text.points), len(from_text.circuits))
    assert from_text.points == from_sheets.points
    assert from_text.circuits == from_sheets.circuits
    assert from_text.campaign == from_sheets.campaign


def test_the_stock_saved_as_spreadsheets_loads_the_same(tmp_path: Path) -> None:
    names = ("lots.csv", "consumables.csv")
    from_text = load_stock([DEMO / name for name in names], counter())
    for name in names:
        shutil.copy(DEMO / name, tmp_path)
        _as_spreadsheet(tmp_path / name)
    sheets = [(tmp_path / name).with_suffix(".xlsx") for name in names]
    assert from_text == load_stock(sheets, counter())
