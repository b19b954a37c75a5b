"""The guards of arguments, held to NumPy's and the standard library's notion of a number."""

from __future__ import annotations

import math
from collections.abc import Callable
from typing import Any

import numpy as np
import pytest

from gaugelog.physics import validity
from gaugelog.physics.validity import OutOfDomain

CHECKS = (
    validity.finite,
    validity.positive,
    validity.positive_or_infinite,
    validity.not_negative,
    validity.not_zero,
    validity.between,
    validity.strictly_between,
    validity.above,
    validity.one_of,
    validity.largest,
    validity.shown,
)
VALUES = [0.0, -0.0, 1.0, -1.0, 5e-324, -5e-324, 1e308, math.inf, -math.inf, math.nan]

RULES: list[tuple[Callable[[str, Any], Any], Callable[[Any], Any]]] = [
    (validity.finite, np.isfinite),
    (validity.positive, lambda x: np.isfinite(x) & np.greater(x, 0)),
    (validity.positive_or_infinite, lambda x: np.greater(x, 0)),
    (validity.not_negative, lambda x: np.isfinite(x) & np.greater_equal(x, 0)),
    (validity.not_zero, lambda x: np.isfinite(x) & np.not_equal(x, 0)),
    (lambda n, v: validity.between(n, v, -1.0, 1.0), lambda x: np.less_equal(np.abs(x), 1)),
    (lambda n, v: validity.strictly_between(n, v, -1.0, 1.0), lambda x: np.less(np.abs(x), 1)),
    (lambda n, v: validity.above(n, v, -1.0), lambda x: np.isfinite(x) & np.greater(x, -1)),
]


def _passes(guard: Callable[[str, Any], Any], value: Any) -> bool:
    try:
        guard("value", value)
    except OutOfDomain:
        return False
    return True


@pytest.mark.parametrize(("guard", "rule"), RULES)
def test_each_guard_passes_what_numpy_passes(
    guard: Callable[[str, Any], Any], rule: Callable[[Any], Any]
) -> None:
    """NumPy's comparisons follow IEEE 754, as the guards must, for one value and for many."""
    for value in VALUES:
        assert bool(rule(value)) == _passes(guard, value)
        pair = np.array([0.5, value])
        assert bool(np.all(rule(pair))) == _passes(guard, pair)


def test_a_choice_is_membership() -> None:
    assert _passes(lambda n, v: validity.one_of(n, v, (1, 2)), 2)
    assert not _passes(lambda n, v: validity.one_of(n, v, (1, 2)), 3)


def test_the_largest_is_numpys_largest() -> None:
    draw = np.random.default_rng(8)
    for size in (1, 2, 50):
        values = draw.normal(size=size)
        assert np.max(np.abs(values)) == validity.largest(values)


def test_values_are_shown_as_the_format_language_of_the_standard_library_does() -> None:
    for value in (350.0, 1e-9, -273.15, math.nan):
        assert format(value, "g") == validity.shown(value)
    assert repr("350 ohm") == validity.shown("350 ohm")
