"""Coverage factors held to the GUM's table and to SciPy."""

from __future__ import annotations

import pytest
from scipy import stats

from gaugelog.physics import student
from gaugelog.physics.student import coverage_factor, t_confidence

CHECKS = (student.coverage_factor, student.t_confidence)


@pytest.mark.parametrize(
    ("dof", "confidence", "factor"),
    [
        (1, 0.6827, 1.84),
        (1, 0.95, 12.71),
        (2, 0.95, 4.30),
        (5, 0.9545, 2.65),
        (10, 0.95, 2.23),
        (16, 0.99, 2.92),
        (20, 0.9973, 3.42),
        (50, 0.9545, 2.05),
        (float("inf"), 0.95, 1.960),
    ],
)
def test_factors_are_those_of_the_table(dof: float, confidence: float, factor: float) -> None:
    """JCGM 100:2008, table G.2 (from memory)."""
    assert factor == pytest.approx(coverage_factor(confidence, dof), abs=0.005)


@pytest.mark.parametrize("dof", [1, 2, 3, 7, 16, 50, 151, 999, 1000, 5000])
def test_factors_are_scipys(dof: int) -> None:
    """SciPy, scipy.stats.t."""
    for confidence in (0.5, 0.6827, 0.95, 0.99, 0.9999):
        expected = stats.t.ppf((1 + confidence) / 2, dof)
        assert expected == pytest.approx(coverage_factor(confidence, dof), rel=1e-7)


@pytest.mark.parametrize("dof", [1, 2, 3, 8, 31])
def test_shares_are_scipys(dof: int) -> None:
    """SciPy, scipy.stats.t."""
    for t in (0.0, 0.3, 1.0, 2.5, 40.0):
        expected = stats.t.cdf(t, dof) - stats.t.cdf(-t, dof)
        assert expected == pytest.approx(t_confidence(t, dof), abs=1e-12)
