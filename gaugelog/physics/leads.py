"""What lead wires do to a bridge: sensitivity lost, apparent strain with temperature, offset.

First-order formulas for equal wires and equal arms, as the trade uses them. For unequal arms or
wires, or to the last digit, `prediction` solves the circuit itself.
"""

from __future__ import annotations

from gaugelog.physics._maths import Number
from gaugelog.physics.bridge import indicated_strain, output_ratio
from gaugelog.physics.validity import Notice, OutOfDomain, finite, not_negative, not_zero, positive

_WIRES_IN_PATH = {
    "quarter two-wire": 2,
    "quarter three-wire": 1,
    "half three-wire": 1,
    "half five-wire": 0,
    "opposite four-wire": 2,
    "full four-wire": 2,
    "full six-wire": 0,
}
"""Wires that stand in series with one grid's resistance and dilute its change, by layout.

In a half or full bridge they are the supply wires, which lower the voltage at the bridge; with
remote sense the module measures what arrives, so none count.
"""


def desensitisation(layout: str, grid: Number, wire: Number) -> Number:
    """Part of the sensitivity that is left: R/(R + n RL).

    n is 2 for two wires in the arm (two-wire quarter) or in the supply (full bridge), 1 for the
    three-wire quarter and the half bridge, 0 with remote sense. `grid` is one arm. Units: ohm
    in, ratio out. Source: Dally and Riley, Experimental Stress Analysis, effects of lead wires
    (from memory).

    >>> round(desensitisation("quarter two-wire", 120.0, 1.0), 9)
    0.983606557
    """
    positive("grid", grid)
    return grid / (grid + _count(layout) * not_negative("wire", wire))


def sensitivity_loss(layout: str, grid: Number, wire: Number) -> Number:
    """Part of the sensitivity that the wires take: 1 − R/(R + n RL).

    Units: ohm in, ratio out. Source: as `desensitisation`.
    """
    return 1 - desensitisation(layout, grid, wire)


def correction_factor(layout: str, grid: Number, wire: Number) -> Number:
    """What to multiply a reading by so that the wires' loss is made good: (R + n RL)/R.

    Units: ohm in, ratio out. Source: as `desensitisation`.
    """
    return 1 / desensitisation(layout, grid, wire)


def effective_factor(layout: str, grid: Number, wire: Number, factor: Number) -> Number:
    """Gauge factor of grid and wires together; set on the instrument it makes good their loss.

    Units: ohm in, ratio out. Source: as `desensitisation`.
    """
    return not_zero("factor", factor) * desensitisation(layout, grid, wire)


def added_gauge_strain(
    grid: Number, wires: Number, coefficient: Number, rise: Number, factor: Number
) -> Number:
    """Grid strain equal to the wires' change of resistance in the grid's arm: ΔR/(K R).

    `wires` is the resistance of all wires in that arm, less that of the neighbour's. Units:
    ohm, 1/K, K in, ratio out. Source: Beckwith and Marangoni, Mechanical Measurements, lead-wire
    temperature (from memory).
    """
    change = finite("wires", wires) * finite("coefficient", coefficient) * finite("rise", rise)
    return change / (positive("grid", grid) * not_zero("factor", factor))


def temperature_strain(
    grid: Number,
    wires: Number,
    neighbour: Number,
    coefficient: Number,
    rise: Number,
    setting: Number,
) -> Number:
    """Strain indicated, after zeroing, when the wires warm: ΔR/(K (R + RL)) in each of two arms.

    `wires` lie in the grid's arm (two of them in a two-wire circuit), `neighbour` in the arm
    beside it (none in a two-wire circuit, one in a three-wire). Equal wires in both cancel.
    Small-signal. Units: ohm, 1/K, K in, ratio out.
    Source: Dally and Riley, Experimental Stress Analysis, effects of lead wires (from memory).
    """
    positive("grid", grid)
    warming = finite("coefficient", coefficient) * finite("rise", rise)
    own = not_negative("wires", wires) / (grid + wires)
    beside = not_negative("neighbour", neighbour) / (grid + neighbour)
    return (own - beside) * warming / not_zero("setting", setting)


def sensitivity_drift(
    layout: str, grid: Number, wire: Number, coefficient: Number, rise: Number
) -> Number:
    """Relative change of sensitivity when the wires warm: their loss grows with them.

    What is left of the apparent strain in half and full bridges, whose zero does not move. Units:
    ohm, 1/K, K in, ratio out. Source: as `desensitisation`, at two temperatures.
    """
    growth = 1 + finite("coefficient", coefficient) * finite("rise", rise)
    warm = desensitisation(layout, grid, wire * growth)
    return warm / desensitisation(layout, grid, wire) - 1


def initial_offset(
    grid: Number, wires: Number, completion: Number, neighbour: Number = 0.0
) -> Number:
    """Output before loading of a quarter bridge from its wires and resistors, exact, V/V.

    `wires` lie in series with the grid, `neighbour` with the completion resistor; the other two
    arms are equal. Source: e/E = R1/(R1 + R2) − 1/2; Dally and Riley (from memory).

    >>> round(1000 * initial_offset(351.2, 1.0, 350.0, 1.0), 3)  # mV/V
    0.853
    """
    positive("grid", grid)
    positive("completion", completion)
    near = grid + not_negative("wires", wires)
    return output_ratio(near, completion + not_negative("neighbour", neighbour), 1.0, 1.0)


def initial_strain(grid: Number, wires: Number, setting: Number) -> Number:
    """Offset of a two-wire quarter bridge as strain to first order: RL/(K R), `wires` both.

    Units: ohm in, ratio out. Source: ΔR/R over the gauge factor; Dally and Riley (from memory).
    """
    share = not_negative("wires", wires) / positive("grid", grid)
    return share / not_zero("setting", setting)


def initial_offset_strain(grid: Number, wires: Number, setting: Number) -> Number:
    """Offset of a two-wire quarter bridge as a linear instrument shows it, exact.

    Units: ohm in, ratio out. Source: as `initial_offset` and `bridge.indicated_strain`.
    """
    return indicated_strain(initial_offset(grid, wires, grid), setting)


def desensitisation_notices(layout: str, grid: Number, wire: Number) -> tuple[Notice, ...]:
    """A notice where two wires in a quarter bridge carry an offset and drift with temperature."""
    _count(layout)
    if layout != "quarter two-wire" or wire == 0:
        return ()
    offset = float(initial_offset_strain(float(grid), 2 * float(wire), 2.0))
    return (
        Notice(
            "lead loss",
            f"Both wires of a two-wire circuit lie in the grid's arm: about {offset * 1e6:.0f} "
            "µm/m of offset (factor 2), and all their change with temperature reads as strain.",
            "Dally and Riley, Experimental Stress Analysis, effects of lead wires (from memory)",
        ),
    )


def _count(layout: str) -> int:
    count = _WIRES_IN_PATH.get(layout)
    if count is None:
        raise OutOfDomain("layout", f"must be one of {', '.join(_WIRES_IN_PATH)}, not {layout!r}.")
    return count
