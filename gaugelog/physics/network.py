"""Resistors between named nodes: resistance between any two, potential of any node.

Nodal analysis by star-mesh reduction. A node is removed and its neighbours are joined by
g_i g_j / Σg; nothing is ever subtracted, so no digits are lost, and floats, arrays and uncertain
numbers go through alike. A resistor of no ohm joins its two nodes; one of infinity is open.
"""

from __future__ import annotations

import math
from collections.abc import Iterable, Sequence
from dataclasses import dataclass

from gaugelog.physics._maths import Number
from gaugelog.physics.validity import OutOfDomain, positive_or_infinite

NEGLIGIBLE = 1e-12
"""Resistance under which two nodes are one, ohm."""

_Mesh = dict[str, dict[str, Number]]
"""Conductance between each pair of joined nodes, both ways round."""


@dataclass(frozen=True, slots=True)
class Resistor:
    """A resistor with a name, from node `start` to node `end`; ohm, 0 to infinity."""

    name: str
    start: str
    end: str
    resistance: Number


@dataclass(frozen=True, slots=True)
class Network:
    """Resistors joined at nodes. Source of the method: Kirchhoff's laws, star-mesh transform."""

    resistors: tuple[Resistor, ...]

    @property
    def nodes(self) -> tuple[str, ...]:
        """Every node once, in order of first mention."""
        ends = (node for each in self.resistors for node in (each.start, each.end))
        return tuple(dict.fromkeys(ends))

    def joined(self, *more: Resistor) -> Network:
        """The network with more resistors in it."""
        return Network((*self.resistors, *more))

    def changed(self, name: str, resistance: Number) -> Network:
        """The network with another value for the resistor called `name`."""
        if name not in {each.name for each in self.resistors}:
            raise OutOfDomain("name", f"must be a resistor of the network, not {name!r}.")
        return Network(
            tuple(
                Resistor(each.name, each.start, each.end, resistance) if each.name == name else each
                for each in self.resistors
            )
        )


def resistance_between(network: Network, start: str, end: str) -> Number:
    """Resistance between two nodes, ohm; infinity where nothing joins them.

    Source: nodal analysis (Kirchhoff's laws) by the star-mesh transform; any text on circuits.

    >>> resistance_between(Network((Resistor("a", "1", "2", 3.0), Resistor("b", "1", "2", 6.0))),
    ...     "1", "2")
    2.0
    """
    mesh, alias = _mesh(network)
    first, last = _known(alias, start), _known(alias, end)
    if first == last:
        return 0.0
    conductance = _reduced(mesh, {first, last})[first].get(last)
    return math.inf if conductance is None else 1 / conductance


def connected(network: Network, start: str, end: str) -> bool:
    """Whether current can pass between two nodes.

    Source: the graph of the network.
    """
    mesh, alias = _mesh(network)
    seen, waiting = set[str](), [_known(alias, start)]
    while waiting:
        node = waiting.pop()
        if node not in seen:
            seen.add(node)
            waiting += mesh[node]
    return _known(alias, end) in seen


def potential(network: Network, node: str, high: str, low: str) -> Number:
    """Potential of a node as a part of the voltage between `high` and `low`: 0 at low, 1 at high.

    Source: nodal analysis (Kirchhoff's laws) by the star-mesh transform; any text on circuits.
    """
    return potentials(network, (node,), high, low)[0]


def potentials(network: Network, nodes: Sequence[str], high: str, low: str) -> tuple[Number, ...]:
    """Potential of each node as a part of the voltage between `high` and `low`.

    Source: nodal analysis (Kirchhoff's laws) by the star-mesh transform; any text on circuits.
    """
    mesh, alias = _mesh(network)
    top, bottom, *asked = (_known(alias, node) for node in (high, low, *nodes))
    if top == bottom:
        raise OutOfDomain("high", f"is shorted to {low}: no voltage stands between them.")
    mesh = _reduced(mesh, {top, bottom, *asked})
    return tuple(_potential(mesh, node, top, bottom) for node in asked)


def signal_ratio(network: Network, signal: tuple[str, str], supply: tuple[str, str]) -> Number:
    """Voltage between two signal nodes, plus node first, as a part of the supply's.

    Source: nodal analysis (Kirchhoff's laws) by the star-mesh transform; any text on circuits.
    """
    plus, minus = potentials(network, signal, *supply)
    return plus - minus


def _potential(mesh: _Mesh, node: str, top: str, bottom: str) -> Number:
    if node in (top, bottom):
        return 1.0 if node == top else 0.0
    links = _reduced(mesh, {node, top, bottom})[node]
    if not links:
        raise OutOfDomain("node", f"{node} is joined to neither end of the supply.")
    up, down = links.get(top, 0.0), links.get(bottom, 0.0)
    return up / (up + down)


def _mesh(network: Network) -> tuple[_Mesh, dict[str, str]]:
    """Conductances between nodes, and each node's name after zero-ohm resistors joined some."""
    alias = _aliases(network.resistors)
    mesh: _Mesh = {node: {} for node in alias.values()}
    for each in network.resistors:
        start, end = alias[each.start], alias[each.end]
        if start != end and not _is_open(each.resistance):
            positive_or_infinite(each.name, each.resistance)
            _add(mesh, start, end, 1 / each.resistance)
    return mesh, alias


def _aliases(resistors: Iterable[Resistor]) -> dict[str, str]:
    alias: dict[str, str] = {}
    for each in resistors:
        alias.setdefault(each.start, each.start)
        alias.setdefault(each.end, each.end)
        if _joins(each.resistance):
            kept, lost = alias[each.start], alias[each.end]
            alias = {node: kept if name == lost else name for node, name in alias.items()}
    return alias


def _reduced(mesh: _Mesh, keep: set[str]) -> _Mesh:
    """The mesh with every node but `keep` removed, the least joined first."""
    left = {node: dict(links) for node, links in mesh.items()}
    while len(left) > len(keep):
        node = min((each for each in left if each not in keep), key=lambda each: len(left[each]))
        links = left.pop(node)
        for neighbour in links:
            del left[neighbour][node]
        _join_neighbours(left, links)
    return left


def _join_neighbours(mesh: _Mesh, links: dict[str, Number]) -> None:
    total = sum(links.values())
    neighbours = list(links.items())
    for position, (first, near) in enumerate(neighbours):
        for second, far in neighbours[position + 1 :]:
            _add(mesh, first, second, near * far / total)


def _add(mesh: _Mesh, start: str, end: str, conductance: Number) -> None:
    total = mesh[start].get(end, 0.0) + conductance
    mesh[start][end] = total
    mesh[end][start] = total


def _is_open(resistance: Number) -> bool:
    return isinstance(resistance, float) and resistance == math.inf


def _joins(resistance: Number) -> bool:
    return isinstance(resistance, int | float) and 0 <= resistance < NEGLIGIBLE


def _known(alias: dict[str, str], node: str) -> str:
    if node not in alias:
        raise OutOfDomain("node", f"must be one of {', '.join(alias)}, not {node!r}.")
    return alias[node]
