"""Where a formula holds: arguments that cannot be are refused, values beyond a limit are noticed.

A formula raises `OutOfDomain` for an argument that has no meaning (a negative resistance, a zero
factor, NaN). Outside the range in which it is trusted it still computes; the notices that stand
beside it say so, in words a person can be shown.
"""

from __future__ import annotations

import math
from collections.abc import Collection
from dataclasses import dataclass
from typing import TypeVar

from gaugelog.errors import ExitCode, GaugelogError
from gaugelog.physics._maths import Number, is_array, is_uncertain, nominal

_T = TypeVar("_T")


class OutOfDomain(GaugelogError):
    """An argument has no meaning for the formula; names the argument in one sentence."""

    exit_code = ExitCode.FAULTS

    def __init__(self, argument: str, message: str) -> None:
        super().__init__(f"{argument} {message}")
        self.argument = argument


@dataclass(frozen=True, slots=True)
class Notice:
    """A formula was used outside the range it is trusted in.

    `formula` is its name, `message` one sentence for a person, `source` where the limit stands.
    """

    formula: str
    message: str
    source: str


def finite(name: str, value: _T) -> _T:
    """`value` if every part of it is a finite number, else `OutOfDomain` naming it."""
    _finite_ends(name, value)
    return value


def positive(name: str, value: _T) -> _T:
    """`value` if it is finite and above zero everywhere."""
    least, _ = _finite_ends(name, value)
    return _require(name, value, least > 0, "must be greater than zero")


def positive_or_infinite(name: str, value: _T) -> _T:
    """`value` if it is above zero; infinity is allowed (an insulation without any leak)."""
    least, _ = _ends(name, value)
    return _require(name, value, least > 0, "must be greater than zero")


def not_negative(name: str, value: _T) -> _T:
    """`value` if it is finite and zero or more everywhere."""
    least, _ = _finite_ends(name, value)
    return _require(name, value, least >= 0, "must not be negative")


def not_zero(name: str, value: _T) -> _T:
    """`value` if it is finite and nowhere zero (a factor of either sign)."""
    least, most = _finite_ends(name, value)
    beside = least > 0 or most < 0 or (is_array(value) and bool((nominal(value) != 0).all()))
    return _require(name, value, beside, "must not be zero")


def between(name: str, value: _T, low: float, high: float) -> _T:
    """`value` if it is finite and from `low` to `high`, both included."""
    least, most = _finite_ends(name, value)
    inside = least >= low and most <= high
    return _require(name, value, inside, f"must lie between {low:g} and {high:g}")


def strictly_between(name: str, value: _T, low: float, high: float) -> _T:
    """`value` if it is finite and between `low` and `high`, neither included."""
    least, most = _finite_ends(name, value)
    inside = least > low and most < high
    return _require(name, value, inside, f"must lie between {low:g} and {high:g}")


def above(name: str, value: _T, low: float) -> _T:
    """`value` if it is finite and greater than `low` everywhere (a temperature, say)."""
    least, _ = _finite_ends(name, value)
    return _require(name, value, least > low, f"must be greater than {low:g}")


def one_of(name: str, value: _T, allowed: Collection[_T]) -> _T:
    """`value` if it is one of `allowed`; the sentence lists them."""
    if value not in allowed:
        raise OutOfDomain(
            name, f"must be one of {', '.join(str(each) for each in allowed)}, not {value}."
        )
    return value


def largest(value: Number) -> float:
    """The largest magnitude in `value`, its uncertainty left aside: what notices compare."""
    plain = nominal(value)
    return float(abs(plain).max()) if is_array(plain) else abs(float(plain))


def shown(value: Number) -> str:
    """A value as a sentence shows it; an array by its size only."""
    if is_array(value) and value.ndim:
        return f"an array of {value.size} values"
    if isinstance(value, str):
        return repr(value)
    return f"{value:g}" if isinstance(value, float) else str(value)


def _require(name: str, value: _T, holds: bool, must: str) -> _T:
    if not holds:
        raise OutOfDomain(name, f"{must}, not {shown(value)}.")
    return value


def _finite_ends(name: str, value: Number) -> tuple[float, float]:
    least, most = _ends(name, value)
    if not (math.isfinite(least) and math.isfinite(most)):
        raise OutOfDomain(name, f"must be a finite number, not {shown(value)}.")
    return least, most


def _ends(name: str, value: Number) -> tuple[float, float]:
    """Least and greatest of `value`, not-a-number where any part is; refuses what is no number.

    Two passes over an array without a copy: a formula is checked for little beside its own cost.
    """
    if type(value) is float:
        return value, value
    try:
        if is_array(value):
            plain = nominal(value)
            return float(plain.min()), float(plain.max())
        if is_uncertain(value) and not math.isfinite(value.std_dev):
            return math.nan, math.nan
        plain = nominal(value)
        math.isfinite(plain)
    except TypeError:
        raise OutOfDomain(name, f"must be a number, not {shown(value)}.") from None
    except ValueError:
        raise OutOfDomain(name, "must hold at least one value.") from None
    return plain, plain
