"""The bridge of a circuit as a drawing: arms, lead wires, channel, pins and wire marks.

Arms are numbered round the bridge, 1 and 3 opposite. The supply stands between the corners 2–3
and 4–1, the output between 1–2 and 3–4, so that a larger arm 1 gives a positive output. Each
arrangement is drawn as it is wired: what lies at the article at the left, at the far end of the
cable; what lies in the module at the right.
"""

from __future__ import annotations

from collections.abc import Callable

from markupsafe import Markup

from gaugelog.documents.content.installation import CircuitShown
from gaugelog.documents.farbridge import full_bridge, half_bridge, opposite_arms, two_wire_quarter
from gaugelog.documents.plainbridge import plain_bridge
from gaugelog.documents.quarter import three_wire_quarter
from gaugelog.documents.scene import HEIGHT, WIDTH
from gaugelog.documents.sketch import Sketch
from gaugelog.physics.layouts import layout_for
from gaugelog.physics.validity import OutOfDomain

__all__ = ["HEIGHT", "WIDTH", "bridge_diagram"]

_DRAWN: dict[str, Callable[[Sketch, CircuitShown], None]] = {
    "quarter two-wire": two_wire_quarter,
    "quarter three-wire": three_wire_quarter,
    "half three-wire": half_bridge,
    "half five-wire": half_bridge,
    "opposite four-wire": opposite_arms,
    "full four-wire": full_bridge,
    "full six-wire": full_bridge,
}
"""How each layout is drawn."""


def bridge_diagram(circuit: CircuitShown) -> Markup:
    """The SVG of a circuit; texts are escaped. A layout that is not known is drawn plainly."""
    sketch = Sketch(WIDTH, HEIGHT)
    _DRAWN.get(_layout(circuit), plain_bridge)(sketch, circuit)
    return sketch.svg()


def _layout(circuit: CircuitShown) -> str:
    if circuit.layout or circuit.arrangement == "quarter three-wire":
        return circuit.layout or circuit.arrangement
    try:
        return layout_for(circuit.arrangement, circuit.leads.wires).name
    except OutOfDomain:
        return ""
