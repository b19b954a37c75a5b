"""Patterns: the gauge that is planned is the lot's, numbered as its certificate has it."""

from __future__ import annotations

from collections.abc import Iterator

from gaugelog.ledger.points import PointPlanned
from gaugelog.ledger.stock import LotReceived
from gaugelog.physics.patterns import numbering_of
from gaugelog.rules.fit.finding import PlanFinding
from gaugelog.rules.fit.plan import Plan

SOURCE = "the lot's certificate; rosettes by ASTM E1561"


def pattern_findings(plan: Plan) -> Iterator[PlanFinding]:
    """Each point's pattern and numbering against its lot's."""
    for point in plan.points:
        lot = plan.lots.get(point.lot)
        if lot is None:
            continue
        if point.pattern != lot.pattern:
            what = f"is planned as {point.pattern}, but lot {lot.label} is {lot.pattern}"
            yield PlanFinding("refusal", point.label, what, "", SOURCE)
        elif point.numbering:
            yield _numbered(point, lot)


def _numbered(point: PointPlanned, lot: LotReceived) -> PlanFinding:
    """Seen through the article from the other side, what turns one way turns the other."""
    found = numbering_of([grid.angle.si() for grid in lot.grids])
    turned = {"clockwise": "counter-clockwise", "counter-clockwise": "clockwise"}
    seen = found if point.seen_from == "gauge side" else turned[found]
    figure = ", ".join(str(grid.angle) for grid in lot.grids)
    if seen == point.numbering:
        what = f"its grids are numbered {seen} seen from the {point.seen_from}"
        return PlanFinding("ok", point.label, what, figure, SOURCE)
    what = (
        f"its grids are planned as numbered {point.numbering}, but seen from the "
        f"{point.seen_from} those of lot {lot.label} are numbered {seen}"
    )
    return PlanFinding("refusal", point.label, what, figure, SOURCE)
