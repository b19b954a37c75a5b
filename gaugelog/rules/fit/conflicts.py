"""What can't be told apart or is used twice: channels, pins of a connector, marks in a cable."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from gaugelog.ledger.circuits import CircuitPlanned
from gaugelog.rules.fit.finding import PlanFinding
from gaugelog.rules.fit.plan import Plan, PlannedChannel

_SUPPLY = frozenset({"supply+", "supply-"})


@dataclass(frozen=True, slots=True)
class Conflict:
    """Something used twice: what, the circuits and channels (ids) it is about, and where in them.

    `pin` or `mark` is what is used twice, empty where the channel as a whole is.
    """

    finding: PlanFinding
    circuits: frozenset[str]
    channels: frozenset[str] = frozenset()
    pin: str = ""
    mark: str = ""


def conflicts(plan: Plan) -> Iterator[Conflict]:
    """Every channel, pin and mark that is used twice."""
    yield from _channels(plan)
    yield from _pins(plan)
    yield from _marks(plan)


def _channels(plan: Plan) -> Iterator[Conflict]:
    used: dict[str, list[CircuitPlanned]] = {}
    for circuit in plan.circuits:
        used.setdefault(circuit.channel, []).append(circuit)
    for channel, circuits in used.items():
        if channel in plan.channels and len(circuits) > 1:
            names = ", ".join(circuit.label for circuit in circuits)
            finding = PlanFinding(
                "refusal",
                f"channel {plan.channels[channel].label}",
                f"is used by {names}",
                f"{len(circuits)} circuits",
            )
            yield Conflict(finding, _ids(circuits), frozenset({channel}))


def _pins(plan: Plan) -> Iterator[Conflict]:
    used: dict[tuple[str, str, str], list[tuple[str, str]]] = {}
    for row, each in plan.channels.items():
        if each.channel.connector:
            for function, pin in each.channel.pins.items():
                place = (each.module, each.channel.connector, pin)
                used.setdefault(place, []).append((row, function))
    for (module, connector, pin), uses in used.items():
        shown = [plan.channels[row] for row, _ in uses]
        if len(uses) > 1 and not _is_shared_supply(shown, {function for _, function in uses}):
            names = ", ".join(dict.fromkeys(each.label for each in shown))
            what = f"pin {pin} serves {len(uses)} functions, of channel {names}"
            finding = PlanFinding("refusal", f"{module}, connector {connector}", what)
            channels = frozenset(row for row, _ in uses)
            circuits = _ids(each for each in plan.circuits if each.channel in channels)
            yield Conflict(finding, circuits, channels, pin=pin)


def _is_shared_supply(channels: list[PlannedChannel], functions: set[str]) -> bool:
    """Whether channels with a common or switched supply share its pin, as they may."""
    together = all(each.channel.supply != "separate" for each in channels)
    return together and len(functions) == 1 and functions <= _SUPPLY


def _marks(plan: Plan) -> Iterator[Conflict]:
    """Wires that bear the same mark in one cable.

    A cable that is a lot in stock is a reel: each circuit has a length of its own from it. Any
    other name is one cable, whose wires all its circuits share.
    """
    used: dict[tuple[str, str], list[tuple[CircuitPlanned, str]]] = {}
    for circuit in plan.circuits:
        cable = circuit.leads.cable
        shared = bool(cable) and cable.casefold() not in plan.reels
        for function, mark in circuit.leads.marks.items():
            place = (cable if shared else f"circuit {circuit.label}", mark.casefold())
            used.setdefault(place, []).append((circuit, function))
    for (cable, _), uses in used.items():
        if len(uses) > 1:
            circuits = [circuit for circuit, _ in uses]
            first, function = uses[0]
            mark = first.leads.marks[function]
            wires = ", ".join(f"{circuit.label} {function}" for circuit, function in uses)
            finding = PlanFinding("warning", cable, f"the mark {mark} stands on {wires}")
            yield Conflict(finding, _ids(circuits), mark=mark)


def _ids(circuits: Iterator[CircuitPlanned] | list[CircuitPlanned]) -> frozenset[str]:
    return frozenset(circuit.id for circuit in circuits)
