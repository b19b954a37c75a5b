"""Diagnosis from resistances between pins: what is wrong with the wiring, most likely first.

Every single defect of the circuit's own network is put to the figures; those that the figures
cannot tell apart are one answer. Where explanations remain, the one further measurement that
would part them is named.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from gaugelog.physics.circuit import Circuit
from gaugelog.physics.defects import Defect
from gaugelog.physics.pin_fit import Figures
from gaugelog.physics.pin_next import NextMeasurement, next_measurement
from gaugelog.physics.pin_trials import SIZE_COST, bench_of, grouped, ranked, terminals_of
from gaugelog.physics.suspects import CEILING
from gaugelog.physics.validity import OutOfDomain, not_negative, positive

POOR_MISFIT = 4.0
"""Misfit per figure above which no single defect explains the figures."""


@dataclass(frozen=True, slots=True)
class PinReading:
    """A resistance between two terminals, ohm, with its standard uncertainty in ohm.

    An `overload` reads as above `ohm`. Terminals are pins, `ARTICLE`, `SHIELD`, and where they
    can be reached the tabs.
    """

    between: tuple[str, str]
    ohm: float
    uncertainty: float
    overload: bool = False


@dataclass(frozen=True, slots=True)
class Answer:
    """Defects that the figures cannot tell apart, likeliest first, and how badly they fit.

    `misfit` is a chi-squared over all figures, with a cost for a free size.
    """

    defects: tuple[Defect, ...]
    misfit: float

    @property
    def sentence(self) -> str:
        """The answer as a person reads it."""
        places: dict[str, list[str]] = {}
        for defect in self.defects:
            places.setdefault(defect.what, []).append(defect.place)
        return "; or ".join(
            f"{what} {' or '.join(where)}".rstrip() for what, where in places.items()
        )


@dataclass(frozen=True, slots=True)
class Diagnosis:
    """Answers, best first; the measurement that would part the best; whether one defect fits."""

    answers: tuple[Answer, ...]
    next_measurement: NextMeasurement | None
    explained: bool


def diagnose(
    circuit: Circuit,
    readings: Sequence[PinReading],
    *,
    part_spread: float = 0.002,
    wire_spread: float = 0.02,
    plugged: bool = False,
) -> Diagnosis:
    """Rank what may be wrong with a circuit's wiring from resistances between its terminals.

    `part_spread` and `wire_spread` are the relative standard uncertainties of the elements' and
    the wires' planned resistances; 0.2 % suits grids by their nominal value and bonded (common
    practice), less suits grids measured before. `plugged` says that the module's own arms are
    measured too.
    Source: nodal analysis (Kirchhoff's laws) and generalised least squares; the kinds of defect
    are common practice.
    """
    not_negative("part_spread", part_spread)
    not_negative("wire_spread", wire_spread)
    bench = bench_of(circuit, part_spread, wire_spread, plugged)
    figures = _figures(terminals_of(bench), readings)
    groups = grouped(ranked(bench, figures), figures)
    answers = tuple(
        Answer(tuple(trial.defect for trial in group), group[0].misfit) for group in groups
    )
    return Diagnosis(
        answers,
        next_measurement(bench, figures, groups),
        explained=answers[0].misfit <= POOR_MISFIT * len(readings) + SIZE_COST,
    )


def _figures(terminals: tuple[str, ...], readings: Sequence[PinReading]) -> Figures:
    import numpy as np

    if not readings:
        raise OutOfDomain("readings", "must hold at least one resistance between two terminals.")
    for each in readings:
        _check(terminals, each)
    return Figures(
        tuple(each.between for each in readings),
        np.array([min(each.ohm, CEILING) for each in readings]),
        np.array([each.uncertainty for each in readings]),
        np.array([each.overload or each.ohm >= CEILING for each in readings]),
    )


def _check(terminals: tuple[str, ...], reading: PinReading) -> None:
    name = f"reading from {reading.between[0]} to {reading.between[1]}"
    if not set(reading.between) <= set(terminals) or len(set(reading.between)) < 2:
        raise OutOfDomain(name, f"must join two of {', '.join(terminals)}.")
    not_negative(name, reading.ohm)
    positive(f"uncertainty of the {name}", reading.uncertainty)
