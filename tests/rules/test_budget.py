"""A point's budget takes of warmth what its circuit shows, and of insulation what is its own."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.ledger.circuits import CircuitRow
from gaugelog.rules.budget import PointBudget, point_budget
from gaugelog.work import steps
from gaugelog.work.logbook import Logbook
from tests.work.job import INSULATION
from tests.work.test_arrangements import walk


def _budget(book: Logbook, label: str = "A") -> PointBudget:
    with book.reading() as view:
        row = view.point(label)
        assert row is not None
        found = point_budget(view, row)
    assert found is not None
    return found


def _input(found: PointBudget, name: str) -> float:
    part = next(each for each in found.budget.parts if each.name == name)
    return part.estimate.uncertainty


def _told(found: PointBudget) -> str:
    return next(each.value for each in found.corrections if "thermal" in each.name)


@pytest.mark.parametrize("name", ["half bending", "half with dummy"])
def test_what_cancels_in_the_correction_is_nothing_in_the_budget(tmp_path: Path, name: str) -> None:
    found = _budget(walk(tmp_path, name).job.book)
    assert "cancels" == _told(found)
    assert "thermal" not in {each.name for each in found.budget.parts}


@pytest.mark.parametrize("name", ["quarter three-wire", "opposite arms"])
def test_what_does_not_cancel_counts_whole(tmp_path: Path, name: str) -> None:
    """(11.7 − 11) ppm/K over 20 K is 14 µm/m; two opposite arms over a factor of two as much."""
    found = _budget(walk(tmp_path, name).job.book)
    assert 14e-6 / 3**0.5 == pytest.approx(_input(found, "thermal"), rel=1e-3)


def test_the_insulation_of_another_grid_does_not_count(tmp_path: Path) -> None:
    """16 GΩ at the third grid is not the first's, 18 GΩ: 27.8 pS ± 27.8 pS (JCGM 100, 4.3.7)."""
    job = walk(tmp_path, "rectangular rosette").job
    steps.redo(job.book, job.keys["t.okoro"], point="A", step="coated", reason="once more")
    for value in ("18 GΩ", "17 GΩ", "16 GΩ"):
        job.do("t.okoro", {**INSULATION, "insulation": value}, "A", reason="once more")
    assert 27.78e-12 / 3**0.5 == pytest.approx(_input(_budget(job.book), "leak"), rel=1e-3)


def test_the_insulation_of_the_circuit_counts_wherever_it_was_taken(tmp_path: Path) -> None:
    """What was read at B of the circuit that both share, 18 GΩ, is known to A's budget too."""
    book = walk(tmp_path, "half bending").job.book
    with book.reading() as view:
        (circuit,) = view.all(CircuitRow)
        ids = {label: row.id for label in "AB" if (row := view.point(label)) is not None}
    with book.storage.writing() as writer:
        # No shipped route reads it of a circuit; one of a planner's own may.
        writer.connection.execute(
            "UPDATE reading SET latest = 0 WHERE point = ? AND \"check\" = 'insulation'",
            (ids["A"],),
        )
        writer.connection.execute(
            "UPDATE reading SET subject = ? WHERE point = ? AND stage = 'coated'",
            (circuit.id, ids["B"]),
        )
    assert 27.78e-12 / 3**0.5 == pytest.approx(_input(_budget(book), "leak"), rel=1e-3)
