"""Each layout drawn as it is wired: its arms, its wires with marks and pins, within the page."""

from __future__ import annotations

import re
from typing import Any
from xml.etree import ElementTree

import pytest

from gaugelog.documents.content.installation import CircuitShown
from gaugelog.documents.diagram import HEIGHT, WIDTH, bridge_diagram
from gaugelog.documents.scene import FILLED
from gaugelog.physics.layouts import LAYOUTS
from tests.documents.sample import circuit

SVG = "{http://www.w3.org/2000/svg}"
MARKS = {
    "supply+": "W1",
    "supply-": "W2",
    "signal+": "W3",
    "signal-": "W4",
    "sense+": "W5",
    "sense-": "W6",
    "completion": "W7",
}
ARRANGED = {
    "quarter two-wire": "quarter two-wire",
    "quarter three-wire": "quarter three-wire",
    "half three-wire": "half bending",
    "half five-wire": "half with dummy",
    "opposite four-wire": "opposite arms",
    "full four-wire": "full bending",
    "full six-wire": "full torsion",
}


def _shown(name: str, **changes: Any) -> CircuitShown:
    """A circuit of a layout: grids FB-1 to FB-4 outside, resistors of the module inside."""
    layout, base = LAYOUTS[name], circuit()
    grid = {"kind": "grid", "inside_module": False}
    own = {"kind": "completion", "label": "350 Ω", "inside_module": True}
    arms = [[{**grid, "label": f"FB-{n}"} if n in layout.outside else own] for n in (1, 2, 3, 4)]
    marks = {pin: MARKS[pin] for pin in layout.wires}
    pins = {pin: f"p{number}" for number, pin in enumerate(layout.wires, 1)}
    return CircuitShown.model_validate(
        {
            **base,
            "arrangement": ARRANGED[name],
            "layout": name,
            "arms": arms,
            "leads": {**base["leads"], "wires": len(layout.wires), "marks": marks},
            "channel": {**base["channel"], "pins": pins},
            **changes,
        }
    )


def _texts(shown: CircuitShown) -> list[ElementTree.Element]:
    root = ElementTree.fromstring(bridge_diagram(shown))  # noqa: S314 (our own drawing)
    return list(root.iter(f"{SVG}text"))


def _words(shown: CircuitShown) -> list[str]:
    return [each.text or "" for each in _texts(shown)]


@pytest.mark.parametrize("name", LAYOUTS)
def test_every_arm_is_numbered_and_named(name: str) -> None:
    words = _words(_shown(name))
    assert {"1", "2", "3", "4"} <= set(words)
    outside = {f"FB-{number}" for number in LAYOUTS[name].outside}
    assert outside == {word for word in words if word.startswith("FB-")}
    assert 4 - len(outside) == words.count("350 Ω")


@pytest.mark.parametrize("name", LAYOUTS)
def test_every_wire_bears_its_mark_and_its_pin(name: str) -> None:
    words = _words(_shown(name))
    for number, pin in enumerate(LAYOUTS[name].wires, 1):
        assert 1 == words.count(MARKS[pin])
        assert any(word.split(" ")[0] == f"p{number}" for word in words)


@pytest.mark.parametrize("name", [name for name in LAYOUTS if name != "quarter three-wire"])
def test_a_wires_mark_stands_at_the_height_of_its_pin(name: str) -> None:
    at = {each.text or "": float(each.attrib["y"]) for each in _texts(_shown(name))}
    for number, pin in enumerate(LAYOUTS[name].wires, 1):
        assert pytest.approx(at[MARKS[pin]], abs=2) == at[f"p{number} {pin}"]


@pytest.mark.parametrize("name", LAYOUTS)
def test_what_lies_at_the_article_is_filled(name: str) -> None:
    drawn = bridge_diagram(_shown(name)).count(f'fill="{FILLED}"')
    assert len(LAYOUTS[name].outside) == drawn


@pytest.mark.parametrize("name", LAYOUTS)
def test_everything_stands_within_the_drawing(name: str) -> None:
    drawing = bridge_diagram(_shown(name))
    points = [
        pair.split(",")
        for each in re.findall(r'points="([^"]+)"', drawing)
        for pair in each.split()
    ]
    across = [float(x) for x, _ in points] + [
        float(x) for x in re.findall(r' c?x="(-?[\d.]+)"', drawing)
    ]
    down = [float(y) for _, y in points] + [
        float(y) for y in re.findall(r' c?y="(-?[\d.]+)"', drawing)
    ]
    assert 0 <= min(across) <= max(across) <= WIDTH
    assert 0 <= min(down) <= max(down) <= HEIGHT


def test_no_two_layouts_are_drawn_alike() -> None:
    assert len(LAYOUTS) == len({bridge_diagram(_shown(name)) for name in LAYOUTS})


def test_a_dummy_is_dashed() -> None:
    arms = [[each.model_dump() for each in arm] for arm in _shown("half five-wire").arms]
    arms[1][0] |= {"kind": "dummy", "label": "TD-1"}
    plain, dashed = _shown("half five-wire"), _shown("half five-wire", arms=arms)
    dashes = 'stroke-dasharray="3 2"'
    assert (0, 1) == (bridge_diagram(plain).count(dashes), bridge_diagram(dashed).count(dashes))
