"""Waves and rise times: order of speeds, round trips, and what is noticed."""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics import dynamics
from gaugelog.physics.validity import OutOfDomain
from tests.physics.kinds import assert_takes_every_kind

MODULUS = st.floats(1e8, 1e12)
DENSITY = st.floats(500.0, 2e4)
LENGTH = st.floats(2e-4, 0.15)
SPEED = st.floats(300.0, 12_000.0)
LOSS = st.floats(1e-5, 0.9)


@given(MODULUS, DENSITY, st.floats(0.01, 0.49))
def test_twist_runs_slowest_and_a_plates_wave_fastest(
    modulus: float, density: float, poisson: float
) -> None:
    bar = dynamics.bar_wave_speed(modulus, density)
    assert dynamics.torsion_wave_speed(modulus, density, poisson) < bar
    assert bar < dynamics.plate_wave_speed(modulus, density, poisson)


@given(MODULUS, DENSITY)
def test_four_times_the_modulus_doubles_the_speed(modulus: float, density: float) -> None:
    bar = dynamics.bar_wave_speed(modulus, density)
    assert 2 * bar == pytest.approx(dynamics.bar_wave_speed(4 * modulus, density))
    assert 2 * bar == pytest.approx(dynamics.bar_wave_speed(modulus, density / 4))


@given(LENGTH, SPEED, LOSS)
def test_the_frequency_for_a_loss_makes_that_loss(length: float, speed: float, loss: float) -> None:
    frequency = dynamics.frequency_for_loss(length, speed, loss)
    assert loss == pytest.approx(1 - dynamics.wave_average(length, frequency, speed), rel=1e-6)


@given(st.floats(1.0, 1e6), LOSS)
def test_the_corner_for_a_loss_makes_that_loss(frequency: float, loss: float) -> None:
    corner = dynamics.corner_for_loss(frequency, loss)
    assert loss == pytest.approx(1 - dynamics.first_order_gain(frequency, corner), rel=1e-6)


@given(st.floats(1e-8, 10.0))
def test_rise_and_corner_go_there_and_back(rise: float) -> None:
    assert rise == pytest.approx(dynamics.rise_of_corner(dynamics.corner_for_rise(rise)))


@given(LENGTH, SPEED, st.floats(0.0, 1e-6))
def test_a_grid_rises_in_less_than_its_transit_and_its_own_time(
    length: float, speed: float, own: float
) -> None:
    transit = dynamics.transit_time(length, speed)
    found = dynamics.grid_rise_time(length, speed, own)
    assert 0.8 * transit + own == pytest.approx(found)
    assert found < transit + own


@given(st.floats(0.0, 1.0), st.floats(0.0, 1.0))
def test_rise_times_combine_to_more_than_the_longer(one: float, other: float) -> None:
    found = dynamics.combined_rise(one, other)
    assert max(one, other) - 1e-15 <= found <= one + other + 1e-15


def test_matter_pushed_ahead_is_compressed() -> None:
    assert -0.001 == pytest.approx(dynamics.strain_of_velocity(5.0, 5000.0))
    assert 0.001 == pytest.approx(dynamics.strain_of_velocity(-5.0, 5000.0))


def test_a_wave_short_against_bar_or_grid_is_noticed() -> None:
    assert () == dynamics.bar_wave_speed_notices(10e3, 0.02, 5000.0)
    assert "5 diameters" in dynamics.bar_wave_speed_notices(50e3, 0.02, 5000.0)[0].message
    assert () == dynamics.wave_average_notices(0.003, 100e3, 5000.0)
    assert 1 == len(dynamics.wave_average_notices(0.003, np.array([1e3, 1e6]), 5000.0))


def test_every_formula_takes_floats_arrays_and_uncertain_numbers() -> None:
    assert_takes_every_kind(dynamics.bar_wave_speed, 200e9, 7850.0)
    assert_takes_every_kind(dynamics.plate_wave_speed, 200e9, 7850.0, 0.3)
    assert_takes_every_kind(dynamics.torsion_wave_speed, 200e9, 7850.0, 0.3)
    assert_takes_every_kind(dynamics.strain_of_velocity, 5.0, 5000.0)
    assert_takes_every_kind(dynamics.wave_average, 0.003, 300e3, 5000.0)
    assert_takes_every_kind(dynamics.frequency_for_loss, 0.003, 5000.0, 0.05)
    assert_takes_every_kind(dynamics.grid_rise_time, 0.003, 5000.0, 1e-6)
    assert_takes_every_kind(dynamics.corner_for_loss, 1000.0, 0.05)


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: dynamics.bar_wave_speed(0.0, 1.0), "modulus must be greater than zero"),
        (lambda: dynamics.bar_wave_speed(1.0, -1.0), "density must be greater than zero"),
        (lambda: dynamics.plate_wave_speed(1.0, 1.0, 1.0), "poisson must lie between"),
        (lambda: dynamics.torsion_wave_speed(1.0, 1.0, -1.0), "poisson must lie between"),
        (lambda: dynamics.strain_of_velocity(math.nan, 1.0), "velocity must be a finite"),
        (lambda: dynamics.strain_of_velocity(1.0, 0.0), "speed must be greater than zero"),
        (lambda: dynamics.wave_average(1.0, 0.0, 1.0), "frequency must be greater than zero"),
        (lambda: dynamics.frequency_for_loss(0.0, 1.0, 0.1), "length must be greater"),
        (lambda: dynamics.frequency_for_loss(1.0, 1.0, 0.0), "loss must lie between"),
        (lambda: dynamics.grid_rise_time(1.0, 1.0, -1.0), "own must not be negative"),
        (lambda: dynamics.rise_of_corner(0.0), "corner must be greater than zero"),
        (lambda: dynamics.corner_for_rise(0.0), "rise must be greater than zero"),
        (lambda: dynamics.combined_rise(1.0, -1.0), "parts must not be negative"),
        (lambda: dynamics.first_order_gain(-1.0, 1.0), "frequency must not be negative"),
        (lambda: dynamics.corner_for_loss(1.0, 1.0), "loss must lie between 0 and 1"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
