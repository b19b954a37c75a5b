"""Noise: an effective value at its bandwidth, counted at the bandwidth of the criteria."""

from __future__ import annotations

from dataclasses import dataclass

from gaugelog.physics.change import Accuracy
from gaugelog.physics.conformity import undecided
from gaugelog.physics.noise import johnson_noise, noise_at_bandwidth, strain_noise
from gaugelog.rules.digits import quantity
from gaugelog.rules.limits import Basis, criteria_for
from gaugelog.rules.verdicts import Judged, Taken, Worked, judge_worked, only_a_bound, worded

CHECK = "noise"
ROOM = 20.0
"""Temperature that the thermal noise is counted at, °C; a grid's own moves it by little."""


@dataclass(frozen=True, slots=True)
class Quiet:
    """What a circuit can't be quieter than: its source resistance, ohm, supply, V, factor."""

    resistance: float
    supply: float
    factor: float

    def floor(self, bandwidth: float) -> float:
        """Thermal noise of the bridge as strain at a bandwidth in hertz."""
        thermal = johnson_noise(self.resistance, ROOM, bandwidth)
        return float(strain_noise(thermal, self.supply, self.factor))


def judge_noise(
    basis: Basis, stage: str, bandwidth: float, taken: Taken, quiet: Quiet | None = None
) -> Judged:
    """Judge an effective noise read at `bandwidth` (Hz) at the bandwidth of the criteria.

    It is taken as white. A reading below the thermal noise of the circuit is none of it: no
    verdict. Where the criteria name no bandwidth, that of the reading counts.
    """
    if only_a_bound(taken):
        return worded(basis, CHECK, undecided("A noise at another bandwidth needs a value."))
    spread = Accuracy(taken.on.accuracy.gain_fraction, 0.0, taken.on.accuracy.resolution)
    own = float(spread.uncertainty(taken.si))
    floor = 0.0 if quiet is None else quiet.floor(bandwidth)
    if taken.si + 2 * own < floor:
        why = (
            f"It lies below the thermal noise of this circuit, {quantity(floor, 'um/m', 2)} at "
            f"{bandwidth:g} Hz: look at the filter, the bandwidth and the channel."
        )
        return worded(basis, CHECK, undecided(why))
    wanted = _bandwidth(basis, stage) or bandwidth
    scale = float(noise_at_bandwidth(1.0, bandwidth, wanted))
    told = f"Read at {bandwidth:g} Hz and counted at {wanted:g} Hz, taken as white."
    worked = Worked(taken.si * scale, own * scale, "um/m", told if wanted != bandwidth else "")
    return judge_worked(basis, CHECK, stage, worked)


def _bandwidth(basis: Basis, stage: str) -> float | None:
    found = [item.bandwidth for item in criteria_for(basis, CHECK, stage)]
    named = [each for each in found if each is not None]
    return named[0].si() if named else None
