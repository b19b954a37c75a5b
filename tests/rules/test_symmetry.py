"""Lead symmetry: two wires of a pair, through one gauge on one meter."""

from __future__ import annotations

import pytest

from gaugelog.rules.symmetry import judge_symmetry
from gaugelog.rules.verdicts import Taken
from tests.rules.beside import OHMS, basis, ohms
from tests.rules.test_verdicts import q

LIMIT = basis("lead symmetry", "cabled", at_most=q("0.05", "ohm"))


@pytest.mark.parametrize(
    ("second", "word"),
    [
        ("352.53", "pass"),
        ("352.57", "pass"),
        ("352.49", "pass"),
        ("352.61", "fail"),
        ("352.45", "fail"),
        ("352.58", "conditional pass"),
    ],
)
def test_the_wires_of_a_pair_are_equal_within_a_limit(second: str, word: str) -> None:
    # u of the difference: 0.01/√6 = 0.0041 Ω, and so a guard band of 0.008 Ω.
    assert word == judge_symmetry(LIMIT, "cabled", 352.53, ohms(second)).verdict.word


def test_gain_and_offset_of_the_meter_cancel() -> None:
    found = judge_symmetry(LIMIT, "cabled", 352.53, ohms("352.57")).verdict
    assert found.standard_uncertainty is not None
    assert 0.01 / 6**0.5 == pytest.approx(found.standard_uncertainty.si(), rel=1e-3)


def test_what_the_difference_feigns_is_told() -> None:
    # ΔR α/(K R) = 0.04 · 0.00393/(2 · 350.04) = 0.22 µm/m for each kelvin.
    found = judge_symmetry(LIMIT, "cabled", 352.53, ohms("352.57"))
    assert "0.22 µm/m for each kelvin" in found.verdict.reason
    assert found.result is not None
    assert 0.04 == pytest.approx(found.result.si())


def test_an_open_wire_is_no_difference() -> None:
    found = judge_symmetry(LIMIT, "cabled", 352.53, Taken(None, "overload", OHMS))
    assert ("undecided", True) == (found.verdict.word, found.verdict.blocks)
