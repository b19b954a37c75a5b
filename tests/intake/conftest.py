"""A plan's folder to spoil: the demo's own files, copied, with a lot in stock."""

from __future__ import annotations

import itertools
import shutil
from collections.abc import Callable
from pathlib import Path

import pytest

from gaugelog.errors import Fault, Faulty
from gaugelog.intake.plan import PlanFacts, load_plan

DEMO = Path(__file__).parents[2] / "demo_project"


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
