"""Dummies: planned as such, shared only where the supply allows it, like what they compensate."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from gaugelog.ledger.circuits import CircuitPlanned
from gaugelog.ledger.points import PointPlanned
from gaugelog.rules.fit.finding import PlanFinding
from gaugelog.rules.fit.plan import Plan

SHARED_SOURCE = "two supplies of their own can't both stand on one grid; common practice"
LIKE_SOURCE = "a dummy compensates only what warms and expands alike; common practice"


def dummy_findings(plan: Plan) -> Iterator[PlanFinding]:
    """Each dummy, and each grid that is taken for one."""
    serving: dict[str, list[CircuitPlanned]] = {}
    for circuit in plan.circuits:
        for arm in circuit.arms:
            for element in arm:
                point = plan.point_of_grid.get(element.grid or "")
                if point is None or element.grid is None:
                    continue
                yield from _taken_for(circuit, point, element.kind == "dummy")
                if element.kind == "dummy":
                    serving.setdefault(element.grid, []).append(circuit)
    for grid, circuits in serving.items():
        yield from _shared(plan, grid, circuits)
        for circuit in circuits:
            yield from _like(plan, plan.point_of_grid[grid], circuit)


def _taken_for(
    circuit: CircuitPlanned, point: PointPlanned, as_dummy: bool
) -> Iterator[PlanFinding]:
    if as_dummy and not point.dummy:
        what = f"has {point.label} as a dummy, which is planned to feel strain"
        yield PlanFinding("refusal", circuit.label, what, "column dummy of grids.csv")
    elif point.dummy and not as_dummy:
        what = f"has the dummy {point.label} where a grid must feel strain"
        yield PlanFinding("refusal", circuit.label, what, f"write dummy {point.label} in its arm")


def _shared(plan: Plan, grid: str, circuits: Sequence[CircuitPlanned]) -> Iterator[PlanFinding]:
    """A dummy in several circuits needs one supply under them all: common, or switched."""
    if len(circuits) < 2:
        return
    channels = [plan.channels[each.channel] for each in circuits if each.channel in plan.channels]
    label = plan.point_of_grid[grid].label
    shared = f"is shared by {', '.join(circuit.label for circuit in circuits)}"
    figure = ", ".join(f"{each.label} {each.channel.supply}" for each in channels)
    modules = {each.module for each in channels}
    if any(each.channel.supply == "separate" for each in channels):
        what = f"{shared}, whose supply is neither common nor switched"
        yield PlanFinding("refusal", label, what, figure, SHARED_SOURCE)
    elif len(modules) > 1:
        what = f"{shared}, which lie on different modules and so have no supply in common"
        yield PlanFinding("refusal", label, what, figure, SHARED_SOURCE)
    else:
        yield PlanFinding("ok", label, f"{shared}, on one supply", figure, SHARED_SOURCE)


def _like(plan: Plan, dummy: PointPlanned, circuit: CircuitPlanned) -> Iterator[PlanFinding]:
    """Lot and material of a dummy against those of the points it compensates."""
    own = plan.article_of(dummy)
    for point in plan.points_of(circuit):
        article = plan.article_of(point)
        if point.dummy or own is None or article is None:
            continue
        rates = own.material.expansion, article.material.expansion
        if rates[0].si() != rates[1].si():
            what = (
                f"lies on a material that expands unlike that of {point.label} in {circuit.label}"
            )
            figure = f"{rates[0]} against {rates[1]}"
            yield PlanFinding("warning", dummy.label, what, figure, LIKE_SOURCE)
        if dummy.lot != point.lot:
            lots = [plan.lots[lot].label for lot in (dummy.lot, point.lot) if lot in plan.lots]
            what = f"is of another lot than {point.label} in {circuit.label}"
            yield PlanFinding("warning", dummy.label, what, " and ".join(lots), LIKE_SOURCE)
