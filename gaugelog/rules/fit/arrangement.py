"""Arrangements: the arms hold what they must, with as many wires as they need."""

from __future__ import annotations

from collections.abc import Iterator

from gaugelog.ledger.circuits import CircuitPlanned
from gaugelog.physics.arrangements import ARRANGEMENTS
from gaugelog.physics.layouts import layout_for
from gaugelog.physics.validity import OutOfDomain
from gaugelog.rules.fit.finding import Level, PlanFinding
from gaugelog.rules.fit.plan import Plan


def arrangement_findings(plan: Plan) -> Iterator[PlanFinding]:
    """Each circuit's arms, wires and completion."""
    for circuit in plan.circuits:
        yield from _arms(circuit)
        yield from _completion(plan, circuit)


def _arms(circuit: CircuitPlanned) -> Iterator[PlanFinding]:
    chosen = ARRANGEMENTS.get(circuit.arrangement)
    if chosen is None:
        known = ", ".join(ARRANGEMENTS)
        yield PlanFinding("refusal", circuit.label, f"its arrangement is not one of {known}")
        return
    try:
        layout_for(circuit.arrangement, circuit.leads.wires)
    except OutOfDomain as error:
        yield PlanFinding("refusal", circuit.label, error.message, f"{circuit.leads.wires} wires")
    for number, (arm, active) in enumerate(zip(circuit.arms, chosen.active, strict=True), start=1):
        has_grid = any(element.kind == "grid" for element in arm)
        if active != has_grid:
            what = f"arm {number} must {'' if active else 'not '}hold a grid"
            yield PlanFinding("refusal", circuit.label, what, circuit.arrangement)


def _completion(plan: Plan, circuit: CircuitPlanned) -> Iterator[PlanFinding]:
    lots = plan.lots_of(circuit)
    if not lots:
        return
    nominal = lots[0].nominal_resistance
    for number, arm in enumerate(circuit.arms, start=1):
        for element in arm:
            value = element.resistance
            if element.kind != "completion" or value is None or value.si() == nominal.si():
                continue
            what = f"the completion in arm {number} is not the gauge's nominal resistance"
            yield PlanFinding("refusal", circuit.label, what, f"{value} against {nominal}")
    channel = plan.channels.get(circuit.channel)
    completion = channel.channel.completion if channel is not None else None
    if completion is not None:
        same = completion.si() == nominal.si()
        level: Level = "ok" if same else "refusal"
        what = "the channel completes for " + ("this gauge" if same else "another gauge")
        yield PlanFinding(level, circuit.label, what, f"{completion} for {nominal}")
