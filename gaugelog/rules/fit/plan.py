"""A plan's rows read once, and how they hang together."""

from __future__ import annotations

from collections import Counter
from dataclasses import dataclass

from gaugelog.ledger.campaign import Article, CampaignPlanned, CampaignRow, Channel, ChannelRow
from gaugelog.ledger.circuits import CircuitPlanned, CircuitRow
from gaugelog.ledger.points import GridRow, PointPlanned, PointRow
from gaugelog.ledger.routes import RouteAdopted, RouteRow
from gaugelog.ledger.standing import StandingRow
from gaugelog.ledger.stock import (
    ConsumableReceived,
    ConsumableRow,
    GaugeRow,
    GridData,
    LotReceived,
    LotRow,
)
from gaugelog.ledger.view import View


@dataclass(frozen=True, slots=True)
class PlannedChannel:
    """A channel with the label people use, `M1/3`, and its module."""

    label: str
    module: str
    channel: Channel


class Plan:
    """Points, grids, lots, routes, circuits and channels of one campaign, by id."""

    def __init__(self, view: View, campaign: CampaignRow) -> None:
        body = CampaignPlanned.model_validate_json(campaign.data)
        self.articles = {article.id: article for article in body.articles}
        gone = _withdrawn(view)
        self.barred = {
            row.id: row.standing for row in view.all(StandingRow) if row.standing != "free"
        }
        """Stock in quarantine or scrapped: its standing by its id."""
        self.points = [
            PointPlanned.model_validate_json(row.data)
            for row in view.all(PointRow, campaign=campaign.id)
            if row.id not in gone
        ]
        self.lots = {row.id: LotReceived.model_validate_json(row.data) for row in view.all(LotRow)}
        self.routes = {
            row.id: RouteAdopted.model_validate_json(row.data) for row in view.all(RouteRow)
        }
        self.point_of_grid = {grid.id: point for point in self.points for grid in point.grids}
        self.grids = [grid for grid in view.all(GridRow) if grid.id in self.point_of_grid]
        self.circuits = [
            CircuitPlanned.model_validate_json(row.data)
            for row in view.all(CircuitRow, campaign=campaign.id)
        ]
        self.channels = {
            row.id: PlannedChannel(row.label, row.module, Channel.model_validate_json(row.data))
            for row in view.all(ChannelRow, campaign=campaign.id)
        }
        self.consumables = {
            row.label.casefold(): ConsumableReceived.model_validate_json(row.data)
            for row in view.all(ConsumableRow)
        }
        self.reels = frozenset(
            label for label, lot in self.consumables.items() if lot.type == "cable"
        )
        """Labels of the cable lots in stock."""
        self.cleaners = tuple(view.all(ConsumableRow, type="cleaner"))
        """The cleaner lots in stock."""
        self.shelf = Counter(
            gauge.lot
            for gauge in view.all(GaugeRow, state="on shelf")
            if self.barred.keys().isdisjoint((gauge.id, gauge.pack, gauge.lot))
        )
        self.taken = frozenset(gauge.point for gauge in view.all(GaugeRow, state="in service"))
        """Points that have their gauge already, in a plan that is revised."""

    def lot_of_grid(self, grid: str) -> LotReceived | None:
        """The lot that a grid is planned from, or None when it is not in stock."""
        point = self.point_of_grid.get(grid)
        return None if point is None else self.lots.get(point.lot)

    def data_of_grid(self, grid: str) -> GridData | None:
        """What the lot's certificate says of a grid, or None when it is not in stock."""
        lot, point = self.lot_of_grid(grid), self.point_of_grid.get(grid)
        if lot is None or point is None:
            return None
        number = next(each.number for each in point.grids if each.id == grid)
        return lot.grid(number)

    def factor_of(self, circuit: CircuitPlanned) -> float | None:
        """The mean gauge factor of a circuit's active grids, as far as they are in stock."""
        active = [each.grid for arm in circuit.arms for each in arm if each.kind == "grid"]
        found = [self.data_of_grid(grid) for grid in active if grid is not None]
        factors = [data.gauge_factor.si() for data in found if data is not None]
        return sum(factors) / len(factors) if factors else None

    def lots_of(self, circuit: CircuitPlanned) -> list[LotReceived]:
        """The lots of a circuit's grids, as far as they are in stock."""
        return [lot for grid in circuit.grids if (lot := self.lot_of_grid(grid)) is not None]

    def points_of(self, circuit: CircuitPlanned) -> list[PointPlanned]:
        """The points whose grids a circuit holds, each once."""
        found = {
            point.id: point
            for grid in circuit.grids
            if (point := self.point_of_grid.get(grid)) is not None
        }
        return list(found.values())

    def article_of(self, point: PointPlanned) -> Article | None:
        """The article a point lies on."""
        return self.articles.get(point.article)


def _withdrawn(view: View) -> set[str]:
    """Points that are no more part of the job: every grid of theirs is withdrawn."""
    states: dict[str, set[str]] = {}
    for grid in view.all(GridRow):
        states.setdefault(grid.point, set()).add(grid.state)
    return {point for point, found in states.items() if found == {"withdrawn"}}
