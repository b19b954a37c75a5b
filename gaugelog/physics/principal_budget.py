"""Budgets of a rosette's principal values, its grids' strains being correlated.

The grids of one rosette share a lot, a temperature and a module: their errors go together, and
the principal values, above all their direction, are better or worse known for it.
"""

from __future__ import annotations

from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from itertools import combinations

from gaugelog.physics._maths import Number, arctan2
from gaugelog.physics.circuit_budget import shared_correlation
from gaugelog.physics.estimates import Correlations, Estimate, normal
from gaugelog.physics.plane import PlaneStrain, mohr_circle, principal_strains, turned
from gaugelog.physics.rosette import rosette_state
from gaugelog.physics.uncertainty import Budget, Model, budget
from gaugelog.physics.validity import Notice, one_of

TELLING = 3.0
"""Standard uncertainties that Mohr's radius must exceed for a direction to be told."""


@dataclass(frozen=True, slots=True)
class PrincipalBudgets:
    """Budgets of the principal strains (ratios) and of the direction of the largest (radians).

    `radius` is that of Mohr's circle; `angle` is None where every direction is alike.
    """

    largest: Budget
    smallest: Budget
    radius: Budget
    angle: Budget | None


def grid_names(count: int) -> tuple[str, ...]:
    """The names by which budgets call the grids of a rosette: `grid 1` and so on.

    Source: common practice, grids are numbered from 1.
    """
    return tuple(f"grid {number}" for number in range(1, count + 1))


def principal_budgets(
    strains: Sequence[Estimate],
    angles: Sequence[float],
    correlations: Correlations | None = None,
) -> PrincipalBudgets:
    """Budgets of the principal values of three or more grids at `angles`, radians.

    `correlations` go by the names of `grid_names`. Units: ratios in, ratios and radians out.
    Source: JCGM 100:2008, 5.2.2, on `rosette.rosette_state` and `plane.principal_strains`.
    """
    inputs = dict(zip(grid_names(len(strains)), strains, strict=True))
    planned = principal_strains(rosette_state([each.value for each in strains], angles))
    if planned.angle is None:
        return _alike(angles, inputs, correlations)

    def of(part: str) -> Budget:
        return budget(principal_model(angles, part), inputs, correlations)

    direction = budget(direction_model(angles, planned.angle), inputs, correlations)
    return PrincipalBudgets(of("largest"), of("smallest"), of("radius"), direction)


def principal_model(angles: Sequence[float], part: str) -> Model:
    """The formula from the grids' strains to a principal value, for a budget or a simulation.

    `part` is `largest`, `smallest` or `radius` (of Mohr's circle). Units: angles in radians,
    ratios in and out. Source: `rosette.rosette_state`, `plane.principal_strains`.
    """
    one_of("part", part, ("largest", "smallest", "radius"))

    def model(**grids: Number) -> Number:
        circle = mohr_circle(_state(angles, grids))
        if part == "radius":
            return circle.radius
        return circle.centre + (circle.radius if part == "largest" else -circle.radius)

    return model


def direction_model(angles: Sequence[float], about: float) -> Model:
    """The formula from the grids' strains to the direction of the largest, near `about`.

    ½ atan2(γ, εx − εy) in axes turned by `about`, so that a direction near ±90° does not jump; a
    state alike in every direction gives `about`. Units: radians. Source: `plane.turned`; ASTM
    E1561, with the two-argument arctangent.
    """

    def model(**grids: Number) -> Number:
        state = turned(_state(angles, grids), about)
        return about + arctan2(state.shear, state.x - state.y) / 2

    return model


def rosette_correlations(
    budgets: Sequence[Budget], shared: tuple[str, ...]
) -> dict[tuple[str, str], float]:
    """Correlations of a rosette's grids through the inputs they share, from their budgets.

    Source: JCGM 100:2008, F.1.2.3.
    """
    named = list(zip(grid_names(len(budgets)), budgets, strict=True))
    return {
        (one, other): shared_correlation(first, second, shared)
        for (one, first), (other, second) in combinations(named, 2)
    }


def rosette_estimates(budgets: Sequence[Budget]) -> tuple[Estimate, ...]:
    """The grids' strains as estimates, from the budget of each circuit.

    Source: JCGM 100:2008, 7.2.1: a result with its combined standard uncertainty.
    """
    return tuple(normal(each.value, each.uncertainty) for each in budgets)


def principal_budgets_notices(found: PrincipalBudgets) -> tuple[Notice, ...]:
    """A notice where the circle's radius hardly rises above its uncertainty.

    Then the larger strain reads too large, the smaller too small, and no direction is told.
    """
    if found.radius.value > TELLING * found.radius.uncertainty:
        return ()
    message = (
        "The principal strains differ by too little for their uncertainty: no direction is told, "
        "and their difference reads too large; trust the simulation."
    )
    return (Notice("principal strains", message, "JCGM 100:2008, 5.1.2, note"),)


def _state(angles: Sequence[float], grids: Mapping[str, Number]) -> PlaneStrain:
    return rosette_state([grids[name] for name in grid_names(len(angles))], angles)


def _alike(
    angles: Sequence[float], inputs: Mapping[str, Estimate], correlations: Correlations | None
) -> PrincipalBudgets:
    """Where the radius vanishes it has no slope: the mean is told for both principal strains.

    The radius has the uncertainty of (εx − εy)/2.
    """

    def mean(**grids: Number) -> Number:
        state = _state(angles, grids)
        return (state.x + state.y) / 2

    def half_difference(**grids: Number) -> Number:
        state = _state(angles, grids)
        return (state.x - state.y) / 2

    middle = budget(mean, inputs, correlations)
    return PrincipalBudgets(middle, middle, budget(half_difference, inputs, correlations), None)
