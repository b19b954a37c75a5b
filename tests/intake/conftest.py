"""A plan's folder to spoil: the demo's own files, copied, with a lot in stock."""

from __future__ import annotations

import csv
import io
import itertools
import shutil
from collections.abc import Callable
from pathlib import Path

import pytest

from gaugelog.errors import Fault, Faulty
from gaugelog.intake.plan import PlanFacts, load_plan

DEMO = Path(__file__).parents[1] / "small_job"


def counter() -> Callable[[], str]:
    """Ids that count, so that a test can be repeated."""
    numbers = itertools.count(1)
    return lambda: f"id{next(numbers)}"


@pytest.fixture
def plan(tmp_path: Path) -> Path:
    """A copy of the demo's plan."""
    return Path(shutil.copytree(DEMO / "plan", tmp_path / "plan"))


def understood(folder: Path) -> PlanFacts:
    """The plan in `folder`, with the demo's lot in stock."""
    return load_plan(folder, lots={"L-3504": "lot1"}, new_id=counter())


def faults_of(act: Callable[[], object]) -> tuple[Fault, ...]:
    """The faults that `act` names; it must name some."""
    with pytest.raises(Faulty) as caught:
        act()
    return caught.value.faults


def change(file: Path, old: str, new: str) -> None:
    """Replace the first `old` in a file; it must be there."""
    text = file.read_text(encoding="utf-8")
    assert old in text
    file.write_text(text.replace(old, new, 1), encoding="utf-8")


def set_cell(file: Path, row: int, column: str, value: str) -> None:
    """Change one cell of a CSV file; row 1 is the heading, and gets a column that it lacks."""
    table = list(csv.reader(io.StringIO(file.read_text(encoding="utf-8"))))
    if column not in table[0]:
        for place, line in enumerate(table):
            line.append(column if place == 0 else "")
    table[row - 1][table[0].index(column)] = value
    with file.open("w", encoding="utf-8", newline="") as target:
        csv.writer(target, lineterminator="\n").writerows(table)


def lines_of(act: Callable[[], object]) -> list[str]:
    """The faults that `act` names, each as a person reads it."""
    return [str(fault) for fault in faults_of(act)]


def places_of(act: Callable[[], object]) -> list[str]:
    """The places of the faults that `act` names, in order."""
    return [fault.where for fault in faults_of(act)]


def told(act: Callable[[], object]) -> tuple[Fault, ...] | None:
    """The faults that `act` names, or None when it understands; any other error is a defect."""
    try:
        act()
    except Faulty as error:
        return error.faults
    return None
