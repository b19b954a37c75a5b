"""Whether the plan fits: each finding with its figure and source, refusals first."""

from __future__ import annotations

from collections.abc import Callable
from datetime import date

from gaugelog.ledger.campaign import CampaignRow
from gaugelog.ledger.view import View
from gaugelog.rules.fit.arrangement import arrangement_findings
from gaugelog.rules.fit.cables import cable_findings
from gaugelog.rules.fit.dummies import dummy_findings
from gaugelog.rules.fit.finding import Level, PlanFinding
from gaugelog.rules.fit.leads import lead_findings
from gaugelog.rules.fit.output import output_findings
from gaugelog.rules.fit.patterns import pattern_findings
from gaugelog.rules.fit.plan import Plan
from gaugelog.rules.fit.points import point_findings
from gaugelog.rules.fit.stock import stock_findings
from gaugelog.rules.fit.supply import supply_findings
from gaugelog.rules.fit.surface import surface_findings
from gaugelog.rules.fit.warmth import warmth_findings
from gaugelog.rules.fit.wiring import wiring_findings

__all__ = ["Level", "PlanFinding", "Progress", "check_plan"]

_SUBJECTS = (
    point_findings,
    wiring_findings,
    arrangement_findings,
    dummy_findings,
    pattern_findings,
    lead_findings,
    cable_findings,
    supply_findings,
    output_findings,
    warmth_findings,
    surface_findings,
)
_ORDER: dict[Level, int] = {"refusal": 0, "warning": 1, "ok": 2}


Progress = Callable[[int, int], None]
"""Told how many parts are done and how many there are."""


def check_plan(
    view: View, campaign: CampaignRow, day: date, progress: Progress | None = None
) -> list[PlanFinding]:
    """Everything found about a plan: refusals first, then warnings, then what is well.

    `day` is the day it is looked at: a lot may have expired by then.
    """
    plan = Plan(view, campaign)
    found: list[PlanFinding] = []
    for done, subject in enumerate(_SUBJECTS, start=1):
        found += subject(plan)
        if progress:
            progress(done, len(_SUBJECTS))
    found += stock_findings(plan, day)
    return sorted(found, key=lambda finding: _ORDER[finding.level])
