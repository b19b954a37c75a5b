"""Properties of the bridge: round trips, symmetry, limits, and what it refuses."""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics import arrangements, bridge
from gaugelog.physics.validity import OutOfDomain
from tests.physics.kinds import assert_takes_every_kind

OHM = st.floats(1.0, 1e5)
STRAIN = st.floats(-0.01, 0.01)
FACTOR = st.floats(1.5, 4.0)
NAME = st.sampled_from(sorted(arrangements.ARRANGEMENTS))
LINEAR = ("half bending", "full bending", "full torsion")


@given(OHM, OHM, OHM, OHM, st.floats(0.1, 10.0))
def test_the_output_depends_on_ratios_of_arms_alone(
    one: float, two: float, three: float, four: float, scale: float
) -> None:
    found = bridge.output_ratio(one, two, three, four)
    scaled = bridge.output_ratio(scale * one, scale * two, scale * three, scale * four)
    assert found == pytest.approx(scaled, abs=1e-12)
    assert -1 < found < 1


@given(OHM, OHM, OHM, OHM)
def test_a_constant_current_drives_the_ratio_through_the_bridges_resistance(
    one: float, two: float, three: float, four: float
) -> None:
    seen = (one + two) * (three + four) / (one + two + three + four)
    found = bridge.current_output(one, two, three, four)
    assert bridge.output_ratio(one, two, three, four) * seen == pytest.approx(found, abs=1e-9)


@given(OHM, OHM, OHM, OHM)
def test_exchanging_neighbours_turns_the_sign(
    one: float, two: float, three: float, four: float
) -> None:
    found = bridge.output_ratio(one, two, three, four)
    assert -found == pytest.approx(bridge.output_ratio(two, one, four, three), abs=1e-12)
    assert found == pytest.approx(bridge.output_ratio(three, four, one, two), abs=1e-12)


@given(STRAIN, FACTOR, NAME, st.floats(0.0, 0.45), st.floats(-0.02, 0.02))
def test_strain_comes_back_from_its_output_with_initial_unbalance(
    strain: float, factor: float, name: str, poisson: float, initial: float
) -> None:
    ratio = bridge.strain_output(strain, factor, name, poisson, initial)
    found = bridge.actual_strain(ratio, factor, name, poisson, initial)
    assert strain == pytest.approx(found, abs=1e-12)


@given(NAME, st.floats(-0.2, 0.2), st.floats(0.0, 0.45))
def test_without_strain_the_output_is_the_initial_one(
    name: str, initial: float, poisson: float
) -> None:
    found = bridge.strain_output(0.0, 2.0, name, poisson, initial)
    assert initial == pytest.approx(found, abs=1e-14)


@given(STRAIN, FACTOR, st.sampled_from(LINEAR))
def test_bending_and_torsion_bridges_are_exactly_linear(
    strain: float, factor: float, name: str
) -> None:
    ratio = bridge.strain_output(strain, factor, name)
    assert strain == pytest.approx(bridge.indicated_strain(ratio, factor, name), abs=1e-15)


@given(st.floats(1e-6, 0.01), FACTOR, NAME, st.floats(0.0, 0.45))
def test_the_two_percentages_of_non_linearity_belong_together(
    strain: float, factor: float, name: str, poisson: float
) -> None:
    of_indicated = bridge.nonlinearity_of_indicated(strain, factor, name, poisson)
    of_actual = bridge.nonlinearity_of_actual(strain, factor, name, poisson)
    assert of_actual == pytest.approx(of_indicated / (1 + of_indicated), abs=1e-9)


@given(NAME, st.floats(0.0, 0.45))
def test_small_strains_are_read_without_error_by_every_arrangement(
    name: str, poisson: float
) -> None:
    found = bridge.nonlinearity_of_actual(1e-5, 2.0, name, poisson)
    assert 0.0 == pytest.approx(found, abs=2e-5)


def test_the_linear_form_of_equal_arms_is_a_quarter_of_the_sum() -> None:
    found = bridge.linear_ratio((350.0, 350.0, 350.0, 350.0), (4e-3, -3e-3, 2e-3, -1e-3))
    assert 10e-3 / 4 == pytest.approx(found)


@pytest.mark.parametrize("name", sorted(arrangements.ARRANGEMENTS))
def test_every_formula_takes_floats_arrays_and_uncertain_numbers(name: str) -> None:
    assert_takes_every_kind(
        lambda strain, factor, poisson: bridge.strain_output(strain, factor, name, poisson, 0.001),
        0.002,
        2.1,
        0.3,
    )
    assert_takes_every_kind(
        lambda ratio, factor: bridge.actual_strain(ratio, factor, name, 0.3, 0.001), 0.002, 2.1
    )
    assert_takes_every_kind(
        lambda ratio, setting: bridge.indicated_strain(ratio, setting, name, 0.3), 0.002, 2.1
    )
    assert_takes_every_kind(
        lambda strain, factor: bridge.nonlinearity_of_indicated(strain, factor, name, 0.3),
        0.02,
        2.1,
    )


def test_four_arms_take_floats_arrays_and_uncertain_numbers() -> None:
    assert_takes_every_kind(bridge.output_ratio, 351.0, 349.0, 352.0, 350.0)
    assert_takes_every_kind(bridge.current_output, 351.0, 349.0, 352.0, 350.0)


def test_a_notice_counts_the_worst_of_an_array() -> None:
    strains = np.array([1e-5, -0.01])
    (notice,) = bridge.indicated_strain_notices(strains, 2.0, "quarter two-wire")
    assert "10000 µm/m" in notice.message
    assert () == bridge.indicated_strain_notices(strains, 2.0, "full bending")
    assert () == bridge.indicated_strain_notices(0.0, 2.0, "quarter two-wire")


def test_poisson_counts_only_where_a_grid_lies_across() -> None:
    across = {name for name, each in arrangements.ARRANGEMENTS.items() if each.needs_poisson}
    assert {"half Poisson", "full Poisson"} == across
    assert 2.6 == pytest.approx(arrangements.bridge_factor("full Poisson", 0.3))


@pytest.mark.parametrize(
    ("call", "sentence"),
    [
        (lambda: bridge.output_ratio(-350.0, 1.0, 1.0, 1.0), "arm_1 must be greater than zero"),
        (lambda: bridge.output_ratio(1.0, 1.0, 0.0, 1.0), "arm_3 must be greater than zero"),
        (lambda: bridge.output_ratio(1.0, math.nan, 1.0, 1.0), "arm_2 must be a finite number"),
        (lambda: bridge.strain_output(math.nan, 2.0, "full bending"), "strain must be a finite"),
        (lambda: bridge.strain_output(0.001, 0.0, "full bending"), "factor must not be zero"),
        (lambda: bridge.strain_output(-0.6, 2.0, "quarter two-wire"), "strain times factor must"),
        (lambda: bridge.strain_output(0.001, 2.0, "third"), "arrangement must be one of quarter"),
        (lambda: bridge.indicated_strain(0.001, 0.0), "setting must not be zero"),
        (lambda: bridge.actual_strain(0.5, 2.0, "half bending"), "ratio must lie between -0.5"),
        (lambda: bridge.actual_strain(1.2, 2.0, "full bending"), "ratio must lie between -1 and"),
        (lambda: bridge.strain_output(0.0, 2.0, "full Poisson", 0.7), "poisson must lie between"),
        (lambda: bridge.strain_output(0.0, 2.0, "full bending", 0, 0.5), "initial must lie"),
        (lambda: bridge.nonlinearity_of_actual(0.0, 2.0, "full bending"), "strain must not be"),
    ],
)
def test_what_cannot_be_is_refused_by_name(call: object, sentence: str) -> None:
    assert callable(call)
    with pytest.raises(OutOfDomain, match=sentence):
        call()
