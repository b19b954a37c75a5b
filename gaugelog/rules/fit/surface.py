"""Surface: what the route does to the article against what may be done to it."""

from __future__ import annotations

from collections.abc import Iterator

from gaugelog.ledger.campaign import Article
from gaugelog.ledger.routes import RouteAdopted
from gaugelog.rules.article import forbids_cleaner
from gaugelog.rules.fit.finding import PlanFinding
from gaugelog.rules.fit.plan import Plan


def surface_findings(plan: Plan) -> Iterator[PlanFinding]:
    """Each route on each article: its temperature, its abrasion; the cleaners in stock."""
    pairs = {
        (point.article, point.route): point
        for point in plan.points
        if point.article in plan.articles and point.route in plan.routes
    }
    for article, route in pairs:
        yield from _temperature(plan.articles[article], plan.routes[route])
        yield from _abrasion(plan.articles[article], plan.routes[route])
    for label in sorted({article for article, _route in pairs}):
        yield from _cleaners(plan, plan.articles[label])


def _cleaners(plan: Plan, article: Article) -> Iterator[PlanFinding]:
    """A cleaner in stock that the article forbids is warned of; the step refuses it."""
    for lot in plan.cleaners:
        word = forbids_cleaner(article, lot.name)
        if word:
            what = f"must not be cleaned with {word}; cleaner {lot.label} in stock is {lot.name}"
            subject = f"article {article.label}"
            yield PlanFinding("warning", subject, what, "", article.surface.agreed_by)


def _temperature(article: Article, route: RouteAdopted) -> Iterator[PlanFinding]:
    hottest, allowed = route.process_temperature, article.surface.largest_process_temperature
    if hottest is None:
        return
    subject = f"route {route.label} on {article.label}"
    by = article.surface.agreed_by
    if allowed is None:
        what = "the article's largest process temperature is not said"
        yield PlanFinding("warning", subject, what, f"the route reaches {hottest}")
    elif hottest.si() > allowed.si():
        what = "the route is hotter than the article may get"
        yield PlanFinding("refusal", subject, what, f"{hottest} of {allowed}", by)
    else:
        what = "the route stays below what the article may get"
        yield PlanFinding("ok", subject, what, f"{hottest} of {allowed}", by)


def _abrasion(article: Article, route: RouteAdopted) -> Iterator[PlanFinding]:
    if route.abrades and article.surface.removal_allowed.strip().casefold() in {"no", "none"}:
        subject = f"route {route.label} on {article.label}"
        what = "the route abrades, and nothing may be removed from the article"
        yield PlanFinding("refusal", subject, what, "", article.surface.agreed_by)
