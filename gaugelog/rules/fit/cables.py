"""Cables: the plan's figures are the reel's, and the reel may be used."""

from __future__ import annotations

from collections.abc import Iterator

from gaugelog.ledger.circuits import CircuitPlanned
from gaugelog.ledger.stock import ConsumableReceived
from gaugelog.rules.fit.finding import PlanFinding
from gaugelog.rules.fit.plan import Plan

RESISTANCE_AGREES = 0.05
"""Part by which the plan's resistance per metre may differ from the reel's. Common practice."""


def cable_findings(plan: Plan) -> Iterator[PlanFinding]:
    """Each circuit's cable against the lots in stock; none where the plan names no cable.

    A name that is no lot in stock is one cable of the article's own, as a harness is.
    """
    for circuit in plan.circuits:
        cable = circuit.leads.cable
        if not cable:
            continue
        reel = plan.consumables.get(cable.casefold())
        if reel is None:
            what = f"cable {cable} is no lot in stock; taken as one cable of that name"
            yield PlanFinding("warning", circuit.label, what)
        elif reel.type != "cable":
            what = f"{reel.label} is a lot of {reel.type}, not of cable"
            yield PlanFinding("refusal", circuit.label, what)
        else:
            yield from _barred(plan, circuit, reel)
            yield from _resistance(circuit, reel)


def _barred(plan: Plan, circuit: CircuitPlanned, reel: ConsumableReceived) -> Iterator[PlanFinding]:
    if reel.id in plan.barred:
        what = f"cable {reel.label} is {plan.barred[reel.id]}"
        yield PlanFinding("refusal", circuit.label, what)


def _resistance(circuit: CircuitPlanned, reel: ConsumableReceived) -> Iterator[PlanFinding]:
    planned, known = circuit.leads.resistance_per_length, reel.wire_resistance
    if known is None:
        what = f"what a metre of {reel.label} measures is not in stock"
        yield PlanFinding("warning", circuit.label, what, f"{planned} planned")
        return
    figure = f"{planned} planned, {known} of {reel.label}"
    if abs(planned.si() - known.si()) > RESISTANCE_AGREES * known.si():
        what = "the lead wires' resistance is not that of the cable in stock"
        yield PlanFinding("warning", circuit.label, what, figure, "common practice, 5 %")
    else:
        what = "the lead wires' resistance is that of the cable in stock"
        yield PlanFinding("ok", circuit.label, what, figure)
