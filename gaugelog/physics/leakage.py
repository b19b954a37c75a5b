"""Leakage: the strain that poor insulation feigns, and the insulation a permitted error needs.

The insulation is taken to lie across the grid, the worst place it can lie, unless a function says
otherwise. Leakage lowers a resistance and so feigns compression.
"""

from __future__ import annotations

from gaugelog.physics._maths import Number, magnitude
from gaugelog.physics.bridge import indicated_strain
from gaugelog.physics.validity import (
    Notice,
    between,
    largest,
    not_zero,
    positive,
    positive_or_infinite,
    strictly_between,
)

FIELD_FLOOR = 100e6
"""Insulation under which field readings are not trusted, ohm (common practice)."""


def leakage_strain(grid: Number, factor: Number, insulation: Number) -> Number:
    """Apparent strain of a grid with its insulation across it: −R/(K (R + Ri)).

    `insulation` may be infinite. Units: ohm in, ratio out. Source: parallel resistance and the
    gauge factor (ASTM E251, from memory).

    >>> round(1e6 * leakage_strain(350.0, 2.0, 10e6), 4)
    -17.4994
    """
    positive("grid", grid)
    total = grid + positive_or_infinite("insulation", insulation)
    return -grid / (not_zero("factor", factor) * total)


def leakage_drift(grid: Number, factor: Number, before: Number, after: Number) -> Number:
    """Apparent strain that appears as insulation goes from one value to another.

    A steady leak is lost in the zero; its change is not. Units: ohm in, ratio out.
    Source: as `leakage_strain`, a difference.

    >>> round(1e6 * leakage_drift(120.0, 2.0, 1000e6, 10e6))
    -6
    """
    first = leakage_strain(grid, factor, positive_or_infinite("before", before))
    return leakage_strain(grid, factor, positive_or_infinite("after", after)) - first


def insulation_needed(grid: Number, factor: Number, permitted: Number) -> Number:
    """Least insulation for a permitted error: R (1/(K |ε|) − 1).

    Units: ohm and ratio in, ohm out. Source: as `leakage_strain`, turned round.
    """
    change = magnitude(not_zero("factor", factor) * not_zero("permitted", permitted))
    strictly_between("permitted times factor", change, 0.0, 1.0)
    return positive("grid", grid) * (1 / change - 1)


def insulation_fall(before: Number, after: Number) -> Number:
    """How many times smaller insulation has become between two stages: R0/R1.

    Units: ohm in, ratio out. Source: arithmetic; that more than tenfold is looked into is common
    practice.
    """
    return positive("before", before) / positive("after", after)


def grid_to_grid_strain(
    grid: Number,
    factor: Number,
    insulation: Number,
    own: Number,
    other: Number,
    other_resistance: Number = 0.0,
) -> Number:
    """Apparent strain of a quarter bridge whose signal tab leaks to a tab of another circuit.

    Both hang on one supply. `own` and `other` are the potentials of the two tabs as parts of the
    supply voltage (0 at minus, 1 at plus); `other_resistance` is what the other tab's circuit
    shows as its own source: 0 at a supply tab, half a grid at a balanced signal tab. Units: ohm
    and ratios in, ratio out. Source: Thévenin's theorem; any text on circuits.

    >>> round(1e6 * grid_to_grid_strain(350.0, 2.0, 10e6, 0.5, 0.0), 3)
    -17.5
    """
    inner = positive("grid", grid) / 2
    between("own", own, 0.0, 1.0)
    between("other", other, 0.0, 1.0)
    path = inner + positive_or_infinite("insulation", insulation) + other_resistance
    return indicated_strain((other - own) * inner / path, factor)


def shield_leak_strain(
    grid: Number, factor: Number, insulation: Number, shield: Number, tab: Number = 0.5
) -> Number:
    """Apparent strain of a quarter bridge whose signal tab leaks to a shield or to the article.

    `shield` is its potential as a part of the supply voltage; a shield held at the potential of
    the signal feigns nothing. A shield that floats carries no current: leave this out. Units:
    ohm and ratios in, ratio out. Source: Thévenin's theorem; any text on circuits.
    """
    return grid_to_grid_strain(grid, factor, insulation, tab, shield)


def leakage_strain_notices(insulation: Number) -> tuple[Notice, ...]:
    """A notice where insulation is so low that it will not stay what it is."""
    if largest(FIELD_FLOOR / positive_or_infinite("insulation", insulation)) <= 1:
        return ()
    return (
        Notice(
            "leakage",
            "Under 100 MΩ insulation changes with damp and temperature; the apparent strain is "
            "not steady and cannot be corrected.",
            "common practice",
        ),
    )
