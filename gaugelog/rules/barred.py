"""Stock that must not be used: in quarantine or scrapped, itself or with its pack or lot."""

from __future__ import annotations

from gaugelog.errors import Refused
from gaugelog.ledger.points import PointRow
from gaugelog.ledger.standing import StandingRow
from gaugelog.ledger.stock import GaugeRow
from gaugelog.ledger.view import View


def why_barred(view: View, *ids: str) -> str:
    """Why none of these may be used, `lot L-3504 is quarantined: reason`; empty when all may."""
    for each in ids:
        row = view.get(StandingRow, each)
        if row is not None and row.standing != "free":
            return f"{row.item_kind} {row.label} is {row.standing}: {row.reason}"
    return ""


def why_gauge_barred(view: View, gauge: GaugeRow) -> str:
    """Why a piece may not be used, by its own standing, its pack's or its lot's."""
    return why_barred(view, gauge.id, gauge.pack, gauge.lot)


def why_place_barred(view: View, point: PointRow) -> str:
    """Why work on the gauge in place must rest: it is in quarantine, by itself or with others.

    What was scrapped later is what is left on the shelf; it does not bear on a gauge in service.
    """
    gauge = view.get(GaugeRow, point.gauge) if point.gauge else None
    if gauge is None:
        return ""
    rows = [view.get(StandingRow, each) for each in (gauge.id, gauge.pack, gauge.lot)]
    held = [row for row in rows if row is not None and row.standing == "quarantined"]
    return why_barred(view, held[0].id) if held else ""


def demand_place_free(view: View, point: PointRow) -> None:
    """Raise Refused while the gauge in place is in quarantine."""
    barred = why_place_barred(view, point)
    if barred:
        raise Refused(f"{point.label}: {barred.rstrip('.')}.", "Have it freed, or replace it.")
