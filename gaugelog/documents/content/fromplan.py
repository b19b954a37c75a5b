"""What the plan and the stock say of a point, gathered from the ledger for its record."""

from __future__ import annotations

from dataclasses import dataclass
from typing import TYPE_CHECKING, TypeVar

from gaugelog.documents.content.installation import (
    ArticleShown,
    CertificateShown,
    ChannelShown,
    CircuitShown,
    ElementShown,
    GaugeShown,
    GridShown,
    LeadsShown,
    PointShown,
)
from gaugelog.errors import Refused
from gaugelog.ledger.base import Quantity
from gaugelog.ledger.campaign import (
    CampaignPlanned,
    CampaignRow,
    Channel,
    ChannelRow,
    CriteriaAgreed,
    CriteriaRow,
    Module,
)
from gaugelog.ledger.circuits import CircuitPlanned, CircuitRow, Element
from gaugelog.ledger.papers import CertificateRow
from gaugelog.ledger.points import GridRow, PointPlanned, PointRow
from gaugelog.ledger.routes import RouteAdopted, RouteRow
from gaugelog.ledger.stock import GaugeRow, LotReceived, LotRow
from gaugelog.physics.validity import OutOfDomain
from gaugelog.rules.layout import layout_of

if TYPE_CHECKING:
    from gaugelog.ledger.view import View

_Row = TypeVar("_Row")


@dataclass(frozen=True, slots=True)
class Planned:
    """A point with everything its plan says, whole."""

    point: PointPlanned
    row: PointRow
    campaign: CampaignPlanned
    revision: int
    criteria: CriteriaAgreed
    route: RouteAdopted
    grids: tuple[GridRow, ...]
    circuits: tuple[CircuitPlanned, ...]

    def subjects(self, kind: str) -> list[tuple[str, str]]:
        """Id and label of each subject of the point's steps: its place, grids or circuits."""
        if kind == "grid":
            return [(grid.id, grid.label) for grid in self.grids]
        if kind == "circuit":
            return [(circuit.id, circuit.label) for circuit in self.circuits]
        return [(self.point.id, self.point.label)]


def planned(view: View, point: str) -> Planned:
    """Gather the plan of the point with this id. Raises Refused when there is none."""
    row = view.get(PointRow, point)
    if row is None:
        raise Refused("There is no such point in this logbook.", "Load the plan first.")
    campaign = needed(view.get(CampaignRow, row.campaign))
    grids = tuple(sorted(view.all(GridRow, point=point), key=lambda grid: grid.number))
    wired = dict.fromkeys(grid.circuit for grid in grids if grid.circuit)
    criteria, route = view.get(CriteriaRow, campaign.criteria), view.get(RouteRow, row.route)
    return Planned(
        point=PointPlanned.model_validate_json(row.data),
        row=row,
        campaign=CampaignPlanned.model_validate_json(campaign.data),
        revision=campaign.revision,
        criteria=CriteriaAgreed.model_validate_json(needed(criteria).data),
        route=RouteAdopted.model_validate_json(needed(route).data),
        grids=grids,
        circuits=tuple(
            CircuitPlanned.model_validate_json(needed(view.get(CircuitRow, circuit)).data)
            for circuit in wired
        ),
    )


def needed(row: _Row | None) -> _Row:
    """The row, which the ledger must have. Raises Refused when it has not."""
    if row is None:
        raise Refused(
            "The ledger lacks something that this point's plan names.",
            "Run `gaugelog journal check`.",
        )
    return row


def article_shown(plan: Planned) -> ArticleShown:
    """The test article and the zone of the point."""
    article = next(each for each in plan.campaign.articles if each.id == plan.point.article)
    zones = {zone.label: zone.description for zone in article.zones}
    return ArticleShown(
        label=article.label,
        description=article.description,
        drawing=article.drawing,
        drawing_revision=article.drawing_revision,
        material=article.material,
        zone=plan.point.zone,
        zone_description=zones.get(plan.point.zone, ""),
        surface=article.surface,
        permits=article.permits,
    )


def point_shown(point: PointPlanned) -> PointShown:
    """What is measured and why, and where."""
    kept = PointShown.model_fields.keys()
    return PointShown.model_validate({name: getattr(point, name) for name in kept})


def grids_shown(view: View, plan: Planned) -> tuple[GridShown, ...]:
    """The grids with their states, and what the certificate of the gauge in place says of each."""
    circuits = {circuit.id: circuit.label for circuit in plan.circuits}
    gauge = view.get(GaugeRow, plan.row.gauge) if plan.row.gauge else None
    lot_row = needed(view.get(LotRow, gauge.lot)) if gauge is not None else None
    lot = LotReceived.model_validate_json(lot_row.data) if lot_row is not None else None
    return tuple(
        GridShown(
            id=grid.id,
            label=grid.label,
            number=grid.number,
            state=grid.state,
            circuit=circuits.get(grid.circuit, ""),
            serves=_serves(view, plan, grid.id) if plan.point.dummy else (),
            **(_figures(lot, grid.number) if lot is not None else {}),
        )
        for grid in plan.grids
    )


def _figures(lot: LotReceived, number: int) -> dict[str, Quantity]:
    data = lot.grid(number)
    return {
        "gauge_factor": data.gauge_factor,
        "gauge_factor_tolerance": data.gauge_factor_tolerance,
        "transverse_sensitivity": data.transverse_sensitivity,
        "angle": data.angle,
    }


def _serves(view: View, plan: Planned, grid: str) -> tuple[str, ...]:
    """The circuits that a dummy is in, by label."""
    rows = view.all(CircuitRow, campaign=plan.campaign.id)
    bodies = (CircuitPlanned.model_validate_json(row.data) for row in rows)
    return tuple(body.label for body in bodies if grid in body.grids)


def gauge_shown(view: View, row: PointRow) -> GaugeShown | None:
    """The gauge in place with its lot's figures; none before one is taken."""
    gauge = view.get(GaugeRow, row.gauge) if row.gauge else None
    if gauge is None:
        return None
    lot = LotReceived.model_validate_json(needed(view.get(LotRow, gauge.lot)).data)
    own = {"id", "label", "generation", "lot", "received_on", "certificates"}
    figures = {name: getattr(lot, name) for name in GaugeShown.model_fields if name not in own}
    return GaugeShown.model_validate(
        {
            **figures,
            "id": gauge.id,
            "label": gauge.label,
            "generation": row.generation,
            "lot": lot.label,
            "received_on": gauge.received_on,
            "certificates": certificates_shown(view, gauge.lot),
        }
    )


def certificates_shown(view: View, item: str, number: str = "") -> tuple[CertificateShown, ...]:
    """The certificates that are kept of a lot, or of an instrument's certificate `number`."""
    rows = view.all(CertificateRow, item=item, number=number)
    return tuple(CertificateShown(name=row.name, sha256=row.file, kept_at=row.at) for row in rows)


def circuit_shown(view: View, plan: Planned, circuit: CircuitPlanned) -> CircuitShown:
    """A circuit with its arms, its leads and its channel."""
    one, two, three, four = (
        tuple(_element(view, element) for element in arm) for arm in circuit.arms
    )
    return CircuitShown(
        id=circuit.id,
        label=circuit.label,
        arrangement=circuit.arrangement,
        layout=_layout(circuit),
        arms=(one, two, three, four),
        leads=LeadsShown(
            wires=circuit.leads.wires,
            length=circuit.leads.length,
            resistance_per_length=circuit.leads.resistance_per_length,
            cable=circuit.leads.cable,
            marks=circuit.leads.marks,
        ),
        channel=_channel(view, plan.campaign.modules, circuit.channel),
    )


def _layout(circuit: CircuitPlanned) -> str:
    try:
        return layout_of(circuit).name
    except OutOfDomain:  # a draft plan that its check refuses
        return ""


def _element(view: View, element: Element) -> ElementShown:
    grid = view.get(GridRow, element.grid) if element.grid else None
    label = grid.label if grid is not None else str(element.resistance or element.kind)
    return ElementShown(kind=element.kind, label=label, inside_module=element.inside_module)


def _channel(view: View, modules: tuple[Module, ...], channel: str) -> ChannelShown:
    row = needed(view.get(ChannelRow, channel))
    body = Channel.model_validate_json(row.data)
    holder = next(module for module in modules if any(channel == c.id for c in module.channels))
    return ChannelShown(
        label=row.label,
        module_type=holder.type,
        module_serial=holder.serial,
        connector=body.connector,
        pins=body.pins,
        excitation=body.excitation,
        excitation_kind=body.excitation_kind,
        range=body.range,
        shunt=body.shunt,
    )
