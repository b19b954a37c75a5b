"""Forms of supply, held to numeric means over time and to a circuit simulator."""

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest
from scipy import signal

from gaugelog.physics import supplies
from gaugelog.physics.network import Network, Resistor
from tests.foreign import needs
from tests.outside.spice import Bench, voltages

CHECKS = (
    supplies.effective_of_carrier,
    supplies.effective_of_pulses,
    supplies.pulse_peak,
    supplies.effective_of_pulses_notices,
    supplies.carrier_bandwidth,
    supplies.constant_current_output,
    supplies.single_grid_output,
)


def test_effective_voltages_are_means_over_time() -> None:
    """Root mean square of the waves that NumPy and scipy.signal.square make, over 50 periods."""
    phase = np.linspace(0, 100 * np.pi, 1_000_000, endpoint=False)
    carrier = 7.0 * np.sin(phase)
    assert np.sqrt(np.mean(carrier**2)) == pytest.approx(supplies.effective_of_carrier(7.0))
    pulses = 5.0 * (1 + signal.square(phase, duty=0.16))
    expected = np.sqrt(np.mean(pulses**2))
    assert expected == pytest.approx(supplies.effective_of_pulses(10.0, 0.16), rel=1e-4)
    assert 10.0 == pytest.approx(supplies.pulse_peak(expected, 0.16), rel=1e-4)


@pytest.mark.parametrize("period", [0.1, 0.5, 3.0, 10.0])
def test_slow_pulses_heat_one_by_one(period: float) -> None:
    """First-order warming (Newton's law of cooling) by scipy.signal.lsim, time constant 1 s.

    The notice comes where the warmth swings by more than its own mean.
    """
    times = np.linspace(0, 30 * max(period, 1.0), 60_001)
    power = (1 + signal.square(2 * np.pi * times / period, duty=0.2)) / 2
    _, warmth, _ = signal.lsim(([1.0], [1.0, 1.0]), power, times, interp=False)
    settled = warmth[len(warmth) // 2 :]
    swing = (settled.max() - settled.min()) / settled.mean()
    noticed = bool(supplies.effective_of_pulses_notices(period, 1.0))
    assert (swing > 1.0) == noticed


def test_a_carrier_of_five_kilohertz_transmits_one() -> None:
    """Common practice: 4.8 or 5 kHz carrier systems transmit about 1 kHz."""
    assert 1000.0 == supplies.carrier_bandwidth(5000.0)


@needs("ngspice")
def test_a_bridge_on_constant_current_puts_out_what_a_simulator_says(tmp_path: Path) -> None:
    draw = np.random.default_rng(3)
    trials = [tuple(float(value) for value in draw.uniform(50, 5000, 4)) for _ in range(200)]
    corners = ("low", "plus", "high", "minus")
    benches = [
        Bench(
            Network(
                tuple(
                    Resistor(f"arm {place}", corners[place], corners[(place + 1) % 4], value)
                    for place, value in enumerate(arms)
                )
            ),
            current=("high", "low"),
        )
        for arms in trials
    ]
    for (one, two, three, four), volts in zip(trials, voltages(benches, tmp_path), strict=True):
        found = supplies.constant_current_output(1.0, one, two, three, four)
        assert volts["plus"] - volts["minus"] == pytest.approx(found, abs=1e-6)


def test_a_single_grid_follows_the_definition_of_the_gauge_factor() -> None:
    """ASTM E251 (from memory): ΔR = R K ε; Ohm's law turns it into volts."""
    resistance = 350.0 * (1 + 2.1 * 500e-6)
    expected = 0.004 * (resistance - 350.0)
    assert expected == pytest.approx(supplies.single_grid_output(0.004, 350.0, 2.1, 500e-6))
