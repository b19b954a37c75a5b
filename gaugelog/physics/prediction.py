"""What a circuit must read: its zero, its output under strain, with a shunt or a leak in place.

By nodal analysis of the circuit's own network, so unequal arms, unequal wires, remote sense and a
resistor between any two nodes need no formula of their own. Outputs are ratios of the voltage
the module measures as its supply (V/V).
"""

from __future__ import annotations

from collections.abc import Collection

from gaugelog.physics._maths import Number
from gaugelog.physics.arrangements import arrangement, bridge_factor
from gaugelog.physics.bridge import indicated_strain
from gaugelog.physics.circuit import Circuit
from gaugelog.physics.layouts import (
    HALF_MINUS,
    HALF_PLUS,
    SIGNAL_MINUS,
    SIGNAL_PLUS,
    SUPPLY_MINUS,
    SUPPLY_PLUS,
)
from gaugelog.physics.network import (
    Network,
    Resistor,
    connected,
    potential,
    potentials,
    resistance_between,
)
from gaugelog.physics.validity import OutOfDomain, not_zero, positive

STEP = 1e-5
"""Strain, or relative change, of a step to either side: small, yet far above rounding."""


def network_of(circuit: Circuit, arms: Collection[int] = (1, 2, 3, 4)) -> Network:
    """The network of a circuit: each wire and each element a resistor between named nodes.

    Only the numbered `arms` are taken. Elements in series meet at nodes `arm 1.1`, `arm 1.2` …
    counted from the arm's first end. Source: Kirchhoff's laws; corners as in `bridge`.
    """
    placed = circuit.layout
    resistors = [
        Resistor(f"{pin} wire", pin, placed.wires[pin], resistance)
        for pin, resistance in circuit.wires.items()
    ]
    for number, (arm, (start, end)) in enumerate(
        zip(circuit.arms, placed.arm_ends, strict=True), start=1
    ):
        if number not in arms:
            continue
        inner = [f"arm {number}.{place}" for place in range(1, len(arm))]
        stops = [start, *inner, end]
        resistors += [
            Resistor(element.name, stops[place], stops[place + 1], element.value)
            for place, element in enumerate(arm)
        ]
    return Network(tuple(resistors))


def output(circuit: Circuit, *added: Resistor) -> Number:
    """Output of a circuit with any resistors added between its nodes, V/V.

    A ratio of the supply at the module's pins or, with remote sense, at the sense pins.
    Source: nodal analysis (Kirchhoff's laws).
    """
    whole = network_of(circuit).joined(*added)
    if not _has_buffers(circuit):
        plus, minus = _measured(circuit, whole, (SIGNAL_PLUS, SIGNAL_MINUS))
        return plus - minus
    if connected(whole, HALF_MINUS, SUPPLY_MINUS):
        raise OutOfDomain("added", "may not join the module's buffered half bridge to the rest.")
    half = potential(whole, SIGNAL_MINUS, HALF_PLUS, HALF_MINUS)
    return _measured(circuit, whole, (SIGNAL_PLUS,))[0] - half


def strained_output(circuit: Circuit, name: str, strain: Number, poisson: Number = 0.0) -> Number:
    """Output with every grid under its share of the strain that the arrangement looks for, V/V.

    Grids are those called `grid 1` to `grid 4`, as `circuit_of` names them.
    Source: nodal analysis (Kirchhoff's laws).
    """
    shares = arrangement(name).shares(poisson)
    present = {element.name for element in circuit.elements if element.kind == "grid"}
    return output(
        circuit.strained(
            {
                f"grid {number}": share * strain
                for number, share in enumerate(shares, start=1)
                if f"grid {number}" in present
            }
        )
    )


def added_strain(
    circuit: Circuit,
    resistance: Number,
    between: tuple[str, str],
    setting: Number,
    name: str = "quarter three-wire",
    poisson: Number = 0.0,
) -> Number:
    """Strain a linear instrument shows when a resistor is put between any two nodes.

    The instrument was zeroed before. A shunt and a leak are the same thing here. `setting` is
    the instrument's gauge factor. Units: ohm in, ratio out.
    Source: nodal analysis (Kirchhoff's laws) and `bridge.indicated_strain`.
    """
    nodes = network_of(circuit).nodes
    if not set(between) <= set(nodes):
        raise OutOfDomain("between", f"must name two nodes of the circuit ({', '.join(nodes)}).")
    resistor = Resistor("added resistor", *between, positive("resistance", resistance))
    change = output(circuit, resistor) - output(circuit)
    return indicated_strain(change, setting, name, poisson)


def sensitivity(circuit: Circuit, name: str, poisson: Number = 0.0) -> Number:
    """Output per strain of the circuit as wired, over that of ideal equal arms without leads.

    1 means nothing is lost; its inverse corrects a reading. By a symmetric step of 10 µm/m.
    Source: nodal analysis (Kirchhoff's laws).
    """
    rise = strained_output(circuit, name, STEP, poisson) - strained_output(
        circuit, name, -STEP, poisson
    )
    factors = [element.factor for element in circuit.elements if element.kind == "grid"]
    if not factors:
        raise OutOfDomain("circuit", "has no grid, so it has no sensitivity to strain.")
    factor = not_zero("factor", sum(factors) / len(factors))
    return rise / (2 * STEP) * 4 / (factor * bridge_factor(name, poisson))


def resistance_error(circuit: Circuit, measured: Number, grid: str) -> Number:
    """How much resistance in one element accounts for a measured zero that is not the predicted.

    Positive where the arm has too much. `measured` is in V/V, `grid` names the element; the
    result is in ohm. First order. Source: nodal analysis (Kirchhoff's laws).
    """
    element = circuit.element(grid)
    more = output(circuit.altered(grid, element.resistance * (1 + STEP)))
    less = output(circuit.altered(grid, element.resistance * (1 - STEP)))
    slope = (more - less) / (2 * STEP * element.resistance)
    return (measured - output(circuit)) / slope


def supply_resistance(circuit: Circuit) -> Number:
    """Resistance that the supply sees at the module's pins, ohm.

    Source: nodal analysis (Kirchhoff's laws).
    """
    return resistance_between(network_of(circuit), SUPPLY_PLUS, SUPPLY_MINUS)


def _measured(circuit: Circuit, whole: Network, nodes: tuple[str, ...]) -> tuple[Number, ...]:
    """Potentials of nodes as parts of the voltage the module takes as its supply."""
    if not circuit.layout.sensed:
        return potentials(whole, nodes, SUPPLY_PLUS, SUPPLY_MINUS)
    asked = (*circuit.layout.reference, *nodes)
    high, low, *found = potentials(whole, asked, SUPPLY_PLUS, SUPPLY_MINUS)
    return tuple((each - low) / (high - low) for each in found)


def _has_buffers(circuit: Circuit) -> bool:
    return any(HALF_PLUS in ends for ends in circuit.layout.arm_ends)
