"""Properties of nodal analysis: series, parallel, star and delta, opens, shorts and bad names."""

from __future__ import annotations

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics.network import (
    Network,
    Resistor,
    connected,
    potential,
    potentials,
    resistance_between,
    signal_ratio,
)
from gaugelog.physics.validity import OutOfDomain
from tests.physics.kinds import assert_takes_every_kind

OHM = st.floats(0.1, 1e6)


def _bridge(one: float, two: float, three: float, four: float, across: float = 1e4) -> Network:
    return Network(
        (
            Resistor("one", "low", "plus", one),
            Resistor("two", "plus", "high", two),
            Resistor("three", "high", "minus", three),
            Resistor("four", "minus", "low", four),
            Resistor("across", "plus", "minus", across),
        )
    )


@given(st.lists(OHM, min_size=1, max_size=8))
def test_resistors_in_series_add(values: list[float]) -> None:
    chain = Network(
        tuple(Resistor(str(n), str(n), str(n + 1), ohm) for n, ohm in enumerate(values))
    )
    found = resistance_between(chain, "0", str(len(values)))
    assert sum(values) == pytest.approx(found, rel=1e-12)


@given(st.lists(OHM, min_size=1, max_size=8))
def test_conductances_side_by_side_add(values: list[float]) -> None:
    bundle = Network(tuple(Resistor(str(n), "a", "b", ohm) for n, ohm in enumerate(values)))
    expected = 1 / sum(1 / ohm for ohm in values)
    assert expected == pytest.approx(resistance_between(bundle, "a", "b"), rel=1e-12)


@given(OHM, OHM, OHM, OHM, OHM)
def test_resistance_is_the_same_both_ways(
    one: float, two: float, three: float, four: float, across: float
) -> None:
    network = _bridge(one, two, three, four, across)
    there = resistance_between(network, "plus", "high")
    assert there == pytest.approx(resistance_between(network, "high", "plus"), rel=1e-12)


@given(OHM, OHM, OHM, OHM, OHM)
def test_adding_a_resistor_never_raises_a_resistance(
    one: float, two: float, three: float, four: float, across: float
) -> None:
    """Rayleigh's law of monotonicity."""
    network = _bridge(one, two, three, four, across)
    with_more = network.joined(Resistor("more", "low", "minus", 100.0))
    before = resistance_between(network, "plus", "high")
    assert resistance_between(with_more, "plus", "high") <= before * (1 + 1e-12)


@given(OHM, OHM)
def test_a_balanced_bridge_carries_nothing_across(arm: float, across: float) -> None:
    network = _bridge(arm, arm, arm, arm, across)
    assert 0.0 == pytest.approx(signal_ratio(network, ("plus", "minus"), ("high", "low")))
    assert arm == pytest.approx(resistance_between(network, "high", "low"))


def test_an_open_resistor_is_as_good_as_none() -> None:
    network = _bridge(350.0, 350.0, 350.0, 350.0, math.inf)
    assert 262.5 == pytest.approx(resistance_between(network, "high", "plus"))
    assert math.inf == resistance_between(Network((Resistor("r", "a", "b", math.inf),)), "a", "b")


def test_a_resistor_of_nothing_joins_its_nodes() -> None:
    network = _bridge(350.0, 350.0, 350.0, 350.0, 0.0)
    assert 0.0 == resistance_between(network, "plus", "minus")
    assert 0.5 == pytest.approx(potential(network, "plus", "high", "low"))
    assert 0.0 == signal_ratio(network, ("plus", "minus"), ("high", "low"))


def test_a_node_beside_the_path_has_the_potential_of_where_it_hangs() -> None:
    network = _bridge(1.0, 3.0, 1.0, 1.0, math.inf).joined(Resistor("spur", "plus", "end", 7.0))
    assert 0.25 == pytest.approx(potential(network, "end", "high", "low"))
    assert (1.0, 0.0) == potentials(network, ("high", "low"), "high", "low")


def test_parts_that_share_no_node_are_apart() -> None:
    network = Network((Resistor("a", "1", "2", 5.0), Resistor("b", "3", "4", 5.0)))
    assert math.inf == resistance_between(network, "1", "3")
    assert not connected(network, "1", "4")
    assert connected(network, "3", "4")
    with pytest.raises(OutOfDomain, match="3 is joined to neither end of the supply"):
        potential(network, "3", "1", "2")


def test_every_kind_of_number_goes_through_the_same_network() -> None:
    arms = (351.0, 349.0, 352.0, 350.0, 1e4)
    assert_takes_every_kind(lambda *arm: resistance_between(_bridge(*arm), "plus", "high"), *arms)
    assert_takes_every_kind(
        lambda *arm: signal_ratio(_bridge(*arm), ("plus", "minus"), ("high", "low")), *arms
    )


def test_a_thousand_networks_at_once_are_a_thousand_networks() -> None:
    draw = np.random.default_rng(3)
    arms = draw.uniform(100.0, 1000.0, (5, 1000))
    together = signal_ratio(_bridge(*arms), ("plus", "minus"), ("high", "low"))
    for place in range(0, 1000, 100):
        one = _bridge(*(float(arm) for arm in arms[:, place]))
        alone = signal_ratio(one, ("plus", "minus"), ("high", "low"))
        assert alone == pytest.approx(together[place], rel=1e-12)


def test_a_changed_resistor_is_the_only_change() -> None:
    network = _bridge(350.0, 350.0, 350.0, 350.0).changed("one", 700.0)
    assert [700.0, 350.0] == [each.resistance for each in network.resistors[:2]]
    assert ("low", "plus", "high", "minus") == network.nodes
    with pytest.raises(OutOfDomain, match="name must be a resistor of the network, not 'five'"):
        network.changed("five", 1.0)


@pytest.mark.parametrize(
    ("resistor", "sentence"),
    [
        (Resistor("r", "low", "plus", -1.0), "r must be greater than zero, not -1"),
        (Resistor("r", "low", "plus", math.nan), "r must be greater than zero, not nan"),
        (Resistor("r", "low", "high", 0.0), "high is shorted to low"),
    ],
)
def test_what_cannot_be_is_refused_by_name(resistor: Resistor, sentence: str) -> None:
    network = _bridge(1.0, 1.0, 1.0, 1.0).joined(resistor)
    with pytest.raises(OutOfDomain, match=sentence):
        potential(network, "plus", "high", "low")


def test_an_unknown_node_lists_those_there_are() -> None:
    with pytest.raises(OutOfDomain, match="node must be one of low, plus, high, minus, not 'top'"):
        resistance_between(_bridge(1.0, 1.0, 1.0, 1.0), "top", "low")
