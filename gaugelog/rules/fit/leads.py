"""Lead wires: what they take of the sensitivity, and the offset of two wires in one arm."""

from __future__ import annotations

from collections.abc import Iterator

from gaugelog.ledger.circuits import CircuitPlanned
from gaugelog.physics.arrangements import ARRANGEMENTS
from gaugelog.physics.leads import initial_offset, sensitivity_loss
from gaugelog.physics.validity import OutOfDomain
from gaugelog.rules.fit.finding import Level, PlanFinding
from gaugelog.rules.fit.plan import Plan
from gaugelog.rules.layout import layout_of

LOSS_WARNED = 0.02
"""Part of the sensitivity beyond which the loss is warned of. Common practice."""

LOSS_SOURCE = "R/(R + n RL), Dally and Riley (from memory)"
OFFSET_SOURCE = "R1/(R1 + R2) − 1/2, Dally and Riley (from memory)"


def lead_findings(plan: Plan) -> Iterator[PlanFinding]:
    """Each circuit's leads."""
    for circuit in plan.circuits:
        lots = plan.lots_of(circuit)
        layout = _layout(circuit)
        if lots and layout:
            grid = lots[0].nominal_resistance.si()
            yield from _loss(circuit, layout, grid)
            yield from _offset(plan, circuit, layout, grid)


def wire_resistance(circuit: CircuitPlanned) -> float:
    """Resistance of one lead wire from the reel, ohm."""
    return circuit.leads.resistance_per_length.si() * circuit.leads.length.si()


def _layout(circuit: CircuitPlanned) -> str:
    if circuit.arrangement not in ARRANGEMENTS:
        return ""
    try:
        return layout_of(circuit).name
    except OutOfDomain:
        return ""


def _loss(circuit: CircuitPlanned, layout: str, grid: float) -> Iterator[PlanFinding]:
    wire = wire_resistance(circuit)
    lost = float(sensitivity_loss(layout, grid, wire))
    figure = f"{100 * lost:.2f} %, {wire:.3f} Ω a wire"
    level: Level = "warning" if lost > LOSS_WARNED else "ok"
    what = "lead wires take sensitivity" + ("; correct for it" if level == "warning" else "")
    yield PlanFinding(level, circuit.label, what, figure, LOSS_SOURCE)


def _offset(plan: Plan, circuit: CircuitPlanned, layout: str, grid: float) -> Iterator[PlanFinding]:
    channel = plan.channels.get(circuit.channel)
    if layout != "quarter two-wire" or channel is None:
        return
    offset = abs(float(initial_offset(grid, 2 * wire_resistance(circuit), grid)))
    span = channel.channel.range
    level: Level = "refusal" if offset > span.si() else "warning"
    what = "two wires in the gauge's arm offset the bridge and drift with temperature"
    figure = f"{offset * 1e3:.2f} mV/V on ±{span}"
    yield PlanFinding(level, circuit.label, what, figure, OFFSET_SOURCE)
