"""How well suspected defects explain figures between pins, each with its best size.

The figures of a network with one changed resistance lie on a straight line in the strength of
the change (`transfer`), so the size of every suspect is a weighted straight-line fit.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from gaugelog.physics.defects import Suspect
from gaugelog.physics.network import Network
from gaugelog.physics.transfer import AIR, Array, Transfer, changed_resistance, strength

Ends = tuple[str, str]
"""Two nodes, or two terminals, by name."""

CEILING = 1e9
"""Resistance from which a path counts as none, ohm."""
LEAST = 1e-3
"""Smallest resistance a path is given, ohm."""
OVERLOAD_DOUBT = 0.01
"""Relative standard uncertainty of the bound that an overload reading stands for."""
VALUE_SPAN = 10.0
"""How many times too large or too small a wrong element may be."""


@dataclass(frozen=True)
class Figures:
    """M readings as arrays: two terminals by name, ohm, standard uncertainty, overload or not.

    For an overload `ohm` is the bound that the resistance lies above.
    """

    ends: tuple[Ends, ...]
    ohm: Array
    sigma: Array
    overload: Array


@dataclass(frozen=True)
class Fit:
    """K suspects against M figures: predictions (M × K, ohm), misfit (chi-squared), size (ohm)."""

    predicted: Array
    misfit: Array
    size: Array
    strength: Array


@dataclass(frozen=True)
class Model:
    """How K changes move M figures of a network of E resistors.

    `sound` (M) are the figures without a change, `moved` (M × K) their voltages per ampere along
    a change, `own` (K) the resistance along each, `shares` (M × E) and `cross` (K × E) the part
    of the current in each resistor, `spread` (E) its standard uncertainty, `itself` (K × E)
    whether the change is to that resistor; `low` and `high` (K) bound the strength.
    """

    sound: Array
    moved: Array
    own: Array
    present: Array
    shares: Array
    cross: Array
    spread: Array
    itself: Array
    low: Array
    high: Array


def model(
    solved: Transfer,
    network: Network,
    spread: Array,
    ends: Sequence[Ends],
    suspected: Sequence[Suspect],
) -> Model:
    """Put suspects and pairs of terminals to a solved network."""
    import numpy as np

    figures = solved.incidence(ends)
    changes = solved.incidence([each.ends for each in suspected])
    elements = solved.incidence([(each.start, each.end) for each in network.resistors])
    values = np.array([float(each.resistance) for each in network.resistors])
    own = solved.along(changes)
    present = np.array([each.present for each in suspected])
    least, most = np.array([_bounds(each) for each in suspected]).T
    names = [each.name for each in network.resistors]
    return Model(
        sound=solved.along(figures),
        moved=solved.between(figures, changes),
        own=own,
        present=present,
        shares=solved.between(figures, elements) / values,
        cross=solved.between(changes, elements) / values,
        spread=spread,
        itself=np.array([[name in each.where for name in names] for each in suspected]),
        low=strength(present, own, most),
        high=strength(present, own, least),
    )


def fit(given: Model, figures: Figures) -> Fit:
    """Fit each change's strength to the figures; misfit counts overloads that should not be.

    Generalised least squares; what the spread of parts explains in several figures at once
    counts once, by Woodbury's identity.
    """
    import numpy as np

    first = _first_strength(given, figures)
    final, misfit = _refined(given, figures, first)
    predicted = given.sound[:, None] - final * given.moved**2
    bound = figures.ohm[:, None]
    short = np.where(figures.overload[:, None] & (predicted < bound), 1 - predicted / bound, 0.0)
    return Fit(
        predicted,
        misfit + ((short / OVERLOAD_DOUBT) ** 2).sum(axis=0),
        changed_resistance(given.present, given.own, final),
        final,
    )


def predict(given: Model, strengths: Array) -> Array:
    """Figures (M × K) of changes whose strength is known, ohm."""
    return given.sound[:, None] - strengths * given.moved**2


def _bounds(suspect: Suspect) -> tuple[float, float]:
    """Least and greatest resistance the change may lead to, ohm."""
    return {
        "open": (AIR, AIR),
        "across": (LEAST, CEILING),
        "joint": (suspect.present, suspect.present + CEILING),
        "value": (suspect.present / VALUE_SPAN, suspect.present * VALUE_SPAN),
    }.get(suspect.family, (AIR, AIR))


def _first_strength(given: Model, figures: Figures) -> Array:
    """Weighted straight line, figure by figure; overloads say nothing of the size."""
    import numpy as np

    variance = figures.sigma**2 + ((given.shares**2 * given.spread) ** 2).sum(axis=1)
    weight = np.where(figures.overload, 0.0, 1 / variance)[:, None] * given.moved**2
    above = weight.T @ (given.sound - np.where(figures.overload, 0.0, figures.ohm))
    return np.clip(_ratio(above, (weight * given.moved**2).sum(axis=0)), given.low, given.high)


def _refined(given: Model, figures: Figures, first: Array) -> tuple[Array, Array]:
    """Strength and misfit with the parts' spread as the changed network passes it on."""
    import numpy as np

    known = np.where(figures.overload, 0.0, 1 / figures.sigma)
    line = (known[:, None] * given.moved**2).T
    left = (figures.ohm - given.sound + first[:, None] * given.moved.T**2) * known
    passed = _passed_on(given, first) * known[None, :, None]
    joint = np.swapaxes(passed, 1, 2)
    inner = np.eye(passed.shape[2]) + joint @ passed
    seen = joint @ np.stack([left, line], axis=2)
    solved = np.linalg.solve(inner, seen)
    products = np.stack([left, line], axis=1) @ np.stack([left, line], axis=2)
    products = products - np.swapaxes(seen, 1, 2) @ solved
    step = -_ratio(products[:, 0, 1], products[:, 1, 1])
    final = np.clip(first + step, given.low, given.high)
    step = final - first
    misfit = products[:, 0, 0] + 2 * step * products[:, 0, 1] + step**2 * products[:, 1, 1]
    return final, np.maximum(misfit, 0.0)


def _passed_on(given: Model, strengths: Array) -> Array:
    """Standard uncertainty (K × M × E) that each part's spread brings to each figure, ohm."""
    import numpy as np

    moved = (strengths * given.moved).T
    share = given.shares[None, :, :] - moved[:, :, None] * given.cross[:, None, :]
    share = np.where(given.itself[:, None, :], 0.0, share)
    return share**2 * given.spread


def _ratio(above: Array, below: Array) -> Array:
    """Their quotient, nought where there is nothing below."""
    import numpy as np

    return np.divide(above, below, out=np.zeros_like(above), where=below > 0)
