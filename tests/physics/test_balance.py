"""Properties of balance: a nulled bridge is null, whichever arm does it."""

from __future__ import annotations

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics import balance, bridge
from gaugelog.physics.validity import OutOfDomain
from tests.physics.kinds import assert_takes_every_kind

OHM = st.floats(50.0, 5000.0)
ARMS = st.tuples(OHM, OHM, OHM, OHM)
ARM = st.integers(1, 4)


@given(ARMS, ARM)
def test_the_balancing_arm_nulls_the_bridge(
    arms: tuple[float, float, float, float], arm: int
) -> None:
    nulled = list(arms)
    nulled[arm - 1] = balance.balancing_arm(arms, arm)
    assert 0.0 == pytest.approx(bridge.output_ratio(*nulled), abs=1e-12)


@given(ARMS, ARM)
def test_the_arms_own_value_does_not_count(
    arms: tuple[float, float, float, float], arm: int
) -> None:
    one, two, three, four = (1.0 if number == arm - 1 else old for number, old in enumerate(arms))
    assert balance.balancing_arm(arms, arm) == balance.balancing_arm((one, two, three, four), arm)


@given(st.floats(340.0, 349.9))
def test_a_resistor_across_the_larger_arm_makes_the_two_equal(small: float) -> None:
    across = balance.balancing_parallel((350.0, small, 350.0, 350.0), 1)
    assert small == pytest.approx(350.0 * across / (350.0 + across))


@given(st.floats(-0.01, 0.01), st.sampled_from([2, 3, 4]))
def test_the_null_method_has_no_non_linearity(strain: float, arm: int) -> None:
    before = (350.2, 349.9, 350.4, 350.1)
    after = (350.2 * (1 + 2.0 * strain), *before[1:])
    found = balance.strain_by_null(
        balance.balancing_arm(before, arm), balance.balancing_arm(after, arm), 2.0, arm
    )
    assert strain == pytest.approx(found, abs=1e-12)


@given(st.floats(-0.001, 0.001))
def test_a_dummy_that_feels_the_same_takes_all_away(apparent: float) -> None:
    assert 0.0 == pytest.approx(balance.dummy_error(apparent, apparent, 2.0), abs=1e-15)


def test_a_dummy_at_another_temperature_leaves_near_the_difference() -> None:
    assert 70e-6 == pytest.approx(balance.dummy_error(250e-6, 180e-6, 2.08), rel=1e-3)


def test_every_formula_takes_floats_arrays_and_uncertain_numbers() -> None:
    assert_takes_every_kind(
        lambda one, two, three: balance.balancing_arm((1.0, one, two, three), 1),
        350.0,
        349.0,
        351.0,
    )
    assert_takes_every_kind(
        lambda one, two: balance.balancing_parallel((one, two, 350.0, 350.0), 1), 351.0, 349.0
    )
    assert_takes_every_kind(
        lambda before, after: balance.strain_by_null(before, after, 2.0, 3), 351.0, 349.0
    )
    assert_takes_every_kind(balance.dummy_error, 250e-6, 180e-6, 2.08)


@pytest.mark.parametrize(
    ("call", "sentence"),
    [
        (lambda: balance.balancing_arm((1.0, 1.0, 1.0, 1.0), 5), "arm must be one of 1, 2, 3, 4"),
        (lambda: balance.balancing_arm((1.0, -1.0, 1.0, 1.0), 1), "arm_2 must be greater than"),
        (
            lambda: balance.balancing_parallel((1.0, 2.0, 1.0, 1.0), 1),
            "arm_1 less the value that nulls must",
        ),
        (lambda: balance.strain_by_null(1.0, 1.0, 2.0, 1), "arm must be one of 2, 3, 4"),
        (lambda: balance.strain_by_null(1.0, 1.0, 0.0, 2), "factor must not be zero"),
        (lambda: balance.dummy_error(-0.6, 0.0, 2.0), "active times factor must be greater"),
    ],
)
def test_what_cannot_be_is_refused_by_name(call: object, sentence: str) -> None:
    assert callable(call)
    with pytest.raises(OutOfDomain, match=sentence):
        call()
