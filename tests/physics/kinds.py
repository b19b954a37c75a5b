"""Holds one formula to the same answer for floats, arrays and uncertain numbers."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from typing import Any

import numpy as np
import pytest
from uncertainties import ufloat

Formula = Callable[..., Any]


def assert_takes_every_kind(formula: Formula, *arguments: float) -> None:
    """Arrays give what floats give; an uncertain argument's slope is the finite difference."""
    plain = formula(*arguments)
    arrays = [np.full(3, argument) for argument in arguments]
    assert [plain] * 3 == pytest.approx(list(formula(*arrays)), rel=1e-12)
    for place, argument in enumerate(arguments):
        step = max(abs(argument), 1e-6) * 1e-5
        uncertain = ufloat(argument, step)
        found = formula(*_replaced(arguments, place, uncertain))
        assert plain == pytest.approx(found.nominal_value, rel=1e-12)
        slope = _slope(formula, arguments, place, step)
        rounding = 1e-15 / step * max(1.0, abs(plain))
        assert slope == pytest.approx(found.derivatives[uncertain], rel=1e-4, abs=rounding)


def _slope(formula: Formula, arguments: Sequence[float], place: int, step: float) -> float:
    above = formula(*_replaced(arguments, place, arguments[place] + step))
    below = formula(*_replaced(arguments, place, arguments[place] - step))
    return float(above - below) / (2 * step)


def _replaced(arguments: Sequence[Any], place: int, value: Any) -> list[Any]:
    return [value if number == place else old for number, old in enumerate(arguments)]
