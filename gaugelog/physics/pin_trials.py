"""Every suspect of a circuit put to figures between its pins, ranked and grouped."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from gaugelog.physics.circuit import Circuit
from gaugelog.physics.defects import Defect, Suspect, found, suspects
from gaugelog.physics.network import Network, Resistor
from gaugelog.physics.pin_fit import LEAST, Ends, Figures, fit, model
from gaugelog.physics.pin_network import ARTICLE, SHIELD, pin_network, pins_of
from gaugelog.physics.transfer import Array, Transfer, solve

APART = 3.0
"""Standard uncertainties that two figures must be apart to be told apart."""
SIZE_COST = 9.0
"""What a defect of free size must gain in misfit over one without: three sigma."""


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


def ranked(bench: Bench, figures: Figures) -> list[Trial]:
    """Every suspect put to the figures, best first; no size that explains less than nothing.

    Source: generalised least squares.
    """
    straight = [each for each in bench.suspected if not each.swap]
    trials = _tried(bench, figures, straight, figures.ends)
    for each in bench.suspected:
        if each.swap:
            trials += _tried(bench, figures, [each], exchanged(figures.ends, each))
    sound = trials[0].misfit
    kept = [each for each in trials if not each.suspect.sized or each.misfit < sound]
    return sorted(kept, key=lambda each: each.misfit)


def grouped(trials: Sequence[Trial], figures: Figures) -> list[list[Trial]]:
    """Trials that the figures cannot tell from a better one, together with it.

    Source: three standard uncertainties in every figure (common practice).
    """
    groups: list[list[Trial]] = []
    for trial in trials:
        home = next((group for group in groups if _alike(group[0], trial, figures)), None)
        if home is None:
            groups.append([trial])
        else:
            home.append(trial)
    # Where nothing need be wrong, that is said first, whatever the noise favours.
    return [sorted(group, key=lambda each: each.defect.kind != "nothing") for group in groups]


def exchanged(ends: Sequence[Ends], suspect: Suspect) -> tuple[Ends, ...]:
    """The terminals that a meter really touches where a suspect has two wires swapped.

    Source: the swap itself.
    """
    swap = suspect.swap
    return tuple((swap.get(start, start), swap.get(end, end)) for start, end in ends)


def _tried(
    bench: Bench, figures: Figures, suspected: Sequence[Suspect], ends: Sequence[Ends]
) -> list[Trial]:
    given = model(bench.solved, bench.network, bench.spread, ends, suspected)
    result = fit(given, figures)
    return [
        Trial(
            suspect,
            found(suspect, float(result.size[place]) if suspect.sized else None, bench.nominal),
            result.predicted[:, place],
            float(result.misfit[place]) + (SIZE_COST if suspect.sized else 0.0),
            float(result.strength[place]),
        )
        for place, suspect in enumerate(suspected)
    ]


def _alike(first: Trial, second: Trial, figures: Figures) -> bool:
    """Whether no figure parts them by three standard uncertainties, nor all figures together."""
    import numpy as np

    apart = np.abs(first.predicted - second.predicted) / figures.sigma
    one, other = first.predicted < figures.ohm, second.predicted < figures.ohm
    apart = np.where(figures.overload, np.where(one == other, 0.0, np.inf), apart)
    return bool((apart <= APART).all()) and second.misfit - first.misfit <= SIZE_COST
