"""The plan that is there: the campaign loaded last, in draft or released."""

from __future__ import annotations

from gaugelog.errors import Refused
from gaugelog.ledger.campaign import CampaignRow
from gaugelog.ledger.view import View


def latest_campaign(view: View) -> CampaignRow | None:
    """The campaign loaded last, or None before the first."""
    rows = view.all(CampaignRow)
    return rows[-1] if rows else None


def planned_campaign(view: View) -> CampaignRow:
    """The campaign loaded last. Raises Refused when no plan is loaded."""
    found = latest_campaign(view)
    if found is None:
        raise Refused("No plan is loaded.", "Load one with `gaugelog plan load FOLDER`.")
    return found
