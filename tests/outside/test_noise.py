"""Noise, held to a simulator's noise analysis, to SciPy's filters and to drawn numbers."""

from __future__ import annotations

import re
import subprocess
from pathlib import Path

import numpy as np
import pytest
from scipy import constants, integrate, signal, stats

from gaugelog.physics import noise
from gaugelog.physics.temperature import ABSOLUTE_ZERO
from tests.foreign import needs

CHECKS = (
    noise.source_resistance,
    noise.johnson_noise,
    noise.noise_bandwidth,
    noise.amplifier_noise,
    noise.combined_noise,
    noise.strain_noise,
    noise.peak_to_peak,
    noise.averaged_noise,
    noise.digital_step,
    noise.step_noise,
    noise.bandwidth_for_noise,
    noise.noise_at_bandwidth,
)
_SPICE_CELSIUS = 27.0
"""ngspice computes noise at 27 °C unless told."""


def total_noise(lines: list[str], source: str, folder: Path) -> float:
    """Output noise of node `out` from 1 mHz to 1 GHz by ngspice, in volt."""
    deck = folder / "noise.cir"
    control = [
        ".control",
        f"noise v(out) {source} dec 100 1m 1g",
        "setplot noise2",
        "print onoise_total",
        ".endc",
        ".end",
    ]
    deck.write_text("\n".join(["* noise", *lines, *control]) + "\n", encoding="utf-8")
    done = subprocess.run(
        ["ngspice", "-b", str(deck)], capture_output=True, text=True, check=False, cwd=folder
    )
    found = re.search(r"onoise_total = (\S+)", done.stdout)
    assert found, done.stdout + done.stderr
    return float(found.group(1))


@needs("ngspice")
def test_a_bridge_behind_a_filter_sounds_as_a_simulator_says(tmp_path: Path) -> None:
    """Four unequal arms; a noiseless first-order filter of 1 kHz stands behind them."""
    one, two, three, four = 350.0, 120.0, 1000.0, 600.0
    lines = [
        "V1 high 0 DC 5 AC 1",
        f"R1 0 plus {one}",
        f"R2 plus high {two}",
        f"R3 high minus {three}",
        f"R4 minus 0 {four}",
        "E1 filter 0 plus minus 1",  # an integrator in a loop: a low pass that makes no noise
        "G1 0 out filter out 1",
        f"C1 out 0 {1 / (2 * np.pi * 1000.0)!r}",
    ]
    expected = total_noise(lines, "V1", tmp_path)
    source = noise.source_resistance(one, two, three, four)
    found = noise.johnson_noise(source, _SPICE_CELSIUS, noise.noise_bandwidth(1000.0))
    assert expected == pytest.approx(found, rel=2e-3)


def test_the_boltzmann_constant_is_scipys() -> None:
    """SciPy, scipy.constants (CODATA); absolute zero likewise."""
    assert constants.k == noise.BOLTZMANN
    assert -constants.zero_Celsius == ABSOLUTE_ZERO


def test_noise_of_another_bandwidth_goes_with_its_root() -> None:
    """Horowitz and Hill, The Art of Electronics: 10 kΩ make 1.3 µV in 10 kHz (from memory)."""
    assert 0.13e-6 == pytest.approx(noise.noise_at_bandwidth(1.3e-6, 10e3, 100.0))
    thermal = (4 * constants.k * 300.0 * 10e3 * 100.0) ** 0.5
    assert thermal == pytest.approx(noise.noise_at_bandwidth(1.3e-6, 10e3, 100.0), rel=0.02)


def test_a_kilohm_makes_four_nanovolts_a_root_hertz() -> None:
    """Horowitz and Hill, The Art of Electronics: 10 kΩ in 10 kHz makes 1.29 µV (from memory)."""
    assert 4.06e-9 == pytest.approx(noise.johnson_noise(1000.0, 25.0, 1.0), abs=0.01e-9)
    assert 1.29e-6 == pytest.approx(noise.johnson_noise(1e4, 27.0, 1e4), abs=0.01e-6)
    assert 1e4 == pytest.approx(noise.bandwidth_for_noise(1.287e-6, 1e4, 27.0), rel=2e-3)


@pytest.mark.parametrize("order", [1, 2, 3, 4, 8])
def test_noise_bandwidths_are_integrals_of_scipys_filters(order: int) -> None:
    """scipy.signal.butter, analogue; its squared response integrated by scipy's quad."""
    numerator, denominator = signal.butter(order, 1.0, analog=True)

    def passed(frequency: float) -> float:
        _, response = signal.freqs(numerator, denominator, [frequency])
        return float(abs(response[0]) ** 2)

    low, _ = integrate.quad(passed, 0, 1)
    high, _ = integrate.quad(lambda t: passed(1 / t) / t**2, 1e-9, 1)
    assert low + high == pytest.approx(noise.noise_bandwidth(1.0, order), rel=1e-6)


def test_noises_add_and_average_as_drawn_numbers_do() -> None:
    """NumPy draws of normal noise, 400 000 of each."""
    draw = np.random.default_rng(11)
    one, two = draw.normal(0, 3e-6, 400_000), draw.normal(0, 4e-6, 400_000)
    assert np.std(one + two) == pytest.approx(noise.combined_noise(3e-6, 4e-6), rel=5e-3)
    means = one.reshape(-1, 16).mean(axis=1)
    assert means.std() == pytest.approx(noise.averaged_noise(3e-6, 16), rel=1e-2)


def test_rounding_adds_the_noise_of_a_drawn_rectangle() -> None:
    """NumPy: a span of 2 in 10 bits, rounded and compared."""
    step = noise.digital_step(2.0, 10)
    values = np.random.default_rng(5).uniform(-1, 1, 400_000)
    rounded = np.round(values / step) * step
    assert 2.0 / 1024 == step
    assert np.std(rounded - values) == pytest.approx(noise.step_noise(step), rel=5e-3)


def test_the_span_of_noise_holds_all_but_a_thousandth() -> None:
    """SciPy, scipy.stats.norm: ± 3.3 standard deviations hold 99.9 %."""
    half = noise.peak_to_peak(1.0) / 2
    assert 0.999 == pytest.approx(stats.norm.cdf(half) - stats.norm.cdf(-half), abs=1e-4)


def test_an_amplifier_noise_is_its_density_times_the_root_of_the_bandwidth() -> None:
    """Horowitz and Hill, definition: 5 nV/√Hz in 10 kHz is 0.5 µV."""
    assert 0.5e-6 == pytest.approx(noise.amplifier_noise(5e-9, 1e4))


def test_noise_as_strain_is_the_bridge_equation_turned_round() -> None:
    """Dally and Riley: e/E = K ε/4 for one active arm, so 1 µV at 5 V, K 2 is 0.4 µm/m."""
    assert 0.4e-6 == pytest.approx(noise.strain_noise(1e-6, 5.0, 2.0))
    assert 0.1e-6 == pytest.approx(noise.strain_noise(1e-6, 5.0, 2.0, 4.0))
