"""Suspects: every single defect that a circuit's wiring may have, each as one change.

An open, a short, a wrong value, a poor joint and a leak all change one resistance between two
nodes, known or to be fitted. Two wires swapped exchange two pins. So every defect of a circuit
is listed from its own network, not from a book of cases.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass, field
from itertools import chain, combinations
from typing import Literal

from gaugelog.physics.network import Network, Resistor
from gaugelog.physics.pin_network import ARTICLE, SHIELD
from gaugelog.physics.transfer import AIR

Ends = tuple[str, str]
"""Two nodes, or two terminals, by name."""
Family = Literal["nothing", "open", "across", "value", "joint", "swapped"]
"""How a defect changes the network; `across` is a short or a leak by its size."""

LEAST = 1e-3
"""Smallest resistance a path is given, ohm."""
CEILING = 1e9
"""Resistance from which a path counts as none, ohm."""
VALUE_SPAN = 10.0
"""How many times an element may be under its own value, or over the largest there is."""


@dataclass(frozen=True, slots=True)
class Suspect:
    """A defect that may be there: a change between two nodes, or two pins exchanged.

    `present` is the resistance there by plan, infinite where nothing joins the nodes; `least`
    and `most` bound what it may be instead. Resistances in ohm.
    """

    family: Family
    where: tuple[str, ...]
    ends: Ends
    present: float = float("inf")
    least: float = AIR
    most: float = AIR
    swap: Mapping[str, str] = field(default_factory=dict, hash=False)
    completion: bool = False

    @property
    def sized(self) -> bool:
        """Whether the readings must tell how large it is."""
        return self.family in ("across", "value", "joint")

    def touched(self, ends: Sequence[Ends]) -> list[Ends]:
        """The terminals that a meter at `ends` really touches where wires are swapped."""
        return [(self.swap.get(start, start), self.swap.get(end, end)) for start, end in ends]


def suspects(network: Network, pins: tuple[str, ...], completions: frozenset[str]) -> list[Suspect]:
    """Every single defect that a network with these pins may have; `nothing` comes first.

    `completions` names the elements that are completion resistors.
    Source: the network itself; the kinds are common practice.
    """
    wires = {f"{pin} wire" for pin in pins}
    elements = [each for each in network.resistors if each.name not in wires]
    largest = max(float(each.resistance) for each in elements)
    return list(
        chain(
            [Suspect("nothing", (), (pins[0], pins[0]))],
            (_open(each, completions) for each in network.resistors),
            (_joint(each) for each in network.resistors),
            (_value(each, largest) for each in elements),
            _across(network, pins),
            _swapped(network, pins),
        )
    )


def _open(each: Resistor, completions: frozenset[str]) -> Suspect:
    present, ends = float(each.resistance), (each.start, each.end)
    return Suspect("open", (each.name,), ends, present, completion=each.name in completions)


def _joint(each: Resistor) -> Suspect:
    present, ends = float(each.resistance), (each.start, each.end)
    return Suspect("joint", (each.name,), ends, present, present, present + CEILING)


def _value(each: Resistor, largest: float) -> Suspect:
    present, ends = float(each.resistance), (each.start, each.end)
    least, most = present / VALUE_SPAN, largest * VALUE_SPAN
    return Suspect("value", (each.name,), ends, present, least, most)


def _across(network: Network, pins: tuple[str, ...]) -> Iterator[Suspect]:
    """Paths between any two corners, any two pins, either and bare metal; across each element."""
    inner = {node for node in network.nodes if node.startswith("arm ")}
    corners = [node for node in network.nodes if node not in pins and node not in inner]
    metal = (ARTICLE, SHIELD)
    pairs = chain(
        combinations((*corners, *metal), 2),
        combinations(pins, 2),
        ((pin, each) for pin in pins for each in metal),
        ((each.start, each.end) for each in network.resistors if {each.start, each.end} & inner),
    )
    for pair in dict.fromkeys(pairs):
        yield Suspect("across", pair, pair, least=LEAST, most=CEILING)


def _swapped(network: Network, pins: tuple[str, ...]) -> Iterator[Suspect]:
    """Two wires exchanged, unless both end at one tab with one resistance: that is no defect."""
    wires = {each.start: (each.end, each.resistance) for each in network.resistors}
    for first, second in combinations(pins, 2):
        if first not in wires or wires[first] != wires.get(second):
            swap = {first: second, second: first}
            yield Suspect("swapped", (first, second), (first, first), swap=swap)
