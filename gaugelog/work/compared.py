"""A plan read anew held against the released one: what is added, changed or dropped, and where."""

from __future__ import annotations

from collections.abc import Iterable, Iterator, Mapping
from dataclasses import dataclass, field
from typing import Any

from gaugelog.intake.plan import PlanFacts
from gaugelog.ledger.campaign import CampaignPlanned, CriteriaAgreed
from gaugelog.ledger.circuits import CircuitPlanned
from gaugelog.ledger.points import PointPlanned
from gaugelog.ledger.revisions import Affected, PlanChange, PlanRevised, Subject, What
from gaugelog.ledger.routes import RouteAdopted
from gaugelog.rules.changes import content, differences
from gaugelog.work.recognised import Released

Things = Mapping[str, tuple[str, Mapping[str, Any]]]
"""Label and content of each thing, by its id."""


@dataclass(slots=True)
class _Found:
    """What differs, as it is found; `bears` are lines by the id of a point or a grid."""

    names: Mapping[str, str]
    changes: list[PlanChange] = field(default_factory=list)
    bears: dict[str, list[str]] = field(default_factory=dict)

    def note(
        self,
        subject: Subject,
        label: str,
        what: What,
        lines: Iterable[str] = (),
        on: Iterable[str] = (),
    ) -> None:
        """Note one change and the points or grids it bears on."""
        said = tuple(lines)
        self.changes.append(PlanChange(subject=subject, label=label, what=what, lines=said))
        short = said if subject == "point" else tuple(f"{subject} {label} {each}" for each in said)
        for each in on:
            self.bears.setdefault(each, []).extend(short or (f"{subject} {label} {what}",))

    def compare(self, subject: Subject, before: Things, now: Things, on: _On) -> None:
        """Note every thing of one kind that is added, changed or dropped."""
        for each, (label, body) in now.items():
            if each not in before:
                self.note(subject, label, "added", on=on.get(each, ()))
            elif body != before[each][1]:
                lines = differences(before[each][1], body, self.names)
                self.note(subject, label, "changed", lines, on.get(each, ()))
        for each, (label, _) in before.items():
            if each not in now:
                self.note(subject, label, "dropped", on=on.get(each, ()))


_On = Mapping[str, list[str]]
"""Ids of the points or grids that a thing bears on, by its id."""


def compared(known: Released, new: PlanFacts) -> PlanRevised:
    """The draft of a revision, still without number, reason and files."""
    found = _Found(_names(known, new))
    circuits = (*known.circuits.values(), *new.circuits)
    _job(found, known.job, new, circuits)
    _criteria(found, known, new.criteria)
    _routes(found, known, new.routes)
    now = {point.id: point for point in new.points}
    own = {point: [point] for point in known.points}
    found.compare("point", _things(known.points.values()), _things(new.points), own)
    on = _grids_of(circuits)
    found.compare("circuit", _things(known.circuits.values()), _things(new.circuits), on)
    return PlanRevised(
        campaign=known.job.id,
        revision=0,
        reason="",
        job=new.campaign if content(new.campaign) != content(known.job) else None,
        criteria=new.criteria if new.criteria.id != known.criteria.id else None,
        routes=tuple(each for each in new.routes if each.id not in known.routes),
        points=tuple(each for each in new.points if _differs(each, known.points)),
        circuits=_wired_anew(known, new),
        dropped_points=tuple(each for each in known.points if each not in now),
        dropped_circuits=_gone(known.circuits, new.circuits),
        changes=tuple(found.changes),
        affected=_affected(found, known, now),
    )


def _names(known: Released, new: PlanFacts) -> dict[str, str]:
    names = dict(known.names)
    for job in (known.job, new.campaign):
        names |= {article.id: article.label for article in job.articles}
        names |= {
            channel.id: f"{module.label}/{channel.label}"
            for module in job.modules
            for channel in module.channels
        }
    names |= {each.id: f"{each.label}, edition {each.edition}" for each in known.routes.values()}
    for route in new.routes:
        name = f"{route.label}, edition {route.edition}"
        names.setdefault(route.id, f"{name}, changed" if name in names.values() else name)
    for point in (*known.points.values(), *new.points):
        names |= {grid.id: grid.label for grid in point.grids}
    return names


def _things(bodies: Iterable[PointPlanned | CircuitPlanned]) -> Things:
    return {body.id: (body.label, content(body)) for body in bodies}


def _grids_of(circuits: Iterable[CircuitPlanned]) -> _On:
    """The grids of each circuit, before and now."""
    on: dict[str, list[str]] = {}
    for circuit in circuits:
        on.setdefault(circuit.id, []).extend(circuit.grids)
    return {each: list(dict.fromkeys(grids)) for each, grids in on.items()}


def _job(
    found: _Found, before: CampaignPlanned, new: PlanFacts, circuits: Iterable[CircuitPlanned]
) -> None:
    now = new.campaign
    parts = {"articles", "modules"}
    plain = [
        {name: value for name, value in content(job).items() if name not in parts}
        for job in (before, now)
    ]
    lines = list(differences(plain[0], plain[1], found.names))
    if lines:
        moved = before.surroundings != now.surroundings
        every = [point.id for point in new.points] if moved else []
        found.note("job", now.label, "changed", lines, every)
    on: dict[str, list[str]] = {}
    for point in new.points:
        on.setdefault(point.article, []).append(point.id)
    found.compare("article", _articles(before), _articles(now), on)
    wired: dict[str, list[str]] = {}
    for circuit in circuits:
        wired.setdefault(circuit.channel, []).extend(circuit.grids)
    found.compare("channel", _channels(before), _channels(now), wired)


def _articles(job: CampaignPlanned) -> Things:
    return {article.id: (article.label, content(article)) for article in job.articles}


def _channels(job: CampaignPlanned) -> Things:
    return {
        channel.id: (
            f"{module.label}/{channel.label}",
            {**content(channel), "module_type": module.type, "module_serial": module.serial},
        )
        for module in job.modules
        for channel in module.channels
    }


def _criteria(found: _Found, known: Released, now: CriteriaAgreed) -> None:
    before = known.criteria
    if now.id == before.id:
        return
    lines = list(differences(_figures(before), _figures(now), found.names))
    found.note("criteria", now.title, "changed", lines, known.points)


def _figures(criteria: CriteriaAgreed) -> dict[str, Any]:
    """Criteria with each figure under the name of its check."""
    plain = {name: value for name, value in content(criteria).items() if name != "checks"}
    for item in criteria.checks:
        body = content(item)
        key = [body.pop(name) for name in ("check", "stage", "surroundings")]
        plain[" ".join(part for part in key if part != "any")] = body
    return plain


def _routes(found: _Found, known: Released, routes: Iterable[RouteAdopted]) -> None:
    labels = {each.label.casefold(): each for each in known.routes.values()}
    for route in routes:
        if route.id in known.routes:
            continue
        before = labels.get(route.label.casefold())
        lines = differences(content(before), content(route), {}) if before is not None else ()
        found.note("route", route.label, "changed" if before is not None else "added", lines)


def _differs(point: PointPlanned, known: Mapping[str, PointPlanned]) -> bool:
    return point.id not in known or content(point) != content(known[point.id])


def _wired_anew(known: Released, new: PlanFacts) -> tuple[CircuitPlanned, ...]:
    """Circuits that are new or changed."""
    return tuple(
        each
        for each in new.circuits
        if each.id not in known.circuits or content(each) != content(known.circuits[each.id])
    )


def _gone(before: Iterable[str], now: Iterable[CircuitPlanned]) -> tuple[str, ...]:
    left = {each.id for each in now}
    return tuple(each for each in before if each not in left)


def _affected(
    found: _Found, known: Released, now: Mapping[str, PointPlanned]
) -> tuple[Affected, ...]:
    """Points that were there and still are, with all that bears on them or on their grids."""
    return tuple(
        Affected(point=point.id, lines=lines)
        for point in known.points.values()
        if point.id in now and (lines := tuple(_bearing(found, point, now[point.id])))
    )


def _bearing(found: _Found, before: PointPlanned, now: PointPlanned) -> Iterator[str]:
    grids = dict.fromkeys(grid.id for grid in (*before.grids, *now.grids))
    lines = (line for each in (now.id, *grids) for line in found.bears.get(each, ()))
    yield from dict.fromkeys(lines)
