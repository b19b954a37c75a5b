"""Which wire of a three-wire lead goes where, by the user's own names for them."""

from __future__ import annotations

from dataclasses import dataclass

from gaugelog.documents.content.installation import CircuitShown


@dataclass(frozen=True, slots=True)
class Wire:
    """A lead wire: what it is for, the mark it bears, the pin it ends at; empty where not said."""

    function: str = ""
    mark: str = ""
    pin: str = ""


_COMPLETION = ("completion", "return", "dummy")
_SIGNAL = ("signal", "sense")
_SUPPLY = ("supply", "excitation", "gauge")


def three_wires(circuit: CircuitShown) -> tuple[Wire, Wire, Wire]:
    """The wires of a quarter bridge: to the completing arm, to the output, to the supply.

    A wire is known by the words in its function. One that can't be told stays without a mark
    in the drawing; the wiring list beside it has them all.
    """
    return (
        _wire(circuit, _COMPLETION),
        _wire(circuit, _SIGNAL),
        _wire(circuit, _SUPPLY),
    )


def _wire(circuit: CircuitShown, words: tuple[str, ...]) -> Wire:
    marks, pins = circuit.leads.marks, circuit.channel.pins
    found = [name for name in marks if any(word in name.lower() for word in words)]
    if len(found) != 1:
        return Wire()
    function = found[0]
    return Wire(function, marks[function], pins.get(function, ""))


def wiring_list(circuit: CircuitShown) -> list[Wire]:
    """Every wire mark and every pin of the channel, by function."""
    marks, pins = circuit.leads.marks, circuit.channel.pins
    functions = {**dict.fromkeys(marks), **dict.fromkeys(pins)}
    return [Wire(name, marks.get(name, ""), pins.get(name, "")) for name in functions]
