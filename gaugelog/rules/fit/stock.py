"""Stock: enough gauges on the shelf, and not expired already."""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterator
from datetime import date

from gaugelog.ledger.stock import LotReceived
from gaugelog.rules.fit.finding import PlanFinding
from gaugelog.rules.fit.plan import Plan


def stock_findings(plan: Plan, day: date) -> Iterator[PlanFinding]:
    """Each lot that is planned from: wanted against what is on the shelf, and its expiry."""
    open_points = [point for point in plan.points if point.id not in plan.taken]
    wanted = Counter(point.lot for point in open_points if point.lot in plan.lots)
    for lot, count in wanted.items():
        there = plan.shelf[lot]
        label = f"lot {plan.lots[lot].label}"
        figure = f"{count} wanted, {there} on the shelf"
        if there < count:
            yield PlanFinding("refusal", label, "stock is short", figure)
        elif there == count:
            yield PlanFinding("warning", label, "no gauge is spare", figure)
        else:
            yield PlanFinding("ok", label, "stock suffices", figure)
        yield from _expiry(plan.lots[lot], day)


def _expiry(lot: LotReceived, day: date) -> Iterator[PlanFinding]:
    if lot.expires is not None and date.fromisoformat(lot.expires) < day:
        figure = f"expired on {lot.expires}"
        yield PlanFinding("refusal", f"lot {lot.label}", "its gauges may not be bonded", figure)
