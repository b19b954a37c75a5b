"""Coverage factors behave as tails must."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics.student import coverage_factor, t_confidence
from gaugelog.physics.validity import OutOfDomain

DOF = st.integers(1, 300)
CONFIDENCE = st.floats(0.01, 0.999)


@given(CONFIDENCE, DOF)
def test_the_factor_holds_the_share_that_was_asked_for(confidence: float, dof: int) -> None:
    assert confidence == pytest.approx(t_confidence(coverage_factor(confidence, dof), dof))


@given(CONFIDENCE, DOF)
def test_more_freedom_needs_a_smaller_factor(confidence: float, dof: int) -> None:
    assert coverage_factor(confidence, dof + 1) < coverage_factor(confidence, dof)
    assert coverage_factor(confidence) < coverage_factor(confidence, dof)


def test_degrees_of_freedom_are_cut_not_rounded() -> None:
    assert coverage_factor(0.95, 16) == coverage_factor(0.95, 16.9)


def test_the_step_to_many_degrees_of_freedom_is_smooth() -> None:
    assert coverage_factor(0.95, 999) == pytest.approx(coverage_factor(0.95, 1000), rel=1e-5)


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: coverage_factor(1.0), "confidence must lie between 0 and 1"),
        (lambda: coverage_factor(0.95, 0.5), "dof must be at least 1"),
        (lambda: coverage_factor(0.95, math.nan), "dof must be greater than zero"),
        (lambda: t_confidence(1.0, 0), "dof must be greater than zero"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
