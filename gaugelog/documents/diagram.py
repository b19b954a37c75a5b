"""The bridge of a circuit as a drawing: arms, lead wires, channel, pins and wire marks.

Arms are numbered round the bridge, 1 and 3 opposite. The supply stands between the corners 2–3
and 4–1, the output between 1–2 and 3–4, so that a larger arm 1 gives a positive output. An
element at the article is filled, one inside the module is not. A quarter bridge on three wires
shows its one outside arm where it is: at the far end of the cable.
"""

from __future__ import annotations

from math import atan2, degrees

from markupsafe import Markup

from gaugelog.documents.content.installation import CircuitShown, ElementShown
from gaugelog.documents.sketch import ACCENT, GREY, INK, PAPER, Sketch, Spot
from gaugelog.documents.wiring import Wire, three_wires

WIDTH, HEIGHT = 560.0, 258.0
_MIDDLE, _REACH = Spot(398, 132), 78.0
_SIDE = 128.0
"""How far right of the middle the supply stands."""
_EDGE = 236.0
"""Where the module begins: its pins stand on this line."""
_FILLED = "#d7e6e8"


_ONE_TWO, _TWO_THREE = _MIDDLE.moved(-_REACH), _MIDDLE.moved(0, -_REACH)
_THREE_FOUR, _FOUR_ONE = _MIDDLE.moved(_REACH), _MIDDLE.moved(0, _REACH)
_ROUND = (_FOUR_ONE, _ONE_TWO, _TWO_THREE, _THREE_FOUR, _FOUR_ONE)
"""The corners, named by the arms that meet there, in the order of the arms."""


def _ends(number: int) -> tuple[Spot, Spot]:
    """Both ends of an arm."""
    return _ROUND[number - 1], _ROUND[number]


def bridge_diagram(circuit: CircuitShown) -> Markup:
    """The SVG of a circuit; texts are escaped."""
    sketch = Sketch(WIDTH, HEIGHT)
    _module(sketch, circuit)
    if circuit.arrangement == "quarter three-wire":
        _quarter(sketch, circuit)
    else:
        _four_arms(sketch, circuit)
    return sketch.svg()


def _module(sketch: Sketch, circuit: CircuitShown) -> None:
    channel = circuit.channel
    sketch.box(Spot(_EDGE, 12), WIDTH - _EDGE - 6, HEIGHT - 24, ink=GREY, round_by=4)
    connector = f", connector {channel.connector}" if channel.connector else ""
    sketch.text(Spot(_EDGE + 8, 25), f"Channel {channel.label}{connector}", ink=GREY, size=9)
    top, bottom = _TWO_THREE, _FOUR_ONE
    side = top.moved(_SIDE)
    sketch.line(top, side, Spot(side.x, _MIDDLE.y - 13))
    sketch.line(bottom, Spot(side.x, bottom.y), Spot(side.x, _MIDDLE.y + 13))
    sketch.dot(Spot(side.x, _MIDDLE.y), 13, fill=PAPER)
    sketch.text(Spot(side.x, _MIDDLE.y + 3), "E", at="middle", bold=True)
    supply = f"{channel.excitation} {channel.excitation_kind}"
    sketch.text(Spot(side.x + 22, bottom.y + 14), supply, at="end", size=9, ink=GREY)
    for corner in (top, bottom, _THREE_FOUR):
        sketch.dot(corner)


def _meter(sketch: Sketch, left: Spot, signs: str = "+−") -> None:
    """The output's meter and the signs of output and supply, which turn together."""
    sketch.line(left, _THREE_FOUR)
    sketch.dot(_MIDDLE, 11, fill=PAPER)
    sketch.text(_MIDDLE.moved(0, 3), "e", at="middle", bold=True)
    sketch.text(_MIDDLE.moved(-15, -4), signs[0], at="end", size=9)
    sketch.text(_MIDDLE.moved(15, -4), signs[1], size=9)
    sketch.text(_TWO_THREE.moved(_SIDE - 6, 13), signs[0], at="end", bold=True)
    sketch.text(_FOUR_ONE.moved(_SIDE - 6, -6), signs[1], at="end", bold=True)


def _four_arms(sketch: Sketch, circuit: CircuitShown) -> None:
    _meter(sketch, _ONE_TWO)
    sketch.dot(_ONE_TWO)
    for number in (1, 2, 3, 4):
        start, end = _ends(number)
        _arm(sketch, number, circuit.arms[number - 1], start, end)
    _pins(sketch, circuit)


def _pins(sketch: Sketch, circuit: CircuitShown) -> None:
    """The channel's pins at the module's edge, with the wire marks, and named at the corners."""
    names = {**circuit.leads.marks, **circuit.channel.pins}
    for row, function in enumerate(names):
        spot = Spot(_EDGE, 62 + row * 24)
        mark, pin = circuit.leads.marks.get(function, ""), circuit.channel.pins.get(function, "")
        if mark:
            sketch.line(spot.moved(-150), spot)
            sketch.text(spot.moved(-75, -4), mark, at="middle", size=9)
        sketch.dot(spot, fill=PAPER)
        sketch.text(spot.moved(7, 3), f"{pin} {function}".strip(), size=8.5, ink=GREY)
    pins = circuit.channel.pins
    for function, at, corner in (
        ("supply+", "middle", _TWO_THREE.moved(0, -6)),
        ("supply-", "middle", _FOUR_ONE.moved(0, 13)),
        ("signal+", "end", _ONE_TWO.moved(-5, 3)),
        ("signal-", "start", _THREE_FOUR.moved(5, 3)),
    ):
        sketch.text(corner, pins.get(function, ""), at=at, size=9, bold=True)


def _arm(
    sketch: Sketch, number: int, elements: tuple[ElementShown, ...], start: Spot, end: Spot
) -> None:
    """An arm as a line with its elements in series, its number and their labels beside it."""
    sketch.line(start, end)
    turned = degrees(atan2(end.y - start.y, end.x - start.x))
    count = max(len(elements), 1)
    for place, element in enumerate(elements, start=1):
        middle = start.towards(end, place / (count + 1))
        _element(sketch, element, middle, 38.0 / count**0.5, turned)
    middle = start.towards(end, 0.5)
    outward = 1 if middle.x > _MIDDLE.x else -1
    beside = middle.moved(outward * 15, -6 if middle.y < _MIDDLE.y else 12)
    anchor = "start" if outward > 0 else "end"
    sketch.text(beside, str(number), at=anchor, bold=True, ink=ACCENT, size=11)
    labels = " + ".join(element.label for element in elements)
    down = -11 if middle.y < _MIDDLE.y else 11
    sketch.text(beside.moved(outward * 2, down), labels, at=anchor, size=9)


def _element(sketch: Sketch, element: ElementShown, middle: Spot, long: float, at: float) -> None:
    fill = PAPER if element.inside_module else _FILLED
    corner = middle.moved(-long / 2, -6)
    sketch.box(corner, long, 12, fill=fill, turned=at, ink=INK)


def _quarter(sketch: Sketch, circuit: CircuitShown) -> None:
    """Three wires: two from one tab, so that the leads share out between arms 1 and 2."""
    wires = three_wires(circuit)
    upper = _TWO_THREE.towards(_ONE_TWO, 0.66)
    heights = (upper.y, _MIDDLE.y, _FOUR_ONE.y)
    _meter(sketch, Spot(_EDGE, _MIDDLE.y), "−+" if wires[2].function.endswith("+") else "+−")
    sketch.line(Spot(_EDGE, upper.y), upper)
    sketch.line(Spot(_EDGE, heights[2]), _FOUR_ONE)
    _arm(sketch, 2, circuit.arms[1], _TWO_THREE, upper)
    for number in (3, 4):
        _arm(sketch, number, circuit.arms[number - 1], *_ends(number))
    tab = Spot(74, (heights[0] + heights[1]) / 2)
    for wire, height in zip(wires, heights, strict=True):
        _wire(sketch, wire, tab, height)
    sketch.line(tab, Spot(44, tab.y), Spot(44, heights[2]), Spot(tab.x, heights[2]))
    _gauge(sketch, circuit.arms[0], Spot(44, (tab.y + heights[2]) / 2))
    sketch.dot(tab)
    _cable(sketch, circuit, heights[0] - 20, heights[2] + 12)


def _wire(sketch: Sketch, wire: Wire, tab: Spot, height: float) -> None:
    pin = Spot(_EDGE, height)
    start = Spot(tab.x, height)
    sketch.line(*((tab, start) if height <= _MIDDLE.y else (start,)), pin)
    sketch.text(Spot(158, height - 4), wire.mark, at="middle", size=9, bold=True)
    sketch.dot(pin, fill=PAPER)
    sketch.text(pin.moved(6, -5), wire.pin, size=9, bold=True)


def _gauge(sketch: Sketch, elements: tuple[ElementShown, ...], middle: Spot) -> None:
    """The grid: a meander in a filled box."""
    sketch.box(middle.moved(-15, -24), 30, 48, fill=_FILLED, round_by=2)
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
