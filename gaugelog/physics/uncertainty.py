"""An uncertainty budget by the GUM, through the very formula that gives the result.

The model is any formula of this room, called with names: the law of propagation takes its
derivatives by carrying uncertain numbers through it. What bends within the uncertainty of one
input (a small misalignment, say, that errs to second order only) counts by its curvature.
"""

from __future__ import annotations

import importlib
from collections.abc import Callable, Iterable, Mapping
from dataclasses import dataclass
from math import inf, sqrt

from gaugelog.physics._maths import Number, is_uncertain, nominal
from gaugelog.physics.estimates import Correlations, Estimate
from gaugelog.physics.student import coverage_factor
from gaugelog.physics.validity import OutOfDomain, between

Model = Callable[..., Number]
"""A formula that takes its inputs by name: floats, arrays and uncertain numbers alike."""


@dataclass(frozen=True, slots=True)
class Part:
    """What one uncertain input adds to a budget.

    `sensitivity` is the derivative of the result by the input; `contribution` the standard
    uncertainty that the input alone would leave in the result; `share` its part of the variance
    with its correlations, all shares adding up to 1.
    """

    name: str
    estimate: Estimate
    sensitivity: float
    contribution: float
    share: float


@dataclass(frozen=True, slots=True)
class Budget:
    """A result with its standard uncertainty and where that comes from.

    `parts` are sorted, largest share first; exact inputs have none. `linear` is the standard
    uncertainty without curvature; `shift` is how far curvature moves the mean from `value`, which
    is left as it is; `dof` the effective degrees of freedom.
    """

    value: float
    uncertainty: float
    linear: float
    shift: float
    dof: float
    parts: tuple[Part, ...]

    def coverage(self, confidence: float = 0.95) -> float:
        """Coverage factor k for a share of cases, by the effective degrees of freedom."""
        return coverage_factor(confidence, max(self.dof, 1.0))

    def expanded(self, confidence: float = 0.95) -> float:
        """Expanded uncertainty U = k u for a share of cases, in the result's unit."""
        return self.coverage(confidence) * self.uncertainty

    def part(self, name: str) -> Part:
        """The part of the input called `name`."""
        for part in self.parts:
            if part.name == name:
                return part
        raise OutOfDomain("name", f"must be an input of the budget, not {name!r}.")


def budget(
    model: Model, inputs: Mapping[str, Estimate], correlations: Correlations | None = None
) -> Budget:
    """The budget of `model` at its inputs: u² = Σ Σ ci cj ui uj rij, and each input's curvature.

    Units: those of the model. Source: JCGM 100:2008, 5.1.2 with its note (higher terms), 5.2.2,
    and G.4.1.

    >>> from gaugelog.physics.estimates import normal
    >>> round(budget(lambda a, b: a * b, {"a": normal(3, 0.1), "b": normal(2, 0.1)}).linear, 4)
    0.3606
    """
    uncertain = {name: each for name, each in inputs.items() if each.uncertainty}
    pairs = checked_correlations(uncertain, correlations or {})
    value, slopes = _propagate(model, inputs)
    bends = {name: _bend(model, inputs, name, value) for name in uncertain}
    linear = {name: slopes[name] * each.uncertainty for name, each in uncertain.items()}
    shared = {name: linear[name] * _with_partners(name, linear, pairs) for name in linear}
    bent = {name: _bent_variance(each, bends[name]) for name, each in uncertain.items()}
    own = {name: sqrt(linear[name] ** 2 + bent[name]) for name in uncertain}
    variance = max(sum(shared.values()) + sum(bent.values()), 0.0)
    parts = [
        Part(name, each, slopes[name], own[name], _share(shared[name] + bent[name], variance))
        for name, each in uncertain.items()
    ]
    return Budget(
        value=value,
        uncertainty=sqrt(variance),
        linear=sqrt(max(sum(shared.values()), 0.0)),
        shift=sum(bends.values()) / 2,
        dof=effective_dof([(own[name], each.dof) for name, each in uncertain.items()]),
        parts=tuple(sorted(parts, key=lambda part: -part.share)),
    )


def effective_dof(contributions: Iterable[tuple[float, float]]) -> float:
    """Effective degrees of freedom: ν = u⁴/Σ(ui⁴/νi), from pairs of ui and νi.

    For independent inputs. Source: Welch–Satterthwaite, JCGM 100:2008, G.4.1.

    >>> effective_dof([(1.0, 4.0), (1.0, 4.0)])
    8.0
    """
    pairs = tuple(contributions)
    total = sum(each**2 for each, _ in pairs)
    loss = sum(each**4 / dof for each, dof in pairs)
    return total**2 / loss if loss else inf


def checked_correlations(
    inputs: Mapping[str, Estimate], correlations: Correlations
) -> dict[frozenset[str], float]:
    """Correlation coefficients by unordered pair; refuses what can't be one.

    Pairs with an input that is exact are left out. Source: JCGM 100:2008, 5.2.2 (|r| ≤ 1).
    """
    for (one, other), coefficient in correlations.items():
        between(f"correlation of {one} and {other}", coefficient, -1.0, 1.0)
        if one == other:
            raise OutOfDomain("correlations", f"must pair two inputs, not {one!r} with itself.")
    return {
        frozenset(pair): coefficient
        for pair, coefficient in correlations.items()
        if inputs.keys() >= set(pair)
    }


def _propagate(model: Model, inputs: Mapping[str, Estimate]) -> tuple[float, dict[str, float]]:
    """The model's value, and its derivative by each uncertain input."""
    library = importlib.import_module("uncertainties")
    carried = {
        name: library.ufloat(each.value, each.uncertainty) if each.uncertainty else each.value
        for name, each in inputs.items()
    }
    result = model(**carried)
    slopes = result.derivatives if is_uncertain(result) else {}
    return float(nominal(result)), {
        name: float(slopes.get(carried[name], 0.0))
        for name, each in inputs.items()
        if each.uncertainty
    }


def _bend(model: Model, inputs: Mapping[str, Estimate], name: str, value: float) -> float:
    """f(x + u) + f(x − u) − 2 f(x) in one input: its second derivative times u²."""
    plain = {each: estimate.value for each, estimate in inputs.items()}
    step = inputs[name].uncertainty
    ahead = model(**{**plain, name: plain[name] + step})
    behind = model(**{**plain, name: plain[name] - step})
    return float(ahead + behind - 2 * value)


def _bent_variance(estimate: Estimate, bend: float) -> float:
    """Variance of the second-order term ½ f'' (x − x0)², by the kurtosis of the input's shape."""
    return (estimate.shape.kurtosis - 1) / 4 * bend**2


def _with_partners(
    name: str, linear: Mapping[str, float], pairs: Mapping[frozenset[str], float]
) -> float:
    """A first-order contribution with those correlated to it: Σ rij uj."""
    return sum(
        each * (1.0 if other == name else pairs.get(frozenset((name, other)), 0.0))
        for other, each in linear.items()
    )


def _share(variance: float, whole: float) -> float:
    return variance / whole if whole else 0.0
