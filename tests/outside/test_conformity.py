"""Verdicts held to the examples of JCGM 106, the table of ILAC-G8 and SciPy's distribution."""

from __future__ import annotations

import numpy
import pytest
from scipy import stats

from gaugelog.physics import conformity
from gaugelog.physics.conformity import (
    Limits,
    Words,
    guard_band,
    judge,
    probability_of_conformance,
    undecided,
)
from tests.outside.cases import case

CHECKS = (
    conformity.judge,
    conformity.guard_band,
    conformity.probability_of_conformance,
    conformity.undecided,
)


def test_the_oil_between_two_limits_conforms_as_jcgm_106_prints() -> None:
    """JCGM 106:2012, 7.4, viscosity of a motor oil (from memory)."""
    oil = case("C13-09")
    limits = Limits(oil.value("TL"), oil.value("TU"))
    oil.expect("p_c", probability_of_conformance(oil.value("y"), oil.value("u"), limits))


def test_the_bursting_strength_over_one_limit_conforms_as_jcgm_106_prints() -> None:
    """JCGM 106:2012, 7.3, example 2, bursting strength (from memory)."""
    bottle = case("C13-11")
    limits = Limits(bottle.value("TL"), None)
    found = judge(bottle.value("y"), bottle.value("u"), limits)
    assert found.probability is not None
    bottle.expect("p_c", found.probability)
    assert Words.PASS is found.word


def test_the_guard_band_leaves_no_more_risk_than_ilac_g8_tabulates() -> None:
    """ILAC-G8:09/2019, table of guard bands, U = 2u."""
    table = case("C13-12")
    bounds = table.expected["PFA_max"]["value"]
    for share, bound in zip(table.value("w_over_U"), bounds, strict=True):
        accepted_at = 10.0 + share * guard_band(0.5)
        assert bound >= 1 - probability_of_conformance(accepted_at, 0.5, Limits(10.0, None))


@pytest.mark.parametrize(
    ("value", "word"),
    [
        (8.0, Words.PASS),
        (8.5, Words.CONDITIONAL_PASS),
        (10.0, Words.CONDITIONAL_PASS),
        (10.5, Words.CONDITIONAL_FAIL),
        (12.0, Words.CONDITIONAL_FAIL),
        (12.1, Words.FAIL),
    ],
)
def test_the_words_part_where_ilac_g8_draws_them(value: float, word: Words) -> None:
    """ILAC-G8:09/2019, 4.2.3: pass to TL − w, conditional to TL and TL + w, fail beyond."""
    assert word is judge(value, 1.0, Limits(None, 10.0)).word


def test_nothing_is_decided_without_information() -> None:
    """ISO/IEC 17025:2017, 7.8.6 asks for a decision rule; without its terms there is no word."""
    assert Words.UNDECIDED is undecided("no uncertainty").word


def test_probabilities_are_those_of_scipy_over_random_readings() -> None:
    """SciPy, scipy.stats.norm."""
    random = numpy.random.default_rng(20)
    values, low = random.normal(0, 3, 5000), random.normal(-2, 1)
    limits = Limits(low, low + 4)
    uncertainty = random.uniform(0.05, 4, 5000)
    normal = stats.norm(values, uncertainty)
    expected = normal.cdf(low + 4) - normal.cdf(low)
    found = probability_of_conformance(values, uncertainty, limits)
    assert 1e-12 > numpy.abs(found - expected).max()


def test_the_probability_is_the_share_of_true_values_inside() -> None:
    """JCGM 106:2012, 6: with a flat prior the true value is normal about the reading (NumPy)."""
    draws = numpy.random.default_rng(7).normal(11.0, 0.635, 400_000)
    found = probability_of_conformance(11.0, 0.635, Limits(10.0, 12.0))
    assert numpy.mean((draws >= 10) & (draws <= 12)) == pytest.approx(found, abs=0.003)
