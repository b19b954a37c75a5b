"""Zero offset predicted from resistances already read; numbers by hand-worked bridge algebra."""

from __future__ import annotations

import pytest

from gaugelog.physics.circuit import circuit_of
from gaugelog.physics.conformity import Words
from gaugelog.rules.zero import ZeroFound, judge_zero


def _found(measured_mv_v: float) -> ZeroFound:
    circuit = circuit_of("quarter three-wire", 3, 351.2, 2.10, wire=1.0, completion=350.00)
    return judge_zero(
        circuit.altered("resistor 3", 350.0).altered("resistor 4", 350.0),
        measured_mv_v * 1e-3,
        setting=2.10,
        predicted_uncertainty=5e-6,
        measured_uncertainty=5e-6,
        least_tolerance=30e-6,
    )


def test_the_zero_follows_from_the_resistances() -> None:
    assert pytest.approx(0.853e-3, abs=0.5e-6) == _found(0.86).predicted
    assert pytest.approx(1625e-6, abs=0.5e-6) == _found(0.86).predicted_strain


def test_a_zero_near_the_predicted_one_passes() -> None:
    found = _found(0.86)
    assert found.judgement.word is Words.PASS
    assert found.hint == ""


def test_the_opposite_zero_is_a_swapped_arm_or_polarity() -> None:
    found = _found(-0.853)
    assert found.judgement.word is Words.FAIL
    assert "swapped arm or polarity" in found.hint


def test_another_zero_says_how_much_resistance_would_explain_it() -> None:
    assert "about 0.70 Ω too much in the gauge arm" in _found(1.35).hint


def test_too_little_resistance_is_told_too() -> None:
    assert "too little in the gauge arm" in _found(0.2).hint
