"""Arguments without meaning are refused in one sentence that names them."""

from __future__ import annotations

from collections.abc import Callable
from typing import Any

import numpy as np
import pytest
from uncertainties import ufloat

from gaugelog.errors import ExitCode
from gaugelog.physics import validity
from gaugelog.physics.validity import OutOfDomain

Check = Callable[[str, Any], Any]

REFUSED: list[tuple[Check, Any, str]] = [
    (validity.finite, float("nan"), "gap must be a finite number, not nan."),
    (validity.finite, float("inf"), "gap must be a finite number, not inf."),
    (validity.finite, "350", "gap must be a number, not '350'."),
    (validity.finite, None, "gap must be a number, not None."),
    (validity.finite, np.array([1.0, np.nan]), "gap must be a finite number, not an array of 2"),
    (validity.finite, ufloat(float("nan"), 0.1), "gap must be a finite number"),
    (validity.positive, 0.0, "gap must be greater than zero, not 0."),
    (validity.positive, -350.0, "gap must be greater than zero, not -350."),
    (validity.positive, ufloat(-1.0, 0.1), "gap must be greater than zero, not -1.00+/-0.10."),
    (validity.positive, np.array([1.0, -1.0]), "gap must be greater than zero, not an array"),
    (validity.positive_or_infinite, -1.0, "gap must be greater than zero, not -1."),
    (validity.positive_or_infinite, float("nan"), "gap must be greater than zero, not nan."),
    (validity.not_negative, -0.1, "gap must not be negative, not -0.1."),
    (validity.not_zero, 0.0, "gap must not be zero, not 0."),
]


@pytest.mark.parametrize(("check", "value", "sentence"), REFUSED)
def test_an_argument_without_meaning_is_named(check: Check, value: Any, sentence: str) -> None:
    with pytest.raises(OutOfDomain) as caught:
        check("gap", value)
    assert caught.value.message.startswith(sentence)
    assert "gap" == caught.value.argument
    assert ExitCode.FAULTS == caught.value.exit_code


ACCEPTED: list[tuple[Check, Any]] = [
    (validity.finite, -3.0),
    (validity.positive, 1e-12),
    (validity.positive, 5),
    (validity.positive_or_infinite, float("inf")),
    (validity.not_negative, 0.0),
    (validity.not_zero, -150.0),
]


@pytest.mark.parametrize(("check", "value"), ACCEPTED)
def test_an_argument_with_meaning_comes_back_as_it_came(check: Check, value: Any) -> None:
    assert value == check("gap", value)


def test_arrays_and_uncertain_numbers_come_back_as_they_came() -> None:
    array, uncertain = np.array([1.0, 2.0]), ufloat(1.0, 0.1)
    assert array is validity.positive("gap", array)
    assert uncertain is validity.positive("gap", uncertain)
    assert array is validity.between("gap", array, 1.0, 2.0)


def test_limits_are_included_or_not_as_the_name_says() -> None:
    assert 2.0 == validity.between("gap", 2.0, 1.0, 2.0)
    with pytest.raises(OutOfDomain, match="gap must lie between 1 and 2, not 2"):
        validity.strictly_between("gap", 2.0, 1.0, 2.0)
    with pytest.raises(OutOfDomain, match=r"gap must lie between 1 and 2, not 2\.1"):
        validity.between("gap", 2.1, 1.0, 2.0)
    with pytest.raises(OutOfDomain, match=r"gap must be greater than -273\.15, not -300"):
        validity.above("gap", -300.0, -273.15)


def test_a_choice_lists_what_may_be_chosen() -> None:
    assert 2 == validity.one_of("arm", 2, (1, 2))
    with pytest.raises(OutOfDomain, match="arm must be one of 1, 2, not 3"):
        validity.one_of("arm", 3, (1, 2))


def test_the_largest_magnitude_leaves_sign_and_uncertainty_aside() -> None:
    assert 3.0 == validity.largest(np.array([1.0, -3.0]))
    assert 3.0 == validity.largest(ufloat(-3.0, 1.0))
    assert 3.0 == validity.largest(-3)


def test_an_array_that_crosses_zero_may_still_avoid_it() -> None:
    crossing = np.array([-1.0, 1.0])
    assert crossing is validity.not_zero("gap", crossing)
    with pytest.raises(OutOfDomain, match="gap must not be zero"):
        validity.not_zero("gap", np.array([-1.0, 0.0, 1.0]))


@pytest.mark.parametrize("values", [np.array(["350"]), np.array([None]), ["350"], object()])
def test_what_is_no_number_is_refused_in_arrays_too(values: Any) -> None:
    with pytest.raises(OutOfDomain, match="gap must be a "):
        validity.finite("gap", values)


def test_an_empty_array_is_refused() -> None:
    with pytest.raises(OutOfDomain, match="gap must hold at least one value"):
        validity.positive("gap", np.array([]))


def test_an_uncertain_number_without_a_finite_uncertainty_is_refused() -> None:
    with pytest.raises(OutOfDomain, match="gap must be a finite number"):
        validity.positive("gap", ufloat(1.0, float("nan")))
