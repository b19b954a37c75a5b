"""Forms of supply: what they heat, and what a bridge on constant current puts out."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics import supplies
from gaugelog.physics.bridge import output_ratio
from gaugelog.physics.excitation import supply_current
from gaugelog.physics.validity import OutOfDomain
from tests.physics.kinds import assert_takes_every_kind

VOLT = st.floats(0.1, 100.0)
DUTY = st.floats(0.001, 1.0)
ARM = st.floats(50.0, 5000.0)


@given(VOLT, DUTY)
def test_pulses_that_heat_like_a_steady_supply_are_higher(effective: float, duty: float) -> None:
    peak = supplies.pulse_peak(effective, duty)
    assert peak >= effective
    assert effective == pytest.approx(supplies.effective_of_pulses(peak, duty))


@given(VOLT)
def test_a_supply_that_is_always_on_is_steady(peak: float) -> None:
    assert peak == supplies.effective_of_pulses(peak, 1.0)


@given(VOLT)
def test_a_carrier_heats_like_pulses_of_half_duty(peak: float) -> None:
    found = supplies.effective_of_carrier(peak)
    assert supplies.effective_of_pulses(peak, 0.5) == pytest.approx(found)


def test_slow_pulses_are_noticed() -> None:
    assert () == supplies.effective_of_pulses_notices(0.001, 0.01)
    assert "by the peak" in supplies.effective_of_pulses_notices(0.1, 0.01)[0].message


@given(st.tuples(ARM, ARM, ARM, ARM), st.floats(0.0001, 0.1))
def test_constant_current_and_voltage_agree_on_the_same_bridge(
    arms: tuple[float, float, float, float], current: float
) -> None:
    one, two, three, four = arms
    supply = current / supply_current(1.0, one, two, three, four)
    found = supplies.constant_current_output(current, one, two, three, four)
    expected = supply * output_ratio(one, two, three, four)
    assert expected == pytest.approx(found, abs=1e-12 * supply)


@given(st.floats(1e-4, 1e-2))
def test_constant_current_halves_the_non_linearity(change: float) -> None:
    linear = change / 4
    at_current = supplies.constant_current_output(1.0, 1 + change, 1.0, 1.0, 1.0)
    at_voltage = output_ratio(1 + change, 1.0, 1.0, 1.0)
    ratio = (linear / at_voltage - 1) / (linear / at_current - 1)
    assert 2.0 == pytest.approx(ratio, rel=1e-6)


def test_a_single_grid_feels_strain_in_proportion() -> None:
    assert 0.0021 == pytest.approx(supplies.single_grid_output(0.003, 350.0, 2.0, 0.001))


def test_every_formula_takes_floats_arrays_and_uncertain_numbers() -> None:
    assert_takes_every_kind(supplies.effective_of_pulses, 10.0, 0.3)
    assert_takes_every_kind(supplies.pulse_peak, 5.0, 0.3)
    assert_takes_every_kind(supplies.constant_current_output, 0.01, 350.7, 350.0, 349.0, 351.0)
    assert_takes_every_kind(supplies.single_grid_output, 0.01, 350.0, 2.0, 0.001)


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: supplies.effective_of_carrier(math.nan), "peak must be a finite number"),
        (lambda: supplies.effective_of_pulses(math.inf, 0.5), "peak must be a finite number"),
        (lambda: supplies.effective_of_pulses(1.0, 0.0), "duty must be greater than zero"),
        (lambda: supplies.pulse_peak(1.0, 1.1), "duty must lie between 0 and 1"),
        (lambda: supplies.carrier_bandwidth(0.0), "carrier must be greater than zero"),
        (lambda: supplies.effective_of_pulses_notices(0.0, 1.0), "period must be greater"),
        (lambda: supplies.effective_of_pulses_notices(1.0, 0.0), "settling must be greater"),
        (lambda: supplies.constant_current_output(1.0, 1.0, 1.0, 1.0, -1.0), "arm_4 must be"),
        (lambda: supplies.single_grid_output(1.0, 0.0, 2.0, 0.0), "grid must be greater"),
        (lambda: supplies.single_grid_output(1.0, 1.0, math.nan, 0.0), "factor must be a finite"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
