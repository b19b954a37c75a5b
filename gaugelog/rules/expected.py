"""What the criteria expect of a reading beyond its limit: told to the reviewer, never blocking."""

from __future__ import annotations

from collections.abc import Iterator

from gaugelog.ledger.campaign import CampaignRow, CheckCriterion, CriteriaAgreed, CriteriaRow
from gaugelog.ledger.readings import ReadingTaken
from gaugelog.ledger.view import View


def short_of_expected(view: View, campaign: str, reading: ReadingTaken) -> Iterator[str]:
    """A sentence for each expectation of the criteria that a reading does not reach."""
    row = view.get(CampaignRow, campaign)
    criteria = view.get(CriteriaRow, row.criteria) if row is not None else None
    if row is None or criteria is None:
        return
    for item in CriteriaAgreed.model_validate_json(criteria.data).checks:
        asked = (item.check, item.stage) == (reading.check, reading.stage)
        if asked and item.surroundings in {"any", row.surroundings} and is_short(item, reading):
            found = reading.result if item.expected and item.expected.unit == "%" else reading.value
            yield (
                f"{reading.check} {reading.stage}: {found} falls short of the {item.expected} "
                f"expected ({item.source})."
            )


def is_short(item: CheckCriterion, reading: ReadingTaken) -> bool:
    """Whether a value misses what is expected. A bound such as “> 20 GΩ” gets the benefit."""
    expected = item.expected
    if expected is None:
        return False
    found = reading.result if expected.unit == "%" else reading.value
    if found is None:
        return False
    if item.at_least is not None:
        return reading.qualifier != ">" and found.si() < expected.si()
    return reading.qualifier != "<" and abs(found.si()) > expected.si()
