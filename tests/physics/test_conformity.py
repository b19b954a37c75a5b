"""Verdicts: the four words, the probability of conformance, and readings that are only bounds."""

from __future__ import annotations

import math

import numpy
import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics.change import difference_uncertainty, instrument_uncertainty
from gaugelog.physics.conformity import (
    Judgement,
    Limits,
    Words,
    guard_band,
    judge,
    probability_of_conformance,
    undecided,
)
from gaugelog.physics.validity import OutOfDomain

FLOOR = Limits(10.0, None)
VALUES = st.floats(-1e6, 1e6)
UNCERTAINTIES = st.floats(1e-6, 1e6)


def _insulation(gigaohm: float, qualifier: str = "=") -> Judgement:
    """A floor of 10 GΩ and a meter of ±10 % of reading, k = 2."""
    return judge(
        gigaohm, instrument_uncertainty(gigaohm, 0.1, 0.0, 0.0), FLOOR, qualifier=qualifier
    )


@pytest.mark.parametrize(
    ("gigaohm", "word", "probability"),
    [
        (12.0, Words.PASS, 0.998),
        (11.0, Words.CONDITIONAL_PASS, 0.942),
        (9.5, Words.CONDITIONAL_FAIL, 0.181),
        (8.9, Words.FAIL, 0.016),
    ],
)
def test_an_insulation_reading_gets_its_word_and_probability(
    gigaohm: float, word: Words, probability: float
) -> None:
    found = _insulation(gigaohm)
    assert word is found.word
    assert found.probability is not None
    assert probability == round(found.probability, 3)


def test_a_bound_far_above_the_floor_passes_without_a_probability() -> None:
    found = _insulation(20.0, ">")
    assert (Words.PASS, None) == (found.word, found.probability)


@pytest.mark.parametrize("bound", [5.0, 11.0])
def test_a_bound_that_less_its_uncertainty_is_below_the_floor_is_undecided(bound: float) -> None:
    found = _insulation(bound, ">")
    assert (Words.UNDECIDED, None) == (found.word, found.probability)


def test_a_value_known_to_lie_below_a_bound_below_the_floor_fails() -> None:
    assert Words.FAIL is _insulation(5.0, "<").word
    assert Words.UNDECIDED is _insulation(9.5, "<").word


def test_an_overload_is_a_bound_at_the_end_of_the_range() -> None:
    assert _insulation(20.0, ">") == _insulation(20.0, "overload")
    assert Words.UNDECIDED is judge(math.nan, 0.0, FLOOR, qualifier="overload").word


def test_an_overload_beyond_an_upper_limit_fails() -> None:
    assert Words.FAIL is judge(10.0, 0.1, Limits(None, 5.0), qualifier="overload").word
    assert Words.FAIL is judge(10.0, 0.1, Limits(1.0, 5.0), qualifier="overload").word


def test_a_bound_never_passes_between_two_limits() -> None:
    assert Words.UNDECIDED is judge(7.0, 0.1, Limits(5.0, 10.0), qualifier=">").word
    assert Words.UNDECIDED is judge(7.0, 0.1, Limits(5.0, 10.0), qualifier="<").word


def test_a_change_read_by_one_meter_passes() -> None:
    limit = 0.003 * 350.4
    u = difference_uncertainty(350.4, 351.2, True, 0.0005, 0.1, 0.01)
    assert Words.PASS is judge(351.2 - 350.4, u, Limits(-limit, limit)).word


def test_the_same_change_read_by_two_meters_passes_on_condition() -> None:
    limit = 0.003 * 350.4
    u = difference_uncertainty(350.4, 351.2, False, 0.0005, 0.1, 0.01)
    found = judge(351.2 - 350.4, u, Limits(-limit, limit))
    assert Words.CONDITIONAL_PASS is found.word
    assert found.probability is not None
    assert 0.868 == round(found.probability, 3)


def test_a_reading_on_its_limit_is_inside_despite_rounding() -> None:
    change = (351.05 - 350) / 350
    assert change > 0.003
    assert Words.PASS is judge(change, 0.0, Limits(None, 0.003)).word


def test_limits_too_close_for_the_uncertainty_say_so() -> None:
    found = judge(5.0, 2.0, Limits(4.0, 6.0))
    assert Words.CONDITIONAL_PASS is found.word
    assert "nothing could pass" in found.reason
    assert "nothing could pass" not in judge(5.0, 0.6, Limits(4.0, 6.5)).reason


def test_without_uncertainty_only_pass_and_fail_remain() -> None:
    inside, outside = judge(10.0, 0.0, FLOOR), judge(9.99, 0.0, FLOOR)
    assert (Words.PASS, 1.0) == (inside.word, inside.probability)
    assert (Words.FAIL, 0.0) == (outside.word, outside.probability)


def test_what_lacks_information_is_undecided_with_its_reason() -> None:
    found = undecided("The meter has no certificate.")
    assert (Words.UNDECIDED, None) == (found.word, found.probability)
    assert "The meter has no certificate." == found.reason


@given(VALUES, UNCERTAINTIES, VALUES)
def test_half_of_the_values_read_on_a_single_limit_conform(
    limit: float, uncertainty: float, shift: float
) -> None:
    assert 0.5 == probability_of_conformance(limit, uncertainty, Limits(limit, None))
    low = probability_of_conformance(limit + shift, uncertainty, Limits(limit, None))
    high = probability_of_conformance(limit + shift, uncertainty, Limits(None, limit))
    assert 1.0 == pytest.approx(low + high)


@given(VALUES, UNCERTAINTIES, VALUES, VALUES)
def test_a_mirrored_reading_gets_the_same_judgement(
    value: float, uncertainty: float, one: float, other: float
) -> None:
    low, high = min(one, other), max(one, other)
    found = judge(value, uncertainty, Limits(low, high))
    mirrored = judge(-value, uncertainty, Limits(-high, -low))
    assert found.word is mirrored.word
    assert found.margin == mirrored.margin
    assert found.probability == pytest.approx(mirrored.probability)


@given(VALUES, UNCERTAINTIES, VALUES)
def test_a_pass_at_k_two_is_wrong_in_at_most_one_case_in_forty(
    value: float, uncertainty: float, limit: float
) -> None:
    found = judge(value, uncertainty, Limits(limit, None))
    assert found.probability is not None
    if found.word is Words.PASS and found.guard_band > 1e-3:
        assert found.probability > 0.9749
    assert found.word is not Words.FAIL or found.probability < 0.0251


@given(VALUES, UNCERTAINTIES, VALUES)
def test_a_bound_passes_only_where_the_bound_itself_would(
    bound: float, uncertainty: float, limit: float
) -> None:
    censored = judge(bound, uncertainty, Limits(limit, None), qualifier=">")
    if censored.word is Words.PASS:
        assert Words.PASS is judge(bound, uncertainty, Limits(limit, None)).word
    assert censored.word is not Words.FAIL


def test_an_array_of_readings_has_the_probabilities_of_each() -> None:
    values = numpy.array([12.0, 11.0, 9.5])
    found = probability_of_conformance(values, values * 0.1 / math.sqrt(3), FLOOR)
    assert [0.998, 0.942, 0.181] == [round(each, 3) for each in found]


def test_the_far_tail_is_not_lost_to_rounding() -> None:
    found = probability_of_conformance(0.0, 1.0, Limits(20.0, 21.0))
    assert 2.75e-89 == pytest.approx(found, rel=0.01)


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: Limits(None, None), "limits must have a lower or an upper limit"),
        (lambda: Limits(2.0, 1.0), "lower limit must not exceed the upper limit"),
        (lambda: Limits(math.nan, 1.0), "lower must be a finite number"),
        (lambda: judge(math.nan, 1.0, FLOOR), "value must be a finite number"),
        (lambda: judge(1.0, -1.0, FLOOR), "standard_uncertainty must not be negative"),
        (lambda: judge(1.0, 1.0, FLOOR, coverage=0.0), "coverage must be greater than zero"),
        (lambda: judge(1.0, 1.0, FLOOR, qualifier="~"), "qualifier must be one of"),
        (lambda: guard_band(-0.1), "standard_uncertainty must not be negative"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
