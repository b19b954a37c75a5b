"""Wiring: every grid in one circuit, no channel and no pin used twice."""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterator

from gaugelog.rules.fit.finding import PlanFinding
from gaugelog.rules.fit.plan import Plan, PlannedChannel


def wiring_findings(plan: Plan) -> Iterator[PlanFinding]:
    """Grids, channels and pins: each used once."""
    yield from _grids(plan)
    yield from _channels(plan)
    yield from _pins(plan)


def _grids(plan: Plan) -> Iterator[PlanFinding]:
    used = Counter(
        element.grid
        for circuit in plan.circuits
        for arm in circuit.arms
        for element in arm
        if element.grid is not None and element.kind == "grid"
    )
    dummies = {
        element.grid
        for circuit in plan.circuits
        for arm in circuit.arms
        for element in arm
        if element.kind == "dummy"
    }
    for grid in plan.grids:
        if used[grid.id] == 0 and grid.id not in dummies:
            yield PlanFinding("refusal", grid.label, "is in no circuit")
        elif used[grid.id] > 1:
            figure = f"{used[grid.id]} circuits"
            yield PlanFinding("refusal", grid.label, "is in more than one circuit", figure)


def _channels(plan: Plan) -> Iterator[PlanFinding]:
    used: dict[str, list[str]] = {}
    for circuit in plan.circuits:
        used.setdefault(circuit.channel, []).append(circuit.label)
    for channel, circuits in used.items():
        if channel not in plan.channels:
            yield PlanFinding("refusal", ", ".join(circuits), "its channel is not known")
        elif len(circuits) > 1:
            what = f"is used by {', '.join(circuits)}"
            label = f"channel {plan.channels[channel].label}"
            yield PlanFinding("refusal", label, what, f"{len(circuits)} circuits")


def _pins(plan: Plan) -> Iterator[PlanFinding]:
    used: dict[tuple[str, str, str], list[PlannedChannel]] = {}
    for each in plan.channels.values():
        if each.channel.connector:
            for pin in each.channel.pins.values():
                used.setdefault((each.module, each.channel.connector, pin), []).append(each)
    for (module, connector, pin), channels in used.items():
        if len(channels) > 1:
            names = ", ".join(dict.fromkeys(each.label for each in channels))
            what = f"pin {pin} serves {len(channels)} functions, of channel {names}"
            yield PlanFinding("refusal", f"{module}, connector {connector}", what)
