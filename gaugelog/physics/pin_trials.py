"""Every suspect of a circuit put to figures between its pins, ranked and grouped."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from gaugelog.physics.circuit import Circuit
from gaugelog.physics.defects import Defect, found
from gaugelog.physics.network import Network, Resistor
from gaugelog.physics.pin_fit import Figures, Fit, fit, model
from gaugelog.physics.pin_network import ARTICLE, SHIELD, pin_network, pins_of
from gaugelog.physics.suspects import CEILING, LEAST, Suspect, suspects
from gaugelog.physics.transfer import Array, Transfer, solve

APART = 3.0
"""Standard uncertainties that two figures must be apart to be told apart."""
SIZE_COST = 7.0
"""What a defect of free size must gain in misfit over one without, 2.6 sigma: chosen so that a
sound circuit is called sound 997 times in 1000 and small defects are still seen."""
LEAST_GAIN = 4.0
"""Gain in misfit over a sound circuit from which a defect is named at all: two sigma."""
MOST_ANSWERS = 10
"""Answers that a diagnosis gives."""


@dataclass(frozen=True)
class Bench:
    """A sound circuit's pin network, solved once, with the spread of its parts in ohm."""

    network: Network
    solved: Transfer
    spread: Array
    pins: tuple[str, ...]
    suspected: tuple[Suspect, ...]
    nominal: float


@dataclass(frozen=True)
class Trial:
    """One suspect put to M figures: what it would be, its predictions (M, ohm), its misfit."""

    suspect: Suspect
    defect: Defect
    predicted: Array
    misfit: float
    strength: float


def bench_of(circuit: Circuit, part_spread: float, wire_spread: float, plugged: bool) -> Bench:
    """Solve a circuit's pin network and list its suspects; spreads are relative.

    Source: nodal analysis (Kirchhoff's laws).
    """
    import numpy as np

    pins = pins_of(circuit, plugged=plugged)
    network = Network(
        tuple(
            Resistor(each.name, each.start, each.end, max(float(each.resistance), LEAST))
            for each in pin_network(circuit, plugged=plugged).resistors
        )
    )
    wires = {f"{pin} wire" for pin in circuit.wires}
    spread = [
        each.resistance * (wire_spread if each.name in wires else part_spread)
        for each in network.resistors
    ]
    completions = frozenset(each.name for each in circuit.elements if each.kind == "completion")
    return Bench(
        network,
        solve(network, (ARTICLE, SHIELD)),
        np.array(spread),
        pins,
        tuple(suspects(network, pins, completions)),
        float(sum(each.value for each in circuit.arms[0])),
    )


def terminals_of(bench: Bench) -> tuple[str, ...]:
    """Where a meter can be put: pins, bare metal, shield, and the tabs at the article.

    Source: the circuit's layout.
    """
    tabs = (node for node in bench.network.nodes if node.endswith(" tab"))
    return (*bench.pins, ARTICLE, SHIELD, *tabs)


def ranked(bench: Bench, figures: Figures) -> list[Trial]:
    """Every suspect put to the figures, best first; no size that explains next to nothing.

    Source: generalised least squares.
    """
    given = model(bench.solved, bench.network, bench.spread, figures.ends, bench.suspected)
    result = fit(given, figures)
    trials = [_trial(bench, result, place) for place in range(len(bench.suspected))]
    worth = trials[0].misfit + SIZE_COST - LEAST_GAIN
    kept = [each for each in trials if not each.suspect.sized or each.misfit < worth]
    return sorted((each for each in kept if not _is_open(each)), key=lambda each: each.misfit)


def grouped(trials: Sequence[Trial], figures: Figures) -> list[list[Trial]]:
    """The best answers: each the best trial left, with those that no figure parts from it.

    Source: three standard uncertainties in every figure (common practice).
    """
    import numpy as np

    groups: list[list[Trial]] = []
    left = list(trials)
    while left and len(groups) < MOST_ANSWERS:
        alike = _alike(left, figures)
        groups.append([each for each, same in zip(left, alike, strict=True) if same])
        left = [each for each, same in zip(left, np.logical_not(alike), strict=True) if same]
    # Where nothing need be wrong, that is said first, whatever the noise favours.
    return [sorted(group, key=lambda each: each.defect.kind != "nothing") for group in groups]


def _is_open(trial: Trial) -> bool:
    """Whether a joint adds so much that it is the open circuit, which is a suspect of its own."""
    size = trial.defect.size
    return trial.defect.kind == "joint" and size is not None and size > CEILING / 2


def _trial(bench: Bench, result: Fit, place: int) -> Trial:
    suspect = bench.suspected[place]
    size = float(result.size[place]) if suspect.sized else None
    return Trial(
        suspect,
        found(suspect, size, bench.nominal),
        result.predicted[place],
        float(result.misfit[place]) + (SIZE_COST if suspect.sized else 0.0),
        float(result.strength[place]),
    )


def _alike(trials: Sequence[Trial], figures: Figures) -> Array:
    """Which trials no figure parts from the first by three sigma, nor all figures together.

    A defect of some size is never one with nothing at all: it has that size to show.
    """
    import numpy as np

    predicted = np.array([each.predicted for each in trials])
    misfit = np.array([each.misfit for each in trials])
    apart = np.abs(predicted - predicted[0]) > APART * figures.sigma
    under = predicted < figures.ohm
    parted = np.where(figures.overload, under != under[0], apart).any(axis=1)
    kept = ~parted & (misfit - misfit[0] <= APART**2)
    if trials[0].defect.kind == "nothing":
        kept &= [not each.suspect.sized for each in trials]
    return kept
