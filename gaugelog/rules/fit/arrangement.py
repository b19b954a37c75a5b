"""Arrangements: the arms hold what they must, with as many wires as they need."""

from __future__ import annotations

from collections.abc import Iterator

from gaugelog.ledger.circuits import CircuitPlanned, Element
from gaugelog.physics.arrangements import ARRANGEMENTS, Arrangement
from gaugelog.physics.layouts import Layout
from gaugelog.physics.validity import OutOfDomain
from gaugelog.rules.fit.arms import nominal_arm
from gaugelog.rules.fit.finding import Level, PlanFinding
from gaugelog.rules.fit.plan import Plan
from gaugelog.rules.layout import layout_of

FACTORS_APART = 0.01
"""Part of the mean factor that one grid's may differ by before it is warned of.

About the tolerance that lots are sold with; common practice.
"""


def arrangement_findings(plan: Plan) -> Iterator[PlanFinding]:
    """Each circuit's arms, wires, completion and factors."""
    for circuit in plan.circuits:
        yield from _arrangement(circuit)
        yield from _alike(plan, circuit)
        yield from _completion(plan, circuit)
        yield from _factors(plan, circuit)


def _arrangement(circuit: CircuitPlanned) -> Iterator[PlanFinding]:
    chosen = ARRANGEMENTS.get(circuit.arrangement)
    if chosen is None:
        known = ", ".join(ARRANGEMENTS)
        yield PlanFinding("refusal", circuit.label, f"its arrangement is not one of {known}")
        return
    try:
        layout = layout_of(circuit)
    except OutOfDomain as error:
        yield PlanFinding("refusal", circuit.label, error.message, f"{circuit.leads.wires} wires")
        return
    for number, arm in enumerate(circuit.arms, start=1):
        for what in _arm(chosen, layout, number, arm):
            yield PlanFinding("refusal", circuit.label, what, circuit.arrangement)


def _arm(
    chosen: Arrangement, layout: Layout, number: int, arm: tuple[Element, ...]
) -> Iterator[str]:
    """What an arm holds that it must not, or lacks."""
    kinds = {element.kind for element in arm}
    active, outside = chosen.active[number - 1], number in layout.outside
    dummy = chosen.kind == "half" and outside and not active
    if active != ("grid" in kinds):
        yield f"arm {number} must {'' if active else 'not '}hold a grid"
    if dummy and "dummy" not in kinds:
        yield f"arm {number} must hold a dummy"
    if "dummy" in kinds and (active or not outside):
        yield f"arm {number} must not hold a dummy"
    if outside and any(element.inside_module for element in arm):
        yield f"arm {number} lies at the article and can't hold a resistor of the module"


def _alike(plan: Plan, circuit: CircuitPlanned) -> Iterator[PlanFinding]:
    """Arms 1 and 2, and arms 3 and 4, must be of one nominal resistance, or nothing balances."""
    for one, other in ((1, 2), (3, 4)):
        first, second = nominal_arm(plan, circuit, one), nominal_arm(plan, circuit, other)
        if first is not None and second is not None and abs(first - second) > 1e-9 * first:
            what = f"arms {one} and {other} are not of one nominal resistance"
            yield PlanFinding("refusal", circuit.label, what, f"{first:g} Ω against {second:g} Ω")


def _completion(plan: Plan, circuit: CircuitPlanned) -> Iterator[PlanFinding]:
    """The channel's own completion, which only a quarter bridge has use for."""
    channel, nominal = plan.channels.get(circuit.channel), nominal_arm(plan, circuit, 1)
    completion = channel.channel.completion if channel is not None else None
    if completion is None or nominal is None or not circuit.arrangement.startswith("quarter"):
        return
    same = abs(completion.si() - nominal) <= 1e-9 * nominal
    level: Level = "ok" if same else "refusal"
    what = "the channel completes for " + ("this gauge" if same else "another gauge")
    yield PlanFinding(level, circuit.label, what, f"{completion} for {nominal:g} Ω")


def _factors(plan: Plan, circuit: CircuitPlanned) -> Iterator[PlanFinding]:
    mean = plan.factor_of(circuit)
    active = [each.grid for arm in circuit.arms for each in arm if each.kind == "grid"]
    found = [plan.data_of_grid(grid) for grid in active if grid is not None]
    factors = [data.gauge_factor.si() for data in found if data is not None]
    if mean is not None and max(abs(factor - mean) for factor in factors) > FACTORS_APART * mean:
        figure = f"{min(factors):g} to {max(factors):g}, mean {mean:.4g}"
        what = "its grids' factors differ, and the channel can be set only to their mean"
        yield PlanFinding("warning", circuit.label, what, figure, "the lots' certificates")
