"""Output: the largest strain against the channel's range, the likely zero against its balance."""

from __future__ import annotations

from collections.abc import Iterator

from gaugelog.ledger.campaign import Channel
from gaugelog.ledger.circuits import CircuitPlanned
from gaugelog.ledger.stock import LotReceived
from gaugelog.physics.arrangements import ARRANGEMENTS
from gaugelog.physics.bridge import strain_output
from gaugelog.rules.fit.finding import Level, PlanFinding
from gaugelog.rules.fit.plan import Plan

OUTPUT_SOURCE = "exact output of the arrangement, Dally and Riley (from memory)"
OFFSET_SOURCE = "lot tolerance in each arm with a grid, ΔR/(4 R), in quadrature"


def output_findings(plan: Plan) -> Iterator[PlanFinding]:
    """Each circuit's output and likely zero."""
    for circuit in plan.circuits:
        channel, lots = plan.channels.get(circuit.channel), plan.lots_of(circuit)
        if channel is None or not lots or circuit.arrangement not in ARRANGEMENTS:
            continue
        yield from _range(plan, circuit, channel.channel, lots[0])
        yield from _balance(circuit, channel.channel, lots[0])


def _range(
    plan: Plan, circuit: CircuitPlanned, channel: Channel, lot: LotReceived
) -> Iterator[PlanFinding]:
    points = plan.points_of(circuit)
    article = plan.article_of(points[0])
    if article is None:
        yield PlanFinding("refusal", circuit.label, "the article of its first point is not known")
        return
    poisson = article.material.poisson_ratio.si()
    strains = [value.si() for point in points for value in (point.strain_min, point.strain_max)]
    factor = plan.factor_of(circuit) or lot.grids[0].gauge_factor.si()
    outputs = [
        abs(float(strain_output(strain, factor, circuit.arrangement, poisson)))
        for strain in strains
    ]
    largest, span = max(outputs), channel.range
    level: Level = "refusal" if largest > span.si() else "ok"
    word = "exceeds" if level == "refusal" else "lies within"
    figure = f"{largest * 1e3:.3g} mV/V of ±{span}"
    what = f"the output at its largest strain {word} the channel's range"
    yield PlanFinding(level, circuit.label, what, figure, OUTPUT_SOURCE)


def _balance(circuit: CircuitPlanned, channel: Channel, lot: LotReceived) -> Iterator[PlanFinding]:
    if channel.balance_range is None:
        return
    arms = sum(any(element.grid is not None for element in arm) for arm in circuit.arms)
    likely = lot.resistance_tolerance.si() / 4 * arms**0.5
    level: Level = "warning" if likely > channel.balance_range.si() else "ok"
    word = "may exceed" if level == "warning" else "lies within"
    figure = f"±{likely * 1e3:.3g} mV/V of ±{channel.balance_range}"
    what = f"the zero that the lot's tolerance allows {word} the balance range"
    yield PlanFinding(level, circuit.label, what, figure, OFFSET_SOURCE)
