"""Press: a gauge answers and comes back. The module steps by 0.1 µm/m, so u = 0.1/√6 = 0.041."""

from __future__ import annotations

import pytest

from gaugelog.rules.press import Pressed, judge_press
from gaugelog.rules.verdicts import Judged, Taken
from tests.rules.beside import STRAIN, basis, strain
from tests.rules.test_verdicts import q

LIMIT = basis("press", at_most=q("5", "um/m"))


def _judged(before: float, pressed: float, after: str) -> Judged:
    return judge_press(LIMIT, "on channel", Pressed(before * 1e-6, pressed * 1e-6), strain(after))


def test_a_gauge_that_comes_back_passes_with_its_answer_told() -> None:
    found = _judged(0.2, 41.5, "0.6")
    assert "pass" == found.verdict.word
    assert found.result is not None
    assert 0.4 == pytest.approx(found.result.to("um/m"))
    assert "Pressed, it moved by 41.3 µm/m." in found.verdict.reason
    # One module on one range: (0.1 µm/m)/√6 and 0.05 % of 0.4 µm/m over √3.
    assert found.verdict.standard_uncertainty is not None
    assert 0.0408 == pytest.approx(found.verdict.standard_uncertainty.to("um/m"), rel=2e-3)


@pytest.mark.parametrize(("after", "word"), [("12", "fail"), ("-12", "fail"), ("5", "pass")])
def test_a_zero_that_stays_away_fails_either_way(after: str, word: str) -> None:
    assert word == _judged(0.1, 60, after).verdict.word


def test_a_zero_that_stays_away_tells_of_a_void() -> None:
    assert "void" in _judged(0, 60, "12").verdict.reason
    assert "void" not in _judged(0, 60, "1").verdict.reason


def test_a_gauge_that_does_not_answer_is_not_on_this_channel() -> None:
    found = _judged(0.2, 0.2, "0.2")
    assert ("fail", True) == (found.verdict.word, found.verdict.blocks)
    assert "did not answer" in found.verdict.reason


def test_an_answer_smaller_than_the_return_allowed_proves_nothing() -> None:
    found = _judged(0, 4, "0")
    assert "undecided" == found.verdict.word
    assert "press again" in found.verdict.reason


def test_an_overload_after_pressing_is_no_zero() -> None:
    found = judge_press(LIMIT, "on channel", Pressed(0, 40e-6), Taken(None, "overload", STRAIN))
    assert "undecided" == found.verdict.word


def test_without_a_limit_the_return_is_recorded() -> None:
    found = judge_press(
        basis("noise", at_most=q("1", "um/m")), "on channel", Pressed(0, 40e-6), strain("9")
    )
    assert "pass" == found.verdict.word
    assert "no limit" in found.verdict.reason
