"""Deeds about a released plan: draft a revision with its reason, and look at what it touches."""

from __future__ import annotations

import json
from collections.abc import Iterable, Iterator
from contextlib import contextmanager
from sqlite3 import Connection

from gaugelog.errors import Refused
from gaugelog.intake.plan import PlanFacts
from gaugelog.journal.keys import Signer
from gaugelog.ledger.base import FactBody
from gaugelog.ledger.campaign import CampaignRow, PlanReleased
from gaugelog.ledger.points import PointRow
from gaugelog.ledger.preview import preview
from gaugelog.ledger.revisions import (
    ChangeSeen,
    PlanRevised,
    RevisionRow,
    apply_plan_released,
)
from gaugelog.ledger.rows import At, Change, Known
from gaugelog.ledger.view import View
from gaugelog.rules.progress import demand_step, demand_walked, state_of
from gaugelog.rules.who import demand_role, demand_second_person
from gaugelog.work.compared import compared
from gaugelog.work.doing import about, point_row
from gaugelog.work.kept import demand_meaning, demand_reason, name_to_keep
from gaugelog.work.logbook import Deed, Logbook
from gaugelog.work.recognised import recognised, released_plan


def revise(logbook: Logbook, signer: Signer, facts: PlanFacts, *, reason: str) -> PlanRevised:
    """Keep a revision of the released plan as a draft; an earlier draft is replaced.

    What has the label it had keeps its id and its work. Nothing changes for those who work
    until the revision is released. Raises Faulty without a reason, Refused when nothing differs,
    no plan is released, or the one who acts is no planner.
    """
    demand_reason(reason)
    for data in facts.files.values():
        logbook.evidence.put(data)
    with logbook.deed(signer) as deed:
        demand_role(deed.view, signer.person, "planner")
        campaign = released_campaign(deed.view)
        known = released_plan(deed.view, campaign)
        body = compared(known, recognised(facts, known)).model_copy(
            update={
                "revision": campaign.revision + 1,
                "reason": reason,
                "files": {name_to_keep(name): digest for name, digest in facts.digests.items()},
            }
        )
        if not body.changes:
            raise Refused(
                f"These files say what revision {campaign.revision} says already.",
                "Look whether they are the changed ones.",
            )
        deed.keep(body, _concerned(body), evidence=facts.digests.values())
    return body


def drafted(view: View, campaign: CampaignRow) -> RevisionRow | None:
    """The draft of the plan's next revision; None when there is none."""
    return view.get(RevisionRow, f"{campaign.id}/{campaign.revision + 1}")


def changes(logbook: Logbook) -> PlanRevised:
    """The draft of a revision, else the newest that was released, with what it changes.

    Raises Refused when the plan was never revised.
    """
    with logbook.reading() as view:
        rows = view.all(RevisionRow)
    if not rows:
        raise Refused("The plan was never revised.", "See `gaugelog plan show`.")
    return PlanRevised.model_validate_json(max(rows, key=lambda row: row.revision).data)


@contextmanager
def as_released(connection: Connection, row: RevisionRow) -> Iterator[View]:
    """The ledger as it would be if the draft were released."""
    body = PlanReleased(campaign=row.campaign, revision=row.revision, meaning="")

    def released(known: Known) -> Iterator[Change]:
        return apply_plan_released(known, At(row.seq, "", ""), body)

    with preview(connection, released) as view:
        yield view


def see(
    logbook: Logbook, signer: Signer, *, point: str, remark: str, meaning: str, redo_from: str = ""
) -> ChangeSeen:
    """A reviewer has looked at what revisions changed at a point, and lets the work go on.

    Raises Refused when nothing waits there, the reviewer did a step of it, or steps are to be
    done again under an accepted record; Faulty without a remark.
    """
    demand_reason(remark)
    demand_meaning(meaning)
    with logbook.deed(signer) as deed:
        row = point_row(deed.view, point)
        demand_role(deed.view, signer.person, "reviewer")
        demand_second_person(deed.view, signer.person, row.id, "look at its changes")
        _demand_not_own(deed, signer.person)
        if not json.loads(row.touched):
            raise Refused(
                f"No change of the plan waits at {row.label}.", "See `gaugelog plan show`."
            )
        if redo_from:
            _demand_open(deed, row, redo_from)
        body = ChangeSeen(
            point=row.id,
            revision=released_campaign(deed.view).revision,
            remark=remark,
            redo_from=redo_from,
            seen_by=signer.person,
            meaning=meaning,
        )
        deed.keep(body, about(deed.view, row, row.id))
    return body


def released_campaign(view: View) -> CampaignRow:
    """The campaign whose plan is released. Raises Refused when none is."""
    rows = [row for row in view.all(CampaignRow) if row.state == "released"]
    if not rows:
        raise Refused("No plan is released.", "Load one with `gaugelog plan load FOLDER`.")
    return rows[-1]


def _demand_not_own(deed: Deed, person: str) -> None:
    """Raise Refused when the one who looks at a revision released it."""
    last = list(deed.writer.of_kinds([PlanReleased.kind]))[-1:]
    if last and last[0].header.actor == person:
        raise Refused(
            f"{person} released this revision and can't look at its changes.",
            "Have another reviewer look.",
        )


def _demand_open(deed: Deed, row: PointRow, step: str) -> None:
    state = state_of(deed.view, row)
    if state in {"accepted", "awaiting review"}:
        verb = "amend" if state == "accepted" else "return"
        raise Refused(
            f"{row.label} is {state}; no step can be done again now.",
            f"Look without --redo-from, then: gaugelog {verb} {row.label} --redo-from {step} …",
        )
    demand_walked(deed.view, row, demand_step(deed.view, row, step))


def _concerned(body: PlanRevised) -> Iterable[str]:
    bodies: tuple[FactBody, ...] = (*body.points, *body.circuits, *body.routes)
    return [
        body.campaign,
        *(each.id for each in bodies),  # type: ignore[attr-defined]
        *body.dropped_points,
        *body.dropped_circuits,
        *(each.point for each in body.affected),
    ]
