"""Warmth: the gauge's expansion class against the material over the point's temperatures."""

from __future__ import annotations

from collections.abc import Iterator

from gaugelog.ledger.campaign import Article
from gaugelog.ledger.circuits import CircuitPlanned
from gaugelog.ledger.points import PointPlanned
from gaugelog.ledger.stock import LotReceived
from gaugelog.physics.arrangements import ARRANGEMENTS
from gaugelog.physics.temperature import mismatch_output, mismatch_output_notices
from gaugelog.rules.compensated import thermal_share
from gaugelog.rules.fit.finding import Level, PlanFinding
from gaugelog.rules.fit.plan import Plan

_WITHIN = "thermal output by mismatch stays within the permitted error"
_CANCELS = "thermal output by mismatch cancels in its circuit, while its gauges are equally warm"
_EXCEEDS = "thermal output by mismatch exceeds the permitted error: correct for it or use a dummy"

SOURCE = "(αs − αm) ΔT, Dally and Riley (from memory)"


def warmth_findings(plan: Plan) -> Iterator[PlanFinding]:
    """Each point's thermal output by mismatch, against its permitted error."""
    shown = _shown(plan)
    for point in plan.points:
        lot, article = plan.lots.get(point.lot), plan.article_of(point)
        if lot is not None and article is not None:
            cancels = shown.get(point.id) is False
            yield from _mismatch(point, lot, article, cancels)


def _shown(plan: Plan) -> dict[str, bool]:
    """Whether any circuit of a point shows its thermal output, by the point's id."""
    found: dict[str, bool] = {}
    for circuit in plan.circuits:
        points = plan.points_of(circuit)
        shows = not _cancels(plan, circuit, points)
        found |= {point.id: shows or found.get(point.id, False) for point in points}
    return found


def _cancels(plan: Plan, circuit: CircuitPlanned, points: list[PointPlanned]) -> bool:
    """Whether a circuit shows nothing of a thermal output that all its gauges share.

    They must be of one lot and lie on materials that expand alike.
    """
    articles = [plan.article_of(point) for point in points]
    known = [article.material for article in articles if article is not None]
    alike = (
        len({each.expansion.si() for each in known}) == len({point.lot for point in points}) == 1
    )
    if circuit.arrangement not in ARRANGEMENTS or not alike or len(known) < len(points):
        return False
    return not thermal_share(circuit, known[0].poisson_ratio.si())


def _mismatch(
    point: PointPlanned, lot: LotReceived, article: Article, cancels: bool
) -> Iterator[PlanFinding]:
    if lot.expansion_class is None:
        what = f"lot {lot.label} has no expansion class: thermal output is not judged"
        yield PlanFinding("warning", point.label, what)
        return
    rise = point.temperature_max.si() - point.temperature_min.si()
    article_rate, class_rate = article.material.expansion.si(), lot.expansion_class.si()
    left = abs(float(mismatch_output(article_rate, class_rate, rise)))
    within = left <= point.permitted_error.si()
    what = _EXCEEDS
    if within or cancels:
        what = _WITHIN if within else _CANCELS
    asked = [notice.message for notice in mismatch_output_notices(article_rate, class_rate, rise)]
    figure = (
        f"{left * 1e6:.1f} µm/m over {rise:g} K, {lot.expansion_class} on "
        f"{article.material.expansion}, permitted {point.permitted_error}"
    )
    level: Level = "ok" if within or (cancels and not asked) else "warning"
    yield PlanFinding(level, point.label, " ".join([what, *asked]), figure, SOURCE)
