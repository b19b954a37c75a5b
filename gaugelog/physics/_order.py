"""One argument against another: what must be smaller than what, for floats and arrays alike."""

from __future__ import annotations

from gaugelog.physics._maths import Number, is_array, nominal
from gaugelog.physics.validity import OutOfDomain, shown


def smaller(name: str, value: Number, than: str, limit: Number) -> Number:
    """`value` if it is below `limit` everywhere, else `OutOfDomain` naming both."""
    if not all_of(nominal(value) < nominal(limit)):
        raise OutOfDomain(name, f"must be smaller than {than}, not {shown(nominal(value))}.")
    return value


def at_most(name: str, value: Number, than: str, limit: Number) -> Number:
    """`value` if it nowhere exceeds `limit`, else `OutOfDomain` naming both."""
    if not all_of(nominal(value) <= nominal(limit)):
        raise OutOfDomain(name, f"must not exceed {than}, not {shown(nominal(value))}.")
    return value


def all_of(condition: Number) -> bool:
    """Whether a condition holds for every element."""
    return bool(condition.all()) if is_array(condition) else bool(condition)


def any_of(condition: Number) -> bool:
    """Whether a condition holds for some element."""
    return bool(condition.any()) if is_array(condition) else bool(condition)
