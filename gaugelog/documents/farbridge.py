"""Bridges with arms at the article: quarter on two wires, half, opposite arms, full.

Wires that cross without a dot do not touch.
"""

from __future__ import annotations

from gaugelog.documents.content.installation import CircuitShown
from gaugelog.documents.scene import arm, cable, column, meter, module_box, supply, wire
from gaugelog.documents.sketch import Sketch, Spot

_EDGE, _FAR = 262.0, 34.0
"""Where the module begins, and where the grids stand, unless the whole bridge is out there."""
_REACH, _RIGHT = 70.0, 532.0
"""Half the width of a bridge, and where the supply stands."""


class _Corners:
    """The corners of a bridge about a middle, named by the arms that meet there."""

    def __init__(self, middle: Spot, reach: float) -> None:
        self.middle = middle
        self.one_two, self.three_four = middle.moved(-reach), middle.moved(reach)
        self.two_three, self.four_one = middle.moved(0, -reach), middle.moved(0, reach)

    def ends(self, number: int) -> tuple[Spot, Spot]:
        """Both ends of an arm."""
        round_it = (self.four_one, self.one_two, self.two_three, self.three_four, self.four_one)
        return round_it[number - 1], round_it[number]

    def draw(self, sketch: Sketch, circuit: CircuitShown, *numbers: int) -> None:
        """The numbered arms."""
        for number in numbers:
            arm(
                sketch,
                number,
                circuit.arms[number - 1],
                *self.ends(number),
                from_middle=self.middle,
            )


def two_wire_quarter(sketch: Sketch, circuit: CircuitShown) -> None:
    """Both wires in the grid's arm; the rest of the bridge in the module."""
    at = _Corners(Spot(412, 130), _REACH)
    module_box(sketch, circuit, _EDGE)
    at.draw(sketch, circuit, 2, 3, 4)
    top, bottom = at.one_two.y, at.four_one.y
    for function, height in (("signal+", top), ("supply-", bottom)):
        wire(sketch, circuit, function, Spot(_FAR, height), Spot(_EDGE, height))
    column(sketch, 1, circuit.arms[0], Spot(_FAR, top), Spot(_FAR, bottom))
    _joined(sketch, at, "signal+", "supply-")
    supply(sketch, circuit, at.two_three, at.four_one, _RIGHT)
    cable(sketch, circuit, _EDGE, top, bottom)


def half_bridge(sketch: Sketch, circuit: CircuitShown) -> None:
    """Arms 1 and 2 at the article, one wire from between them; sense wires where there are."""
    at = _Corners(Spot(412, 130), _REACH)
    module_box(sketch, circuit, _EDGE)
    at.draw(sketch, circuit, 3, 4)
    heights = {"supply+": at.two_three.y, "signal+": at.middle.y, "supply-": at.four_one.y}
    for function, height in heights.items():
        wire(sketch, circuit, function, Spot(_FAR, height), Spot(_EDGE, height))
    column(sketch, 2, circuit.arms[1], Spot(_FAR, heights["supply+"]), Spot(_FAR, at.middle.y))
    column(sketch, 1, circuit.arms[0], Spot(_FAR, at.middle.y), Spot(_FAR, heights["supply-"]))
    sketch.dot(Spot(_FAR, at.middle.y))
    spans = _sensed(sketch, circuit, Spot(_FAR, heights["supply+"]), Spot(_FAR, heights["supply-"]))
    _joined(sketch, at, "supply+", "signal+", "supply-", inside_two=False)
    supply(sketch, circuit, at.two_three, at.four_one, _RIGHT)
    cable(sketch, circuit, _EDGE, *spans)


def opposite_arms(sketch: Sketch, circuit: CircuitShown) -> None:
    """Arms 1 and 3 at the article, 2 and 4 in the module: two wires to each grid."""
    at = _Corners(Spot(412, 150), 66.0)
    module_box(sketch, circuit, _EDGE)
    at.draw(sketch, circuit, 2, 4)
    over = at.two_three.y - 38
    heights = {
        "signal-": over,
        "supply+": at.two_three.y,
        "signal+": at.middle.y,
        "supply-": at.four_one.y,
    }
    for function, height in heights.items():
        wire(sketch, circuit, function, Spot(_FAR, height), Spot(_EDGE, height))
    column(sketch, 3, circuit.arms[2], Spot(_FAR, over), Spot(_FAR, heights["supply+"]))
    column(sketch, 1, circuit.arms[0], Spot(_FAR, at.middle.y), Spot(_FAR, at.four_one.y))
    sketch.line(Spot(_EDGE, over), Spot(at.three_four.x, over), at.three_four)
    _joined(sketch, at, "supply+", "signal+", "supply-")
    supply(sketch, circuit, at.two_three, at.four_one, _RIGHT)
    cable(sketch, circuit, _EDGE, over, at.four_one.y)


_FULL_EDGE = 392.0


def full_bridge(sketch: Sketch, circuit: CircuitShown) -> None:
    """The whole bridge at the article; sense wires where there are."""
    at = _Corners(Spot(160, 122), 62.0)
    module_box(sketch, circuit, _FULL_EDGE)
    at.draw(sketch, circuit, 1, 2, 3, 4)
    under = 226.0
    for function, corner in (
        ("supply+", at.two_three),
        ("signal-", at.three_four),
        ("supply-", at.four_one),
    ):
        wire(sketch, circuit, function, corner, Spot(_FULL_EDGE, corner.y))
    beside = Spot(24, at.one_two.y), Spot(24, under)  # clear of the arms' labels
    wire(sketch, circuit, "signal+", at.one_two, *beside, Spot(_FULL_EDGE, under))
    top, _ = _sensed(sketch, circuit, at.two_three, at.four_one, _FULL_EDGE)
    for corner in (at.one_two, at.two_three, at.three_four, at.four_one):
        sketch.dot(corner)
    high, low = Spot(_FULL_EDGE, at.two_three.y), Spot(_FULL_EDGE, at.four_one.y)
    column_at = 462.0
    plus, minus = Spot(column_at, under), Spot(column_at, at.middle.y)
    sketch.line(Spot(_FULL_EDGE, under), plus)
    sketch.line(Spot(_FULL_EDGE, at.middle.y), minus)
    meter(sketch, plus, minus, 0.7)
    supply(sketch, circuit, high, low, _RIGHT)
    cable(sketch, circuit, _FULL_EDGE, top, under)


def _sensed(
    sketch: Sketch, circuit: CircuitShown, high: Spot, low: Spot, edge: float = _EDGE
) -> tuple[float, float]:
    """Sense wires from the two ends of the supply; the heights of the outermost wires."""
    if circuit.leads.wires not in {5, 6}:
        return high.y, low.y
    above, below = high.y - 18, low.y + 20
    wire(sketch, circuit, "sense+", high, Spot(high.x, above), Spot(edge, above))
    wire(sketch, circuit, "sense-", low, Spot(low.x, below), Spot(edge, below))
    for spot in (high, low):
        sketch.dot(spot)
    return above, below


def _joined(sketch: Sketch, at: _Corners, *functions: str, inside_two: bool = True) -> None:
    """The pins at the module's edge to their corners inside, and the meter across."""
    corners = {"supply+": at.two_three, "signal+": at.one_two, "supply-": at.four_one}
    for function in functions:
        corner = corners[function]
        sketch.line(Spot(_EDGE, corner.y), corner)
    meter(sketch, at.one_two, at.three_four)
    met = (at.one_two,) if inside_two else ()  # nothing meets there when arm 2 is far away
    for corner in (at.two_three, at.three_four, at.four_one, *met):
        sketch.dot(corner)
