"""The layout of a planned circuit: where its arms end and its wires run."""

from __future__ import annotations

from gaugelog.ledger.circuits import CircuitPlanned
from gaugelog.physics.layouts import Layout, layout, layout_for


def layout_of(circuit: CircuitPlanned) -> Layout:
    """The layout of a circuit as planned.

    Opposite arms on four wires have arms 2 and 4 at the article, unless they are the module's
    own. Raises OutOfDomain for an arrangement or a number of wires that there is none for.
    """
    found = layout_for(circuit.arrangement, circuit.leads.wires)
    others = [element for number in (2, 4) for element in circuit.arms[number - 1]]
    own = bool(others) and all(element.inside_module for element in others)
    if circuit.arrangement == "opposite arms" and found.name == "full four-wire" and own:
        return layout("opposite four-wire")
    return found
