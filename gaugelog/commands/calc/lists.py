"""Lists of pairs as people type them: "24 degC = 24 h, 50 degC = 2 h"."""

from __future__ import annotations

from gaugelog.commands.calc.dimensions import STRAIN, VOLTAGE, Dimension
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


def zero_steps(text: str) -> tuple[tuple[tuple[float, float, float], ...], str]:
    """Steps of a raised supply: "2 V = 0 ue / 0.5 ue", the zero at once and after the dwell."""
    steps, shown = [], []
    for each in text.split(","):
        supply, equals, zeros = each.partition("=")
        # Strain may itself be typed with a stroke, um/m: the one that parts stands between spaces.
        at_once, stroke, after = zeros.partition(" / ")
        if not equals or not stroke:
            raise NotUnderstood(f"“{each.strip()}” is no step; type it like 2 V = 0 ue / 0.5 ue")
        step = understand(supply, VOLTAGE), understand(at_once, STRAIN), understand(after, STRAIN)
        steps.append((step[0].value, step[1].value, step[2].value))
        shown.append(f"{step[0].shown} = {step[1].shown} / {step[2].shown}")
    return tuple(steps), ", ".join(shown)
