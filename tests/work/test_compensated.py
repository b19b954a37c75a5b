"""Thermal output by mismatch: shown by a quarter bridge, cancelled by gauges in adjacent arms.

Common practice; the signs are those of the bridge, arms 1 and 3 up, 2 and 4 down.
"""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.ledger.circuits import CircuitPlanned, CircuitRow
from gaugelog.rules.compensated import thermal_share
from gaugelog.rules.fit import PlanFinding
from gaugelog.work import plan
from tests.work.arranged import Sketch, planned_job
from tests.work.test_arrangements import SKETCHES

SHARES = {
    "quarter two-wire": 1.0,
    "half with dummy": 0.0,
    "half bending": 0.0,
    "opposite arms": 1.0,
    "full bending": 0.0,
    "full torsion of two shear pairs": 0.0,
    "rectangular rosette": 1.0,
}


def _found(home: Path, sketch: Sketch) -> tuple[list[float], list[PlanFinding]]:
    """The share of each circuit, and what the plan check says of thermal output."""
    book = planned_job(home, sketch).book
    with book.reading() as view:
        circuits = [CircuitPlanned.model_validate_json(row.data) for row in view.all(CircuitRow)]
    said = [found for found in plan.check(book) if "thermal output" in found.what]
    return [thermal_share(each, 0.3) for each in circuits], said


@pytest.mark.parametrize("name", SHARES)
def test_what_adjacent_arms_cancel_is_no_warning(name: str, tmp_path: Path) -> None:
    shares, said = _found(tmp_path, SKETCHES[name])
    assert {SHARES[name]} == set(shares)
    assert {"warning" if SHARES[name] else "ok"} == {each.level for each in said}
    assert all(("cancels" in each.what) == (not SHARES[name]) for each in said)


def test_grids_along_and_across_cancel_warmth_too(tmp_path: Path) -> None:
    shares, _ = _found(tmp_path, SKETCHES["half Poisson of a tee"])
    assert [0.0] == shares


def test_gauges_of_two_lots_are_not_taken_to_cancel(tmp_path: Path) -> None:
    grids = ("grid A.1", "grid A.2", "grid B.1", "grid B.2")
    mixed = Sketch((("A", "shear pair"), ("B", "tee")), (("full torsion", grids, 4),))
    _, said = _found(tmp_path, mixed)
    assert {"warning"} == {each.level for each in said}
