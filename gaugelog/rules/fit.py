"""Does the plan fit: lots, routes, circuits, channels. Each finding with its figure and source."""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterator
from dataclasses import dataclass
from typing import Literal

from gaugelog.ledger.campaign import CampaignRow, Channel, ChannelRow
from gaugelog.ledger.circuits import CircuitPlanned, CircuitRow
from gaugelog.ledger.points import GridRow, PointPlanned, PointRow
from gaugelog.ledger.routes import RouteRow
from gaugelog.ledger.stock import GaugeRow, LotReceived, LotRow
from gaugelog.ledger.view import View
from gaugelog.physics.arrangements import ARRANGEMENTS
from gaugelog.physics.layouts import layout_for
from gaugelog.physics.leads import sensitivity_loss
from gaugelog.physics.validity import OutOfDomain

Level = Literal["ok", "warning", "refusal"]


@dataclass(frozen=True, slots=True)
class PlanFinding:
    """One thing found about the plan: about what, what, the figure that decided, its source."""

    level: Level
    subject: str
    what: str
    figure: str = ""
    source: str = ""


def check_plan(view: View, campaign: CampaignRow) -> list[PlanFinding]:
    """Everything found about a campaign's plan, refusals first."""
    plan = _Plan(view, campaign)
    found = [
        *_points(plan),
        *_stock(plan),
        *_grids(plan),
        *_channels(plan),
        *_circuits(plan),
    ]
    order = {"refusal": 0, "warning": 1, "ok": 2}
    return sorted(found, key=lambda finding: order[finding.level])


class _Plan:
    """The plan's rows, read once."""

    def __init__(self, view: View, campaign: CampaignRow) -> None:
        self.points = view.all(PointRow, campaign=campaign.id)
        self.planned = {row.id: PointPlanned.model_validate_json(row.data) for row in self.points}
        self.lots = {row.id: LotReceived.model_validate_json(row.data) for row in view.all(LotRow)}
        self.routes = {row.id: row.label for row in view.all(RouteRow)}
        self.grids = [grid for grid in view.all(GridRow) if grid.point in self.planned]
        self.circuits = [
            CircuitPlanned.model_validate_json(row.data)
            for row in view.all(CircuitRow, campaign=campaign.id)
        ]
        self.channels = {
            row.id: (row.label, Channel.model_validate_json(row.data))
            for row in view.all(ChannelRow, campaign=campaign.id)
        }
        self.shelf = Counter(gauge.lot for gauge in view.all(GaugeRow, state="on shelf"))

    def lot_of_grid(self, grid: str) -> LotReceived | None:
        """The lot that a grid is planned from."""
        point = next((each.point for each in self.grids if each.id == grid), None)
        return None if point is None else self.lots.get(self.planned[point].lot)

    def label_of_grid(self, grid: str) -> str:
        """A grid's label."""
        return next((each.label for each in self.grids if each.id == grid), grid)


def _points(plan: _Plan) -> Iterator[PlanFinding]:
    if not plan.points:
        yield PlanFinding("refusal", "plan", "has no point")
    for row in plan.points:
        planned = plan.planned[row.id]
        if row.lot not in plan.lots:
            yield PlanFinding("refusal", row.label, "its gauge lot is not in stock")
        if row.route not in plan.routes:
            yield PlanFinding("refusal", row.label, "its route is not known")
        if planned.permitted_error.si() <= 0:
            figure = str(planned.permitted_error)
            yield PlanFinding("refusal", row.label, "its permitted error must be above 0", figure)
        if planned.strain_min.si() > planned.strain_max.si():
            figure = f"{planned.strain_min} to {planned.strain_max}"
            yield PlanFinding("refusal", row.label, "its strain range is upside down", figure)
        yield from _strain_limit(row, planned, plan.lots.get(row.lot))


def _strain_limit(
    row: PointRow, planned: PointPlanned, lot: LotReceived | None
) -> Iterator[PlanFinding]:
    if lot is None or lot.strain_limit is None:
        return
    largest = max(abs(planned.strain_min.si()), abs(planned.strain_max.si()))
    figure = f"{largest * 1e6:.0f} µm/m of {lot.strain_limit}"
    level: Level = "refusal" if largest > lot.strain_limit.si() else "ok"
    word = "exceeds" if level == "refusal" else "lies within"
    yield PlanFinding(level, row.label, f"its strain {word} the lot's limit", figure, "lot's sheet")


def _stock(plan: _Plan) -> Iterator[PlanFinding]:
    wanted = Counter(row.lot for row in plan.points if row.lot in plan.lots)
    for lot, count in wanted.items():
        there = plan.shelf[lot]
        label = f"lot {plan.lots[lot].label}"
        figure = f"{count} wanted, {there} on the shelf"
        if there < count:
            yield PlanFinding("refusal", label, "stock is short", figure)
        elif there == count:
            yield PlanFinding("warning", label, "no gauge is spare", figure)
        else:
            yield PlanFinding("ok", label, "stock suffices", figure)


def _grids(plan: _Plan) -> Iterator[PlanFinding]:
    used = Counter(grid for circuit in plan.circuits for grid in circuit.grids)
    for grid in plan.grids:
        if used[grid.id] == 0:
            yield PlanFinding("refusal", grid.label, "is in no circuit")
        elif used[grid.id] > 1:
            figure = f"{used[grid.id]} circuits"
            yield PlanFinding("refusal", grid.label, "is in more than one circuit", figure)


def _channels(plan: _Plan) -> Iterator[PlanFinding]:
    used: dict[str, list[str]] = {}
    for circuit in plan.circuits:
        used.setdefault(circuit.channel, []).append(circuit.label)
    for channel, circuits in used.items():
        label, _ = plan.channels.get(channel, ("?", None))
        if label == "?":
            yield PlanFinding("refusal", ", ".join(circuits), "its channel is not known")
        elif len(circuits) > 1:
            what = f"is used by {', '.join(circuits)}"
            yield PlanFinding("refusal", f"channel {label}", what, f"{len(circuits)} circuits")


def _circuits(plan: _Plan) -> Iterator[PlanFinding]:
    for circuit in plan.circuits:
        yield from _arrangement(circuit)
        yield from _completion(plan, circuit)
        yield from _leads(plan, circuit)


def _arrangement(circuit: CircuitPlanned) -> Iterator[PlanFinding]:
    chosen = ARRANGEMENTS.get(circuit.arrangement)
    if chosen is None:
        known = ", ".join(ARRANGEMENTS)
        yield PlanFinding("refusal", circuit.label, f"its arrangement is not one of {known}")
        return
    try:
        layout_for(circuit.arrangement, circuit.leads.wires)
    except OutOfDomain as error:
        yield PlanFinding("refusal", circuit.label, error.message, f"{circuit.leads.wires} wires")
    for number, (arm, active) in enumerate(zip(circuit.arms, chosen.active, strict=True), start=1):
        has_grid = any(element.kind == "grid" for element in arm)
        if active != has_grid:
            what = f"arm {number} must {'' if active else 'not '}hold a grid"
            yield PlanFinding("refusal", circuit.label, what, circuit.arrangement)


def _completion(plan: _Plan, circuit: CircuitPlanned) -> Iterator[PlanFinding]:
    lots = [lot for grid in circuit.grids if (lot := plan.lot_of_grid(grid)) is not None]
    if not lots:
        return
    nominal = lots[0].nominal_resistance
    for number, arm in enumerate(circuit.arms, start=1):
        for element in arm:
            value = element.resistance
            if element.kind != "completion" or value is None or value.si() == nominal.si():
                continue
            figure = f"{value} against {nominal}"
            what = f"the completion in arm {number} is not the gauge's nominal resistance"
            yield PlanFinding("refusal", circuit.label, what, figure)
    _, channel = plan.channels.get(circuit.channel, ("", None))
    if channel is not None and channel.completion is not None:
        same = channel.completion.si() == nominal.si()
        level: Level = "ok" if same else "refusal"
        what = "the channel completes for " + ("this gauge" if same else "another gauge")
        yield PlanFinding(level, circuit.label, what, f"{channel.completion} for {nominal}")


def _leads(plan: _Plan, circuit: CircuitPlanned) -> Iterator[PlanFinding]:
    lots = [lot for grid in circuit.grids if (lot := plan.lot_of_grid(grid)) is not None]
    wire = circuit.leads.resistance_per_length.si() * circuit.leads.length.si()
    if not lots or circuit.arrangement not in ARRANGEMENTS:
        return
    try:
        layout = layout_for(circuit.arrangement, circuit.leads.wires).name
    except OutOfDomain:
        return
    lost = float(sensitivity_loss(layout, lots[0].nominal_resistance.si(), wire))
    figure = f"{100 * lost:.2f} %, {wire:.3g} Ω a wire"
    level: Level = "warning" if lost > 0.02 else "ok"
    what = "lead wires take sensitivity" + ("; correct for it" if level == "warning" else "")
    yield PlanFinding(level, circuit.label, what, figure, "R/(R + n RL), Dally and Riley")
