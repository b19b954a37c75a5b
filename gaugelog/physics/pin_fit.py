"""How well suspected defects explain figures between pins, each with its best size.

The figures of a network with one changed resistance lie on a straight line in the strength of
the change (`transfer`), so the size of every suspect is a weighted straight-line fit.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass

from gaugelog.physics.network import Network
from gaugelog.physics.suspects import Ends, Suspect
from gaugelog.physics.transfer import Array, Transfer, changed_resistance, strength

OVERLOAD_DOUBT = 0.01
"""Relative standard uncertainty of the bound that an overload reading stands for."""


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
    """K suspects against M figures: predictions (K × M, ohm), misfit (chi-squared), size (ohm)."""

    predicted: Array
    misfit: Array
    size: Array
    strength: Array


@dataclass(frozen=True)
class Model:
    """How K changes move M figures of a network of E resistors.

    `sound` (K × M) are the figures without the change, through swapped wires where the suspect
    swaps them; `moved` (K × M) their voltages per ampere along the change; `own` (K) the
    resistance along it. `shares` (K × M × E) and `cross` (K × E) are parts of the current in
    each resistor, `spread` (E) its standard uncertainty in ohm, `itself` (K × E) whether the
    change is to that resistor. `low` and `high` (K) bound the strength.
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
    """Put suspects and pairs of terminals to a solved network.

    Source: nodal analysis (Kirchhoff's laws) as in `transfer`.
    """
    import numpy as np

    which, figures = _touchings(solved, ends, suspected)
    changes = solved.incidence([each.ends for each in suspected])
    elements = solved.incidence([(each.start, each.end) for each in network.resistors])
    values = np.array([float(each.resistance) for each in network.resistors])
    names = [each.name for each in network.resistors]
    shape = (-1, len(ends), len(suspected))
    own = solved.along(changes)
    present = np.array([each.present for each in suspected])
    least, most = np.array([(each.least, each.most) for each in suspected]).T
    return Model(
        sound=solved.along(figures).reshape(-1, len(ends))[which],
        moved=solved.between(figures, changes).reshape(shape)[which, :, np.arange(len(which))],
        own=own,
        present=present,
        shares=(solved.between(figures, elements) / values).reshape(*shape[:2], len(values))[which],
        cross=solved.between(changes, elements) / values,
        spread=spread,
        itself=np.array([[name in each.where for name in names] for each in suspected]),
        low=strength(present, own, most),
        high=strength(present, own, least),
    )


def fit(given: Model, figures: Figures) -> Fit:
    """Fit each change's strength to the figures; misfit counts overloads that should not be.

    What the spread of parts explains in several figures at once counts once. Source:
    generalised least squares with Woodbury's identity; any text on linear regression.
    """
    import numpy as np

    final, misfit = _refined(given, figures, _first_strength(given, figures))
    predicted = predict(given, final)
    short = np.where(figures.overload, np.maximum(1 - predicted / figures.ohm, 0.0), 0.0)
    return Fit(
        predicted,
        misfit + ((short / OVERLOAD_DOUBT) ** 2).sum(axis=1),
        changed_resistance(given.present, given.own, final),
        final,
    )


def predict(given: Model, strengths: Array) -> Array:
    """Figures (K × M) of changes whose strength (K) is known, ohm.

    Source: Sherman and Morrison, 1950 (from memory).
    """
    return given.sound - strengths[:, None] * given.moved**2


def _touchings(
    solved: Transfer, ends: Sequence[Ends], suspected: Sequence[Suspect]
) -> tuple[list[int], Array]:
    """Incidence of the figures for each different way of swapping, and each suspect's way."""
    ways: dict[tuple[str, ...], int] = {}
    touched: list[Ends] = []
    which = []
    for each in suspected:
        way = each.where if each.swap else ()
        if way not in ways:
            ways[way] = len(ways)
            touched += each.touched(ends)
        which.append(ways[way])
    return which, solved.incidence(touched)


def _first_strength(given: Model, figures: Figures) -> Array:
    """Weighted straight line, figure by figure; overloads say nothing of the size."""
    import numpy as np

    variance = figures.sigma**2 + ((given.shares**2 * given.spread) ** 2).sum(axis=2)
    weight = np.where(figures.overload, 0.0, 1 / variance) * given.moved**2
    above = (weight * (given.sound - figures.ohm)).sum(axis=1)
    return np.clip(_ratio(above, (weight * given.moved**2).sum(axis=1)), given.low, given.high)


def _refined(given: Model, figures: Figures, first: Array) -> tuple[Array, Array]:
    """Strength and misfit with the parts' spread as the changed network passes it on."""
    import numpy as np

    known = np.where(figures.overload, 0.0, 1 / figures.sigma)
    left = (figures.ohm - predict(given, first)) * known
    both = np.stack([left, given.moved**2 * known], axis=2)
    passed = _passed_on(given, first) * known[:, None]
    across = np.swapaxes(passed, 1, 2)
    seen = across @ both
    solved = np.linalg.solve(np.eye(passed.shape[2]) + across @ passed, seen)
    products = np.swapaxes(both, 1, 2) @ both - np.swapaxes(seen, 1, 2) @ solved
    square, mixed, line = products[:, 0, 0], products[:, 0, 1], products[:, 1, 1]
    final = np.clip(first - _ratio(mixed, line), given.low, given.high)
    step = final - first
    return final, np.maximum(square + 2 * step * mixed + step**2 * line, 0.0)


def _passed_on(given: Model, strengths: Array) -> Array:
    """Standard uncertainty (K × M × E) that each part's spread brings to each figure, ohm."""
    import numpy as np

    moved = strengths[:, None] * given.moved
    share = given.shares - moved[:, :, None] * given.cross[:, None, :]
    return np.where(given.itself[:, None, :], 0.0, share**2 * given.spread)


def _ratio(above: Array, below: Array) -> Array:
    """Their quotient, nought where there is nothing below."""
    import numpy as np

    return np.divide(above, below, out=np.zeros_like(above), where=below > 0)
