"""Limits with verdicts, a thousand at a time, against the bare formulas."""

from __future__ import annotations

import math

import pytest

from gaugelog.physics.change import instrument_uncertainty
from gaugelog.physics.conformity import Judgement, Limits, judge
from gaugelog.physics.leakage import insulation_needed
from tests.bench.compare import compare

READINGS = [(8.0 + step * 0.08) * 1e6 for step in range(1000)]
GRID, FACTOR, PERMITTED = 350.0, 2.1, 10e-6


def _ours() -> list[Judgement]:
    """What a permitted error asks of the insulation, the meter's share, and the word."""
    return [
        judge(
            value,
            instrument_uncertainty(value, 0.1, 0.0, 1e4),
            Limits(insulation_needed(GRID, FACTOR, PERMITTED), None),
        )
        for value in READINGS
    ]


def _bare() -> list[tuple[str, float]]:
    """The same arithmetic without a check, a name or a reason."""
    found = []
    for value in READINGS:
        limit = GRID * (1 / (FACTOR * PERMITTED) - 1)
        u = math.sqrt((value * 0.1) ** 2 / 3 + 1e4**2 / 12)
        margin, width = value - limit, 2 * u
        if margin >= width:
            word = "pass"
        elif margin >= 0:
            word = "conditional pass"
        else:
            word = "conditional fail" if margin >= -width else "fail"
        found.append((word, 0.5 * math.erfc(-margin / u / math.sqrt(2))))
    return found


@pytest.mark.bench
@pytest.mark.xdist_group("bench")
def test_a_thousand_verdicts_are_checked_named_and_explained_at_a_stated_price(
    capsys: pytest.CaptureFixture[str],
) -> None:
    for ours, (word, probability) in zip(_ours(), _bare(), strict=True):
        assert word == ours.word.value
        assert probability == pytest.approx(ours.probability)
    found = compare(_ours, _bare, repeats=15)
    with capsys.disabled():
        print(f"\n{found.line('a thousand limits with verdicts')}")
    assert found.ours < 0.05
