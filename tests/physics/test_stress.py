"""Stress from strain: invariants of rotation, limits, kinds of number, bad input."""

from __future__ import annotations

from collections.abc import Callable
from math import nan, pi

import pytest
from hypothesis import assume, given
from hypothesis import strategies as st

from gaugelog.physics import plane, stress
from gaugelog.physics.plane import PlaneStrain
from gaugelog.physics.stress import PlaneStress
from gaugelog.physics.validity import OutOfDomain
from tests.physics.kinds import assert_takes_every_kind

STRAIN = st.floats(-2e-3, 2e-3)
STRESS = st.floats(-500e6, 500e6)
ANGLE = st.floats(-pi, pi)
POISSON = st.floats(0.0, 0.5)


@given(STRAIN, STRAIN, STRAIN, ANGLE, POISSON)
def test_in_an_isotropic_part_strain_turned_is_stress_turned(
    x: float, y: float, shear: float, angle: float, poisson: float
) -> None:
    state = PlaneStrain(x, y, shear)
    one = stress.isotropic_stress(plane.turned(state, angle), 206e9, poisson)
    other = stress.turned_stress(stress.isotropic_stress(state, 206e9, poisson), angle)
    assert [one.x, one.y, one.shear] == pytest.approx([other.x, other.y, other.shear], abs=1e-3)


@given(STRAIN, STRAIN, STRAIN, POISSON)
def test_in_an_isotropic_part_stress_and_strain_have_one_direction(
    x: float, y: float, shear: float, poisson: float
) -> None:
    state = PlaneStrain(x, y, shear)
    assume(plane.mohr_circle(state).radius > 1e-7)
    strain = plane.principal_strains(state).angle
    found = stress.principal_stresses(stress.isotropic_stress(state, 70e9, poisson)).angle
    assert strain is not None
    assert found is not None
    assert 0.0 == pytest.approx((found - strain + pi / 2) % pi - pi / 2, abs=1e-6)


@given(STRESS, STRESS, STRESS, ANGLE)
def test_von_mises_stress_does_not_turn_with_the_axes(
    x: float, y: float, shear: float, angle: float
) -> None:
    given_stress = PlaneStress(x, y, shear)
    here = stress.von_mises(given_stress)
    there = stress.von_mises(stress.turned_stress(given_stress, angle))
    assert here == pytest.approx(there, rel=1e-9, abs=1.0)


@given(STRESS, STRESS, STRESS)
def test_von_mises_stress_is_that_of_the_principal_stresses(
    x: float, y: float, shear: float
) -> None:
    ends = stress.principal_stresses(PlaneStress(x, y, shear))
    plain = stress.von_mises(PlaneStress(ends.largest, ends.smallest, 0.0))
    assert plain == pytest.approx(stress.von_mises(PlaneStress(x, y, shear)), rel=1e-9, abs=1.0)


def test_equal_stress_all_round_has_no_direction() -> None:
    assert stress.principal_stresses(PlaneStress(80e6, 80e6, 0.0)).angle is None


def test_a_layer_off_its_axes_is_stressed_in_another_direction_than_it_is_strained() -> None:
    state = PlaneStrain(500e-6, 100e-6, 400e-6)
    layer = stress.orthotropic_stress(state, 140e9, 10e9, 0.3, 5e9)
    found, strain = stress.principal_stresses(layer).angle, plane.principal_strains(state).angle
    assert found is not None
    assert strain is not None
    assert strain - found > 0.3


def test_a_layer_without_poisson_contraction_is_two_bars_side_by_side() -> None:
    found = stress.orthotropic_stress(PlaneStrain(1e-3, 2e-3, 3e-3), 100e9, 10e9, 0.0, 5e9)
    assert [100e6, 20e6, 15e6] == pytest.approx([found.x, found.y, found.shear])


def test_every_formula_takes_floats_arrays_and_uncertain_numbers() -> None:
    def isotropic(x: float, y: float, shear: float, *constants: float) -> object:
        return stress.von_mises(stress.isotropic_stress(PlaneStrain(x, y, shear), *constants))

    def layer(x: float, y: float, shear: float, *constants: float) -> object:
        return stress.von_mises(stress.orthotropic_stress(PlaneStrain(x, y, shear), *constants))

    assert_takes_every_kind(isotropic, 4e-4, -2e-4, 4e-4, 206e9, 0.3)
    assert_takes_every_kind(layer, 4e-4, -2e-4, 4e-4, 140e9, 10e9, 0.3, 5e9)
    for part in ("largest", "angle"):
        assert_takes_every_kind(
            lambda *given, part=part: getattr(stress.principal_stresses(PlaneStress(*given)), part),
            *(80e6, -30e6, 25e6),
        )
    assert_takes_every_kind(lambda *given: stress.von_mises(PlaneStress(*given)), 80e6, -30e6, 25e6)


STATE = PlaneStrain(1e-4, 0.0, 0.0)


@pytest.mark.parametrize(
    ("call", "sentence"),
    [
        (lambda: stress.isotropic_stress(STATE, -206e9, 0.3), "modulus must be greater than"),
        (lambda: stress.isotropic_stress(STATE, nan, 0.3), "modulus must be a finite"),
        (lambda: stress.isotropic_stress(STATE, 206e9, 0.6), "poisson must lie between -1 and 0.5"),
        (lambda: stress.isotropic_stress(STATE, 206e9, -1.0), "poisson must be greater than -1"),
        (lambda: stress.orthotropic_stress(STATE, 1e9, 9e9, 0.4, 1e9), "poisson is too large"),
        (lambda: stress.orthotropic_stress(STATE, 1e9, 9e9, nan, 1e9), "poisson must be a finite"),
        (lambda: stress.orthotropic_stress(STATE, 0.0, 9e9, 0.1, 1e9), "along must be greater"),
        (lambda: stress.orthotropic_stress(STATE, 1e9, 0.0, 0.1, 1e9), "across must be greater"),
        (lambda: stress.orthotropic_stress(STATE, 1e9, 9e9, 0.1, 0.0), "shear must be greater"),
        (lambda: stress.turned_stress(PlaneStress(1e6, 0.0, 0.0), nan), "angle must be a finite"),
        (lambda: PlaneStress(0.0, nan, 0.0), "y must be a finite"),
    ],
)
def test_what_cannot_be_is_refused_by_name(call: Callable[[], object], sentence: str) -> None:
    with pytest.raises(OutOfDomain, match=f"^{sentence}"):
        call()
