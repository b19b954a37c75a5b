"""What every circuit drawing is made of: arms, lead wires, pins, supply, meter, cable.

At the left lies the article, at the right the module; the wires run between them through the
cable. An element at the article is filled, one inside the module is not; a dummy is dashed.
"""

from __future__ import annotations

from collections.abc import Sequence
from math import atan2, cos, degrees, radians, sin

from gaugelog.documents.content.installation import CircuitShown, ElementShown
from gaugelog.documents.sketch import ACCENT, GREY, INK, PAPER, Sketch, Spot

WIDTH, HEIGHT = 560.0, 258.0
FILLED = "#d7e6e8"
CABLE_RIGHT = 16.0
"""How far left of the module the cable's sleeve ends."""
SLEEVE = 84.0
"""How long the sleeve is drawn."""


def module_box(sketch: Sketch, circuit: CircuitShown, edge: float) -> None:
    """The module from its pins at `edge` to the right, with the channel's name."""
    channel = circuit.channel
    sketch.box(Spot(edge, 8), WIDTH - edge - 6, HEIGHT - 16, ink=GREY, round_by=4)
    connector = f", connector {channel.connector}" if channel.connector else ""
    sketch.text(Spot(edge + 8, 21), f"Channel {channel.label}{connector}", ink=GREY, size=9)


def supply(sketch: Sketch, circuit: CircuitShown, top: Spot, bottom: Spot, right: float) -> None:
    """The supply between two spots, drawn at `right` of them, plus above."""
    middle = Spot(right, (top.y + bottom.y) / 2)
    sketch.line(top, Spot(right, top.y), middle.moved(0, -13))
    sketch.line(bottom, Spot(right, bottom.y), middle.moved(0, 13))
    sketch.dot(middle, 13, fill=PAPER)
    sketch.text(middle.moved(0, 3), "E", at="middle", bold=True)
    sketch.text(Spot(right - 5, top.y + 12), "+", at="end", bold=True)
    sketch.text(Spot(right - 5, bottom.y - 5), "−", at="end", bold=True)
    words = f"{circuit.channel.excitation} {circuit.channel.excitation_kind}"
    sketch.text(Spot(WIDTH - 12, HEIGHT - 14), words, at="end", size=9, ink=GREY)


def meter(sketch: Sketch, plus: Spot, minus: Spot, part: float = 0.5) -> None:
    """The output's meter on a straight line, `part` of the way from plus to minus, with signs."""
    middle = plus.towards(minus, part)
    sketch.line(plus, minus)
    sketch.dot(middle, 11, fill=PAPER)
    sketch.text(middle.moved(0, 3), "e", at="middle", bold=True)
    level = abs(plus.y - minus.y) < 1
    for at, sign in ((plus, "+"), (minus, "−")):
        way = 1 if (at.x, at.y) > (middle.x, middle.y) else -1
        beside = middle.moved(way * 18, -4) if level else middle.moved(9, way * 18 + 3)
        sketch.text(beside, sign, at="middle", size=9)


def arm(
    sketch: Sketch,
    number: int,
    elements: Sequence[ElementShown],
    start: Spot,
    end: Spot,
    *,
    from_middle: Spot,
) -> None:
    """An arm as a line with its elements in series; number and labels on its outer side."""
    sketch.line(start, end)
    turned = degrees(atan2(end.y - start.y, end.x - start.x))
    count = max(len(elements), 1)
    for place, element in enumerate(elements, start=1):
        middle = start.towards(end, place / (count + 1))
        _element(sketch, element, middle, 38.0 / count**0.5, turned)
    middle = start.towards(end, 0.5)
    outward = 1 if middle.x > from_middle.x else -1
    above = middle.y < from_middle.y
    beside = middle.moved(outward * 14, -5 if above else 11)
    _named(
        sketch, number, elements, beside, "start" if outward > 0 else "end", -11 if above else 11
    )


def column(
    sketch: Sketch, number: int, elements: Sequence[ElementShown], top: Spot, bottom: Spot
) -> None:
    """An arm that stands upright, as at the end of a cable; number and labels at its right."""
    sketch.line(top, bottom)
    room = (bottom.y - top.y) / max(len(elements), 1)
    for place, element in enumerate(elements):
        middle = Spot(top.x, top.y + room * (place + 0.5))
        _element(sketch, element, middle, min(38.0, room * 0.66), 90.0)
    at = Spot(top.x + 14, (top.y + bottom.y) / 2 - 2)
    _named(sketch, number, elements, at, "start", 12)


def _named(
    sketch: Sketch,
    number: int,
    elements: Sequence[ElementShown],
    at: Spot,
    anchor: str,
    down: float,
) -> None:
    sketch.text(at, str(number), at=anchor, bold=True, ink=ACCENT, size=11)
    labels = " + ".join(element.label for element in elements)
    sketch.text(at.moved(0, down), labels, at=anchor, size=9)


def _element(
    sketch: Sketch, element: ElementShown, middle: Spot, long: float, turned: float
) -> None:
    fill = PAPER if element.inside_module else FILLED
    dashes = "3 2" if element.kind == "dummy" else ""
    corner = middle.moved(-long / 2, -7)
    sketch.box(corner, long, 14, fill=fill, ink=INK, turned=turned, dashes=dashes)
    if element.kind in {"grid", "dummy"}:
        _meander(sketch, middle, long - 8, radians(turned))


def _meander(sketch: Sketch, middle: Spot, long: float, turned: float) -> None:
    """The grid's strands along the element, as the gauge itself looks."""
    along, across = (cos(turned), sin(turned)), (-sin(turned), cos(turned))
    spots = []
    for row, off in enumerate((-3.9, -1.3, 1.3, 3.9)):
        for side in (-1, 1) if row % 2 == 0 else (1, -1):
            step = side * long / 2
            spots.append(
                middle.moved(step * along[0] + off * across[0], step * along[1] + off * across[1])
            )
    sketch.line(*spots, weight=0.7)


def wire(sketch: Sketch, circuit: CircuitShown, function: str, *way: Spot) -> None:
    """A lead wire along `way` to its pin at the module's edge, with the user's mark and pin."""
    sketch.line(*way)
    end = way[-1]
    mark = circuit.leads.marks.get(function, "")
    middle = end.x - CABLE_RIGHT - SLEEVE / 2
    sketch.text(Spot(middle, end.y - 4), mark, at="middle", size=9, bold=True)
    sketch.dot(end, fill=PAPER)
    pin = circuit.channel.pins.get(function, "")
    sketch.text(end.moved(6, -5), f"{pin} {function}".strip(), size=8.5, ink=GREY)


def cable(sketch: Sketch, circuit: CircuitShown, edge: float, top: float, bottom: float) -> None:
    """The cable's sleeve about its wires, with lot, length and the resistance of one wire."""
    leads = circuit.leads
    corner = Spot(edge - CABLE_RIGHT - SLEEVE, top - 16)
    sketch.box(corner, SLEEVE, bottom - top + 24, ink=GREY, round_by=9, dashes="3 2.5")
    name = f"cable {leads.cable}, {leads.length}" if leads.cable else f"leads, {leads.length}"
    words = f"{name}, {leads.resistance_per_length} each"
    sketch.text(Spot(12, HEIGHT - 3), words, size=9, ink=GREY)
