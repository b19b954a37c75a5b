"""Noise and resolution: how they grow, how they combine, and what is refused."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics import noise
from gaugelog.physics.bridge import indicated_strain
from gaugelog.physics.validity import OutOfDomain
from tests.physics.kinds import assert_takes_every_kind

ARM = st.floats(50.0, 5000.0)
CELSIUS = st.floats(-200.0, 300.0)
FACTOR = st.floats(1.5, 150.0) | st.floats(-150.0, -1.5)
BAND = st.floats(0.1, 1e6)


@given(ARM, CELSIUS, BAND)
def test_four_times_the_bandwidth_doubles_thermal_noise(
    resistance: float, celsius: float, bandwidth: float
) -> None:
    once = noise.johnson_noise(resistance, celsius, bandwidth)
    assert 2 * once == pytest.approx(noise.johnson_noise(resistance, celsius, 4 * bandwidth))
    assert 2 * once == pytest.approx(noise.johnson_noise(4 * resistance, celsius, bandwidth))
    assert bandwidth == pytest.approx(noise.bandwidth_for_noise(once, resistance, celsius))


@given(ARM)
def test_an_equal_bridge_sounds_like_one_arm(arm: float) -> None:
    assert arm == pytest.approx(noise.source_resistance(arm, arm, arm, arm))


@given(st.floats(1.0, 1e5), st.integers(1, 30))
def test_a_steeper_filter_lets_less_noise_through(corner: float, order: int) -> None:
    found = noise.noise_bandwidth(corner, order)
    assert corner < noise.noise_bandwidth(corner, order + 1) < found <= corner * math.pi / 2 + 1e-9


@given(st.floats(0.0, 1.0), st.floats(0.0, 1.0), st.floats(0.0, 1.0))
def test_noises_combine_in_any_order(one: float, two: float, three: float) -> None:
    together = noise.combined_noise(one, two, three)
    assert together == pytest.approx(noise.combined_noise(three, one, two))
    assert max(one, two, three) - 1e-15 <= together <= one + two + three + 1e-15


def test_no_noise_at_all_is_nothing() -> None:
    assert 0.0 == noise.combined_noise()


@given(st.floats(1e-9, 1e-3), st.floats(0.5, 20.0), FACTOR)
def test_noise_as_strain_is_the_indicated_strain_without_a_sign(
    volts: float, supply: float, factor: float
) -> None:
    expected = abs(indicated_strain(volts / supply, factor))
    assert expected == pytest.approx(noise.strain_noise(volts, supply, factor))
    assert expected / 4 == pytest.approx(noise.strain_noise(volts, supply, factor, 4.0))


@given(st.floats(1e-9, 1.0), st.integers(1, 1000))
def test_averaging_goes_with_the_root_of_the_count(effective: float, count: int) -> None:
    found = noise.averaged_noise(effective, count)
    assert effective == pytest.approx(found * math.sqrt(count))
    assert effective == pytest.approx(noise.averaged_noise(effective, 1))


def test_one_more_bit_halves_the_step() -> None:
    assert 20e-3 / 65536 == noise.digital_step(20e-3, 16)
    assert noise.digital_step(20e-3, 24) == 2 * noise.digital_step(20e-3, 25)


def test_noise_spans_more_than_its_effective_value() -> None:
    assert 6.6e-6 == pytest.approx(noise.peak_to_peak(1e-6))


def test_every_formula_takes_floats_arrays_and_uncertain_numbers() -> None:
    assert_takes_every_kind(noise.johnson_noise, 350.0, 23.0, 1000.0)
    assert_takes_every_kind(noise.source_resistance, 350.0, 351.0, 352.0, 353.0)
    assert_takes_every_kind(noise.combined_noise, 3.0, 4.0)
    assert_takes_every_kind(noise.strain_noise, 1e-6, 5.0, -110.0, 2.0)
    assert_takes_every_kind(noise.bandwidth_for_noise, 1e-7, 350.0, 23.0)


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: noise.johnson_noise(0.0, 20.0, 1.0), "resistance must be greater than zero"),
        (lambda: noise.johnson_noise(1.0, -274.0, 1.0), "celsius must be greater than -273.15"),
        (lambda: noise.johnson_noise(1.0, 20.0, -1.0), "bandwidth must not be negative"),
        (lambda: noise.source_resistance(1.0, 0.0, 1.0, 1.0), "arm_2 must be greater"),
        (lambda: noise.noise_bandwidth(0.0), "corner must be greater than zero"),
        (lambda: noise.noise_bandwidth(1.0, 0), "order must be a whole number of 1 or more"),
        (lambda: noise.amplifier_noise(-1.0, 1.0), "density must not be negative"),
        (lambda: noise.combined_noise(1.0, -1.0), "parts must not be negative"),
        (lambda: noise.strain_noise(1.0, 0.0, 2.0), "supply must be greater than zero"),
        (lambda: noise.strain_noise(1.0, 1.0, 0.0), "factor must not be zero"),
        (lambda: noise.peak_to_peak(math.nan), "effective must be a finite number"),
        (lambda: noise.averaged_noise(1.0, 0), "count must be a whole number"),
        (lambda: noise.digital_step(0.0, 16), "span must be greater than zero"),
        (lambda: noise.digital_step(1.0, 65), "bits must be a whole number from 1 to 64"),
        (lambda: noise.step_noise(-1.0), "step must not be negative"),
        (lambda: noise.bandwidth_for_noise(-1.0, 1.0, 20.0), "noise must not be negative"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
