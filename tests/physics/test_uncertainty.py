"""Budgets: shares, correlations, curvature, and the derivative of a formula as it stands."""

from __future__ import annotations

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics._maths import Number, cos
from gaugelog.physics.bridge import actual_strain
from gaugelog.physics.estimates import Estimate, exactly, normal, rectangular
from gaugelog.physics.uncertainty import budget, checked_correlations, effective_dof
from gaugelog.physics.validity import OutOfDomain

VALUE = st.floats(-10, 10)
SMALL = st.floats(0.001, 0.1)


def _product(one: Number, other: Number) -> Number:
    return one * other


@given(VALUE, VALUE, SMALL, SMALL, st.floats(-1, 1))
def test_a_product_has_the_textbook_uncertainty(
    one: float, other: float, u_one: float, u_other: float, r: float
) -> None:
    inputs = {"one": normal(one, u_one), "other": normal(other, u_other)}
    found = budget(_product, inputs, {("other", "one"): r})
    first, second = other * u_one, one * u_other
    expected = max(first**2 + second**2 + 2 * r * first * second, 0.0)
    assert math.sqrt(expected) == pytest.approx(found.linear, rel=1e-6, abs=1e-7)


@given(VALUE, VALUE, SMALL, SMALL)
def test_shares_add_up_to_one_and_the_largest_stands_first(
    one: float, other: float, u_one: float, u_other: float
) -> None:
    found = budget(_product, {"one": normal(one, u_one), "other": normal(other, u_other)})
    shares = [part.share for part in found.parts]
    assert shares == sorted(shares, reverse=True)
    if found.uncertainty:
        assert 1.0 == pytest.approx(sum(shares))


def test_shares_add_up_to_one_with_correlations_too() -> None:
    inputs = {"one": normal(2.0, 0.1), "other": normal(3.0, 0.1)}
    found = budget(_product, inputs, {("one", "other"): -0.5})
    assert 1.0 == pytest.approx(sum(part.share for part in found.parts))


def test_the_derivative_through_a_formula_is_its_finite_difference() -> None:
    def model(ratio: Number, factor: Number) -> Number:
        return actual_strain(ratio, factor, "quarter three-wire")

    found = budget(model, {"ratio": normal(5e-4, 1e-6), "factor": normal(2.1, 0.01)})
    by_ratio = (model(5.001e-4, 2.1) - model(4.999e-4, 2.1)) / 2e-7
    by_factor = (model(5e-4, 2.1001) - model(5e-4, 2.0999)) / 2e-4
    assert by_ratio == pytest.approx(found.part("ratio").sensitivity, rel=1e-6)
    assert by_factor == pytest.approx(found.part("factor").sensitivity, rel=1e-6)


def test_a_misalignment_counts_by_its_curvature() -> None:
    half = math.radians(2)
    found = budget(lambda angle: cos(angle) ** 2, {"angle": rectangular(0.0, half)})
    assert 0.0 == found.linear
    assert -(half**2) / 3 == pytest.approx(found.shift, rel=1e-3)
    assert half**2 * math.sqrt(4 / 45) == pytest.approx(found.uncertainty, rel=1e-3)


def test_exact_inputs_have_no_part() -> None:
    found = budget(_product, {"one": normal(2.0, 0.1), "other": exactly(3.0)})
    assert ["one"] == [part.name for part in found.parts]
    assert 0.3 == pytest.approx(found.uncertainty)


def test_a_result_without_uncertain_inputs_has_none() -> None:
    found = budget(_product, {"one": exactly(2.0), "other": exactly(3.0)})
    assert (6.0, 0.0, math.inf) == (found.value, found.uncertainty, found.dof)


def test_an_input_the_model_does_not_use_adds_nothing() -> None:
    found = budget(lambda one, other: one, {"one": normal(1, 0.1), "other": normal(1, 0.1)})
    assert 0.0 == found.part("other").share
    alone = budget(lambda one: 5.0, {"one": normal(1, 0.1)})
    assert (0.0, 0.0) == (alone.uncertainty, alone.part("one").share)


def test_few_readings_raise_the_coverage_factor() -> None:
    inputs = {"one": normal(2.0, 0.1, dof=4), "other": normal(3.0, 0.001)}
    assert 2.776 == pytest.approx(budget(_product, inputs).coverage(0.95), abs=0.001)
    assert 1.96 == pytest.approx(
        budget(_product, {**inputs, "one": exactly(2.0)}).coverage(), abs=0.01
    )


def test_less_than_one_degree_of_freedom_still_has_a_factor() -> None:
    assert 12.7 == pytest.approx(
        budget(_product, {"one": normal(1, 0.1, 0.5), "other": exactly(1)}).coverage(), abs=0.01
    )


@given(st.lists(st.tuples(SMALL, st.integers(1, 50)), min_size=1, max_size=6))
def test_effective_freedom_lies_between_the_least_and_the_sum(
    pairs: list[tuple[float, int]],
) -> None:
    found = effective_dof([(u, float(dof)) for u, dof in pairs])
    least, whole = min(dof for _, dof in pairs), sum(dof for _, dof in pairs)
    assert least * (1 - 1e-9) <= found <= whole * (1 + 1e-9)


def test_correlations_with_exact_inputs_are_left_out() -> None:
    inputs: dict[str, Estimate] = {"one": normal(1, 0.1)}
    assert {} == checked_correlations(inputs, {("one", "other"): 0.5})


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: checked_correlations({}, {("a", "b"): 1.5}), "correlation of a and b must lie"),
        (lambda: checked_correlations({}, {("a", "a"): 0.5}), "must pair two inputs"),
        (lambda: budget(_product, {"one": exactly(1), "other": exactly(1)}).part("x"), "name must"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
