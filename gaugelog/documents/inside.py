"""A bridge inside the module: corners, supply, meter and arms, as the quarter bridge shows them."""

from __future__ import annotations

from math import atan2, degrees

from gaugelog.documents.content.installation import CircuitShown, ElementShown
from gaugelog.documents.scene import FILLED, HEIGHT, WIDTH
from gaugelog.documents.sketch import ACCENT, GREY, INK, PAPER, Sketch, Spot

MIDDLE, REACH = Spot(398, 132), 78.0
SIDE = 128.0
"""How far right of the middle the supply stands."""
EDGE = 236.0
"""Where the module begins: its pins stand on this line."""


ONE_TWO, TWO_THREE = MIDDLE.moved(-REACH), MIDDLE.moved(0, -REACH)
THREE_FOUR, FOUR_ONE = MIDDLE.moved(REACH), MIDDLE.moved(0, REACH)
_ROUND = (FOUR_ONE, ONE_TWO, TWO_THREE, THREE_FOUR, FOUR_ONE)
"""The corners, named by the arms that meet there, in the order of the arms."""


def ends(number: int) -> tuple[Spot, Spot]:
    """Both ends of an arm."""
    return _ROUND[number - 1], _ROUND[number]


def module(sketch: Sketch, circuit: CircuitShown) -> None:
    """The module with its channel, its supply and the bridge's corners."""
    channel = circuit.channel
    sketch.box(Spot(EDGE, 12), WIDTH - EDGE - 6, HEIGHT - 24, ink=GREY, round_by=4)
    connector = f", connector {channel.connector}" if channel.connector else ""
    sketch.text(Spot(EDGE + 8, 25), f"Channel {channel.label}{connector}", ink=GREY, size=9)
    top, bottom = TWO_THREE, FOUR_ONE
    side = top.moved(SIDE)
    sketch.line(top, side, Spot(side.x, MIDDLE.y - 13))
    sketch.line(bottom, Spot(side.x, bottom.y), Spot(side.x, MIDDLE.y + 13))
    sketch.dot(Spot(side.x, MIDDLE.y), 13, fill=PAPER)
    sketch.text(Spot(side.x, MIDDLE.y + 3), "E", at="middle", bold=True)
    supply = f"{channel.excitation} {channel.excitation_kind}"
    sketch.text(Spot(side.x + 22, bottom.y + 14), supply, at="end", size=9, ink=GREY)
    for corner in (top, bottom, THREE_FOUR):
        sketch.dot(corner)


def meter(sketch: Sketch, left: Spot, signs: str = "+−") -> None:
    """The output's meter and the signs of output and supply, which turn together."""
    sketch.line(left, THREE_FOUR)
    sketch.dot(MIDDLE, 11, fill=PAPER)
    sketch.text(MIDDLE.moved(0, 3), "e", at="middle", bold=True)
    sketch.text(MIDDLE.moved(-15, -4), signs[0], at="end", size=9)
    sketch.text(MIDDLE.moved(15, -4), signs[1], size=9)
    sketch.text(TWO_THREE.moved(SIDE - 6, 13), signs[0], at="end", bold=True)
    sketch.text(FOUR_ONE.moved(SIDE - 6, -6), signs[1], at="end", bold=True)


def arm(
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
    outward = 1 if middle.x > MIDDLE.x else -1
    beside = middle.moved(outward * 15, -6 if middle.y < MIDDLE.y else 12)
    anchor = "start" if outward > 0 else "end"
    sketch.text(beside, str(number), at=anchor, bold=True, ink=ACCENT, size=11)
    labels = " + ".join(element.label for element in elements)
    down = -11 if middle.y < MIDDLE.y else 11
    sketch.text(beside.moved(outward * 2, down), labels, at=anchor, size=9)


def _element(sketch: Sketch, element: ElementShown, middle: Spot, long: float, at: float) -> None:
    fill = PAPER if element.inside_module else FILLED
    corner = middle.moved(-long / 2, -6)
    sketch.box(corner, long, 12, fill=fill, turned=at, ink=INK)
