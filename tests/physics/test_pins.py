"""Diagnosis from figures between pins: one planted defect at a time, and what cannot be told."""

from __future__ import annotations

import math

import pytest

from gaugelog.physics.circuit import Circuit, Element, circuit_of
from gaugelog.physics.defects import Defect
from gaugelog.physics.network import Network, Resistor
from gaugelog.physics.pin_network import (
    ARTICLE,
    SHIELD,
    pin_network,
    pin_resistance,
    pin_table,
    pins_of,
    three_quarters_rule,
)
from gaugelog.physics.pins import Diagnosis, PinReading, diagnose
from gaugelog.physics.validity import OutOfDomain
from tests.physics.planted import OVERLOAD, Planted, exact

SIX = circuit_of("full bending", 6, 350.0, 2.0, 3.0)
THREE = circuit_of("quarter three-wire", 3, 120.0, 2.0, 1.5)


def _diagnosed(circuit: Circuit, network: Network, **swap: str) -> Diagnosis:
    """What exact readings of every pair of terminals are taken to mean."""
    planted = Planted(circuit, network, network, swap, Defect("nothing"))
    return diagnose(circuit, [exact(pair, planted.true_ohm(*pair)) for pair in planted.pairs])


def test_a_sound_circuit_has_nothing_wrong() -> None:
    for circuit in (SIX, THREE):
        diagnosis = _diagnosed(circuit, pin_network(circuit))
        assert "nothing" == diagnosis.answers[0].defects[0].kind
        assert diagnosis.explained
        assert 0.0 == pytest.approx(diagnosis.answers[0].misfit, abs=1e-6)


@pytest.mark.parametrize(
    ("defect", "network"),
    [
        (Defect("open", ("grid 3",)), pin_network(SIX).changed("grid 3", math.inf)),
        (Defect("open", ("signal- wire",)), pin_network(SIX).changed("signal- wire", math.inf)),
        (Defect("joint", ("supply+ wire",)), pin_network(SIX).changed("supply+ wire", 23.0)),
        (Defect("wrong value", ("grid 2",)), pin_network(SIX).changed("grid 2", 120.0)),
        (
            Defect("short", ("signal+ tab", "supply+ tab")),
            pin_network(SIX).joined(Resistor("x", "signal+ tab", "supply+ tab", 0.2)),
        ),
        (
            Defect("leak", ("signal+ tab", ARTICLE)),
            pin_network(SIX).joined(Resistor("x", "signal+ tab", ARTICLE, 2e6)),
        ),
        (
            Defect("leak", (ARTICLE, SHIELD)),
            pin_network(SIX).joined(Resistor("x", ARTICLE, SHIELD, 5e4)),
        ),
    ],
)
def test_a_planted_defect_is_in_the_first_answer(defect: Defect, network: Network) -> None:
    answer = _diagnosed(SIX, network).answers[0]
    places = {(each.kind, frozenset(each.where)) for each in answer.defects}
    assert (defect.kind, frozenset(defect.where)) in places


def test_the_size_of_a_defect_is_found() -> None:
    joint = _diagnosed(SIX, pin_network(SIX).changed("supply+ wire", 23.0))
    assert 20.0 == pytest.approx(joint.answers[0].defects[0].size or 0.0, rel=1e-3)
    value = _diagnosed(SIX, pin_network(SIX).changed("grid 2", 120.0))
    sizes = {each.kind: each.size for each in value.answers[0].defects}
    assert 120.0 == pytest.approx(sizes["wrong value"] or 0.0, rel=1e-3)


def test_a_wrong_value_and_a_leak_across_it_are_one_answer() -> None:
    """120 Ω in the place of 350 Ω is 350 Ω with 182.6 Ω across it: no resistance parts them."""
    answer = _diagnosed(SIX, pin_network(SIX).changed("grid 2", 120.0)).answers[0]
    sizes = {(each.kind, frozenset(each.where)): each.size for each in answer.defects}
    leak = sizes["leak", frozenset({"signal+ tab", "supply+ tab"})]
    assert 350 * 120 / 230 == pytest.approx(leak or 0.0, rel=1e-3)
    assert "; or " in answer.sentence


def test_two_wires_that_look_alike_swapped_are_named_beside_nothing() -> None:
    """Equal arms: exchanging the signal pins changes no resistance; polarity must tell."""
    diagnosis = _diagnosed(SIX, pin_network(SIX))
    sentence = diagnosis.answers[0].sentence
    assert sentence.startswith("nothing wrong that resistance shows; or swapped wires of ")
    assert "signal+ and signal-" in sentence
    further = diagnosis.next_measurement
    assert further is not None
    assert further.between is not None
    assert further.between[1].endswith(" tab")


def test_wires_swapped_across_the_bridge_are_seen() -> None:
    diagnosis = _diagnosed(SIX, pin_network(SIX), **{"supply+": "signal+", "signal+": "supply+"})
    assert Defect("swapped", ("supply+", "signal+")) in diagnosis.answers[0].defects


def test_wires_to_one_tab_are_never_called_swapped() -> None:
    """The signal and completion wires of a three-wire circuit may change places."""
    diagnosis = _diagnosed(THREE, pin_network(THREE))
    assert "completion" not in diagnosis.answers[0].sentence


def test_a_missing_completion_is_called_so() -> None:
    circuit = circuit_of("opposite arms", 4, 350.0, 2.0, 1.0)
    diagnosis = _diagnosed(circuit, pin_network(circuit).changed("resistor 2", math.inf))
    assert Defect("missing completion", ("resistor 2",)) == diagnosis.answers[0].defects[0]


def test_a_module_plugged_in_shows_its_own_arms() -> None:
    whole = pin_network(THREE, plugged=True).changed("resistor 2", math.inf)
    pins = pins_of(THREE, plugged=True)
    assert {"supply-", "supply+", "signal+", "signal-", "completion"} == set(pins)
    planted = Planted(THREE, whole, whole, {}, Defect("nothing"))
    pairs = [(one, other) for place, one in enumerate(pins) for other in pins[place + 1 :]]
    readings = [exact(pair, planted.true_ohm(*pair)) for pair in pairs]
    diagnosis = diagnose(THREE, readings, plugged=True)
    assert Defect("missing completion", ("resistor 2",)) == diagnosis.answers[0].defects[0]


def test_the_ends_of_a_buffered_half_bridge_are_no_pins() -> None:
    five = circuit_of("half bending", 5, 350.0, 2.0, 3.0)
    assert {*five.wires, "signal-"} == set(pins_of(five, plugged=True))


def test_a_trim_in_series_may_be_what_is_open() -> None:
    arm = (*SIX.arms[0], Element("trim 1", "trim", 0.4))
    circuit = Circuit(SIX.layout, (arm, *SIX.arms[1:]), SIX.wires)
    diagnosis = _diagnosed(circuit, pin_network(circuit).changed("trim 1", math.inf))
    named = {each.where for each in diagnosis.answers[0].defects}
    assert {("grid 1",), ("trim 1",)} <= named


def test_one_reading_is_enough_to_say_what_may_be_wrong() -> None:
    readings = [PinReading(("supply-", "signal+"), OVERLOAD, 1e6, overload=True)]
    diagnosis = diagnose(THREE, readings)
    opens = {each.where for each in diagnosis.answers[0].defects if each.kind == "open"}
    assert {("supply- wire",), ("grid 1",), ("signal+ wire",)} <= opens
    further = diagnosis.next_measurement
    assert further is not None
    assert further.between is not None
    assert "completion" in further.between
    assert "overload would mean" in further.sentence


def test_two_defects_at_once_are_owned_not_to_be_explained() -> None:
    network = (
        pin_network(SIX)
        .changed("grid 1", 120.0)
        .changed("signal- wire", 60.0)
        .joined(Resistor("x", "supply+ tab", ARTICLE, 1e3))
    )
    assert not _diagnosed(SIX, network).explained


def test_a_thousand_ohm_too_much_in_a_dry_joint_overloads_nothing() -> None:
    diagnosis = _diagnosed(THREE, pin_network(THREE).changed("signal+ wire", 1001.5))
    first = diagnosis.answers[0].defects[0]
    assert ("joint", ("signal+ wire",)) == (first.kind, first.where)
    assert "joint with 1 kΩ too much at signal+ wire" == first.sentence


def test_pins_of_a_sound_circuit_read_by_hand_arithmetic() -> None:
    table = pin_table(THREE)
    assert 120 + 2 * 1.5 == pytest.approx(table["supply-", "signal+"])
    assert 2 * 1.5 == pytest.approx(pin_resistance(THREE, "signal+", "completion"))
    assert math.inf == pin_resistance(THREE, "signal+", ARTICLE)
    assert 0.0 == pin_resistance(THREE, "signal+", "signal+")
    assert 3 == len(table)


def test_the_three_quarters_rule_holds_for_four_equal_arms_without_trim_alone() -> None:
    rule = three_quarters_rule(SIX)
    assert rule is not None
    assert rule.pair == pytest.approx(pin_resistance(SIX, "supply+", "supply-"))
    assert rule.mixed == pytest.approx(pin_resistance(SIX, "supply+", "signal+"))
    trimmed = (*SIX.arms[0], Element("trim 1", "trim", 0.4))
    assert three_quarters_rule(THREE) is None
    assert three_quarters_rule(SIX.altered("grid 1", 351.0)) is None
    assert three_quarters_rule(Circuit(SIX.layout, (trimmed, *SIX.arms[1:]), SIX.wires)) is None
    uneven = {**SIX.wires, "supply+": 9.0}
    assert three_quarters_rule(Circuit(SIX.layout, SIX.arms, uneven)) is None


@pytest.mark.parametrize(
    ("readings", "sentence"),
    [
        ([], "readings must hold at least one resistance"),
        ([PinReading(("supply+", "top"), 1.0, 0.1)], r"reading from supply\+ to top must join two"),
        ([PinReading(("signal+", "signal+"), 1.0, 0.1)], r"must join two of supply-, signal\+"),
        ([PinReading(("supply-", "signal+"), -1.0, 0.1)], "must not be negative"),
        ([PinReading(("supply-", "signal+"), math.nan, 0.1)], "must be a finite number"),
        ([PinReading(("supply-", "signal+"), 1.0, 0.0)], "uncertainty of the reading from supply-"),
    ],
)
def test_readings_that_cannot_be_are_refused_by_name(
    readings: list[PinReading], sentence: str
) -> None:
    with pytest.raises(OutOfDomain, match=sentence):
        diagnose(THREE, readings)


def test_spreads_that_cannot_be_are_refused_by_name() -> None:
    readings = [PinReading(("supply-", "signal+"), 123.0, 0.2)]
    with pytest.raises(OutOfDomain, match="part_spread must not be negative"):
        diagnose(THREE, readings, part_spread=-0.1)
    with pytest.raises(OutOfDomain, match="pin must be one of supply-, signal"):
        pin_resistance(THREE, "supply-", "earth")
