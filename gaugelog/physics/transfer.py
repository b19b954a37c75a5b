"""One nodal solve of a network, asked in many ways: voltage here per ampere there.

A change of one resistance between nodes p and q changes the resistance between any a and b by
−s d², where d is the voltage a−b per ampere through p−q in the unchanged network and s depends
on the change alone (Sherman and Morrison, 1950). So one inverse serves any number of changes.
Parts that nothing joins are kept apart exactly; `AIR` stands between them.
"""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any, TypeAlias

from gaugelog.physics.network import Network

Array: TypeAlias = Any
"""A NumPy array; NumPy is imported only where a network is solved so."""

AIR = 1e11
"""Resistance of what does not conduct, ohm."""


@dataclass(frozen=True)
class Transfer:
    """A solved network of N nodes in P parts.

    `inner` (N × N) is the inverse of the nodal matrix, part by part; `part` (N × P) says with
    ones which nodes belong together. Pairs of nodes are incidences: N × K arrays with +1 at the
    first node and −1 at the second of each pair.
    """

    place: dict[str, int]
    inner: Array
    part: Array

    def incidence(self, ends: Sequence[tuple[str, str]]) -> Array:
        """The incidence of pairs of nodes by name; a pair of one node with itself is nothing."""
        import numpy as np

        columns = np.zeros((len(self.place), len(ends)))
        order = np.arange(len(ends))
        columns[[self.place[start] for start, _ in ends], order] += 1.0
        columns[[self.place[end] for _, end in ends], order] -= 1.0
        return columns

    def between(self, rows: Array, columns: Array) -> Array:
        """Voltage along each of `rows` per ampere along each of `columns`, ohm."""
        apart = (self.part.T @ rows).T @ (self.part.T @ columns)
        return rows.T @ self.inner @ columns + AIR * apart

    def along(self, rows: Array) -> Array:
        """Resistance along each of `rows`, ohm."""
        apart = ((self.part.T @ rows) ** 2).sum(axis=0)
        return (rows * (self.inner @ rows)).sum(axis=0) + AIR * apart


def solve(network: Network, loose: Sequence[str] = ()) -> Transfer:
    """Solve a network; `loose` names nodes that nothing joins by plan.

    Source: nodal analysis (Kirchhoff's laws), a node of each part held at zero.
    """
    import numpy as np

    nodes = list(dict.fromkeys((*network.nodes, *loose)))
    place = {node: index for index, node in enumerate(nodes)}
    matrix = np.zeros((len(nodes), len(nodes)))
    for each in network.resistors:
        first, second = place[each.start], place[each.end]
        matrix[[first, second], [first, second]] += 1 / each.resistance
        matrix[[first, second], [second, first]] -= 1 / each.resistance
    parts = _parts(matrix)
    inner, belongs = np.zeros_like(matrix), np.zeros((len(nodes), len(parts)))
    for column, members in enumerate(parts):
        belongs[members, column] = 1.0
        kept = np.ix_(members[1:], members[1:])
        inner[kept] = np.linalg.inv(matrix[kept])
    return Transfer(place, inner, belongs)


def strength(present: Array, own: Array, wanted: Array) -> Array:
    """The s of a change from the resistance `present` to `wanted`, both in ohm.

    `own` is the resistance along the change in the unchanged network. Where nothing but the
    changed resistor joins its ends, `own` is `present` and rounding is not let in.
    Source: Sherman and Morrison, 1950 (from memory).
    """
    import numpy as np

    rise = 1 / wanted - 1 / present
    rest = 1 + rise * own
    alone = rest < 1e-9
    return rise / np.where(alone, np.where(alone, present, 1.0) / wanted, rest)


def changed_resistance(present: Array, own: Array, strength: Array) -> Array:
    """The resistance in ohm that a change of that strength leads to: `strength` turned round."""
    import numpy as np

    with np.errstate(divide="ignore"):
        return 1 / (1 / present + strength / (1 - strength * own))


def _parts(matrix: Array) -> list[list[int]]:
    """Indices of nodes that current can pass between, part by part."""
    left, parts = set(range(len(matrix))), list[list[int]]()
    while left:
        waiting, members = [min(left)], list[int]()
        while waiting:
            node = waiting.pop()
            if node in left:
                left.remove(node)
                members.append(node)
                waiting += [int(other) for other in matrix[node].nonzero()[0]]
        parts.append(members)
    return parts
