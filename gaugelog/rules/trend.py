"""Trends between stages: a fall of insulation is flagged, and never rules."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import pairwise

from gaugelog.physics.leakage import insulation_fall

FALL_INVESTIGATED = 10.0
"""A fall of more than tenfold is investigated, even above the floor. Common practice."""


@dataclass(frozen=True, slots=True)
class InsulationFall:
    """A fall between a stage and the next: `factor` times from `before` to `after`."""

    factor: float
    before: str
    after: str

    @property
    def sentence(self) -> str:
        """The flag as the record shows it."""
        return (
            f"Insulation fell {self.factor:.3g} times from {self.before} to {self.after}; "
            f"more than {FALL_INVESTIGATED:g} times is investigated (common practice)."
        )


def insulation_trend(stages: Sequence[tuple[str, float]]) -> InsulationFall | None:
    """The flag of a series of insulation values (ohm) by stage, in order; None when steady.

    Each stage is compared with the one before; the largest fall counts.
    """
    falls = [
        InsulationFall(float(insulation_fall(before, after)), earlier, later)
        for (earlier, before), (later, after) in pairwise(stages)
    ]
    largest = max(falls, key=lambda fall: fall.factor, default=None)
    return largest if largest is not None and largest.factor > FALL_INVESTIGATED else None
