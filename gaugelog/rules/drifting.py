"""Zero drift: what is left of it when warmth is taken off, held against the limit per time."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from math import hypot, sqrt

from gaugelog.physics.change import Accuracy
from gaugelog.physics.conformity import undecided
from gaugelog.physics.drift import drift_rate, rate_uncertainty
from gaugelog.rules.digits import quantity
from gaugelog.rules.limits import Basis, criteria_for
from gaugelog.rules.verdicts import Judged, Taken, Worked, judge_worked, only_a_bound, worded
from gaugelog.rules.warmed import Warmth

CHECK = "zero drift"


@dataclass(frozen=True, slots=True)
class ZeroSeen:
    """A zero as seen: seconds from any start, strain ratio, °C of gauge and leads, a display step.

    `step` is the last digit that the temperature was typed with, in K.
    """

    at: float
    zero: float
    celsius: float
    leads: float
    step: float = 0.0


def judge_drift(
    basis: Basis, stage: str, seen: Sequence[ZeroSeen], taken: Taken, warmth: Warmth
) -> Judged:
    """Judge a zero watched two or more times, the last of which is `taken`.

    Thermal output and the warming of the leads, counted from the first zero, are taken off. What
    is left is counted over the time of the criteria by its least-squares rate; where they name
    none, the last zero less the first is judged.
    """
    if only_a_bound(taken):
        return worded(basis, CHECK, undecided("A drift needs a value."))
    first, last = seen[0], seen[-1]
    if last.at <= first.at:
        return worded(basis, CHECK, undecided("The two zeros were seen at the same time."))
    over = _per(basis, stage) or (last.at - first.at)
    rest = [_rest(warmth, first, each) for each in seen]
    times = [each.at for each in seen]
    worked = Worked(
        drift_rate(times, rest) * over,
        hypot(
            rate_uncertainty(times, _reading(taken.on.accuracy)) * over,
            _thermal(taken.on.accuracy, warmth, seen) * over / (last.at - first.at),
        ),
        "um/m",
        _told(warmth, first, last, over),
    )
    return judge_worked(basis, CHECK, stage, worked)


def _rest(warmth: Warmth, first: ZeroSeen, each: ZeroSeen) -> float:
    """What is left of a zero when the warming since the first is taken off."""
    return (
        each.zero
        - first.zero
        - warmth.feigned(first.celsius, each.celsius)
        - warmth.wires(first.leads, each.leads)
    )


def _reading(accuracy: Accuracy) -> float:
    """Standard uncertainty of each zero on one range: its rounding, for the offset cancels."""
    return float(Accuracy(0.0, 0.0, accuracy.resolution).uncertainty(0.0))


def _thermal(accuracy: Accuracy, warmth: Warmth, seen: Sequence[ZeroSeen]) -> float:
    """What gain, thermal output and the steps of the thermometer leave in doubt, as strain."""
    first, last = seen[0], seen[-1]
    gain = accuracy.gain_fraction * abs(last.zero - first.zero) / sqrt(3)
    own = warmth.uncertainty(first.celsius, last.celsius)
    per_kelvin = abs(warmth.feigned(first.celsius, first.celsius + 1.0))
    steps = hypot(first.step, last.step) / sqrt(12) * per_kelvin
    return hypot(gain, own, steps)


def _told(warmth: Warmth, first: ZeroSeen, last: ZeroSeen, over: float) -> str:
    shift = quantity(last.zero - first.zero, "um/m", 3)
    grids = quantity(warmth.feigned(first.celsius, last.celsius), "um/m", 3)
    wires = quantity(warmth.wires(first.leads, last.leads), "um/m", 3)
    minutes, meant = (last.at - first.at) / 60, over / 60
    told = (
        f"The zero moved by {shift} in {minutes:.0f} min, from {first.celsius:g} °C to "
        f"{last.celsius:g} °C; taken off: {grids} of thermal output, {wires} of the leads. The "
        f"rest is counted over {meant:.0f} min."
    )
    if warmth.unknown:
        told += (
            f" Of lot {', '.join(warmth.unknown)} no thermal output is known: none is taken off."
        )
    return told


def _per(basis: Basis, stage: str) -> float | None:
    found = [item.per for item in criteria_for(basis, CHECK, stage)]
    named = [each for each in found if each is not None]
    return named[0].si() if named else None
