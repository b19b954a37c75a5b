"""What the plan says of the step in hand: permits, lot, place, wiring. Read at the article."""

from __future__ import annotations

from collections.abc import Iterator

from gaugelog.ledger.campaign import CampaignPlanned, CampaignRow, Channel, ChannelRow
from gaugelog.ledger.circuits import CircuitPlanned, CircuitRow
from gaugelog.ledger.points import PointPlanned, PointRow
from gaugelog.ledger.routes import AXIS, PLACE_X, PLACE_Y, RouteStep
from gaugelog.ledger.stock import GaugeRow, LotRow
from gaugelog.ledger.view import View
from gaugelog.rules.article import article_of
from gaugelog.rules.barred import why_gauge_barred

_MOST_PIECES = 5


def plan_facts(view: View, row: PointRow, step: RouteStep, subject: str, number: int) -> list[str]:
    """The plan's facts that a person needs for a step, a line each; `number` counts from 1."""
    planned = PointPlanned.model_validate_json(row.data)
    facts: list[str] = []
    if number == 1:
        facts += _permits(view, planned)
    if any(item.kind == "gauge" for item in step.inputs):
        facts += _gauges(view, row)
    if any(item.type == "cleaner" for item in step.inputs):
        facts += _cleaners(view, planned)
    if step.qualification:
        facts.append(f"qualification: {step.qualification}")
    if step.hold or any(item.type in {PLACE_X, PLACE_Y, AXIS} for item in step.inputs):
        facts += _place(planned)
    circuit = view.get(CircuitRow, subject)
    if circuit is not None:
        facts += _wiring(view, CircuitPlanned.model_validate_json(circuit.data))
    return facts


def _permits(view: View, planned: PointPlanned) -> Iterator[str]:
    campaign = view.get(CampaignRow, planned.campaign)
    if campaign is None:
        return
    for article in CampaignPlanned.model_validate_json(campaign.data).articles:
        if article.id == planned.article:
            yield f"article {article.label}: {article.description}, drawing {article.drawing}"
            yield from (f"permit: {permit}" for permit in article.permits)


def _gauges(view: View, row: PointRow) -> Iterator[str]:
    lot = view.get(LotRow, row.lot)
    if lot is None:
        return
    shelf = view.all(GaugeRow, lot=row.lot, state="on shelf")
    free = [gauge.label for gauge in shelf if not why_gauge_barred(view, gauge)]
    more = f" and {len(free) - _MOST_PIECES} more" if len(free) > _MOST_PIECES else ""
    yield f"lot {lot.label}, {lot.type}; on the shelf: {', '.join(free[:_MOST_PIECES])}{more}"


def _cleaners(view: View, planned: PointPlanned) -> Iterator[str]:
    """The plan forbids by kind as well as by name, so the person reads what it says."""
    article = article_of(view, planned)
    for word in article.surface.forbidden_cleaners:
        yield f"forbidden on {article.label}: {word}"


def _place(planned: PointPlanned) -> Iterator[str]:
    place = planned.place
    yield f"place: x {place.x}, y {place.y} (± {place.tolerance}) from {place.datum}"
    yield f"side: {place.side}"
    yield f"axis: {place.angle} (± {place.angle_tolerance}) from {place.axis}"


def _wiring(view: View, circuit: CircuitPlanned) -> Iterator[str]:
    row = view.get(ChannelRow, circuit.channel)
    if row is None:
        return
    channel = Channel.model_validate_json(row.data)
    where = f", connector {channel.connector}" if channel.connector else ""
    yield f"circuit {circuit.label}: {circuit.arrangement}, channel {row.label}{where}"
    for function in dict.fromkeys([*channel.pins, *circuit.leads.marks]):
        pin, mark = channel.pins.get(function, ""), circuit.leads.marks.get(function, "")
        parts = [f"pin {pin}" if pin else "", f"wire {mark}" if mark else ""]
        yield f"  {function}: {', '.join(part for part in parts if part)}"
