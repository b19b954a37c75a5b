"""A circuit's terminals by every name people call them, and what a defect of its wiring means."""

from __future__ import annotations

from collections.abc import Mapping

from gaugelog.physics.circuit import Circuit
from gaugelog.physics.pin_network import ARTICLE, SHIELD, pins_of

MEANINGS: Mapping[str, str] = {
    "nothing": "the wiring reads as planned",
    "open": "no current passes: a broken wire, a lifted tab or a joint that never took",
    "missing completion": "the completion resistor is absent or not switched in",
    "short": "two parts touch: bare wires, a solder bridge or a crushed cable",
    "leak": "damp, flux or damaged insulation conducts between them",
    "wrong value": "another gauge or resistor than the planned one is fitted there",
    "joint": "a cold or corroded joint, or a loose contact, adds resistance",
    "swapped": "these wires have changed places at one end",
}
"""What each kind of defect means to the one who looks for it (common practice)."""


def terminals_of(circuit: Circuit, labels: Mapping[str, str]) -> dict[str, str]:
    """Each terminal that a meter can be put to, the module unplugged, with its pin's own label.

    `labels` are the channel's pins by their function; a terminal without one has an empty label.
    """
    found = {pin: labels.get(pin, "") for pin in pins_of(circuit)}
    found.update(dict.fromkeys(circuit.layout.wires.values(), ""))
    return {**found, ARTICLE: "", SHIELD: ""}


def terminal_called(name: str, terminals: Mapping[str, str]) -> str | None:
    """The terminal of this name or of this pin label, or None; capitals do not matter.

    The functions come first: a connector may well label a pin by another's function.
    """
    wanted = name.casefold()
    by_function = [each for each in terminals if each.casefold() == wanted]
    by_label = [each for each, label in terminals.items() if label and label.casefold() == wanted]
    found = by_function or by_label
    return found[0] if found else None
