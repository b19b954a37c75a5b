"""Waves, bandwidths and rise times, held to printed cases, a wave solver and SciPy's filters."""

from __future__ import annotations

import numpy as np
import pytest
from scipy import optimize, signal

from gaugelog.physics import dynamics
from tests.outside.cases import case

CHECKS = (
    dynamics.bar_wave_speed,
    dynamics.plate_wave_speed,
    dynamics.torsion_wave_speed,
    dynamics.strain_of_velocity,
    dynamics.wave_average,
    dynamics.frequency_for_loss,
    dynamics.transit_time,
    dynamics.grid_rise_time,
    dynamics.rise_of_corner,
    dynamics.corner_for_rise,
    dynamics.combined_rise,
    dynamics.first_order_gain,
    dynamics.corner_for_loss,
    dynamics.bar_wave_speed_notices,
    dynamics.wave_average_notices,
)


def rise_time(times: np.ndarray, response: np.ndarray) -> float:
    """Time from a tenth to nine tenths of a rising response."""
    tenth, nine = np.interp([0.1, 0.9], response, times)
    return float(nine - tenth)


def test_the_wave_speed_in_a_bar_is_that_of_the_case() -> None:
    given = case("C11-05")
    found = dynamics.bar_wave_speed(given.value("E") * 1e9, given.value("rho"))
    given.expect("c", found)


@pytest.mark.parametrize(
    ("modulus", "density", "poisson", "bar", "twist"),
    [
        (200e9, 7850.0, 0.29, 5050.0, 3140.0),
        (70e9, 2700.0, 0.34, 5090.0, 3110.0),
        (120e9, 8930.0, 0.34, 3670.0, 2240.0),
    ],
)
def test_wave_speeds_are_those_of_the_handbook(
    modulus: float, density: float, poisson: float, bar: float, twist: float
) -> None:
    """Kolsky, Stress Waves in Solids, table of steel, aluminium and copper (from memory)."""
    assert bar == pytest.approx(dynamics.bar_wave_speed(modulus, density), rel=0.02)
    assert twist == pytest.approx(dynamics.torsion_wave_speed(modulus, density, poisson), rel=0.02)


def test_a_plates_wave_runs_as_its_elastic_constants_say() -> None:
    """Eigenvalues of the Christoffel matrix in plane stress, by NumPy, over the density."""
    modulus, density, poisson = 70e9, 2700.0, 0.34
    plane = modulus / (1 - poisson**2) * np.diag([1.0, (1 - poisson) / 2])
    slow, fast = np.sqrt(np.linalg.eigvalsh(plane) / density)
    assert fast == pytest.approx(dynamics.plate_wave_speed(modulus, density, poisson))
    assert slow == pytest.approx(dynamics.torsion_wave_speed(modulus, density, poisson))


def test_strain_behind_a_front_is_that_of_a_chain_of_masses() -> None:
    """A bar of 400 springs and masses, its end pushed at 1 m/s, stepped through time by NumPy."""
    cell, modulus, density, push = 1.0, 1e6, 1.0, 1.0
    speed = dynamics.bar_wave_speed(modulus, density)
    place, velocity, step = np.zeros(400), np.zeros(400), 0.2 * cell / speed
    for count in range(1, 1001):
        place[0] = push * count * step
        strain = np.diff(place) / cell
        velocity[1:-1] += step * modulus / density * np.diff(strain) / cell
        place[1:-1] += step * velocity[1:-1]
    strain = np.diff(place) / cell
    found = dynamics.strain_of_velocity(push, speed)
    assert strain[50:120].mean() == pytest.approx(found, rel=0.02)
    front = int(np.argmax(strain > found / 2))
    assert front * cell == pytest.approx(1000 * step * speed, rel=0.03)


def test_a_grid_of_three_millimetres_shows_a_frequency_as_the_case_says() -> None:
    given = case("C11-03")
    length, speed, loss = given.value("L") * 1e-3, given.value("c"), given.value("loss")
    found = dynamics.frequency_for_loss(length, speed, loss)
    given.expect("f", found * 1e-3)
    assert 1 - loss == pytest.approx(dynamics.wave_average(length, found, speed))


@pytest.mark.parametrize("frequency", [20e3, 300e3, 1.2e6])
def test_a_running_wave_is_averaged_as_over_time_and_grid(frequency: float) -> None:
    """NumPy: the mean over the grid of a wave that runs, its amplitude over one period."""
    length, speed = 0.003, 5000.0
    middles = (np.arange(2000) + 0.5) / 2000 * length
    phases = np.linspace(0, 2 * np.pi, 400, endpoint=False)
    wave = np.sin(2 * np.pi * frequency / speed * middles[None, :] - phases[:, None])
    amplitude = np.sqrt(2) * wave.mean(axis=1).std()
    found = dynamics.wave_average(length, frequency, speed)
    assert amplitude == pytest.approx(abs(found), abs=1e-6)
    long_grid = length * frequency / speed > 0.5
    assert long_grid == bool(dynamics.wave_average_notices(length, frequency, speed))


def test_the_rise_over_a_grid_is_that_of_an_averaged_step() -> None:
    """NumPy: the part of the grid that the front has passed, from a tenth to nine tenths."""
    length, speed = 0.006, 5000.0
    times = np.linspace(0, 2e-6, 100_001)
    passed = np.clip(speed * times / length, 0, 1)
    assert rise_time(times, passed) == pytest.approx(
        dynamics.grid_rise_time(length, speed), rel=1e-4
    )
    expected = times[np.argmax(passed == 1.0)]
    assert expected == pytest.approx(dynamics.transit_time(length, speed), rel=1e-4)


def test_rise_and_corner_are_those_of_scipys_low_pass() -> None:
    """scipy.signal.step of a first-order low pass of 1 kHz."""
    corner = 1000.0
    system = ([1.0], [1 / (2 * np.pi * corner), 1.0])
    times, response = signal.step(system, T=np.linspace(0, 2e-3, 40_001))
    found = rise_time(times, response)
    assert found == pytest.approx(dynamics.rise_of_corner(corner), rel=1e-4)
    assert corner == pytest.approx(dynamics.corner_for_rise(found), rel=1e-4)


def test_the_gain_and_corner_for_a_loss_are_those_of_scipys_low_pass() -> None:
    """scipy.signal.freqs and brentq on it: what is left of 800 Hz."""

    def left(corner: float) -> float:
        numerator, denominator = signal.butter(1, 2 * np.pi * corner, analog=True)
        _, response = signal.freqs(numerator, denominator, [2 * np.pi * 800.0])
        return float(abs(response[0]))

    assert left(1000.0) == pytest.approx(dynamics.first_order_gain(800.0, 1000.0))
    expected = optimize.brentq(lambda corner: left(corner) - 0.98, 100.0, 1e5)
    assert expected == pytest.approx(dynamics.corner_for_loss(800.0, 0.02))


def test_rise_times_combine_as_gaussian_filters_do() -> None:
    """NumPy: two Gaussian impulse responses convolved; their rise times by integration."""
    times = np.linspace(-40, 40, 4_001)

    def rise(*widths: float) -> float:
        impulse = np.exp(-(times**2) / (2 * widths[0] ** 2))
        for width in widths[1:]:
            impulse = np.convolve(impulse, np.exp(-(times**2) / (2 * width**2)), mode="same")
        step = np.cumsum(impulse)
        return rise_time(times, step / step[-1])

    found = dynamics.combined_rise(rise(3.0), rise(1.5))
    assert rise(3.0, 1.5) == pytest.approx(found, rel=1e-3)


def test_a_bar_counts_as_thin_while_its_wave_is_hardly_slower() -> None:
    """Rayleigh's correction, Kolsky (from memory): speed falls by the part ν²π²(a/Λ)².

    At ten diameters to the wave, ν 0.3, that is 0.2 %; where the notice comes it is no more.
    """
    slower = (0.3 * np.pi * 0.5 * 0.1) ** 2
    assert slower < 0.003
    assert () == dynamics.bar_wave_speed_notices(24.9e3, 0.02, 5000.0)
    assert 1 == len(dynamics.bar_wave_speed_notices(25.1e3, 0.02, 5000.0))
