"""A bridge of four arms without its wires' ways: for a layout that is not known."""

from __future__ import annotations

from gaugelog.documents.content.installation import CircuitShown
from gaugelog.documents.inside import (
    EDGE,
    FOUR_ONE,
    ONE_TWO,
    THREE_FOUR,
    TWO_THREE,
    arm,
    ends,
    meter,
    module,
)
from gaugelog.documents.sketch import GREY, PAPER, Sketch, Spot


def plain_bridge(sketch: Sketch, circuit: CircuitShown) -> None:
    """Four arms round the bridge, the pins beside them."""
    module(sketch, circuit)
    meter(sketch, ONE_TWO)
    sketch.dot(ONE_TWO)
    for number in (1, 2, 3, 4):
        start, end = ends(number)
        arm(sketch, number, circuit.arms[number - 1], start, end)
    _pins(sketch, circuit)


def _pins(sketch: Sketch, circuit: CircuitShown) -> None:
    """The channel's pins at the module's edge, with the wire marks, and named at the corners."""
    names = {**circuit.leads.marks, **circuit.channel.pins}
    for row, function in enumerate(names):
        spot = Spot(EDGE, 62 + row * 24)
        mark, pin = circuit.leads.marks.get(function, ""), circuit.channel.pins.get(function, "")
        if mark:
            sketch.line(spot.moved(-150), spot)
            sketch.text(spot.moved(-75, -4), mark, at="middle", size=9)
        sketch.dot(spot, fill=PAPER)
        sketch.text(spot.moved(7, 3), f"{pin} {function}".strip(), size=8.5, ink=GREY)
    pins = circuit.channel.pins
    for function, at, corner in (
        ("supply+", "middle", TWO_THREE.moved(0, -6)),
        ("supply-", "middle", FOUR_ONE.moved(0, 13)),
        ("signal+", "end", ONE_TWO.moved(-5, 3)),
        ("signal-", "start", THREE_FOUR.moved(5, 3)),
    ):
        sketch.text(corner, pins.get(function, ""), at=at, size=9, bold=True)
