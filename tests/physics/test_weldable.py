"""Welded carriers: how strain enters them, and limits long and short."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics import weldable
from gaugelog.physics.validity import OutOfDomain
from tests.physics.kinds import assert_takes_every_kind

LAG = st.floats(1e-4, 0.1)
CARRIER = st.floats(5e-3, 0.1)
PART = st.floats(0.01, 1.0)


@given(CARRIER, LAG)
def test_a_free_end_bears_nothing(carrier: float, lag: float) -> None:
    assert 0.0 == pytest.approx(weldable.carrier_strain(carrier / 2, carrier, lag), abs=1e-12)


@given(CARRIER, LAG, PART)
def test_strain_is_the_same_on_both_sides_and_largest_in_the_middle(
    carrier: float, lag: float, part: float
) -> None:
    place = part * carrier / 2
    right = weldable.carrier_strain(place, carrier, lag)
    assert weldable.carrier_strain(-place, carrier, lag) == right
    assert right <= weldable.carrier_strain(0.0, carrier, lag) <= 1


@given(CARRIER, LAG, PART)
def test_a_grid_shows_less_than_the_middle_and_more_than_its_ends(
    carrier: float, lag: float, part: float
) -> None:
    grid = part * carrier
    found = weldable.grid_transfer(grid, carrier, lag)
    assert weldable.carrier_strain(0.0, carrier, lag) >= found - 1e-9
    assert weldable.carrier_strain(grid / 2, carrier, lag) <= found + 1e-9


@given(CARRIER, PART)
def test_a_stiff_joint_hands_all_of_the_strain_over(carrier: float, part: float) -> None:
    found = weldable.grid_transfer(0.5 * part * carrier, carrier, 1e-3 * carrier)
    assert 1.0 == pytest.approx(found, abs=1e-6)


@given(CARRIER, LAG, PART)
def test_a_longer_carrier_is_better(carrier: float, lag: float, part: float) -> None:
    short = weldable.grid_transfer(part * carrier, carrier, lag)
    assert short <= weldable.grid_transfer(part * carrier, 1.5 * carrier, lag) + 1e-12


def test_four_times_the_carriers_thickness_doubles_its_lag() -> None:
    joint = weldable.bond_stiffness(1e9, 5e-5)
    once = weldable.lag_length(joint, 2e11, 1e-4)
    assert 2 * once == pytest.approx(weldable.lag_length(joint, 2e11, 4e-4))
    assert once / 2 == pytest.approx(weldable.lag_length(4 * joint, 2e11, 1e-4))


def test_twice_the_spots_make_twice_the_stiffness() -> None:
    once = weldable.spot_joint_stiffness(1e7, 8e-4, 1e-3)
    assert 2 * once == pytest.approx(weldable.spot_joint_stiffness(1e7, 4e-4, 1e-3))


def test_the_factor_on_the_part_shows_what_the_sample_showed() -> None:
    transfer = weldable.transfer_of_sample(-950e-6, -1000e-6)
    assert 1.9 == pytest.approx(weldable.factor_on_part(2.0, transfer))


def test_a_carrier_that_lags_is_noticed() -> None:
    assert () == weldable.grid_transfer_notices(0.006, 0.020, 0.001)
    assert "calibrate a sample" in weldable.grid_transfer_notices(0.006, 0.008, 0.001)[0].message


def test_every_formula_takes_floats_arrays_and_uncertain_numbers() -> None:
    assert_takes_every_kind(weldable.spot_joint_stiffness, 1e7, 8e-4, 1e-3)
    assert_takes_every_kind(weldable.lag_length, 2e13, 2e11, 1e-4)
    assert_takes_every_kind(weldable.carrier_strain, 0.004, 0.02, 0.003)
    assert_takes_every_kind(weldable.grid_transfer, 0.006, 0.02, 0.003)
    assert_takes_every_kind(weldable.transfer_of_sample, 9e-4, 1e-3)
    assert_takes_every_kind(weldable.factor_on_part, 2.0, 0.95)


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: weldable.spot_joint_stiffness(0.0, 1.0, 1.0), "spot must be greater than zero"),
        (lambda: weldable.spot_joint_stiffness(1.0, 0.0, 1.0), "pitch must be greater"),
        (lambda: weldable.bond_stiffness(1.0, 0.0), "thickness must be greater than zero"),
        (lambda: weldable.lag_length(0.0, 1.0, 1.0), "joint must be greater than zero"),
        (lambda: weldable.carrier_strain(2.0, 1.0, 1.0), "position must not exceed half"),
        (lambda: weldable.carrier_strain(math.nan, 1.0, 1.0), "position must be a finite"),
        (lambda: weldable.grid_transfer(2.0, 1.0, 1.0), "grid must not exceed the carrier"),
        (lambda: weldable.factor_on_part(2.0, 0.0), "transfer must be greater than zero"),
        (lambda: weldable.transfer_of_sample(1.0, 0.0), "applied must not be zero"),
        (lambda: weldable.transfer_of_sample(-1.0, 1.0), "indicated must have the sign"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
