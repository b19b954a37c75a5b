"""Excitation: the heat a supply puts into a grid, and the largest supply the article carries off.

A grid's heat leaves through the part it is bonded to, so the power is judged by the grid's area.
`supply` is the steady or effective (r.m.s.) voltage across the bridge, `supplies` tells how other
forms come to that.
"""

from __future__ import annotations

from dataclasses import dataclass

from gaugelog.physics._maths import Number, nominal, sqrt
from gaugelog.physics._order import any_of, at_most
from gaugelog.physics.bridge import ARM_NAMES
from gaugelog.physics.validity import (
    Notice,
    OutOfDomain,
    finite,
    largest,
    not_negative,
    positive,
)

SQUARE_INCH = 0.0254**2
"""Square metres in a square inch (exact)."""


@dataclass(frozen=True, slots=True)
class HeatSink:
    """How much heat a class of article carries off with static accuracy, W/m².

    Up to `steady` no harm is looked for, over `most` the zero is not trusted; between them it
    depends on the article's thickness and on what is asked of the reading.
    """

    name: str
    steady: float
    most: float

    def __post_init__(self) -> None:
        at_most("steady", positive("steady", self.steady), "most", positive("most", self.most))


def from_watts_per_square_inch(value: Number) -> Number:
    """Power density in W/m² from W/in²: value/0.0254².

    Source: unit conversion, the inch is 25.4 mm exactly.

    >>> round(from_watts_per_square_inch(2.0), 1)
    3100.0
    """
    return not_negative("value", value) / SQUARE_INCH


def watts_per_square_inch(value: Number) -> Number:
    """Power density in W/in² from W/m²: value · 0.0254².

    Source: unit conversion, the inch is 25.4 mm exactly.
    """
    return not_negative("value", value) * SQUARE_INCH


HEAT_SINKS: dict[str, HeatSink] = {
    name: HeatSink(name, steady / SQUARE_INCH, most / SQUARE_INCH)
    for name, steady, most in (
        ("heavy aluminium or copper", 2.0, 5.0),
        ("thick steel", 1.0, 2.0),
        ("thin stainless or titanium", 0.5, 1.0),
        ("filled plastic or composite", 0.1, 0.2),
        ("plain plastic", 0.01, 0.02),
    )
}
"""Classes to begin with, given as is usual in W/in² (common practice); a logbook may set others."""


def heat_sink(name: str) -> HeatSink:
    """The heat-sink class called `name`; an unknown name lists those there are.

    Source: common practice (static accuracy).
    """
    found = HEAT_SINKS.get(name)
    if found is None:
        raise OutOfDomain("heat_sink", f"must be one of {', '.join(HEAT_SINKS)}, not {name!r}.")
    return found


def grid_power(
    supply: Number, grid: Number, neighbour: Number | None = None, wires: Number = 0.0
) -> Number:
    """Heat in one grid of a bridge: E² R/(R + Rn + RL)²; E²/(4R) in a bridge of equal arms.

    `neighbour` is the arm in series with the grid (the grid's own value when left out), `wires`
    all wires in that branch. Units: volt and ohm in, watt out. Source: Ohm's law; Dally and
    Riley, Experimental Stress Analysis, heat dissipated by a gauge (from memory).

    >>> round(1e3 * grid_power(5.0, 350.0), 2)  # mW
    17.86
    """
    positive("grid", grid)
    beside = grid if neighbour is None else positive("neighbour", neighbour)
    branch = grid + beside + not_negative("wires", wires)
    return grid * (finite("supply", supply) / branch) ** 2


def current_power(current: Number, grid: Number) -> Number:
    """Heat in a grid that carries a constant current: I² R.

    Units: ampere and ohm in, watt out. Source: Joule's law.
    """
    return finite("current", current) ** 2 * positive("grid", grid)


def power_density(power: Number, length: Number, width: Number) -> Number:
    """Heat of a grid over its area: P/(L W), the active length by the width over all strands.

    Units: watt and metre in, W/m² out. Source: definition; that it is the measure is common
    practice.

    >>> round(power_density(0.0178571, 0.003, 0.0025) / 1e3, 2)  # kW/m²
    2.38
    """
    return not_negative("power", power) / (positive("length", length) * positive("width", width))


def largest_supply(
    density: Number,
    grid: Number,
    length: Number,
    width: Number,
    neighbour: Number | None = None,
) -> Number:
    """Supply that gives a permitted density: (R + Rn) √(p L W/R); 2 √(p L W R) with equal arms.

    Units: W/m², ohm and metre in, volt out. Source: `grid_power` turned round.

    >>> round(largest_supply(from_watts_per_square_inch(2.0), 120.0, 0.003, 0.0025), 2)
    3.34
    """
    current = largest_current(density, grid, length, width)
    beside = grid if neighbour is None else positive("neighbour", neighbour)
    return (grid + beside) * current


def largest_current(density: Number, grid: Number, length: Number, width: Number) -> Number:
    """Current in a grid that gives a permitted density: √(p L W/R).

    Units: W/m², ohm and metre in, ampere out. Source: `current_power` turned round.
    """
    area = positive("length", length) * positive("width", width)
    return sqrt(positive("density", density) * area / positive("grid", grid))


def supply_current(
    supply: Number, arm_1: Number, arm_2: Number, arm_3: Number, arm_4: Number
) -> Number:
    """Current a bridge draws: E (1/(R1 + R2) + 1/(R3 + R4)), E/R with equal arms.

    Units: volt and ohm in, ampere out. Source: Ohm's law.
    """
    for name, value in zip(ARM_NAMES, (arm_1, arm_2, arm_3, arm_4), strict=True):
        positive(name, value)
    return finite("supply", supply) * (1 / (arm_1 + arm_2) + 1 / (arm_3 + arm_4))


def power_density_notices(density: Number, sink: HeatSink) -> tuple[Notice, ...]:
    """A notice where a grid gets hotter than its class of article is trusted to carry off."""
    if not any_of(nominal(density) > sink.steady):
        return ()
    found, limit = largest(density), sink.steady
    what = "depends on the part's thickness and on the accuracy asked for"
    if found > sink.most:
        limit, what = sink.most, "heats the grid so far that its zero drifts"
    message = (
        f"A power density of {found / 1e3:.3g} kW/m² on {sink.name} is above "
        f"{limit / 1e3:.3g} kW/m² and {what}."
    )
    return (Notice("grid power density", message, "common practice"),)
