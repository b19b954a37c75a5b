"""Load-cell fits held to certified regression data, NumPy and a textbook transducer."""

from __future__ import annotations

import numpy
import pytest

from gaugelog.physics import loadcell
from gaugelog.physics.loadcell import RunPoint, fit_run, sensitivity, strain_for_sensitivity

CHECKS = (loadcell.sensitivity, loadcell.strain_for_sensitivity, loadcell.fit_run)

NORRIS = (
    "0.2 0.1 337.4 338.8 118.2 118.1 884.6 888.0 10.1 9.2 226.5 228.1 666.3 668.5 996.3 998.5 "
    "448.6 449.1 777.0 778.9 558.2 559.2 0.4 0.3 0.6 0.1 775.5 778.1 666.9 668.8 338.0 339.3 "
    "447.5 448.9 11.6 10.8 556.0 557.7 228.1 228.3 995.8 998.0 887.6 888.8 120.2 119.6 0.3 0.3 "
    "0.3 0.6 556.8 557.6 339.1 339.3 887.2 888.0 999.0 998.5 779.0 778.9 11.1 10.2 118.3 117.6 "
    "229.2 228.9 669.1 668.4 448.9 449.2 0.5 0.2"
)
"""NIST Statistical Reference Datasets, Norris: x and y in turn (from memory)."""


def _norris() -> list[RunPoint]:
    numbers = [float(text) for text in NORRIS.split()]
    return [RunPoint(x, y) for x, y in zip(numbers[::2], numbers[1::2], strict=True)]


def test_the_line_of_the_norris_data_is_the_certified_one() -> None:
    """NIST StRD, Norris, certified values (from memory): they fit only if the data are right."""
    fit = fit_run(_norris())
    assert 1.00211681802045 == pytest.approx(fit.slope, rel=1e-12)
    assert -0.262323073774029 == pytest.approx(fit.intercept, rel=1e-10)


def test_the_straying_is_numpys_largest_residual() -> None:
    """NumPy, polyfit and its residuals."""
    points = _norris()
    x, y = (numpy.array([getattr(p, name) for p in points]) for name in ("load", "output"))
    slope, intercept = numpy.polyfit(x, y, 1)
    stray = numpy.abs(y - slope * x - intercept).max() / (slope * x.max())
    assert stray == pytest.approx(fit_run(points).nonlinearity)


def test_hysteresis_and_repeatability_are_numpys_largest_gaps() -> None:
    """NumPy on a table of two runs up and down; terms of ISA-37.1 (from memory)."""
    loads = numpy.linspace(0, 100, 6)
    random = numpy.random.default_rng(12)
    table = 0.02 * loads + random.normal(0, 0.001, (2, 2, 6))  # run, direction, load
    points = [
        RunPoint(loads[k], table[run, way, k], way == 0, run)
        for run in range(2)
        for way in range(2)
        for k in range(6)
    ]
    fit = fit_run(points)
    assert numpy.abs(table[:, 0] - table[:, 1]).max() / fit.full_scale == pytest.approx(
        fit.hysteresis
    )
    assert numpy.ptp(table, axis=0).max() / fit.full_scale == pytest.approx(fit.repeatability)


def test_a_column_cell_has_the_textbook_sensitivity() -> None:
    """Dally and Riley, link load cell: e/E = K (1 + ν) P/(2 A E) (from memory)."""
    factor, poisson, strain = 2.0, 0.3, 50e3 / (500e-6 * 200e9)
    expected = factor * (1 + poisson) * strain / 2
    assert expected == pytest.approx(sensitivity(strain, factor, "full Poisson", poisson))
    assert strain == pytest.approx(
        strain_for_sensitivity(expected, factor, "full Poisson", poisson)
    )
