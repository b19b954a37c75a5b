"""Noise at its bandwidth against a limit at another: white noise goes with the root of it."""

from __future__ import annotations

import pytest

from gaugelog.rules.noisy import Quiet, judge_noise
from tests.rules.beside import basis, strain
from tests.rules.test_verdicts import q

LIMIT = basis("noise", at_most=q("1", "um/m"), bandwidth=q("100", "Hz"))
BRIDGE = Quiet(350.0, 2.5, 2.0)


@pytest.mark.parametrize(
    ("bandwidth", "read", "counted", "word"),
    [
        (100.0, "0.4", 0.4, "pass"),
        (400.0, "1.6", 0.8, "pass"),  # 1.6 · √(100/400)
        (400.0, "2.4", 1.2, "fail"),
        (25.0, "0.6", 1.2, "fail"),  # quiet only because the filter is low
    ],
)
def test_a_noise_is_counted_at_the_bandwidth_of_the_criteria(
    bandwidth: float, read: str, counted: float, word: str
) -> None:
    found = judge_noise(LIMIT, "on channel", bandwidth, strain(read), BRIDGE)
    assert word == found.verdict.word
    assert found.result is not None
    assert counted == pytest.approx(found.result.to("um/m"), rel=1e-3)


def test_the_thermal_noise_of_a_bridge_by_hand() -> None:
    # Nyquist: √(4 · 1.380649e-23 · 293.15 · 350 · 100) = 23.8 nV; 4 e/(E K) = 0.0190 µm/m.
    thermal = (4 * 1.380649e-23 * 293.15 * 350 * 100) ** 0.5
    assert 23.8e-9 == pytest.approx(thermal, rel=1e-3)
    assert 4 * thermal / (2.5 * 2.0) == pytest.approx(BRIDGE.floor(100.0))


def test_a_reading_below_the_thermal_noise_is_none_of_this_circuit() -> None:
    # At 100 MHz thermal noise alone is 19 µm/m; the module reads 0.4.
    found = judge_noise(LIMIT, "on channel", 100e6, strain("0.4"), BRIDGE)
    assert ("undecided", True) == (found.verdict.word, found.verdict.blocks)
    assert "below the thermal noise" in found.verdict.reason


def test_the_offset_of_the_module_is_no_noise() -> None:
    # 0.05 % of 0.4 µm/m over √3 and 0.1/√12; the offset of 2 µm/m stays out.
    found = judge_noise(LIMIT, "on channel", 100.0, strain("0.4"), BRIDGE).verdict
    assert found.standard_uncertainty is not None
    assert 0.0289 == pytest.approx(found.standard_uncertainty.to("um/m"), rel=2e-3)


def test_criteria_without_a_bandwidth_take_the_readings_own() -> None:
    bare = basis("noise", at_most=q("1", "um/m"))
    found = judge_noise(bare, "on channel", 25.0, strain("0.6"))
    assert "pass" == found.verdict.word
    assert "counted at" not in found.verdict.reason
