"""Supply: the power in each grid against what its article carries off."""

from __future__ import annotations

from collections.abc import Iterator

from gaugelog.ledger.campaign import Article, Channel
from gaugelog.ledger.circuits import CircuitPlanned
from gaugelog.ledger.stock import LotReceived
from gaugelog.physics.excitation import (
    HEAT_SINKS,
    HeatSink,
    current_power,
    grid_power,
    largest_supply,
    power_density,
)
from gaugelog.rules.fit.arms import OPPOSED, arm_of, nominal_arm
from gaugelog.rules.fit.finding import Level, PlanFinding
from gaugelog.rules.fit.plan import Plan

SOURCE = "V²/(4 R A) of an equal-arm bridge; heat-sink classes are common practice"


def supply_findings(plan: Plan) -> Iterator[PlanFinding]:
    """Each grid's power density against its article's heat-sink class or limit."""
    for circuit in plan.circuits:
        channel = plan.channels.get(circuit.channel)
        if channel is None:
            continue
        found: dict[PlanFinding, None] = {}
        for grid in dict.fromkeys(circuit.grids):
            point, lot = plan.point_of_grid.get(grid), plan.lot_of_grid(grid)
            article = plan.article_of(point) if point is not None else None
            if lot is not None and article is not None:
                beside = _beside(plan, circuit, grid, lot)
                found |= dict.fromkeys(_power(circuit.label, channel.channel, lot, article, beside))
        yield from found


def _beside(plan: Plan, circuit: CircuitPlanned, grid: str, lot: LotReceived) -> float:
    """All that stands in series with a grid between the supply's pins, nominally, ohm."""
    own = arm_of(circuit, grid)
    arms = [nominal_arm(plan, circuit, number) for number in (own, OPPOSED[own])]
    nominal = lot.nominal_resistance.si()
    known = [arm for arm in arms if arm is not None]
    return sum(known) - nominal if len(known) == len(arms) else nominal


def heat_sink_of(article: Article) -> HeatSink | None:
    """The heat-sink class of an article's material, or its own limit where one is given."""
    material = article.material
    if material.heat_sink_limit is not None:
        limit = material.heat_sink_limit.si()
        return HeatSink(material.heat_sink or material.name, limit, limit)
    return HEAT_SINKS.get(material.heat_sink)


def _power(
    label: str, channel: Channel, lot: LotReceived, article: Article, beside: float
) -> Iterator[PlanFinding]:
    sink = heat_sink_of(article)
    if sink is None:
        known = ", ".join(HEAT_SINKS)
        what = f"no heat-sink class is given for {article.label}, so its supply is not judged"
        yield PlanFinding("warning", label, what, "", f"classes: {known}")
        return
    grid = lot.nominal_resistance.si()
    length, width = lot.grid_length.si(), lot.grid_width.si()
    power = _grid_power(channel, grid, beside)
    density = float(power_density(power, length, width))
    largest = float(largest_supply(sink.most, grid, length, width, beside))
    figure = (
        f"{power * 1e3:.4g} mW, {density / 1e3:.3g} kW/m² on {sink.name}, "
        f"at most {sink.most / 1e3:.3g} kW/m² or {largest:.2f} V"
    )
    level, what = _word(density, sink)
    yield PlanFinding(level, label, f"{what} at {channel.excitation}", figure, SOURCE)


def _grid_power(channel: Channel, grid: float, beside: float) -> float:
    if channel.excitation.unit == "mA":
        return float(current_power(channel.excitation.si() / 2, grid))
    return float(grid_power(channel.excitation.si(), grid, beside))


def _word(density: float, sink: HeatSink) -> tuple[Level, str]:
    if density > sink.most:
        return "refusal", "the grid gets too hot"
    if density > sink.steady:
        return "warning", "the grid gets warm: watch the zero as the supply rises"
    return "ok", "the article carries the grid's heat off"
