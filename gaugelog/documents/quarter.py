"""A quarter bridge on three wires: its one outside arm at the far end of the cable."""

from __future__ import annotations

from gaugelog.documents.content.installation import CircuitShown, ElementShown
from gaugelog.documents.inside import (
    EDGE,
    FOUR_ONE,
    MIDDLE,
    ONE_TWO,
    TWO_THREE,
    arm,
    ends,
    meter,
    module,
)
from gaugelog.documents.scene import FILLED
from gaugelog.documents.sketch import ACCENT, GREY, PAPER, Sketch, Spot
from gaugelog.documents.wiring import Wire, three_wires


def three_wire_quarter(sketch: Sketch, circuit: CircuitShown) -> None:
    """Three wires: two from one tab, so that the leads share out between arms 1 and 2."""
    module(sketch, circuit)
    wires = three_wires(circuit)
    upper = TWO_THREE.towards(ONE_TWO, 0.66)
    heights = (upper.y, MIDDLE.y, FOUR_ONE.y)
    meter(sketch, Spot(EDGE, MIDDLE.y), "−+" if wires[2].function.endswith("+") else "+−")
    sketch.line(Spot(EDGE, upper.y), upper)
    sketch.line(Spot(EDGE, heights[2]), FOUR_ONE)
    arm(sketch, 2, circuit.arms[1], TWO_THREE, upper)
    for number in (3, 4):
        arm(sketch, number, circuit.arms[number - 1], *ends(number))
    tab = Spot(74, (heights[0] + heights[1]) / 2)
    for wire, height in zip(wires, heights, strict=True):
        _wire(sketch, wire, tab, height)
    sketch.line(tab, Spot(44, tab.y), Spot(44, heights[2]), Spot(tab.x, heights[2]))
    _gauge(sketch, circuit.arms[0], Spot(44, (tab.y + heights[2]) / 2))
    sketch.dot(tab)
    _cable(sketch, circuit, heights[0] - 20, heights[2] + 12)


def _wire(sketch: Sketch, wire: Wire, tab: Spot, height: float) -> None:
    pin = Spot(EDGE, height)
    start = Spot(tab.x, height)
    sketch.line(*((tab, start) if height <= MIDDLE.y else (start,)), pin)
    sketch.text(Spot(158, height - 4), wire.mark, at="middle", size=9, bold=True)
    sketch.dot(pin, fill=PAPER)
    sketch.text(pin.moved(6, -5), wire.pin, size=9, bold=True)


def _gauge(sketch: Sketch, elements: tuple[ElementShown, ...], middle: Spot) -> None:
    """The grid: a meander in a filled box."""
    sketch.box(middle.moved(-15, -24), 30, 48, fill=FILLED, round_by=2)
    left, right = middle.x - 9, middle.x + 9
    turns = [middle.moved(0, -24)]
    for row in range(6):
        height = middle.y - 18 + row * 7.2
        ends = (left, right) if row % 2 == 0 else (right, left)
        turns += [Spot(ends[0], height), Spot(ends[1], height)]
    sketch.line(*turns, middle.moved(0, 24), weight=0.9)
    sketch.text(middle.moved(-20, -4), "1", at="end", bold=True, ink=ACCENT, size=11)
    label = " + ".join(element.label for element in elements)
    sketch.text(middle.moved(22, 3), label, size=9)


def _cable(sketch: Sketch, circuit: CircuitShown, top: float, bottom: float) -> None:
    leads = circuit.leads
    sketch.box(Spot(108, top), 100, bottom - top, ink=GREY, round_by=9, dashes="3 2.5")
    name = f"cable {leads.cable}, {leads.length}" if leads.cable else f"leads, {leads.length}"
    sketch.text(Spot(158, bottom + 12), name, at="middle", size=9, ink=GREY)
    each = f"{leads.resistance_per_length} each"
    sketch.text(Spot(158, bottom + 22), each, at="middle", size=9, ink=GREY)
