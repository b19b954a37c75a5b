"""Raising the supply while watching the zero: the test that finds a grid's largest supply.

With the part unloaded and at rest, the supply is raised in steps. At each the zero is read at
once and again after a dwell. A zero that walks during the dwell tells that the grid is warming.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from gaugelog.physics._maths import Number, magnitude, sqrt
from gaugelog.physics.validity import OutOfDomain, finite, not_zero, positive


@dataclass(frozen=True, slots=True)
class ZeroStep:
    """One step: the supply in volt, the zero at once and after the dwell as strain ratios."""

    supply: float
    at_once: float
    after_dwell: float

    def __post_init__(self) -> None:
        positive("supply", self.supply)
        finite("at_once", self.at_once)
        finite("after_dwell", self.after_dwell)

    @property
    def walk(self) -> float:
        """How far the zero walked during the dwell."""
        return self.after_dwell - self.at_once


@dataclass(frozen=True, slots=True)
class ZeroVerdict:
    """What the test found: the largest supply with a steady zero, the first without; or None."""

    steady: float | None
    unsteady: float | None


def judge_steps(steps: Sequence[ZeroStep], permitted: float) -> ZeroVerdict:
    """The largest supply up to which every zero stood still within `permitted` (a ratio).

    A step that stands still above one that walked does not count. Source: common practice
    (raise the bridge voltage until the zero drifts, then go back to the last steady step).

    >>> steps = (ZeroStep(5.0, 0.0, 1e-6), ZeroStep(10.0, 2e-6, 14e-6))
    >>> judge_steps(steps, 3e-6)
    ZeroVerdict(steady=5.0, unsteady=10.0)
    """
    positive("permitted", permitted)
    if not steps:
        raise OutOfDomain("steps", "must hold at least one step.")
    steady: float | None = None
    for step in sorted(steps, key=lambda step: step.supply):
        if abs(step.walk) > permitted:
            return ZeroVerdict(steady, step.supply)
        steady = step.supply
    return ZeroVerdict(steady, None)


def heating_slope(steps: Sequence[ZeroStep]) -> float:
    """Strain feigned per volt squared: least-squares slope of the zero after dwell over E².

    Heat goes with E²; so does the shift while the article stays cold. Units: 1/V².
    Source: least squares; Joule's law.
    """
    squares = [step.supply**2 for step in steps]
    if len(set(squares)) < 2:
        raise OutOfDomain("steps", "must hold at least two different supplies.")
    middle = sum(squares) / len(squares)
    spread = sum((square - middle) ** 2 for square in squares)
    along = sum((s - middle) * step.after_dwell for s, step in zip(squares, steps, strict=True))
    return along / spread


def supply_for_shift(slope: Number, permitted: Number) -> Number:
    """Supply at which self-heating feigns a permitted strain: √(ε/|slope|).

    Units: 1/V² and ratio in, volt out. Source: as `heating_slope`, turned round.
    """
    return sqrt(positive("permitted", permitted) / magnitude(not_zero("slope", slope)))
