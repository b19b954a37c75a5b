"""Circuits drawn in characters: every wire ends where the layout has it."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.physics.layouts import layout_for
from gaugelog.screens.drawn import bridge_drawn
from gaugelog.work.bridges import Bridge, bridges
from tests.screens.conftest import At
from tests.work.arranged import MODULE, Sketch, planned_job
from tests.work.job import start_job

FULL = ("grid A", "grid B", "grid C", "grid D")
FOUR = tuple((label, "single") for label in "ABCD")
SKETCHES = {
    ("quarter two-wire", 2): ("grid A", MODULE, MODULE, MODULE),
    ("quarter three-wire", 3): ("grid A", MODULE, MODULE, MODULE),
    ("half bending", 3): ("grid A", "grid B", MODULE, MODULE),
    ("half bending", 5): ("grid A", "grid B", MODULE, MODULE),
    ("opposite arms", 4): ("grid A", MODULE, "grid B", MODULE),
    ("full bending", 4): FULL,
    ("full bending", 6): FULL,
}


def drawn(home: Path, arrangement: str, wires: int) -> tuple[Bridge, list[str]]:
    """A circuit of an arrangement, and its drawing."""
    arms = SKETCHES[arrangement, wires]
    count = sum(arm.startswith("grid") for arm in arms)
    job = planned_job(home, Sketch(FOUR[:count], ((arrangement, arms, wires),)))
    bridge = bridges(job.book)["C-1"]
    return bridge, bridge_drawn(bridge, 76)


def test_the_three_wires_of_a_quarter_bridge_start_at_two_tabs(at: At) -> None:
    assert [
        "   article       CB-19 18 m             M1/1 J1",
        "    ●──────────────── W1 ────────────── 1  supply-",
        "   [1] FB-1",
        "    ●─┬────────────── W2 ────────────── 2  signal+",
        "      └────────────── W3 ────────────── 3  completion",
        "",
        " in the module: arm 2: 350 Ω, arm 3: 350 Ω, arm 4: 350 Ω",
    ] == bridge_drawn(bridges(at(0).book)["C-1"], 76)


@pytest.mark.parametrize(("arrangement", "wires"), SKETCHES)
def test_every_arm_and_wire_is_drawn_once(tmp_path: Path, arrangement: str, wires: int) -> None:
    bridge, lines = drawn(tmp_path, arrangement, wires)
    functions = [line.split()[-1] for line in lines if "●" in line or "└─" in line[3:]]
    assert wires == len(bridge.wires)
    assert sorted(wire.function for wire in bridge.wires) == sorted(
        each for each in functions if each in {wire.function for wire in bridge.wires}
    )
    outside = [line for line in lines if line.strip(" │").startswith("[")]
    assert sum(arm.outside for arm in bridge.arms) == len(outside)
    assert max(map(len, lines)) <= 76


@pytest.mark.parametrize(("arrangement", "wires"), SKETCHES)
def test_wires_are_drawn_at_the_tabs_of_the_layout(
    tmp_path: Path, arrangement: str, wires: int
) -> None:
    bridge, lines = drawn(tmp_path, arrangement, wires)
    if arrangement == "opposite arms":
        assert {1, 3} == {arm.number for arm in bridge.arms if arm.outside}
    else:
        layout = layout_for(arrangement, wires)
        assert dict(layout.wires) == {wire.function: wire.tab for wire in bridge.wires}
    tabs = len({wire.tab for wire in bridge.wires})
    assert tabs == sum(line.count("●") for line in lines)


def test_a_full_bridge_closes_at_the_tab_it_began_at(tmp_path: Path) -> None:
    _bridge, lines = drawn(tmp_path, "full bending", 6)
    assert lines[1].startswith(" ┌──●")
    assert " └──┘" == lines[-1]


def test_without_a_plan_there_is_no_circuit(tmp_path: Path) -> None:
    assert {} == bridges(start_job(tmp_path).book)
