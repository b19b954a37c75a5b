"""What a circuit reads between the pins of its connector, the module unplugged."""

from __future__ import annotations

import math
from dataclasses import dataclass
from itertools import combinations

from gaugelog.physics._maths import Number
from gaugelog.physics.circuit import Circuit
from gaugelog.physics.layouts import HALF_MINUS, HALF_PLUS
from gaugelog.physics.network import Network, resistance_between
from gaugelog.physics.prediction import network_of
from gaugelog.physics.validity import OutOfDomain

ARTICLE, SHIELD = "ARTICLE", "SHIELD"
"""Terminals beside the pins: bare metal of the article, and the cable's shield."""


@dataclass(frozen=True, slots=True)
class ThreeQuarters:
    """The rule of thumb for a full bridge of equal arms, ohm.

    `pair` across the supply or the signal pins, `mixed` from any supply pin to any signal pin.
    """

    pair: Number
    mixed: Number


def pin_network(circuit: Circuit, *, plugged: bool = False) -> Network:
    """The part of a circuit that the pins show: wires and outside arms; all of it if `plugged`.

    Source: Kirchhoff's laws.
    """
    return network_of(circuit, (1, 2, 3, 4) if plugged else circuit.layout.outside)


def pins_of(circuit: Circuit, *, plugged: bool = False) -> tuple[str, ...]:
    """The pins that a meter can be put to; ARTICLE and SHIELD are not among them.

    Source: the circuit's layout.
    """
    nodes = pin_network(circuit, plugged=plugged).nodes
    return tuple(node for node in nodes if node in circuit.layout.wires or _is_module_pin(node))


def pin_resistance(circuit: Circuit, start: str, end: str, *, plugged: bool = False) -> Number:
    """Resistance a sound circuit shows between two terminals, ohm; infinity to bare metal.

    Source: nodal analysis (Kirchhoff's laws).
    """
    known = (*pins_of(circuit, plugged=plugged), ARTICLE, SHIELD)
    for terminal in (start, end):
        if terminal not in known:
            raise OutOfDomain("pin", f"must be one of {', '.join(known)}, not {terminal!r}.")
    if start != end and {start, end} & {ARTICLE, SHIELD}:
        return math.inf
    return resistance_between(pin_network(circuit, plugged=plugged), start, end)


def pin_table(circuit: Circuit, *, plugged: bool = False) -> dict[tuple[str, str], Number]:
    """What every pair of pins of a sound circuit shows, ohm: a table to measure against.

    Source: nodal analysis (Kirchhoff's laws).
    """
    return {
        pair: pin_resistance(circuit, *pair, plugged=plugged)
        for pair in combinations(pins_of(circuit, plugged=plugged), 2)
    }


def three_quarters_rule(circuit: Circuit) -> ThreeQuarters | None:
    """The 3/4 rule, or None where it does not hold: only for four equal arms and no trim.

    Across supply or signal one arm, supply to signal three quarters of an arm, each with its two
    wires. Source: Tablet and Capsule Machine Instrumentation, electrical tests; nodal analysis.
    """
    arms = {sum(element.value for element in arm) for arm in circuit.arms}
    wires = set(circuit.wires.values())
    trimmed = any(element.kind == "trim" for element in circuit.elements)
    full = circuit.layout.outside == frozenset({1, 2, 3, 4})
    if not full or trimmed or len(arms) > 1 or len(wires) > 1:
        return None
    arm, wire = arms.pop(), wires.pop()
    return ThreeQuarters(arm + 2 * wire, 0.75 * arm + 2 * wire)


def _is_module_pin(node: str) -> bool:
    """Whether a node is a pin of the module that no wire of the circuit reaches."""
    inner = node.endswith(" tab") or node.startswith("arm ")
    return not inner and node not in (HALF_PLUS, HALF_MINUS)
