"""Drift of a zero against another library's fit, the GUM's slope, and sums by hand."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics.drift import drift_rate, rate_uncertainty, warming_output
from gaugelog.physics.validity import OutOfDomain

CHECKS = (drift_rate, rate_uncertainty, warming_output)

# A lot's sheet as such sheets are written (invented): −30 + 2.6 t − 0.06 t² + 0.0003 t³, µm/m.
SHEET = (-30e-6, 2.6e-6, -0.06e-6, 0.0003e-6)


def test_two_zeros_give_their_difference_over_the_time_between() -> None:
    # By hand: 3 µm/m in half an hour are 6 µm/m in an hour.
    assert 6e-6 == pytest.approx(drift_rate((0.0, 1800.0), (1e-6, 4e-6)) * 3600)


@given(
    st.lists(
        st.tuples(st.integers(0, 5000), st.floats(-100, 100)),
        min_size=2,
        max_size=8,
        unique_by=lambda pair: pair[0],
    )
)
def test_a_rate_is_the_slope_that_numpy_fits(seen: list[tuple[int, float]]) -> None:
    times, zeros = [float(time) for time, _ in seen], [zero for _, zero in seen]
    slope = np.polynomial.Polynomial.fit(times, zeros, 1).convert().coef
    wanted = slope[1] if len(slope) > 1 else 0.0
    assert wanted == pytest.approx(drift_rate(times, zeros), rel=1e-6, abs=1e-9)


def test_the_doubt_of_a_slope_is_that_of_the_gum() -> None:
    # JCGM 100:2008, H.3.3: s²(b) = n s²/D with D = n Σ(t − t0)² − (Σ(t − t0))².
    times = (0.0, 10.0, 25.0, 40.0)
    count = len(times)
    denominator = count * sum(time**2 for time in times) - sum(times) ** 2
    wanted = (count * 0.2**2 / denominator) ** 0.5
    assert wanted == pytest.approx(rate_uncertainty(times, 0.2))


def test_the_doubt_of_two_zeros_is_root_two_over_the_time() -> None:
    assert 2**0.5 * 0.3 / 60 == pytest.approx(rate_uncertainty((0.0, 60.0), 0.3))


@pytest.mark.parametrize("times", [(), (1.0,), (5.0, 5.0)])
def test_no_rate_comes_of_less_than_two_times(times: tuple[float, ...]) -> None:
    with pytest.raises(OutOfDomain, match="times"):
        drift_rate(times, (1.0,) * len(times))


def test_a_lots_curve_by_hand() -> None:
    # At 30 °C: −30 + 78 − 54 + 8.1 = 2.1 µm/m; at 20 °C: −30 + 52 − 24 + 2.4 = 0.4 µm/m.
    found = warming_output(20.0, 30.0, SHEET, 2.0, 2.0, 11.7e-6, 11.7e-6)
    assert 1.7e-6 == pytest.approx(found)


def test_a_curve_counts_at_the_factor_that_is_set() -> None:
    # The change of resistance is the same: 1.7 µm/m at 2.00 shows as 1.7 · 2.00/2.08.
    found = warming_output(20.0, 30.0, SHEET, 2.0, 2.08, 11.7e-6, 11.7e-6)
    assert 1.7e-6 * 2.0 / 2.08 == pytest.approx(found)


def test_what_the_article_expands_otherwise_comes_on_top() -> None:
    # Steel 11.7 under a lot matched to 11: 0.7 ppm/K over 10 K are 7 µm/m more.
    found = warming_output(20.0, 30.0, SHEET, 2.0, 2.0, 11.7e-6, 11e-6)
    assert 8.7e-6 == pytest.approx(found)


def test_without_a_curve_only_the_mismatch_counts() -> None:
    # The agreed figure: class 6 on steel 11.7 over 35 K, 199.5 µm/m.
    assert 199.5e-6 == pytest.approx(warming_output(0.0, 35.0, (), 2.0, 2.0, 11.7e-6, 6e-6))
