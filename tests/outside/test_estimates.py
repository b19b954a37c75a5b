"""Estimates held to the GUM's worked example H.2 and to GTC."""

from __future__ import annotations

import math

import GTC
import pytest

from gaugelog.physics import estimates
from gaugelog.physics.estimates import (
    Estimate,
    arcsine,
    exactly,
    from_joint_readings,
    from_readings,
    normal,
    rectangular,
    triangular,
)
from tests.outside.cases import case

CHECKS = (
    estimates.exactly,
    estimates.normal,
    estimates.rectangular,
    estimates.triangular,
    estimates.arcsine,
    estimates.from_readings,
    estimates.from_joint_readings,
)
DIODE = [20.1, 20.5, 19.8, 20.2, 20.0, 20.4]


def test_each_shape_has_the_width_that_gtc_gives_it() -> None:
    """GTC, type_b."""
    assert GTC.type_b.uniform(0.4) == pytest.approx(rectangular(1.0, 0.4).uncertainty)
    assert GTC.type_b.triangular(0.4) == pytest.approx(triangular(1.0, 0.4).uncertainty)
    assert GTC.type_b.arcsine(0.4) == pytest.approx(arcsine(1.0, 0.4).uncertainty)


def test_the_mean_of_readings_is_gtcs() -> None:
    """GTC, type_a.estimate."""
    expected = GTC.type_a.estimate(DIODE)
    found = from_readings(DIODE)
    assert (expected.x, expected.u, expected.df) == pytest.approx(
        (found.value, found.uncertainty, found.dof)
    )


def test_a_certificate_gives_its_expanded_uncertainty_over_k() -> None:
    """JCGM 100:2008, 4.3.3: a mass of 1000.000 325 g, 240 µg at three standard deviations."""
    assert 80e-6 == pytest.approx(normal(1000.000325, 240e-6 / 3).uncertainty)
    assert Estimate(1000.0, 0.0) == exactly(1000.0)


def test_resistance_and_reactance_come_out_as_the_gum_prints() -> None:
    """JCGM 100:2008, H.2, second approach: R, X and Z from each set, then means (from memory)."""
    raw = case("C13-03")
    sets = list(zip(raw.value("V"), raw.value("I"), raw.value("phi"), strict=True))
    series = {
        "R": [v / (i * 1e-3) * math.cos(phi) for v, i, phi in sets],
        "X": [v / (i * 1e-3) * math.sin(phi) for v, i, phi in sets],
        "Z": [v / (i * 1e-3) for v, i, phi in sets],
    }
    found, pairs = from_joint_readings(series)
    for name in series:
        raw.expect(name, found[name].value)
        raw.expect(f"u_{name}", found[name].uncertainty)
    for pair in (("R", "X"), ("R", "Z"), ("X", "Z")):
        raw.expect("r_" + "".join(pair), pairs[pair])
