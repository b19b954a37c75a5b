"""The article a point lies on, and the cleaners that must not touch it."""

from __future__ import annotations

from gaugelog.errors import Refused
from gaugelog.ledger.campaign import Article, CampaignPlanned, CampaignRow
from gaugelog.ledger.points import PointPlanned
from gaugelog.ledger.view import View


def article_of(view: View, planned: PointPlanned) -> Article:
    """The article of a point as planned. Raises Refused when it is not known."""
    campaign = view.get(CampaignRow, planned.campaign)
    articles = CampaignPlanned.model_validate_json(campaign.data).articles if campaign else ()
    for each in articles:
        if each.id == planned.article:
            return each
    raise Refused(f"The article of {planned.label} is not known.", "Check the journal.")


def forbids_cleaner(article: Article, name: str) -> str:
    """What forbids a cleaner of this name on an article, in its own word; empty when nothing does.

    A word of the plan forbids every cleaner whose name holds it: `acetone` also `acetone, pure`.
    """
    plain = name.casefold()
    words = article.surface.forbidden_cleaners
    return next((word for word in words if word.strip() and word.casefold() in plain), "")
