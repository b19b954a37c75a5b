"""Meter uncertainties held to the GUM's printed figures and to GTC's correlated propagation."""

from __future__ import annotations

import GTC
import numpy
import pytest

from gaugelog.physics import change
from gaugelog.physics.change import (
    difference_uncertainty,
    instrument_uncertainty,
    rectangular,
    relative_change,
    resolution_uncertainty,
    triangular,
)
from tests.outside.cases import case

CHECKS = (
    change.rectangular,
    change.triangular,
    change.resolution_uncertainty,
    change.instrument_uncertainty,
    change.relative_change,
    change.difference_uncertainty,
)


def test_rectangles_and_triangles_have_the_gum_widths() -> None:
    """JCGM 100:2008, 4.3.7 (expansion of copper) and 4.3.9 (from memory)."""
    widths = case("C13-05")
    widths.expect("u_rect", rectangular(widths.value("a")))
    widths.expect("u_tri", triangular(widths.value("a")))
    widths.expect("u_alpha", rectangular(widths.value("alpha_bound")))


def test_a_digital_display_leaves_what_the_gum_prints() -> None:
    """JCGM 100:2008, F.2.2.1: u = 0.29 δx for a display of step δx."""
    assert 0.29 == pytest.approx(resolution_uncertainty(1.0), abs=0.005)


def test_a_digital_voltmeter_has_the_uncertainty_the_gum_prints() -> None:
    """JCGM 100:2008, 4.3.7, example 2: 14 ppm of 0.928571 V and 2 µV give u = 8.7 µV."""
    found = instrument_uncertainty(0.928571, 14e-6, 2e-6, 0.0)
    assert 8.7e-6 == pytest.approx(found, abs=5e-8)


def test_a_difference_by_one_meter_agrees_with_gtc() -> None:
    """GTC: one gain and one offset common to both readings, a rounding of its own for each."""
    before, after = 350.4, 351.9
    gain = GTC.ureal(1, 0.0005 / 3**0.5)
    offset = GTC.ureal(0, 0.1 / 3**0.5)
    step = 0.01 / 12**0.5
    first = before * gain + offset + GTC.ureal(0, step)
    second = after * gain + offset + GTC.ureal(0, step)
    found = difference_uncertainty(before, after, True, 0.0005, 0.1, 0.01)
    assert GTC.uncertainty(second - first) == pytest.approx(found, rel=1e-9)


def test_a_difference_by_two_meters_agrees_with_gtc() -> None:
    """GTC: two meters of one kind, each with an error of its own."""
    readings = [
        GTC.ureal(value, GTC.type_b.uniform(0.0005 * value + 0.1)) for value in (350.4, 351.2)
    ]
    readings = [each + GTC.ureal(0, GTC.type_b.uniform(0.005)) for each in readings]
    found = difference_uncertainty(350.4, 351.2, False, 0.0005, 0.1, 0.01)
    assert GTC.uncertainty(readings[1] - readings[0]) == pytest.approx(found, rel=1e-9)


def test_a_relative_change_is_the_one_numpy_takes() -> None:
    """NumPy: difference over the first of two readings."""
    readings = numpy.array([350.4, 351.2])
    assert (numpy.diff(readings) / readings[:-1])[0] == relative_change(350.4, 351.2)
