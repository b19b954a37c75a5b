"""Load cells: sensitivity, and what a comparison run tells of straightness."""

from __future__ import annotations

import numpy
import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics.arrangements import ARRANGEMENTS
from gaugelog.physics.bridge import strain_output
from gaugelog.physics.loadcell import (
    NOT_A_CALIBRATION,
    RunPoint,
    fit_run,
    sensitivity,
    strain_for_sensitivity,
)
from gaugelog.physics.validity import OutOfDomain

LOADS = (0.0, 25.0, 50.0, 75.0, 100.0)


def _run(run: int = 1, shift: float = 0.0, lag: float = 0.0) -> list[RunPoint]:
    up = [RunPoint(load, 0.02 * load + 0.1 + shift, True, run) for load in LOADS]
    down = [RunPoint(load, 0.02 * load + 0.1 + shift + lag, False, run) for load in LOADS]
    return up + down


@given(st.sampled_from(sorted(ARRANGEMENTS)), st.floats(1e-9, 1e-7))
def test_the_sensitivity_is_the_bridges_for_small_strain(name: str, strain: float) -> None:
    exact = strain_output(strain, 2.1, name, 0.3)
    assert exact == pytest.approx(sensitivity(strain, 2.1, name, 0.3), rel=1e-5)


@given(st.sampled_from(sorted(ARRANGEMENTS)), st.floats(-0.01, 0.01))
def test_the_sensitivity_gives_the_strain_back(name: str, strain: float) -> None:
    ratio = sensitivity(strain, 2.1, name, 0.3)
    assert strain == pytest.approx(strain_for_sensitivity(ratio, 2.1, name, 0.3))


def test_a_straight_run_has_its_line_and_no_faults() -> None:
    fit = fit_run(_run() + _run(2))
    assert 0.02 == pytest.approx(fit.slope)
    assert 0.1 == pytest.approx(fit.intercept)
    assert 2.0 == pytest.approx(fit.full_scale)
    assert [0.0] * 3 == pytest.approx(
        [fit.nonlinearity, fit.hysteresis, fit.repeatability], abs=1e-12
    )


def test_a_run_says_that_it_is_no_calibration() -> None:
    assert NOT_A_CALIBRATION == fit_run(_run()).statement


def test_lag_on_the_way_back_is_hysteresis() -> None:
    fit = fit_run(_run(lag=0.004))
    assert 0.002 == pytest.approx(fit.hysteresis)


def test_a_shift_between_runs_is_repeatability() -> None:
    fit = fit_run(_run() + _run(2, shift=0.006))
    assert 0.003 == pytest.approx(fit.repeatability)


def test_what_a_run_cannot_tell_is_left_open() -> None:
    fit = fit_run([point for point in _run() if point.rising])
    assert (None, None) == (fit.hysteresis, fit.repeatability)


def test_a_bent_run_strays_from_its_line() -> None:
    points = [RunPoint(load, load + 0.1 * (load / 100) * (1 - load / 100)) for load in LOADS]
    fit = fit_run(points)
    assert 0.0 < fit.nonlinearity < 0.025 / fit.full_scale


def test_a_line_through_zero_has_no_intercept() -> None:
    fit = fit_run([RunPoint(50.0, 1.0), RunPoint(100.0, 2.1)], through_zero=True)
    assert 0.0 == fit.intercept
    assert (50 * 1.0 + 100 * 2.1) / (50**2 + 100**2) == pytest.approx(fit.slope)


def test_a_run_in_compression_has_a_full_scale_too() -> None:
    assert 2.0 == pytest.approx(
        fit_run([RunPoint(-load, 0.02 * load) for load in LOADS]).full_scale
    )


def test_an_array_of_strains_has_the_sensitivity_of_each() -> None:
    strains = numpy.array([0.001, 0.002])
    assert [0.002, 0.004] == list(sensitivity(strains, 2.0, "full bending"))


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: fit_run([]), "points must hold readings at 2 or more loads"),
        (lambda: fit_run([RunPoint(1.0, 2.0)] * 3), "points must hold readings at 2 or more"),
        (lambda: fit_run([RunPoint(0.0, 2.0)], through_zero=True), "points must hold readings"),
        (lambda: fit_run([RunPoint(0.0, 1.0), RunPoint(9.0, 1.0)]), "must show an output"),
        (lambda: RunPoint(float("nan"), 1.0), "load must be a finite number"),
        (lambda: sensitivity(0.001, 0.0, "full bending"), "factor must not be zero"),
        (lambda: sensitivity(0.001, 2.0, "pentagon"), "arrangement must be one of"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
