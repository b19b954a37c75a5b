"""Warmth: the gauge's expansion class against the material over the point's temperatures."""

from __future__ import annotations

from collections.abc import Iterator

from gaugelog.ledger.campaign import Article
from gaugelog.ledger.points import PointPlanned
from gaugelog.ledger.stock import LotReceived
from gaugelog.physics.temperature import mismatch_output, mismatch_output_notices
from gaugelog.rules.fit.finding import Level, PlanFinding
from gaugelog.rules.fit.plan import Plan

SOURCE = "(αs − αm) ΔT, Dally and Riley (from memory)"


def warmth_findings(plan: Plan) -> Iterator[PlanFinding]:
    """Each point's thermal output by mismatch, against its permitted error."""
    for point in plan.points:
        lot, article = plan.lots.get(point.lot), plan.article_of(point)
        if lot is not None and article is not None:
            yield from _mismatch(point, lot, article)


def _mismatch(point: PointPlanned, lot: LotReceived, article: Article) -> Iterator[PlanFinding]:
    if lot.expansion_class is None:
        what = f"lot {lot.label} has no expansion class: thermal output is not judged"
        yield PlanFinding("warning", point.label, what)
        return
    rise = point.temperature_max.si() - point.temperature_min.si()
    article_rate, class_rate = article.material.expansion.si(), lot.expansion_class.si()
    left = abs(float(mismatch_output(article_rate, class_rate, rise)))
    level: Level = "ok" if left <= point.permitted_error.si() else "warning"
    what = (
        "thermal output by mismatch stays within the permitted error"
        if level == "ok"
        else "thermal output by mismatch exceeds the permitted error: correct for it or use a dummy"
    )
    asked = [notice.message for notice in mismatch_output_notices(article_rate, class_rate, rise)]
    figure = (
        f"{left * 1e6:.1f} µm/m over {rise:g} K, {lot.expansion_class} on "
        f"{article.material.expansion}, permitted {point.permitted_error}"
    )
    yield PlanFinding(level, point.label, " ".join([what, *asked]), figure, SOURCE)
