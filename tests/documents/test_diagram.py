from __future__ import annotations

import re
from typing import Any
from xml.etree import ElementTree

from gaugelog.documents.content.installation import CircuitShown
from gaugelog.documents.diagram import HEIGHT, WIDTH, bridge_diagram
from gaugelog.documents.wiring import three_wires, wiring_list
from tests.documents.sample import circuit

SVG = "{http://www.w3.org/2000/svg}"


def _circuit(**changes: Any) -> CircuitShown:
    return CircuitShown.model_validate({**circuit(), **changes})


def _grid(label: str) -> dict[str, Any]:
    return {"kind": "grid", "label": label, "inside_module": False}


def _root(shown: CircuitShown) -> ElementTree.Element:
    return ElementTree.fromstring(bridge_diagram(shown))  # noqa: S314 (our own drawing)


def _words(shown: CircuitShown) -> list[str]:
    return [each.text or "" for each in _root(shown).iter(f"{SVG}text")]


def _places(shown: CircuitShown) -> dict[str, tuple[float, float]]:
    return {
        each.text or "": (float(each.attrib["x"]), float(each.attrib["y"]))
        for each in _root(shown).iter(f"{SVG}text")
    }


def _full() -> CircuitShown:
    return _circuit(
        arrangement="full bending", arms=[[_grid(label)] for label in ("A-1", "A-2", "A-3", "A-4")]
    )


def test_the_arms_are_numbered_and_named() -> None:
    words = _words(_circuit())
    assert {"1", "2", "3", "4", "P1-1"} <= set(words)
    assert 3 == words.count("350 Ω")


def test_opposite_arms_stand_opposite() -> None:
    # Arms 1 and 3 are opposite, 1 and 2 share the left corner: e/E = R1/(R1+R2) − R4/(R3+R4).
    at = _places(_full())
    assert at["1"][0] < at["3"][0]
    assert at["1"][1] > at["3"][1]
    assert at["2"][0] < at["4"][0]
    assert at["2"][1] < at["4"][1]
    assert abs(at["1"][0] - at["2"][0]) < 1


def test_wires_bear_the_users_own_marks_and_pins() -> None:
    words = _words(_circuit())
    assert {"W1", "W2", "W3"} <= set(words)
    assert {"A", "B", "D"} <= set(words)


def test_the_signs_turn_when_the_gauges_wire_is_the_positive_supply() -> None:
    def left_sign(function: str) -> str:
        leads = {**circuit()["leads"], "marks": {function: "W1"}}
        return _words(_circuit(leads=leads))[_words(_circuit(leads=leads)).index("e") + 1]

    assert "+" == left_sign("supply-")
    assert "−" == left_sign("supply+")


def test_cable_channel_and_supply_are_named() -> None:
    words = " ".join(_words(_circuit()))
    assert "cable CB-3, 18 m" in words
    assert "Channel M1/3, connector X3" in words
    assert "2.5 V d.c." in words


def test_elements_in_series_stand_in_one_arm() -> None:
    arms = [*circuit()["arms"]]
    arms[0] = [_grid("P1-1"), _grid("P2-1")]
    assert "P1-1 + P2-1" in _words(_circuit(arms=arms))
    assert "P1-1 + P2-1" in _words(_circuit(arms=arms, arrangement="half bending"))


def test_elements_at_the_article_are_filled_and_those_in_the_module_are_not() -> None:
    def fills(shown: CircuitShown) -> int:
        return bridge_diagram(shown).count('fill="#d7e6e8"')

    assert 4 == fills(_full())
    assert 1 == fills(_circuit())


def test_everything_stands_within_the_drawing() -> None:
    for shown in (_circuit(), _full()):
        numbers = re.findall(r'(?:x|cx)="(-?[\d.]+)"', bridge_diagram(shown))
        assert all(0 <= float(each) <= WIDTH for each in numbers)
        heights = re.findall(r'(?:y|cy)="(-?[\d.]+)"', bridge_diagram(shown))
        assert all(0 <= float(each) <= HEIGHT for each in heights)


def test_hostile_labels_stay_text() -> None:
    arms = [[_grid('</text><script>x</script>"&')], *circuit()["arms"][1:]]
    root = _root(_circuit(arms=arms))
    assert not list(root.iter(f"{SVG}script"))
    assert '</text><script>x</script>"&' in [each.text for each in root.iter(f"{SVG}text")]


def test_a_wire_of_unknown_purpose_gets_no_place_in_the_drawing() -> None:
    leads = {**circuit()["leads"], "marks": {"a": "W9", "b": "grey", "c": "brown"}}
    shown = _circuit(leads=leads)
    assert ["", "", ""] == [wire.mark for wire in three_wires(shown)]
    assert "W9" not in _words(shown)
    assert "W9" in [wire.mark for wire in wiring_list(shown)]


def test_the_wiring_list_has_each_function_once_with_mark_and_pin() -> None:
    leads = {**circuit()["leads"], "marks": {"supply-": "W1", "signal+": "W2"}}
    rows = {wire.function: (wire.mark, wire.pin) for wire in wiring_list(_circuit(leads=leads))}
    assert ("W1", "D") == rows["supply-"]
    assert ("", "A") == rows["completion"]
    assert 3 == len(rows)
