"""The search for defects of a six-wire full bridge, in nodal solves."""

from __future__ import annotations

import numpy as np
import pytest

from gaugelog.physics import transfer
from gaugelog.physics.circuit import circuit_of
from gaugelog.physics.pin_network import ARTICLE, SHIELD, pin_network
from gaugelog.physics.pin_trials import bench_of
from gaugelog.physics.pins import diagnose
from gaugelog.physics.suspects import CEILING
from tests.bench.compare import compare
from tests.physics.planted import Planted, plant, read

pytestmark = [pytest.mark.bench, pytest.mark.xdist_group("bench")]

SIX = circuit_of("full bending", 6, 350.0, 2.0, 3.0)


def _planted() -> Planted:
    draw = np.random.default_rng(21)
    while True:
        planted = plant(draw)
        if planted.circuit.layout.name == "full six-wire" and planted.defect.kind == "leak":
            return planted


def test_a_search_costs_less_than_solving_for_every_defect(
    monkeypatch: pytest.MonkeyPatch,
) -> None:
    """Floor: one bare NumPy inverse of the nodal matrix for each defect that is tried."""
    planted = _planted()
    readings = read(planted, np.random.default_rng(22))
    suspects = bench_of(planted.circuit, 0.001, 0.02, False).suspected
    size = len(pin_network(SIX).nodes) + len((ARTICLE, SHIELD))
    matrix = np.eye(size) * 3.0 + 1.0 / CEILING

    def brute() -> None:
        for _ in suspects:
            np.linalg.inv(matrix)

    result = compare(lambda: diagnose(planted.circuit, readings), brute, repeats=21)
    inversions = _count_inversions(monkeypatch, planted)
    one = result.floor / len(suspects)
    print(
        f"\n{result.line('pin search, six-wire full bridge')}; {len(suspects)} defects tried by "
        f"{inversions} nodal solve; {result.ours / one:.0f} bare solves' time"
    )
    assert 1 == inversions
    assert result.ratio < 10


def _count_inversions(monkeypatch: pytest.MonkeyPatch, planted: Planted) -> int:
    """How many networks one diagnosis solves."""
    solved: list[int] = []
    real = transfer.solve

    def counting(*given: object, **named: object) -> object:
        solved.append(1)
        return real(*given, **named)  # type: ignore[arg-type]

    monkeypatch.setattr("gaugelog.physics.pin_trials.solve", counting)
    diagnose(planted.circuit, read(planted, np.random.default_rng(23)))
    return len(solved)
