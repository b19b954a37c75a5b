"""Each point: its lot, its route, its strain against the lot's limit, its temperatures."""

from __future__ import annotations

from collections.abc import Iterator

from gaugelog.ledger.points import PointPlanned
from gaugelog.ledger.stock import LotReceived
from gaugelog.rules.fit.finding import Level, PlanFinding
from gaugelog.rules.fit.plan import Plan

LOT_SHEET = "the lot's sheet"


def point_findings(plan: Plan) -> Iterator[PlanFinding]:
    """What is found about each point by itself."""
    if not plan.points:
        yield PlanFinding("refusal", "plan", "has no point")
    for point in plan.points:
        yield from _references(plan, point)
        lot = plan.lots.get(point.lot)
        if lot is not None:
            yield from _strain(point, lot)
            yield from _temperature(point, lot)


def _references(plan: Plan, point: PointPlanned) -> Iterator[PlanFinding]:
    if point.lot not in plan.lots:
        yield PlanFinding("refusal", point.label, "its gauge lot is not in stock")
    if point.route not in plan.routes:
        yield PlanFinding("refusal", point.label, "its route is not known")
    if point.permitted_error.si() <= 0:
        figure = str(point.permitted_error)
        yield PlanFinding("refusal", point.label, "its permitted error must be above 0", figure)
    if point.strain_min.si() > point.strain_max.si():
        figure = f"{point.strain_min} to {point.strain_max}"
        yield PlanFinding("refusal", point.label, "its strain range is upside down", figure)


def _strain(point: PointPlanned, lot: LotReceived) -> Iterator[PlanFinding]:
    if lot.strain_limit is None:
        return
    largest = max(abs(point.strain_min.si()), abs(point.strain_max.si()))
    figure = f"{largest * 1e6:.0f} µm/m of {lot.strain_limit}"
    level: Level = "refusal" if largest > lot.strain_limit.si() else "ok"
    word = "exceeds" if level == "refusal" else "lies within"
    what = f"its strain {word} the limit of lot {lot.label}"
    yield PlanFinding(level, point.label, what, figure, LOT_SHEET)


def _temperature(point: PointPlanned, lot: LotReceived) -> Iterator[PlanFinding]:
    low, high = lot.temperature_min, lot.temperature_max
    if low is None and high is None:
        return
    cold = low is not None and point.temperature_min.si() < low.si()
    hot = high is not None and point.temperature_max.si() > high.si()
    level: Level = "refusal" if cold or hot else "ok"
    word = "leaves" if level == "refusal" else "lies within"
    figure = f"{point.temperature_min} to {point.temperature_max}, lot {low} to {high}"
    what = f"its temperature range {word} that of lot {lot.label}"
    yield PlanFinding(level, point.label, what, figure, LOT_SHEET)
