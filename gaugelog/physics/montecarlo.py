"""The same result by Monte Carlo: distributions carried through the model, not derivatives.

Draws go through the model in blocks, as arrays, so that a block stays in the processor's cache.
A seed makes a simulation repeatable.
"""

from __future__ import annotations

import importlib
from collections.abc import Mapping
from dataclasses import dataclass
from math import floor, log10, sqrt
from statistics import NormalDist
from typing import Any

from gaugelog.physics.draws import Sampler
from gaugelog.physics.estimates import Correlations, Estimate
from gaugelog.physics.uncertainty import Budget, Model
from gaugelog.physics.validity import Notice, OutOfDomain, one_of, strictly_between

JCGM_101 = "JCGM 101:2008"
_BLOCK = 20_000
_FEWEST = 1000


@dataclass(frozen=True, slots=True)
class Simulation:
    """What a simulation found: mean, standard uncertainty, and the interval from `low` to `high`.

    The interval holds a share `confidence` of the draws, as much left out below as above.
    """

    mean: float
    uncertainty: float
    low: float
    high: float
    confidence: float
    draws: int
    seed: int


def simulate(
    model: Model,
    inputs: Mapping[str, Estimate],
    correlations: Correlations | None = None,
    *,
    draws: int = 1_000_000,
    seed: int = 1,
    confidence: float = 0.95,
) -> Simulation:
    """Carry `draws` random sets of inputs through the model.

    Units: those of the model. Correlated inputs must be normal. Source: JCGM 101:2008, 5.9 and 7
    (probabilistically symmetric interval).
    """
    strictly_between("confidence", confidence, 0.0, 1.0)
    outputs = draw_outputs(model, inputs, correlations, draws=draws, seed=seed)
    numpy = importlib.import_module("numpy")
    tail = (1 - confidence) / 2
    low, high = numpy.quantile(outputs, (tail, 1 - tail))
    return Simulation(
        mean=float(outputs.mean()),
        uncertainty=float(outputs.std(ddof=1)),
        low=float(low),
        high=float(high),
        confidence=confidence,
        draws=draws,
        seed=seed,
    )


def draw_outputs(
    model: Model,
    inputs: Mapping[str, Estimate],
    correlations: Correlations | None = None,
    *,
    draws: int = 1_000_000,
    seed: int = 1,
) -> Any:
    """The model's results for random sets of inputs, an array of length `draws`.

    Source: JCGM 101:2008, 7.2 to 7.4.
    """
    if draws < _FEWEST:
        raise OutOfDomain("draws", f"must be at least {_FEWEST}, not {draws}.")
    numpy = importlib.import_module("numpy")
    random = numpy.random.default_rng(seed)
    uncertain = {name: each for name, each in inputs.items() if each.uncertainty}
    fixed = {name: each.value for name, each in inputs.items() if not each.uncertainty}
    sampler = Sampler(uncertain, correlations or {})
    outputs = numpy.empty(draws)
    for start in range(0, draws, _BLOCK):
        part = outputs[start : start + _BLOCK]
        part[:] = model(**fixed, **sampler.draw(random, part.size))
    return outputs


def numerical_tolerance(uncertainty: float, digits: int = 2) -> float:
    """δ, half a unit in the last of the significant digits kept of an uncertainty.

    Source: JCGM 101:2008, 7.9.2.

    >>> round(numerical_tolerance(0.0347), 6)
    0.0005
    """
    one_of("digits", digits, (1, 2, 3))
    if uncertainty <= 0:
        return 0.0
    return 0.5 * 10.0 ** (floor(log10(uncertainty)) - digits + 1)


def agreement_notices(found: Budget, simulated: Simulation, digits: int = 2) -> tuple[Notice, ...]:
    """A notice where budget and simulation disagree on either end of the coverage interval.

    They agree when both ends differ by no more than δ for so many digits of the uncertainty, the
    scatter of the simulation's own ends allowed for; the budget's middle is moved by its shift.
    Source: JCGM 101:2008, 8.1.
    """
    half = found.expanded(simulated.confidence)
    allowed = numerical_tolerance(found.uncertainty, digits) + 3 * _scatter(simulated)
    middle = found.value + found.shift
    if max(abs(middle - half - simulated.low), abs(middle + half - simulated.high)) <= allowed:
        return ()
    message = (
        f"Budget and simulation disagree: {middle - half:.5g} to {middle + half:.5g} "
        f"against {simulated.low:.5g} to {simulated.high:.5g}; trust the simulation."
    )
    return (Notice("uncertainty budget", message, f"{JCGM_101}, 8.1"),)


def _scatter(simulated: Simulation) -> float:
    """Standard deviation of an end of the interval over seeds, as of normal draws."""
    tail = (1 - simulated.confidence) / 2
    density = NormalDist().pdf(NormalDist().inv_cdf(tail))
    return simulated.uncertainty * sqrt(tail * (1 - tail) / simulated.draws) / density
