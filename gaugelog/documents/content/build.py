"""The record of a point, gathered from the ledger at one head."""

from __future__ import annotations

import json
from typing import TYPE_CHECKING

from gaugelog import __version__
from gaugelog.documents.content.frombudget import budget_shown
from gaugelog.documents.content.fromphotos import photos_shown
from gaugelog.documents.content.fromplan import (
    Planned,
    article_shown,
    circuit_shown,
    gauge_shown,
    grids_shown,
    planned,
    point_shown,
)
from gaugelog.documents.content.fromwork import (
    consumables_shown,
    instruments_shown,
    readings_shown,
    steps_shown,
)
from gaugelog.documents.content.model import (
    CampaignShown,
    CriteriaShown,
    Drawn,
    PersonShown,
    RecordContent,
    RouteShown,
    SigningShown,
)
from gaugelog.documents.content.pointstory import amends_shown, story_shown
from gaugelog.documents.content.workdone import ReadingShown, StepShown, TurnShown
from gaugelog.ledger.people import PersonRow

if TYPE_CHECKING:
    from gaugelog.ledger.view import View
    from gaugelog.work.ports import RecordRequest


def build(view: View, request: RecordRequest, submitted_by: str | None = None) -> RecordContent:
    """The content of the record of `request.point` as the ledger is now.

    `submitted_by` is the id of the technician who signs it; without one it is a draft. Raises
    Refused when there is no such point.
    """
    plan = planned(view, request.point)
    steps, readings = steps_shown(view, plan), readings_shown(view, plan)
    story, photos = story_shown(view, plan), photos_shown(view, plan)
    instruments = instruments_shown(view, plan)
    given = [(photo.kept_by, "photos") for photo in photos]
    given += [(check.checked_by, "meter checks") for each in instruments for check in each.checks]
    return RecordContent(
        number=f"{plan.campaign.label}-{plan.point.label}-R{request.revision}",
        revision=request.revision,
        state="draft" if submitted_by is None else "submitted",
        amends=amends_shown(view, plan),
        drawn=_drawn(request),
        campaign=_campaign(plan),
        criteria=_criteria(plan),
        article=article_shown(plan),
        point=point_shown(plan.point),
        grids=grids_shown(view, plan),
        gauge=gauge_shown(view, plan.row),
        circuits=tuple(circuit_shown(view, plan, circuit) for circuit in plan.circuits),
        route=_route(plan),
        steps=steps,
        readings=readings,
        photos=photos,
        budget=budget_shown(view, plan.row),
        story=story,
        instruments=instruments,
        consumables=consumables_shown(view, plan),
        people=_people(view, _parts(steps, readings, story, given, submitted_by)),
        signing=_signing(view, request, submitted_by),
        cautions=_cautions(plan),
    )


def _drawn(request: RecordRequest) -> Drawn:
    return Drawn(
        at=request.moment.text,
        offset=request.moment.offset,
        head=request.head,
        program=f"Gaugelog {__version__}",
    )


def _campaign(plan: Planned) -> CampaignShown:
    job = plan.campaign
    return CampaignShown(
        label=job.label,
        title=job.title,
        client=job.client,
        installer=job.installer,
        contract=job.contract,
        document=job.document,
        site=job.site,
        surroundings=job.surroundings,
        plan_revision=plan.revision,
    )


def _criteria(plan: Planned) -> CriteriaShown:
    names = CriteriaShown.model_fields
    return CriteriaShown.model_validate({name: getattr(plan.criteria, name) for name in names})


def _route(plan: Planned) -> RouteShown:
    names = RouteShown.model_fields
    return RouteShown.model_validate({name: getattr(plan.route, name) for name in names})


def _parts(
    steps: tuple[StepShown, ...],
    readings: tuple[ReadingShown, ...],
    story: tuple[TurnShown, ...],
    given: list[tuple[str, str]],
    submitted_by: str | None,
) -> dict[str, list[str]]:
    """What each person did, in the order they came in."""
    did = [(step.by, "holds" if step.hold else "steps") for step in steps if step.by]
    did += [(reading.observed_by, "readings") for reading in readings]
    did += [
        (each.entered_by, "entries") for each in readings if each.entered_by != each.observed_by
    ]
    did += [(turn.by, "story") for turn in story]
    did += given
    if submitted_by is not None:
        did.append((submitted_by, "submission"))
    parts: dict[str, list[str]] = {}
    for person, part in did:
        known = parts.setdefault(person, [])
        if part not in known:
            known.append(part)
    return parts


def _people(view: View, parts: dict[str, list[str]]) -> tuple[PersonShown, ...]:
    return tuple(_person(view, person, tuple(part)) for person, part in parts.items())


def _person(view: View, person: str, part: tuple[str, ...]) -> PersonShown:
    row, sheet = view.get(PersonRow, person), view.identity(person)
    return PersonShown.model_validate(
        {
            "id": person,
            "name": sheet.name if sheet else "name erased",
            "initials": sheet.initials if sheet else "",
            "roles": json.loads(row.roles) if row else [],
            "qualifications": json.loads(row.qualifications) if row else [],
            "part": part,
        }
    )


def _signing(view: View, request: RecordRequest, person: str | None) -> SigningShown | None:
    if person is None:
        return None
    sheet = view.identity(person)
    name = sheet.name if sheet else person
    return SigningShown(person=person, name=name, meaning=request.meaning)


def _cautions(plan: Planned) -> tuple[str, ...]:
    article = article_shown(plan)
    steps = (caution for step in plan.route.steps for caution in step.cautions)
    return tuple(dict.fromkeys((*article.permits, *steps)))
