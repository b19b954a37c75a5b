"""Lists of pairs as people type them: "24 degC = 24 h, 50 degC = 2 h"."""

from __future__ import annotations

from gaugelog.commands.calc.dimensions import Dimension
from gaugelog.commands.calc.model import Reader
from gaugelog.commands.calc.quantities import NotUnderstood, Understood, understand

Pair = tuple[float, float]


def pairs(left: Dimension, right: Dimension) -> Reader:
    """A reader of pairs, a list of them with commas, into tuples of base values."""

    def read(text: str) -> tuple[tuple[Pair, ...], str]:
        found = [pair(each, left, right) for each in text.split(",")]
        return (
            tuple((one.value, other.value) for one, other in found),
            ", ".join(f"{one.shown} = {other.shown}" for one, other in found),
        )

    return read


def pair(text: str, left: Dimension, right: Dimension) -> tuple[Understood, Understood]:
    """One pair, `left = right`."""
    one, equals, other = text.partition("=")
    if not equals:
        raise NotUnderstood(
            f"“{text.strip()}” is no pair; type it like {left.example} = {right.example}"
        )
    return understand(one, left), understand(other, right)
