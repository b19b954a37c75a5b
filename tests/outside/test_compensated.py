"""What a circuit shows of its gauges' warmth, held to two plain voltage dividers.

Kirchhoff's laws; the factors of the arrangements as in Dally and Riley, Experimental Stress
Analysis, chapter on the Wheatstone bridge (from memory), written out here.
"""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.ledger.circuits import CircuitPlanned, CircuitRow
from gaugelog.rules.compensated import thermal_share
from tests.work.arranged import planned_job
from tests.work.test_arrangements import SKETCHES

FACTORS = {
    "quarter two-wire": 1,
    "half with dummy": 1,
    "half bending": 2,
    "opposite arms": 2,
    "full bending": 4,
    "full torsion of two shear pairs": 4,
}
OHM, GAUGE_FACTOR, WARMTH = 350.0, 2.0, 1e-7


def output(warm: tuple[bool, bool, bool, bool]) -> float:
    """Output over supply when the gauges in these arms read the same small strain."""
    one, two, three, four = (OHM * (1 + GAUGE_FACTOR * WARMTH * each) for each in warm)
    return one / (one + two) - four / (three + four)


@pytest.mark.parametrize("name", FACTORS)
def test_gauges_that_warm_alike_show_what_two_dividers_say(name: str, tmp_path: Path) -> None:
    book = planned_job(tmp_path, SKETCHES[name]).book
    with book.reading() as view:
        (row,) = view.all(CircuitRow)
    circuit = CircuitPlanned.model_validate_json(row.data)
    one, two, three, four = (any(part.grid for part in arm) for arm in circuit.arms)
    shown = output((one, two, three, four)) / (GAUGE_FACTOR * WARMTH / 4) / FACTORS[name]
    assert shown == pytest.approx(thermal_share(circuit, 0.3), abs=1e-5)
