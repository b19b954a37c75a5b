"""Temperature: round trips, limits, what a correction leaves, kinds of number, bad input."""

from __future__ import annotations

from collections.abc import Callable
from math import inf, nan

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics import temperature
from gaugelog.physics.validity import OutOfDomain
from tests.physics.kinds import assert_takes_every_kind

CELSIUS = st.floats(-100.0, 250.0)
RISE = st.floats(-120.0, 200.0)
EXPANSION = st.floats(-1e-6, 30e-6)
FACTOR = st.floats(1.8, 2.3)
LOT = [-31.8e-6, 2.77e-6, -6.55e-8, 3.28e-10, -3.26e-13]


@given(CELSIUS, CELSIUS, CELSIUS)
def test_changing_the_reference_twice_is_changing_it_once(
    celsius: float, first: float, second: float
) -> None:
    direct = temperature.referred_output(celsius, LOT, second)
    detour = temperature.referred_output(celsius, LOT, first)
    detour += temperature.referred_output(first, LOT, second)
    assert direct == pytest.approx(detour, abs=1e-15)


@given(CELSIUS)
def test_thermal_output_is_nothing_at_its_reference(celsius: float) -> None:
    assert 0.0 == temperature.referred_output(celsius, LOT, celsius)


@given(st.floats(-1e-3, 1e-3), FACTOR, FACTOR)
def test_a_setting_goes_there_and_back(output: float, one: float, other: float) -> None:
    there = temperature.output_at_setting(output, one, other)
    back = temperature.output_at_setting(there, other, one)
    assert output == pytest.approx(back, rel=1e-14, abs=1e-300)


@given(EXPANSION, EXPANSION, RISE)
def test_exchanging_article_and_class_turns_the_sign(
    article: float, matched: float, rise: float
) -> None:
    there = temperature.mismatch_output(article, matched, rise)
    assert -there == temperature.mismatch_output(matched, article, rise)


@given(EXPANSION, EXPANSION, RISE, FACTOR)
def test_a_grid_matched_by_its_coefficient_errs_by_the_mismatch_of_two_articles(
    matched: float, article: float, rise: float, factor: float
) -> None:
    """β = F (αg − αm) gives nothing on αm and (αs − αm) ΔT on another, without Kt."""
    grid = 15e-6
    coefficient = factor * (grid - matched)
    found = temperature.grid_output(coefficient, factor, article, grid, rise)
    assert temperature.mismatch_output(article, matched, rise) == pytest.approx(found, abs=1e-16)


@given(st.floats(-3e-3, 3e-3), FACTOR, FACTOR, st.floats(-2e-4, 2e-4), RISE)
def test_a_reading_made_of_strain_and_heat_comes_back_as_strain(
    strain: float, factor: float, setting: float, slope: float, rise: float
) -> None:
    warm = temperature.factor_at(factor, slope, rise)
    output = temperature.output_at_setting(120e-6, factor, setting)
    indicated = warm * strain / setting + output
    found = temperature.corrected_strain(indicated, output, setting, warm)
    assert strain == pytest.approx(found, abs=1e-15)


@given(st.floats(-2e-5, 2e-5), RISE)
def test_a_dummy_alike_at_the_same_temperature_leaves_nothing(rate: float, rise: float) -> None:
    assert 0.0 == temperature.dummy_residue(rate, rate, rise, rise)
    alone = temperature.dummy_residue(rate, rate, rise, 0.0)
    assert rate * rise == alone


@given(CELSIUS, CELSIUS)
def test_scatter_is_alike_above_and_below_the_reference(celsius: float, reference: float) -> None:
    here = temperature.scatter(0.27e-6, celsius, reference)
    assert here == temperature.scatter(0.27e-6, reference, celsius)
    assert here >= 0


@pytest.mark.parametrize(
    ("article", "matched", "asked"),
    [
        (11.7e-6, 6e-6, True),
        (23.4e-6, 13e-6, True),
        (17.3e-6, 9e-6, True),
        (11.7e-6, 11e-6, False),
        (23.4e-6, 23e-6, False),
        (8.6e-6, 9e-6, False),
        (11.7e-6, 23e-6, False),
    ],
)
def test_only_a_class_that_fits_per_fahrenheit_is_asked_about(
    article: float, matched: float, asked: bool
) -> None:
    for rise in (35.0, -60.0):
        assert asked == bool(temperature.mismatch_output_notices(article, matched, rise))
    assert () == temperature.mismatch_output_notices(article, matched, 0.0)


def test_only_a_temperature_beyond_the_fit_is_noticed() -> None:
    assert () == temperature.polynomial_output_notices(np.array([-20.0, 120.0]), -20.0, 120.0)
    beyond = temperature.polynomial_output_notices(np.array([20.0, 121.0]), -20.0, 120.0)
    assert "-20 to 120 °C" in beyond[0].message


def test_every_formula_takes_floats_arrays_and_uncertain_numbers() -> None:
    assert_takes_every_kind(lambda t: temperature.polynomial_output(t, LOT), 73.0)
    assert_takes_every_kind(lambda t, ref: temperature.referred_output(t, LOT, ref), 73.0, 24.0)
    assert_takes_every_kind(temperature.output_at_setting, -70e-6, 2.0, 2.1)
    assert_takes_every_kind(temperature.mismatch_output, 11.7e-6, 6e-6, 35.0)
    assert_takes_every_kind(temperature.grid_output, -4e-6, 2.1, 11.7e-6, 15e-6, 35.0, 0.01)
    assert_takes_every_kind(temperature.scatter, 0.27e-6, 80.0, 24.0)
    assert_takes_every_kind(temperature.factor_at, 2.1, 1e-4, 56.0)
    assert_takes_every_kind(temperature.corrected_strain, 1e-3, -3e-5, 2.0, 2.11)
    assert_takes_every_kind(temperature.dummy_residue, 12e-6, 11e-6, 40.0, 39.0)
    assert_takes_every_kind(temperature.per_kelvin, 6e-6)


@pytest.mark.parametrize(
    ("call", "sentence"),
    [
        (
            lambda: temperature.polynomial_output(-300.0, LOT),
            "celsius must be greater than -273.15",
        ),
        (lambda: temperature.polynomial_output(20.0, []), "coefficients must hold at least one"),
        (lambda: temperature.polynomial_output(20.0, [nan]), "coefficient must be a finite"),
        (lambda: temperature.polynomial_output_notices(20.0, 9.0, 1.0), "low must not exceed high"),
        (lambda: temperature.output_at_setting(1e-6, 2.0, 0.0), "setting must not be zero"),
        (lambda: temperature.mismatch_output(nan, 0.0, 1.0), "article must be a finite"),
        (lambda: temperature.grid_output(0.0, 0.0, 0.0, 0.0, 1.0), "factor must not be zero"),
        (
            lambda: temperature.grid_output(0.0, 2.0, 0.0, 0.0, 1.0, 0.7),
            "transverse sensitivity must lie between -0.5 and 0.5",
        ),
        (lambda: temperature.scatter(-1e-6, 20.0, 24.0), "rate must not be negative"),
        (lambda: temperature.scatter(1e-6, 20.0, nan), "reference must be a finite"),
        (lambda: temperature.factor_at(0.0, 1e-4, 10.0), "factor must not be zero"),
        (lambda: temperature.corrected_strain(inf, 0.0, 2.0, 2.0), "indicated must be a finite"),
        (lambda: temperature.corrected_strain(0.0, 0.0, 2.0, 0.0), "factor must not be zero"),
        (lambda: temperature.dummy_residue(1e-6, 1e-6, 1.0, nan), "dummy_rise must be a finite"),
    ],
)
def test_what_cannot_be_is_refused_by_name(call: Callable[[], object], sentence: str) -> None:
    with pytest.raises(OutOfDomain, match=f"^{sentence}"):
        call()
