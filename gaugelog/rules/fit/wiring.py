"""Wiring: every grid in one circuit; no channel, pin or mark used twice."""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterator

from gaugelog.rules.fit.conflicts import conflicts
from gaugelog.rules.fit.finding import PlanFinding
from gaugelog.rules.fit.plan import Plan


def wiring_findings(plan: Plan) -> Iterator[PlanFinding]:
    """Grids, channels, pins and marks: each used once."""
    yield from _grids(plan)
    yield from _channels(plan)
    for conflict in conflicts(plan):
        yield conflict.finding


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
    for circuit in plan.circuits:
        if circuit.channel not in plan.channels:
            yield PlanFinding("refusal", circuit.label, "its channel is not known")
