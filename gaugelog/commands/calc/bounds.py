"""What a typed value must be, told before any formula sees it, so that all slips come at once."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass


@dataclass(frozen=True)
class Bound:
    """A condition on a value in its base unit; `must` ends the sentence that refuses it."""

    must: str
    holds: Callable[[float], bool]


POSITIVE = Bound("must be greater than zero", lambda value: value > 0)
NOT_NEGATIVE = Bound("must not be negative", lambda value: value >= 0)
NOT_ZERO = Bound("must be other than zero", lambda value: value != 0)
POISSON = Bound("must lie between −1 and 0.5", lambda value: -1 <= value <= 0.5)
SOLID = Bound("must lie between 0 and 0.5", lambda value: 0 <= value <= 0.5)
"""Poisson's ratio where a formula divides by what vanishes for odd materials."""
PART_OR_ALL = Bound("must lie between 0 and 1", lambda value: 0 <= value <= 1)
PART = Bound("must lie between 0 and 1, neither included", lambda value: 0 < value < 1)
HUMID = Bound("must be more than 0 % and no more than 100 %", lambda value: 0 < value <= 1)
SMALL = Bound("must lie between −10 % and 10 %", lambda value: -0.1 <= value <= 0.1)
"""A transverse sensitivity."""


def whole(least: int, most: int) -> Bound:
    """A whole number from `least` to `most`."""
    return Bound(
        f"must be a whole number from {least} to {most}",
        lambda value: value == round(value) and least <= value <= most,
    )
