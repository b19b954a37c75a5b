"""Random draws of uncertain inputs, each by its own shape, correlated where they are.

Everything that knows NumPy's generator sits here; a draw is an array.
"""

from __future__ import annotations

import importlib
from collections.abc import Mapping
from math import inf, pi, sqrt
from typing import Any

from gaugelog.physics._maths import Number
from gaugelog.physics._maths import sin as sine
from gaugelog.physics.estimates import Correlations, Estimate, Shape
from gaugelog.physics.uncertainty import checked_correlations
from gaugelog.physics.validity import OutOfDomain


class Sampler:
    """Draws sets of inputs: independent ones by their shapes, correlated ones jointly normal.

    Source: JCGM 101:2008, 6.4.
    """

    def __init__(self, uncertain: Mapping[str, Estimate], correlations: Correlations) -> None:
        """Take the uncertain inputs; refuses correlations that cannot be drawn."""
        pairs = checked_correlations(uncertain, correlations)
        self._joint = {
            name: each for name, each in uncertain.items() if any(name in pair for pair in pairs)
        }
        self._alone = {name: each for name, each in uncertain.items() if name not in self._joint}
        for name, each in self._joint.items():
            _require_normal(name, each)
        self._root = _root(list(self._joint), pairs) if self._joint else None

    def draw(self, random: Any, size: int) -> dict[str, Number]:
        """`size` draws of every uncertain input, from a NumPy generator."""
        drawn = {name: draw(each, random, size) for name, each in self._alone.items()}
        if self._root is not None:
            rows = self._root @ random.standard_normal((len(self._joint), size))
            for (name, each), row in zip(self._joint.items(), rows, strict=True):
                drawn[name] = each.value + each.uncertainty * row
        return drawn


def draw(estimate: Estimate, random: Any, size: int) -> Number:
    """`size` draws of one input from a NumPy generator, by its shape.

    Few degrees of freedom make a normal input a scaled and shifted t-distribution. Units: the
    input's. Source: JCGM 101:2008, 6.4.2 to 6.4.9.
    """
    value, spread = estimate.value, estimate.uncertainty
    if estimate.shape is Shape.RECTANGULAR:
        return random.uniform(value - sqrt(3) * spread, value + sqrt(3) * spread, size)
    if estimate.shape is Shape.TRIANGULAR:
        half = sqrt(6) * spread
        return random.triangular(value - half, value, value + half, size)
    if estimate.shape is Shape.ARCSINE:
        return value + sqrt(2) * spread * sine(random.uniform(0, 2 * pi, size))
    if estimate.dof == inf:
        return random.normal(value, spread, size)
    return value + spread * random.standard_t(estimate.dof, size)


def _require_normal(name: str, estimate: Estimate) -> None:
    if estimate.shape is not Shape.NORMAL or estimate.dof != inf:
        raise OutOfDomain(
            name, "must be normal with unlimited degrees of freedom to be drawn as correlated."
        )


def _root(names: list[str], pairs: Mapping[frozenset[str], float]) -> Number:
    """A root of the correlation matrix by its eigenvalues, so that r = ±1 is allowed too."""
    numpy = importlib.import_module("numpy")
    matrix = [
        [1.0 if one == other else pairs.get(frozenset((one, other)), 0.0) for other in names]
        for one in names
    ]
    values, vectors = numpy.linalg.eigh(numpy.array(matrix))
    if values.min() < -1e-9:
        raise OutOfDomain("correlations", "must be possible together; these contradict each other.")
    return vectors * numpy.sqrt(numpy.clip(values, 0.0, None))
