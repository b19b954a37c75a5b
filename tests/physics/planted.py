"""Circuits with one planted defect, and what a meter would read between their terminals."""

from __future__ import annotations

import math
from collections.abc import Callable
from dataclasses import dataclass
from itertools import combinations

import numpy as np

from gaugelog.physics.circuit import Circuit, Element, circuit_of
from gaugelog.physics.defects import Defect
from gaugelog.physics.layouts import LAYOUTS
from gaugelog.physics.network import Network, Resistor, resistance_between
from gaugelog.physics.pin_network import ARTICLE, SHIELD, pin_network, pins_of
from gaugelog.physics.pins import PinReading

METER = 0.002
"""Relative standard uncertainty of the meter."""
FLOOR = 0.02
"""What its last digits add, ohm."""
OVERLOAD = 200e6
"""Bound of the meter's highest range, ohm."""

CIRCUITS = (
    ("quarter two-wire", 2),
    ("quarter three-wire", 3),
    ("half bending", 3),
    ("half with dummy", 5),
    ("full bending", 4),
    ("full Poisson", 6),
    ("opposite arms", 6),
)


@dataclass(frozen=True)
class Planted:
    """A circuit by plan, its network as made, then with a defect, and the pins as wired."""

    circuit: Circuit
    made: Network
    network: Network
    swap: dict[str, str]
    defect: Defect

    @property
    def pairs(self) -> list[tuple[str, str]]:
        """Every pair of terminals."""
        return list(combinations((*pins_of(self.circuit), ARTICLE, SHIELD), 2))

    def true_ohm(self, start: str, end: str) -> float:
        """What the terminals really have between them."""
        return between(self.network, self.swap.get(start, start), self.swap.get(end, end))


def between(network: Network, start: str, end: str) -> float:
    """Resistance between two nodes; infinite where a node is in no resistor."""
    if start not in network.nodes or end not in network.nodes:
        return math.inf
    return float(resistance_between(network, start, end))


def read(planted: Planted, draw: np.random.Generator) -> list[PinReading]:
    """Every pair of terminals by a 0.2 % meter."""
    return [_reading(pair, planted.true_ohm(*pair), draw) for pair in planted.pairs]


def exact(pair: tuple[str, str], ohm: float) -> PinReading:
    """What a meter without noise would show."""
    shown = min(ohm, OVERLOAD)
    return PinReading(pair, shown, METER * shown + FLOOR, overload=ohm >= OVERLOAD)


def _reading(pair: tuple[str, str], ohm: float, draw: np.random.Generator) -> PinReading:
    if ohm >= OVERLOAD:
        return PinReading(pair, OVERLOAD, METER * OVERLOAD, overload=True)
    sigma = METER * ohm + FLOOR
    shown = max(ohm + sigma * float(draw.standard_normal()), 0.0)
    return PinReading(pair, shown, METER * shown + FLOOR)


def shows(planted: Planted) -> bool:
    """Whether the defect moves some reading by more than three sigma."""
    for pair in planted.pairs:
        here, there = planted.true_ohm(*pair), between(planted.made, *pair)
        if min(here, there) < OVERLOAD:
            if max(here, there) >= OVERLOAD:
                return True
            if abs(here - there) > 3 * (METER * here + FLOOR):
                return True
    return False


def plant(draw: np.random.Generator) -> Planted:
    """A random circuit with a random defect."""
    circuit = _random_circuit(draw)
    return PLANTERS[draw.integers(len(PLANTERS))](circuit, _as_made(circuit, draw), draw)


def _random_circuit(draw: np.random.Generator) -> Circuit:
    """Any layout; one in four has wires of unequal length, one in four a trim in arm 1."""
    name, wires = CIRCUITS[draw.integers(len(CIRCUITS))]
    grid = float(draw.choice([120.0, 350.0, 1000.0]))
    circuit = circuit_of(name, wires, grid, 2.0, float(10 ** draw.uniform(-1, 1)))
    if name == "opposite arms" and draw.random() < 0.5:
        own = LAYOUTS["opposite four-wire"]
        circuit = Circuit(own, circuit.arms, {pin: circuit.wires[pin] for pin in own.wires})
    if draw.random() < 0.25:
        lengths = {pin: ohm * float(draw.uniform(0.5, 2)) for pin, ohm in circuit.wires.items()}
        circuit = Circuit(circuit.layout, circuit.arms, lengths)
    if draw.random() < 0.25:
        trimmed = (*circuit.arms[0], Element("trim 1", "trim", float(draw.uniform(0.2, 5.0))))
        circuit = Circuit(circuit.layout, (trimmed, *circuit.arms[1:]), circuit.wires)
    return circuit


def _as_made(circuit: Circuit, draw: np.random.Generator) -> Network:
    """The sound network with parts as they come: elements within 0.1 %, wires within 2 %."""
    return Network(
        tuple(
            Resistor(
                each.name,
                each.start,
                each.end,
                each.resistance
                * (1 + (0.02 if "wire" in each.name else 0.001) * float(draw.standard_normal())),
            )
            for each in pin_network(circuit).resistors
        )
    )


def _sound(circuit: Circuit, made: Network, draw: np.random.Generator) -> Planted:
    return Planted(circuit, made, made, {}, Defect("nothing"))


def _open(circuit: Circuit, made: Network, draw: np.random.Generator) -> Planted:
    each = _any(made, draw)
    missing = each.name.startswith("resistor")
    defect = Defect("missing completion" if missing else "open", (each.name,))
    return Planted(circuit, made, made.changed(each.name, math.inf), {}, defect)


def _short(circuit: Circuit, made: Network, draw: np.random.Generator) -> Planted:
    each = _element(made, draw)
    size = float(draw.uniform(0.01, 1.0))
    return Planted(
        circuit,
        made,
        made.joined(Resistor("short", each.start, each.end, size)),
        {},
        Defect("short", (each.start, each.end), size),
    )


def _value(circuit: Circuit, made: Network, draw: np.random.Generator) -> Planted:
    each = _element(made, draw)
    if draw.random() < 0.5:
        size = float(draw.choice([120.0, 350.0, 1000.0]))
    else:
        size = each.resistance * float(1 + draw.choice([-1, 1]) * draw.uniform(0.01, 0.4))
    return Planted(
        circuit, made, made.changed(each.name, size), {}, Defect("wrong value", (each.name,), size)
    )


def _swap(circuit: Circuit, made: Network, draw: np.random.Generator) -> Planted:
    tabs = circuit.layout.wires
    pairs = [(a, b) for a, b in combinations(pins_of(circuit), 2) if tabs[a] != tabs[b]]
    first, second = pairs[draw.integers(len(pairs))]
    return Planted(
        circuit, made, made, {first: second, second: first}, Defect("swapped", (first, second))
    )


def _joint(circuit: Circuit, made: Network, draw: np.random.Generator) -> Planted:
    each = _any(made, draw)
    size = float(10 ** draw.uniform(0, 5))
    return Planted(
        circuit,
        made,
        made.changed(each.name, each.resistance + size),
        {},
        Defect("joint", (each.name,), size),
    )


def _leak(circuit: Circuit, made: Network, draw: np.random.Generator) -> Planted:
    ends = [node for node in made.nodes if node.endswith("tab")] + [ARTICLE, SHIELD]
    first, second = (ends[place] for place in draw.permutation(len(ends))[:2])
    size = float(10 ** draw.uniform(1.5, 7.5))
    return Planted(
        circuit,
        made,
        made.joined(Resistor("leak", first, second, size)),
        {},
        Defect("leak", (first, second), size),
    )


def _any(made: Network, draw: np.random.Generator) -> Resistor:
    return made.resistors[draw.integers(len(made.resistors))]


def _element(made: Network, draw: np.random.Generator) -> Resistor:
    elements = [each for each in made.resistors if "wire" not in each.name]
    return elements[draw.integers(len(elements))]


PLANTERS: tuple[Callable[[Circuit, Network, np.random.Generator], Planted], ...] = (
    _sound,
    _open,
    _short,
    _value,
    _swap,
    _joint,
    _leak,
)
