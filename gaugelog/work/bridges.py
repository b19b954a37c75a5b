"""The circuits of a plan as bridges: arms, tabs at the article, wires to the module's pins."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from gaugelog.ledger.campaign import CampaignRow
from gaugelog.ledger.circuits import CircuitPlanned, Element
from gaugelog.physics.layouts import Layout
from gaugelog.physics.validity import OutOfDomain
from gaugelog.rules.fit.plan import Plan, PlannedChannel
from gaugelog.rules.layout import layout_of
from gaugelog.work.logbook import Logbook


@dataclass(frozen=True, slots=True)
class BridgeArm:
    """An arm: its number round the bridge, what is in it, and the two nodes it lies between."""

    number: int
    parts: tuple[str, ...]
    """`FB-1`, `FB-3 (dummy)`, `350 Ω`."""
    ends: tuple[str, str]
    outside: bool
    """Whether it lies at the article."""


@dataclass(frozen=True, slots=True)
class BridgeWire:
    """A lead wire from a tab at the article to a pin; texts are empty where not said."""

    function: str
    pin: str
    mark: str
    tab: str


@dataclass(frozen=True, slots=True)
class Bridge:
    """A circuit as it is wired; `arms` is empty where no layout is known for its wires."""

    circuit: str
    arrangement: str
    channel: str
    connector: str
    cable: str
    length_m: float
    arms: tuple[BridgeArm, ...]
    wires: tuple[BridgeWire, ...]
    others: tuple[BridgeWire, ...]
    """Pins and marks that are no wire of the bridge, such as the shield."""


def bridges(logbook: Logbook) -> dict[str, Bridge]:
    """Every circuit of the plan that is loaded, by its label."""
    with logbook.reading() as view:
        rows = view.all(CampaignRow)
        if not rows:
            return {}
        plan = Plan(view, rows[-1])
        return {each.label: _bridge(plan, each) for each in plan.circuits}


def _bridge(plan: Plan, circuit: CircuitPlanned) -> Bridge:
    channel = plan.channels.get(circuit.channel)
    labels = {grid.id: grid.label for grid in plan.grids}
    try:
        layout: Layout | None = layout_of(circuit)
    except OutOfDomain:
        layout = None
    wires = dict(layout.wires) if layout is not None else {}
    return Bridge(
        circuit.label,
        circuit.arrangement,
        channel.label if channel is not None else "",
        channel.channel.connector if channel is not None else "",
        circuit.leads.cable,
        circuit.leads.length.to("m"),
        tuple(_arms(circuit, layout, labels)) if layout is not None else (),
        tuple(_wires(circuit, channel, wires)),
        tuple(_others(circuit, channel, wires)),
    )


def _arms(circuit: CircuitPlanned, layout: Layout, labels: dict[str, str]) -> Iterator[BridgeArm]:
    for number, (elements, ends) in enumerate(
        zip(circuit.arms, layout.arm_ends, strict=True), start=1
    ):
        parts = tuple(_part(each, labels) for each in elements)
        yield BridgeArm(number, parts, ends, number in layout.outside)


def _part(element: Element, labels: dict[str, str]) -> str:
    if element.grid is not None:
        dummy = " (dummy)" if element.kind == "dummy" else ""
        return labels.get(element.grid, "?") + dummy
    return str(element.resistance) if element.resistance is not None else element.kind


def _wires(
    circuit: CircuitPlanned, channel: PlannedChannel | None, wires: dict[str, str]
) -> Iterator[BridgeWire]:
    pins = channel.channel.pins if channel is not None else {}
    for function, tab in wires.items():
        mark = circuit.leads.marks.get(function, "")
        yield BridgeWire(function, pins.get(function, ""), mark, tab)


def _others(
    circuit: CircuitPlanned, channel: PlannedChannel | None, wires: dict[str, str]
) -> Iterator[BridgeWire]:
    pins = channel.channel.pins if channel is not None else {}
    marks = circuit.leads.marks
    for function in dict.fromkeys([*pins, *marks]):
        if function not in wires:
            yield BridgeWire(function, pins.get(function, ""), marks.get(function, ""), "")
