"""A gauged part as a load cell: its sensitivity, and how straight a comparison run lies.

The figures of a run compare readings with a reference load; they are not a calibration, which
needs traceable loads, a procedure and an uncertainty of its own.
"""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from statistics import linear_regression, mean

from gaugelog.physics._maths import Number
from gaugelog.physics.arrangements import bridge_factor
from gaugelog.physics.validity import OutOfDomain, finite, not_zero

NOT_A_CALIBRATION = "This comparison is not a calibration."
"""Printed beside every fit."""


@dataclass(frozen=True, slots=True)
class RunPoint:
    """One reading of a comparison run: load, output, whether the load was rising, which run."""

    load: float
    output: float
    rising: bool = True
    run: int = 1

    def __post_init__(self) -> None:
        finite("load", self.load)
        finite("output", self.output)


@dataclass(frozen=True, slots=True)
class RunFit:
    """The best straight line of a run and how far the readings stray from it.

    `slope` is output per load, `intercept` output at no load, `full_scale` the line's output span
    at the largest load. The rest are parts of the full scale; None where the run can't tell.
    """

    slope: float
    intercept: float
    full_scale: float
    nonlinearity: float
    hysteresis: float | None
    repeatability: float | None
    statement: str = NOT_A_CALIBRATION


def sensitivity(strain: Number, factor: Number, arrangement: str, poisson: Number = 0.0) -> Number:
    """Output of a gauged part per volt of supply at a strain: e/E = K B ε/4, B the bridge factor.

    Units: ratio in, V/V out; times 1000 for mV/V. The linear form; `bridge.strain_output` is
    exact. Source: Dally and Riley, Experimental Stress Analysis, transducers (from memory).

    >>> sensitivity(0.001, 2.0, "full bending")
    0.002
    """
    product = finite("strain", strain) * not_zero("factor", factor)
    return product * bridge_factor(arrangement, poisson) / 4


def strain_for_sensitivity(
    ratio: Number, factor: Number, arrangement: str, poisson: Number = 0.0
) -> Number:
    """Strain that a wanted output needs: ε = 4 (e/E)/(K B).

    Units: V/V in, ratio out. Source: as `sensitivity`, turned round.
    """
    product = not_zero("factor", factor) * bridge_factor(arrangement, poisson)
    return 4 * finite("ratio", ratio) / product


def fit_run(points: Sequence[RunPoint], through_zero: bool = False) -> RunFit:
    """The best straight line of a comparison run, and its non-linearity, hysteresis, repeatability.

    The line is the least-squares one of the rising readings, `through_zero` without an intercept.
    Non-linearity: largest distance of a rising reading from it. Hysteresis: largest gap between
    rising and falling at one load of one run. Repeatability: largest spread between runs at one
    load in one direction. All as parts of the full-scale output; floats only.
    Source: ISA-37.1 terms for transducers (from memory); least squares by the Python library.
    """
    rising = [point for point in points if point.rising]
    _enough(rising, through_zero)
    slope, intercept = linear_regression(
        [point.load for point in rising],
        [point.output for point in rising],
        proportional=through_zero,
    )
    full_scale = abs(slope) * max(abs(point.load) for point in rising)
    if full_scale == 0:
        raise OutOfDomain("points", "must show an output that grows with the load.")
    stray = max(abs(point.output - slope * point.load - intercept) for point in rising)
    return RunFit(
        slope=slope,
        intercept=intercept,
        full_scale=full_scale,
        nonlinearity=stray / full_scale,
        hysteresis=_part(_gaps(points), full_scale),
        repeatability=_part(_spreads(points), full_scale),
    )


def _enough(rising: Sequence[RunPoint], through_zero: bool) -> None:
    least = 1 if through_zero else 2
    loads = {point.load for point in rising if point.load or not through_zero}
    if len(loads) < least:
        raise OutOfDomain("points", f"must hold readings at {least} or more loads, rising.")


def _gaps(points: Iterable[RunPoint]) -> list[float]:
    """Rising against falling, at each load of each run that was read both ways."""
    both: dict[tuple[int, float], dict[bool, list[float]]] = defaultdict(lambda: defaultdict(list))
    for point in points:
        both[point.run, point.load][point.rising].append(point.output)
    return [abs(mean(ways[True]) - mean(ways[False])) for ways in both.values() if len(ways) == 2]


def _spreads(points: Iterable[RunPoint]) -> list[float]:
    """Largest less smallest over the runs, at each load and direction read in more than one."""
    same: dict[tuple[bool, float], list[RunPoint]] = defaultdict(list)
    for point in points:
        same[point.rising, point.load].append(point)
    return [
        max(point.output for point in group) - min(point.output for point in group)
        for group in same.values()
        if len({point.run for point in group}) > 1
    ]


def _part(distances: list[float], full_scale: float) -> float | None:
    return max(distances) / full_scale if distances else None
