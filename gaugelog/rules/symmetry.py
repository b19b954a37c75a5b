"""Lead symmetry: the two wires of a pair, that end at one tab, must be alike."""

from __future__ import annotations

from gaugelog.physics.change import difference_uncertainty
from gaugelog.physics.conductors import COPPER_COEFFICIENT
from gaugelog.physics.conformity import undecided
from gaugelog.physics.leads import temperature_strain
from gaugelog.rules.limits import Basis
from gaugelog.rules.verdicts import Judged, Taken, Worked, judge_worked, only_a_bound, worded

CHECK = "lead symmetry"


def judge_symmetry(basis: Basis, stage: str, first: float, second: Taken) -> Judged:
    """Judge the difference of the resistances, ohm, from one far pin to each wire of a pair.

    Gauge and common wire lie in both and cancel, and so do the meter's offset and most of its
    gain. The sentence tells what the difference feigns when the cable warms.
    """
    if only_a_bound(second):
        return worded(basis, CHECK, undecided("A difference needs two values."))
    span, accuracy = second.on.range, second.on.accuracy
    same = span.low.si() <= first <= span.high.si()
    spread = difference_uncertainty(
        first,
        second.si,
        same,
        accuracy.gain_fraction,
        accuracy.offset,
        accuracy.resolution,
    )
    difference = second.si - first
    nominal = basis.lot.nominal_resistance.si()
    feigned = temperature_strain(
        nominal, abs(difference), 0.0, COPPER_COEFFICIENT, 1.0, basis.factor
    )
    told = (
        f"Second wire less first; in neighbouring arms they feign {float(feigned) * 1e6:.2g} µm/m "
        "for each kelvin the cable warms."
    )
    return judge_worked(basis, CHECK, stage, Worked(difference, float(spread), "ohm", told))
