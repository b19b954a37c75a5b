"""Zeros of a circuit seen in earlier steps, and how its grids answer warmth: from the ledger."""

from __future__ import annotations

import json
from collections.abc import Iterator, Mapping
from datetime import UTC, datetime
from decimal import Decimal

from gaugelog.errors import Refused
from gaugelog.journal.clock import Moment
from gaugelog.ledger.base import Quantity
from gaugelog.ledger.campaign import CampaignPlanned, CampaignRow
from gaugelog.ledger.circuits import CircuitPlanned
from gaugelog.ledger.points import GridRow, PointPlanned, PointRow
from gaugelog.ledger.progress import SETTLED
from gaugelog.ledger.routes import GAUGE_TEMPERATURE, LEAD_TEMPERATURE, ZERO_SEEN, RouteStep
from gaugelog.ledger.steps import Entered, StepRow
from gaugelog.ledger.stock import GaugeRow, LotReceived, LotRow
from gaugelog.ledger.view import View
from gaugelog.rules.drifting import ZeroSeen
from gaugelog.rules.progress import route_for
from gaugelog.rules.warmed import GridWarmth, Warmth
from gaugelog.rules.windows import clock_jumped
from gaugelog.rules.wired import Wired


def zeros_before(
    view: View, point: PointRow, step: RouteStep, subject: str, now: Moment
) -> list[ZeroSeen] | None:
    """Every zero seen on a circuit in an earlier step of the route, in order of time.

    None when the clock was set since one of them: the time between is not known. Raises Refused
    when none was seen.
    """
    found: list[ZeroSeen] = []
    for earlier in _earlier(view, point, step):
        rows = view.all(StepRow, point=point.id, step=earlier.id, subject=subject)
        for row in rows:
            if row.outcome not in SETTLED or row.outcome == "skipped":
                continue
            if clock_jumped(row, now):
                return None
            types = _by_type(earlier, row)
            if ZERO_SEEN in types and GAUGE_TEMPERATURE in types:
                found.append(zero_seen(types[ZERO_SEEN], types, row.observed_at))
    if not found:
        raise Refused(
            f"No zero was seen before “{step.title}” to watch its drift from.",
            "Do the step that begins the watch, or have a planner skip this one.",
        )
    return sorted(found, key=lambda each: each.at)


def zero_seen(zero: Quantity, beside: Mapping[str, Quantity], observed_at: str) -> ZeroSeen:
    """A zero with the temperatures entered beside it.

    The leads are as warm as the gauge where nothing else was entered.
    """
    gauge = beside[GAUGE_TEMPERATURE]
    leads = beside.get(LEAD_TEMPERATURE, gauge)
    when = datetime.fromisoformat(observed_at.replace("Z", "+00:00")).astimezone(UTC)
    step = float(Decimal(1).scaleb(int(Decimal(gauge.value).as_tuple().exponent)))
    return ZeroSeen(when.timestamp(), zero.si(), gauge.si(), leads.si(), step)


def warmth_of(view: View, planned: CircuitPlanned, found: Wired) -> Warmth:
    """How a circuit answers warmth, by the lots of the gauges in place and what they lie on."""
    grids = tuple(_grid(view, grid) for grid in planned.grids)
    return Warmth(found.circuit, grids, found.factor, planned.arrangement, found.poisson)


def _earlier(view: View, point: PointRow, step: RouteStep) -> Iterator[RouteStep]:
    for each in route_for(view, point).steps:
        if each.id == step.id:
            return
        if any(item.type == ZERO_SEEN for item in each.inputs):
            yield each


def _by_type(step: RouteStep, row: StepRow) -> dict[str, Quantity]:
    given = {name: Entered.model_validate(each) for name, each in json.loads(row.data).items()}
    return {
        item.type: quantity
        for item in step.inputs
        if item.name in given and (quantity := given[item.name].quantity) is not None
    }


def _grid(view: View, grid: str) -> GridWarmth:
    row = view.get(GridRow, grid)
    point = view.get(PointRow, row.point) if row is not None else None
    gauge = view.get(GaugeRow, point.gauge) if point is not None and point.gauge else None
    lot_row = view.get(LotRow, gauge.lot) if gauge is not None else None
    if row is None or point is None or lot_row is None:
        raise Refused("A grid of this circuit has no gauge yet.", "Do its first steps first.")
    lot = LotReceived.model_validate_json(lot_row.data)
    factor = lot.grid(row.number).gauge_factor.si()
    with_ = factor if lot.thermal_output_factor is None else float(lot.thermal_output_factor)
    matched = None if lot.expansion_class is None else lot.expansion_class.si()
    curve = tuple(float(each) * 1e-6 for each in lot.thermal_output)
    planned = PointPlanned.model_validate_json(point.data)
    return GridWarmth(
        row.label, lot.label, curve, with_, factor, _expansion(view, planned), matched
    )


def _expansion(view: View, planned: PointPlanned) -> float:
    campaign = view.get(CampaignRow, planned.campaign)
    articles = CampaignPlanned.model_validate_json(campaign.data).articles if campaign else ()
    for article in articles:
        if article.id == planned.article:
            return article.material.expansion.si()
    raise Refused("The article of this point is not known.", "Check the journal.")
