"""The photos of a point, gathered from the ledger for its record."""

from __future__ import annotations

from typing import TYPE_CHECKING

from gaugelog.documents.content.fromplan import Planned
from gaugelog.documents.content.fromwork import entered
from gaugelog.documents.content.workdone import PhotoShown
from gaugelog.ledger.photos import PhotoKept, PhotoRow
from gaugelog.ledger.steps import StepRow
from gaugelog.ledger.stock import GaugeRow

if TYPE_CHECKING:
    from gaugelog.ledger.view import View


def photos_shown(view: View, plan: Planned) -> tuple[PhotoShown, ...]:
    """Every photo of the point, those of its circuits' steps among them, as they were entered."""
    found = {row.id: row for row in view.all(PhotoRow, point=plan.point.id)}
    for each in _entered(view, plan):
        row = view.get(PhotoRow, each)
        if row is not None:
            found.setdefault(row.id, row)
    ordered = sorted(found.values(), key=lambda row: (row.seq, row.id))
    return tuple(_shown(view, plan, row) for row in ordered)


def _entered(view: View, plan: Planned) -> list[str]:
    """Ids of the photos in the point's steps: a step on a circuit is done once for all its points.

    The photo is kept at the point where the step was done.
    """
    asked = {
        (step.id, item.name)
        for step in plan.route.steps
        for item in step.inputs
        if item.kind == "photo"
    }
    return [
        answer.id
        for row in view.all(StepRow, point=plan.point.id)
        for name, answer in entered(row).items()
        if (row.step, name) in asked and answer.id
    ]


def _shown(view: View, plan: Planned, row: PhotoRow) -> PhotoShown:
    fact = PhotoKept.model_validate_json(row.data)
    titles = {step.id: step.title for step in plan.route.steps}
    labels = dict(plan.subjects("grid") + plan.subjects("circuit"))
    return PhotoShown(
        id=fact.id,
        step=titles.get(fact.step, fact.step),
        subject=labels.get(fact.subject or "", ""),
        readings=fact.readings,
        earlier_gauge=_earlier_gauge(view, plan, fact),
        name=fact.name,
        format=fact.format,
        width=fact.width,
        height=fact.height,
        size=fact.size,
        sha256=fact.file,
        note=fact.note,
        observed_at=fact.observed_at,
        kept_by=fact.kept_by,
        entered_at=row.entered_at,
    )


def _earlier_gauge(view: View, plan: Planned, fact: PhotoKept) -> str:
    if fact.point != plan.point.id or fact.gauge is None or fact.gauge == plan.row.gauge:
        return ""
    gauge = view.get(GaugeRow, fact.gauge)
    return gauge.label if gauge is not None else fact.gauge
