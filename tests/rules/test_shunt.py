"""A shunt's reading depends on where it lies; trap 1 of the outside cases, worked by hand."""

from __future__ import annotations

import pytest

from gaugelog.physics.circuit import circuit_of
from gaugelog.physics.conformity import Words
from gaugelog.rules.shunt import ShuntFound, judge_shunt, shunt_places

CIRCUIT = circuit_of("quarter three-wire", 3, 120.0, 2.0, wire=1.5)


def _found(place: str | None, measured: float) -> ShuntFound:
    return judge_shunt(CIRCUIT, 59_880.0, place, measured * 1e-6, setting=2.0, least_tolerance=5e-6)


@pytest.mark.parametrize(
    ("place", "predicted"),
    [("arm 1", -988.6), ("arm 2", 988.6), ("module pins of arm 1", -1038.5)],
)
def test_each_place_reads_its_own_strain(place: str, predicted: float) -> None:
    found = _found(place, predicted)
    assert found.predicted is not None
    assert pytest.approx(predicted * 1e-6, abs=0.05e-6) == found.predicted
    assert found.judgement.word is Words.PASS


def test_without_the_place_there_is_no_verdict() -> None:
    found = _found(None, -1038)
    assert found.judgement.word is Words.UNDECIDED
    assert found.predicted is None


def test_the_reading_of_another_place_fails_and_names_it() -> None:
    found = _found("arm 1", -1038)
    assert found.judgement.word is Words.FAIL
    assert "module pins of arm 1" in found.hint


def test_the_opposite_reading_is_told_with_the_arm_that_gives_it() -> None:
    assert "arm 2" in _found("arm 1", 988.6).hint


def test_places_without_leads_in_arm_one_are_the_arms_only() -> None:
    assert "module pins of arm 1" in shunt_places(CIRCUIT)
