"""The size of pages that the plan asks for."""

from __future__ import annotations

from gaugelog.ledger.campaign import CampaignPlanned, CampaignRow, Paper
from gaugelog.ledger.view import View


def paper_of(view: View) -> Paper:
    """The size of the campaign's records and wiring maps; A4 where no plan is loaded."""
    rows = view.all(CampaignRow)
    return CampaignPlanned.model_validate_json(rows[-1].data).paper if rows else "a4"
