"""Shunt: predicted for this circuit, these leads, this resistor's place; then compared."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass

from gaugelog.physics.circuit import Circuit
from gaugelog.physics.conformity import Judgement, Limits, Words, judge, undecided
from gaugelog.physics.layouts import (
    HALF_MINUS,
    HALF_PLUS,
    SENSE_MINUS,
    SENSE_PLUS,
    SIGNAL_MINUS,
    SIGNAL_PLUS,
    SUPPLY_MINUS,
    SUPPLY_PLUS,
)
from gaugelog.physics.prediction import added_strain

RULE = "shunt 1"
SOURCE = "predicted for this circuit, its leads and the shunt's place, by nodal analysis"


@dataclass(frozen=True, slots=True)
class ShuntFound:
    """A measured shunt reading held against the predicted one; strains as ratios.

    `predicted` is None when the shunt's place is not known, and then there is no verdict.
    """

    predicted: float | None
    measured: float
    tolerance: float
    judgement: Judgement
    hint: str


_PINS: dict[int, tuple[str, str]] = {
    1: (SUPPLY_MINUS, SIGNAL_PLUS),
    2: (SIGNAL_PLUS, SUPPLY_PLUS),
    3: (SUPPLY_PLUS, SIGNAL_MINUS),
    4: (SIGNAL_MINUS, SUPPLY_MINUS),
}
"""The module's pins at the two ends of each arm."""

_SENSED = {SUPPLY_MINUS: SENSE_MINUS, SUPPLY_PLUS: SENSE_PLUS}


def shunt_places(circuit: Circuit) -> dict[str, tuple[str, str]]:
    """Where a shunt may lie in `circuit`: a name people use, and the two nodes it joins.

    Across each arm at its own ends; across an arm from the module's pins, leads included; with
    remote sense also from the sense pin.
    """
    layout = circuit.layout
    places = {f"arm {number}": pair for number, pair in enumerate(layout.arm_ends, start=1)}
    for number, pair in _PINS.items():
        if HALF_PLUS in layout.arm_ends[number - 1] or HALF_MINUS in layout.arm_ends[number - 1]:
            continue  # the module's buffered half: nothing can be put across it from outside
        if layout.arm_ends[number - 1] != pair:
            places[f"module pins of arm {number}"] = pair
        if layout.sensed:
            low, high = (_SENSED.get(pin, pin) for pin in pair)
            places[f"sense pin of arm {number}"] = (low, high)
    return places


def shunt_place(circuit: Circuit, between: tuple[str, str]) -> str | None:
    """The place of a shunt by the two pins it joins; None where this circuit has none there."""
    for name, pair in shunt_places(circuit).items():
        if set(pair) == set(between):
            return name
    return None


def judge_shunt(
    circuit: Circuit,
    resistor: float,
    place: str | None,
    measured: float,
    *,
    setting: float,
    least_tolerance: float,
    uncertainty: float = 0.0,
    name: str = "quarter three-wire",
    poisson: float = 0.0,
) -> ShuntFound:
    """Hold a measured shunt reading (strain, after zeroing) against the predicted one.

    `place` is one of `shunt_places`, None when nobody knows it; `uncertainty` is the standard
    uncertainty of predicted and measured together. Source: nodal analysis (Kirchhoff's laws).
    """
    tolerance = max(least_tolerance, 2 * uncertainty)
    places = shunt_places(circuit)
    if place is None:
        why = "Where the shunt lies is not known: between which pins, at which end of the leads."
        return ShuntFound(None, measured, tolerance, undecided(why), "")
    predictions = {
        where: float(added_strain(circuit, resistor, nodes, setting, name, poisson))
        for where, nodes in places.items()
    }
    predicted = predictions[place]
    judgement = judge(measured, 0.0, Limits(predicted - tolerance, predicted + tolerance))
    fits = judgement.word is Words.PASS
    hint = "" if fits else _hint(predictions, place, measured, tolerance)
    return ShuntFound(predicted, measured, tolerance, judgement, hint)


def _hint(predictions: Mapping[str, float], place: str, measured: float, tolerance: float) -> str:
    fitting = [
        where
        for where, predicted in predictions.items()
        if where != place and abs(measured - predicted) <= tolerance
    ]
    if fitting:
        return f"It is what a shunt across {' or '.join(fitting)} reads, not across {place}."
    if abs(measured + predictions[place]) <= tolerance:
        return "It is the predicted reading with its sign changed: swapped arm or polarity."
    return ""
