"""Watching the zero, held to a library's regression and to the trade's own rule."""

from __future__ import annotations

import numpy as np
import pytest
from scipy import optimize, stats

from gaugelog.physics import zerowatch
from gaugelog.physics.zerowatch import ZeroStep, ZeroVerdict

CHECKS = (zerowatch.judge_steps, zerowatch.heating_slope, zerowatch.supply_for_shift)


def test_the_slope_is_that_of_a_librarys_regression() -> None:
    """scipy.stats.linregress of the zero over the supply squared, with scatter."""
    draw = np.random.default_rng(2)
    supplies = draw.uniform(1, 15, 40)
    zeros = 3e-4 + 8e-8 * supplies**2 + draw.normal(0, 1e-6, 40)
    steps = [ZeroStep(float(e), 3e-4, float(z)) for e, z in zip(supplies, zeros, strict=True)]
    expected = stats.linregress(supplies**2, zeros).slope
    assert expected == pytest.approx(zerowatch.heating_slope(steps), rel=1e-9)


def test_the_supply_for_a_shift_is_where_a_numeric_solver_finds_it() -> None:
    """SciPy, brentq on slope times supply squared."""
    expected = optimize.brentq(lambda e: 8e-8 * e**2 - 2e-6, 0.1, 50.0, xtol=1e-12)
    assert expected == pytest.approx(zerowatch.supply_for_shift(8e-8, 2e-6))


def test_the_last_supply_with_a_steady_zero_is_the_answer() -> None:
    """Common practice: raise until the zero is unstable, then lower until it is stable again."""
    steps = [
        ZeroStep(2.0, 10e-6, 10e-6),
        ZeroStep(4.0, 10e-6, 11e-6),
        ZeroStep(8.0, 13e-6, 15e-6),
        ZeroStep(12.0, 18e-6, 41e-6),
    ]
    assert ZeroVerdict(steady=8.0, unsteady=12.0) == zerowatch.judge_steps(steps, 2.5e-6)
