"""Agreement with a known value, held to GTC and to figures worked by hand."""

from __future__ import annotations

import GTC
import pytest

from gaugelog.physics import agreement
from gaugelog.physics.agreement import combined, e_number

CHECKS = (agreement.combined, agreement.e_number)


def test_the_uncertainty_of_the_difference_is_gtcs() -> None:
    """GTC propagates the difference of two independent values (JCGM 100:2008, 5.1.2)."""
    reads, known = GTC.ureal(350.02, 0.11), GTC.ureal(350.0, 0.005)
    assert 2 * (reads - known).u == pytest.approx(combined(0.22, 0.01))


def test_the_score_is_the_one_worked_by_hand() -> None:
    """ISO 13528:2015, 9.7: E_n = (x − X)/√(U² + Uref²); x 10.2, X 10.0, U 0.2, Uref 0.15: 0.8."""
    assert 0.8 == pytest.approx(e_number(10.2 - 10.0, 0.2, 0.15))
    assert 0.8 == pytest.approx(e_number(10.0 - 10.2, 0.2, 0.15))
    assert e_number(0.26, 0.2, 0.15) > 1 > e_number(0.24, 0.2, 0.15)
