"""Nodal analysis, held to a circuit simulator and to the network's own Laplacian matrix."""

from __future__ import annotations

from pathlib import Path

import numpy as np
import pytest

from gaugelog.physics import network
from gaugelog.physics.network import Network, Resistor
from tests.foreign import needs
from tests.outside.spice import Bench, resistances, voltages

CHECKS = (
    network.resistance_between,
    network.potential,
    network.potentials,
    network.signal_ratio,
    network.connected,
)


def _random_network(draw: np.random.Generator) -> Network:
    """A connected network of 3 to 9 nodes, values over six decades."""
    nodes = [f"n{place}" for place in range(draw.integers(3, 10))]
    pairs = [(nodes[place], nodes[draw.integers(place)]) for place in range(1, len(nodes))]
    spare = draw.integers(2 * len(nodes))
    for _ in range(spare):
        first, second = draw.permutation(len(nodes))[:2]
        pairs.append((nodes[first], nodes[second]))
    return Network(
        tuple(
            Resistor(f"r{place}", first, second, float(10 ** draw.uniform(0, 6)))
            for place, (first, second) in enumerate(pairs)
        )
    )


@needs("ngspice")
def test_resistance_between_any_two_nodes_is_the_simulators(tmp_path: Path) -> None:
    draw = np.random.default_rng(4)
    pairs = []
    for _ in range(500):
        grid = _random_network(draw)
        start, end = draw.permutation(len(grid.nodes))[:2]
        pairs.append((grid, grid.nodes[start], grid.nodes[end]))
    for (grid, start, end), expected in zip(pairs, resistances(pairs, tmp_path), strict=True):
        found = network.resistance_between(grid, start, end)
        assert expected == pytest.approx(found, rel=1e-9)


@needs("ngspice")
def test_every_potential_is_the_simulators(tmp_path: Path) -> None:
    draw = np.random.default_rng(5)
    networks = [_random_network(draw) for _ in range(200)]
    benches = [Bench(each, supply=(each.nodes[-1], each.nodes[0])) for each in networks]
    for each, volts in zip(networks, voltages(benches, tmp_path), strict=True):
        high, low = each.nodes[-1], each.nodes[0]
        for node in each.nodes:
            found = network.potential(each, node, high, low)
            assert volts[node] == pytest.approx(found, abs=1e-9)
        together = network.potentials(each, each.nodes, high, low)
        assert [volts[node] for node in each.nodes] == pytest.approx(list(together), abs=1e-9)
        first, second = each.nodes[1], each.nodes[-2]
        found = network.signal_ratio(each, (first, second), (high, low))
        assert volts[first] - volts[second] == pytest.approx(found, abs=1e-9)


def test_resistance_is_that_of_the_laplacians_inverse() -> None:
    """R(a, b) = L⁺aa + L⁺bb − 2 L⁺ab: Klein and Randić, Resistance distance, 1993 (from memory)."""
    draw = np.random.default_rng(6)
    for _ in range(50):
        grid = _random_network(draw)
        nodes = list(grid.nodes)
        laplacian = np.zeros((len(nodes), len(nodes)))
        for each in grid.resistors:
            first, second = nodes.index(each.start), nodes.index(each.end)
            laplacian[[first, second], [first, second]] += 1 / each.resistance
            laplacian[[first, second], [second, first]] -= 1 / each.resistance
        inverse = np.linalg.pinv(laplacian, rcond=1e-14)
        for place, node in enumerate(nodes[1:], start=1):
            expected = inverse[0, 0] + inverse[place, place] - 2 * inverse[0, place]
            found = network.resistance_between(grid, nodes[0], node)
            assert expected == pytest.approx(found, rel=1e-6)


def test_connection_follows_the_graph() -> None:
    """Two bridges that share no node are apart (graph theory)."""
    apart = Network((Resistor("a", "1", "2", 5.0), Resistor("b", "3", "4", 5.0)))
    assert network.connected(apart, "1", "2")
    assert not network.connected(apart, "1", "3")
