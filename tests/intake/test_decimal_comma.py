"""A decimal comma, wherever a number is asked for, is told with the number as it should be."""

from __future__ import annotations

import csv
import re
import shutil
import tomllib
from collections.abc import Iterator
from pathlib import Path
from typing import Any

import pytest

from gaugelog.intake.instruments import load_instruments
from gaugelog.intake.stock import load_stock
from tests.intake.conftest import DEMO, change, counter, lines_of, set_cell, understood

NUMBER = re.compile(r"-?\d+(\.\d+)?", re.ASCII)
TOML = ("campaign.toml", "criteria.toml")
WHOLE = {"pieces", "wires"}


def _number_columns(file: Path) -> list[tuple[int, str, str]]:
    """Row, column and value of the first number in each column that holds numbers."""
    with file.open(encoding="utf-8", newline="") as stream:
        rows = list(csv.DictReader(stream))
    found: dict[str, tuple[int, str, str]] = {}
    for number, row in enumerate(rows, start=2):
        for column, cell in row.items():
            if NUMBER.fullmatch(cell or "") and column not in {"channel", "grid", *WHOLE}:
                found.setdefault(column, (number, column, cell))
    return list(found.values())


def _cells(folder: Path, *names: str) -> Iterator[tuple[str, int, str]]:
    for name in names:
        for row, column, _ in _number_columns(folder / name):
            yield name, row, column


@pytest.mark.parametrize(
    ("name", "row", "column"), list(_cells(DEMO / "plan", "grids.csv", "circuits.csv"))
)
def test_in_a_table_of_the_plan(plan: Path, name: str, row: int, column: str) -> None:
    set_cell(plan / name, row, column, "2,08")
    where = f"{name}, row {row}, column {column}: "
    assert f"{where}“2,08” has a decimal comma. Write 2.08." in lines_of(lambda: understood(plan))


@pytest.mark.parametrize(
    ("name", "row", "column"), list(_cells(DEMO, "lots.csv", "consumables.csv"))
)
def test_in_a_table_of_stock(tmp_path: Path, name: str, row: int, column: str) -> None:
    file = Path(shutil.copy(DEMO / name, tmp_path / name))
    set_cell(file, row, column, "2,08")
    found = lines_of(lambda: load_stock([file], new_id=counter()))
    assert any(
        line.startswith(f"{name}, row {row}, column {column}: ")
        and ("Write 2.08." in line or "no commas" in line)
        for line in found
    ), found


def _quantities(value: Any) -> Iterator[str]:
    """Each different quantity with its unit in a TOML file."""
    if isinstance(value, dict):
        for each in value.values():
            yield from _quantities(each)
    elif isinstance(value, list):
        for each in value:
            yield from _quantities(each)
    elif isinstance(value, str) and re.fullmatch(r"-?\d+(\.\d+)? [a-zA-Z%/0-9]+", value):
        yield value


def _of(file: Path) -> list[str]:
    return sorted(set(_quantities(tomllib.loads(file.read_text(encoding="utf-8")))))


@pytest.mark.parametrize(
    ("name", "typed"),
    [
        (name, each)
        for name in ("campaign.toml", "criteria.toml")
        for each in _of(DEMO / "plan" / name)
    ],
)
def test_in_a_quantity_of_the_plan(plan: Path, name: str, typed: str) -> None:
    number, unit = typed.split(" ", 1)
    change(plan / name, f'"{typed}"', f'"{number.partition(".")[0]},25 {unit}"')
    expected = f"Type a decimal point: {number.partition('.')[0]}.25 {unit}."
    assert any(expected in line for line in lines_of(lambda: understood(plan)))


@pytest.mark.parametrize("typed", _of(DEMO / "instruments.toml"))
def test_in_a_quantity_of_an_instrument(tmp_path: Path, typed: str) -> None:
    file = Path(shutil.copy(DEMO / "instruments.toml", tmp_path / "instruments.toml"))
    number, unit = typed.split(" ", 1)
    change(file, f'"{typed}"', f'"{number.partition(".")[0]},25 {unit}"')
    expected = f"Type a decimal point: {number.partition('.')[0]}.25 {unit}."
    found = lines_of(lambda: load_instruments(file, new_id=counter()))
    assert any(expected in line for line in found), found
