"""Zero offset: predicted from resistances already read, then compared with what is measured."""

from __future__ import annotations

from dataclasses import dataclass

from gaugelog.physics.bridge import indicated_strain
from gaugelog.physics.circuit import Circuit
from gaugelog.physics.conformity import Judgement, Limits, Words, judge
from gaugelog.physics.prediction import output, resistance_error

RULE = "zero offset 1"
SOURCE = "predicted from the resistances read, by nodal analysis of the circuit as wired"


@dataclass(frozen=True, slots=True)
class ZeroFound:
    """A measured zero held against the predicted one; outputs in V/V, strain as a ratio.

    `tolerance` is the larger of the criteria's figure and k = 2 of both uncertainties; `hint`
    says what would explain a zero that does not fit, or is empty.
    """

    predicted: float
    predicted_strain: float
    measured: float
    tolerance: float
    judgement: Judgement
    hint: str


def judge_zero(
    circuit: Circuit,
    measured: float,
    *,
    setting: float,
    predicted_uncertainty: float,
    measured_uncertainty: float,
    least_tolerance: float,
    name: str = "quarter three-wire",
    poisson: float = 0.0,
) -> ZeroFound:
    """Hold a measured zero (V/V) against the one that `circuit`'s own resistances predict.

    `setting` is the gauge factor set, `name` the arrangement; uncertainties are standard ones,
    V/V. Whether it fits is a comparison of two uncertain values, so the tolerance carries both
    and the word is pass or fail, with no guard band on top. Source: nodal analysis (Kirchhoff's
    laws).
    """
    predicted = float(output(circuit))
    both = (predicted_uncertainty**2 + measured_uncertainty**2) ** 0.5
    tolerance = max(least_tolerance, 2 * both)
    judgement = judge(measured, 0.0, Limits(predicted - tolerance, predicted + tolerance))
    fits = judgement.word is Words.PASS
    return ZeroFound(
        predicted,
        float(indicated_strain(predicted, setting, name, poisson)),
        measured,
        tolerance,
        judgement,
        "" if fits else _hint(circuit, predicted, measured, tolerance),
    )


def _hint(circuit: Circuit, predicted: float, measured: float, tolerance: float) -> str:
    if abs(measured + predicted) <= tolerance < abs(predicted):
        return "It is the predicted zero with its sign changed: swapped arm or polarity."
    shares = [_share(circuit, measured, number) for number in sorted(circuit.layout.outside)]
    return "It would fit with " + ", or ".join(shares) + "."


def _share(circuit: Circuit, measured: float, number: int) -> str:
    element = circuit.arms[number - 1][0]
    excess = float(resistance_error(circuit, measured, element.name))
    much = "too much" if excess > 0 else "too little"
    arm = "the gauge arm" if len(circuit.layout.outside) == 1 else f"arm {number}"
    return f"about {abs(excess):.2f} Ω {much} in {arm}"
