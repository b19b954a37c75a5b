"""Shunt calibration: the strain a resistor across an arm stands for, and the one it shows.

Three readings are kept apart by name. The *simulated* strain is what the grid alone would have to
feel (ΔR/R/K). The *indicated* strain is what a linear instrument shows, the bridge being a little
non-linear. A *real* strain of the simulated size indicates something else again.
"""

from __future__ import annotations

from gaugelog.physics._maths import Number, magnitude
from gaugelog.physics.bridge import BRIDGE_SOURCE, NONLINEARITY_NOTED, indicated_strain
from gaugelog.physics.validity import (
    Notice,
    largest,
    not_negative,
    not_zero,
    one_of,
    positive,
    strictly_between,
)

_SIGN = {1: 1, 2: -1, 3: 1, 4: -1}
"""Which way the output goes when an arm's resistance rises."""


def shunted(resistance: Number, shunt: Number) -> Number:
    """Resistance of an arm with a shunt across it: R Rs/(R + Rs).

    Units: ohm. Source: two resistors side by side.
    """
    return positive("resistance", resistance) * positive("shunt", shunt) / (resistance + shunt)


def relative_step(resistance: Number, shunt: Number) -> Number:
    """Part of its resistance that a shunted arm loses: R/(R + Rs).

    Units: ohm in, ratio out. Source: two resistors side by side.
    """
    return positive("resistance", resistance) / (resistance + positive("shunt", shunt))


def simulated_strain(resistance: Number, factor: Number, shunt: Number) -> Number:
    """Strain of the shunted grid that its change of resistance stands for: −R/(K (R + Rs)).

    Negative for a positive factor, as a shunt only lowers a resistance; larger than −1/K.
    Units: ohm in, ratio out. Source: parallel resistance and the gauge factor (ASTM E251, from
    memory).

    >>> round(simulated_strain(350.0, 2.0, 174650.0), 6)
    -0.001
    """
    return -relative_step(resistance, shunt) / not_zero("factor", factor)


def shunt_for_strain(resistance: Number, factor: Number, strain: Number) -> Number:
    """Shunt that simulates a strain of that size: R/(K |ε|) − R.

    The sign of the strain does not count: a shunt across the grid simulates compression, across
    a neighbouring arm tension. Units: ohm, ratio. Source: as `simulated_strain`, turned round.

    >>> round(shunt_for_strain(1000.0, 2.0, 0.001))
    499000
    """
    change = magnitude(not_zero("factor", factor) * not_zero("strain", strain))
    strictly_between("strain times factor", change, 0.0, 1.0)
    return positive("resistance", resistance) * (1 / change - 1)


def shunt_output(resistance: Number, shunt: Number, arm: int = 1) -> Number:
    """Change of output of four equal arms when one is shunted: ∓R/(4 Rs + 2 R), V/V.

    Minus for arms 1 and 3, plus for 2 and 4. Units: ohm in, V/V out.
    Source: the exact output of the bridge; Dally and Riley (from memory).

    >>> round(1000 * shunt_output(350.0, 100000.0), 9)
    -0.873471425
    """
    one_of("arm", arm, tuple(_SIGN))
    positive("resistance", resistance)
    return -_SIGN[arm] * resistance / (4 * positive("shunt", shunt) + 2 * resistance)


def shunt_indicated_strain(
    resistance: Number,
    shunt: Number,
    setting: Number,
    arm: int = 1,
    name: str = "quarter three-wire",
    poisson: Number = 0.0,
) -> Number:
    """Strain a linear instrument shows for a shunt across one of four equal arms, no leads.

    `setting` is the instrument's gauge factor. Units: ohm in, ratio out. With leads, unequal
    arms or other pins use `prediction.added_strain`.
    Source: the exact output of the bridge; Dally and Riley (from memory).
    """
    return indicated_strain(shunt_output(resistance, shunt, arm), setting, name, poisson)


def shunt_at_module_strain(grid: Number, wire: Number, shunt: Number, setting: Number) -> Number:
    """Strain shown for a shunt between the supply and signal pins of a three-wire quarter bridge.

    The shunt spans the grid and its wires, and its own current drops in the signal wire; it
    over-reads and does not show the lead loss. All wires equal; completion equal to the grid.
    Units: ohm in, ratio out. Source: Kirchhoff's laws; agrees with `prediction.added_strain`.

    >>> round(1e6 * shunt_at_module_strain(120.0, 1.5, 59880.0, 2.0), 1)
    -1038.5
    """
    positive("grid", grid)
    arm = grid + not_negative("wire", wire)
    across = positive("shunt", shunt)
    # Seen from the pins, the balanced bridge is arm/2 plus the signal wire, at half the supply.
    inner = arm / 2 + wire
    return indicated_strain(-inner / (inner + across) / 2, setting)


def shunt_indicated_strain_notices(resistance: Number, shunt: Number) -> tuple[Notice, ...]:
    """A notice where simulated and indicated strain differ by more than 0.1 %."""
    step = largest(relative_step(resistance, shunt)) / 2
    if step <= NONLINEARITY_NOTED:
        return ()
    message = (
        f"So large a step makes indicated and simulated strain differ by {step:.2%}; "
        "compare a reading with the indicated one."
    )
    return (Notice("shunt strain", message, BRIDGE_SOURCE),)
