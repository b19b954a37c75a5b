"""How a record came about: earlier revisions, what was returned, refused or taken up again."""

from __future__ import annotations

from typing import TYPE_CHECKING

from gaugelog.documents.content.fromplan import Planned
from gaugelog.documents.content.workdone import AmendsShown, TurnShown
from gaugelog.ledger.story import StoryRow
from gaugelog.rules.amended import under_amendment

if TYPE_CHECKING:
    from gaugelog.ledger.view import View


def amends_shown(view: View, plan: Planned) -> AmendsShown | None:
    """The accepted record that the next one takes the place of; None when there is none."""
    amended = under_amendment(view, plan.point.id)
    if amended is None:
        return None
    opened = [
        row
        for row in view.all(StoryRow, point=plan.point.id, turn="amendment")
        if row.revision == amended.revision
    ]
    by = opened[-1].by if opened else amended.accepted_by
    return AmendsShown(revision=amended.revision, reason=amended.reason, by=by)


def story_shown(view: View, plan: Planned) -> tuple[TurnShown, ...]:
    """Every turn in the story of the point, in order."""
    titles = {step.id: step.title for step in plan.route.steps}
    return tuple(
        TurnShown(
            at=row.at,
            turn=row.turn,
            revision=row.revision,
            step=titles.get(row.step, row.step),
            by=row.by,
            reason=row.reason,
        )
        for row in view.all(StoryRow, point=plan.point.id)
    )
