"""Balance of a bridge, held to a circuit simulator."""

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest

from gaugelog.physics import balance
from tests.foreign import needs
from tests.outside.spice import Bench, voltages
from tests.outside.test_bridge import four_arms

CHECKS = (
    balance.balancing_arm,
    balance.balancing_trim,
    balance.balancing_parallel,
    balance.strain_by_null,
    balance.dummy_error,
)
Arms = tuple[float, float, float, float]


def _outputs(bridges: list[Arms], folder: Path) -> list[float]:
    benches = [Bench(four_arms(arms), supply=("high", "low")) for arms in bridges]
    return [volts["plus"] - volts["minus"] for volts in voltages(benches, folder)]


def _replaced(arms: Arms, arm: int, value: float) -> Arms:
    one, two, three, four = (
        value if number == arm else old for number, old in enumerate(arms, start=1)
    )
    return one, two, three, four


def _draw(seed: int, count: int) -> list[tuple[Arms, int]]:
    draw = np.random.default_rng(seed)
    low, high = 340.0, 360.0
    return [
        (
            (
                draw.uniform(low, high),
                draw.uniform(low, high),
                draw.uniform(low, high),
                draw.uniform(low, high),
            ),
            int(draw.integers(1, 5)),
        )
        for _ in range(count)
    ]


@needs("ngspice")
def test_the_balancing_arm_nulls_the_simulated_bridge(tmp_path: Path) -> None:
    nulled = [_replaced(arms, arm, balance.balancing_arm(arms, arm)) for arms, arm in _draw(2, 100)]
    assert [0.0] * 100 == pytest.approx(_outputs(nulled, tmp_path), abs=1e-12)


@needs("ngspice")
def test_trim_in_series_and_resistor_across_null_the_simulated_bridge(tmp_path: Path) -> None:
    nulled = []
    for arms, arm in _draw(3, 200):
        trim = balance.balancing_trim(arms, arm)
        here = arms[arm - 1]
        if trim > 0:
            nulled.append(_replaced(arms, arm, here + trim))
        else:
            across = balance.balancing_parallel(arms, arm)
            nulled.append(_replaced(arms, arm, 1 / (1 / here + 1 / across)))
    assert [0.0] * 200 == pytest.approx(_outputs(nulled, tmp_path), abs=1e-12)


@needs("ngspice")
@pytest.mark.parametrize("arm", [2, 3, 4])
def test_the_null_method_recovers_the_strain(arm: int, tmp_path: Path) -> None:
    """The simulator confirms the null before and after; strain is free of non-linearity."""
    factor, strain = 2.1, 0.004
    before: Arms = (350.4, 349.8, 351.0, 350.2)
    first = balance.balancing_arm(before, arm)
    strained = _replaced(before, 1, before[0] * (1 + factor * strain))
    second = balance.balancing_arm(strained, arm)
    outputs = _outputs([_replaced(before, arm, first), _replaced(strained, arm, second)], tmp_path)
    assert [0.0, 0.0] == pytest.approx(outputs, abs=1e-12)
    assert strain == pytest.approx(balance.strain_by_null(first, second, factor, arm), rel=1e-9)


@needs("ngspice")
def test_a_dummy_at_another_temperature_shows_what_the_simulator_says(tmp_path: Path) -> None:
    factor = 2.08
    pairs = [(250e-6, 180e-6), (-400e-6, 100e-6), (1500e-6, 0.0)]
    bridges: list[Arms] = [
        (350 * (1 + factor * active), 350 * (1 + factor * dummy), 350.0, 350.0)
        for active, dummy in pairs
    ]
    for (active, dummy), volts in zip(pairs, _outputs(bridges, tmp_path), strict=True):
        found = balance.dummy_error(active, dummy, factor)
        assert 4 * volts / factor == pytest.approx(found, abs=1e-11)
