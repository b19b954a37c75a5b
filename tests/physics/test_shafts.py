"""Shafts: torque to strain and back, at any angle and with any bore."""

from __future__ import annotations

import math

import numpy
import pytest
from hypothesis import given
from hypothesis import strategies as st
from uncertainties import ufloat

from gaugelog.physics.shafts import (
    polar_modulus,
    shear_strain,
    strain_on_shaft,
    torque_from_pair,
    torque_from_shear,
    torque_from_strain,
)
from gaugelog.physics.validity import OutOfDomain

TORQUE = st.floats(-1e4, 1e4)
STEEL = 79.3e9
FORTY_FIVE = math.pi / 4


@given(TORQUE, st.floats(0.1, 1.4), st.floats(0.02, 0.5), st.floats(0.0, 0.9))
def test_a_gauge_at_any_slant_gives_the_torque_back(
    torque: float, angle: float, outer: float, bore: float
) -> None:
    strain = strain_on_shaft(torque, STEEL, angle, outer, bore * outer)
    assert torque == pytest.approx(torque_from_strain(strain, STEEL, angle, outer, bore * outer))


@given(TORQUE, st.floats(-1e-3, 1e-3))
def test_a_shear_pair_feels_no_stretch_that_both_share(torque: float, shared: float) -> None:
    plus, minus = (
        strain_on_shaft(torque, STEEL, sign * FORTY_FIVE, 0.05) + shared for sign in (1, -1)
    )
    assert torque == pytest.approx(torque_from_pair(plus, minus, STEEL, 0.05), abs=1e-6)


@given(TORQUE)
def test_gauges_along_and_across_the_shaft_feel_nothing(torque: float) -> None:
    for angle in (0.0, math.pi / 2):
        assert 0.0 == pytest.approx(strain_on_shaft(torque, STEEL, angle, 0.05), abs=1e-15)


def test_a_bore_of_half_the_diameter_costs_a_sixteenth() -> None:
    assert 15 / 16 == pytest.approx(polar_modulus(0.05, 0.025) / polar_modulus(0.05))


def test_arrays_and_uncertain_numbers_go_through_the_same_formula() -> None:
    torques = numpy.array([100.0, 200.0])
    assert [shear_strain(each, STEEL, 0.05) for each in torques] == list(
        shear_strain(torques, STEEL, 0.05)
    )
    found = torque_from_shear(ufloat(250e-6, 1e-6), STEEL, ufloat(0.05, 1e-5))
    relative = math.hypot(1 / 250, 3 * 1e-5 / 0.05)
    assert found.nominal_value * relative == pytest.approx(found.std_dev)


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: polar_modulus(0.0), "outer must be greater than zero"),
        (lambda: polar_modulus(0.05, 0.06), "inner must be smaller than outer"),
        (lambda: shear_strain(1.0, -1.0, 0.05), "stiffness must be greater than zero"),
        (lambda: torque_from_strain(1e-4, STEEL, 0.0, 0.05), "angle must not lie along or across"),
        (lambda: torque_from_strain(1e-4, STEEL, math.pi / 2, 0.05), "angle must not lie along"),
        (lambda: torque_from_pair(math.nan, 0.0, STEEL, 0.05), "plus must be a finite number"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
