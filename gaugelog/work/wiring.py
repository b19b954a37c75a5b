"""The wiring map: what each wire and pin is for, what is used twice, which channels are spare."""

from __future__ import annotations

import re
from collections.abc import Collection, Iterator
from dataclasses import dataclass

from gaugelog.intake.campaign import WIRES
from gaugelog.ledger.circuits import CircuitPlanned, Element
from gaugelog.ledger.points import PointPlanned
from gaugelog.rules.fit.conflicts import Conflict, conflicts
from gaugelog.rules.fit.plan import Plan, PlannedChannel
from gaugelog.rules.planned import planned_campaign
from gaugelog.work.logbook import Logbook


@dataclass(frozen=True, slots=True)
class GridWired:
    """A grid in a circuit: its arm, 1 to 4 round the bridge, and where it sits."""

    arm: int
    grid: str
    dummy: bool
    place: str


@dataclass(frozen=True, slots=True)
class Wire:
    """A wire of a circuit, or a pin without one; `conflict` says what is used twice."""

    function: str
    pin: str
    mark: str
    conflict: str = ""


@dataclass(frozen=True, slots=True)
class CircuitWired:
    """A circuit with its grids, its channel, its wires and its cable."""

    circuit: str
    arrangement: str
    grids: tuple[GridWired, ...]
    channel: str
    """`M1/3`: module and channel."""
    connector: str
    wires: tuple[Wire, ...]
    cable: str
    length_m: float
    conflict: str = ""
    """What is wrong with its channel as a whole."""


@dataclass(frozen=True, slots=True)
class SpareChannel:
    """A channel that no circuit uses."""

    channel: str
    connector: str
    pins: dict[str, str]


@dataclass(frozen=True, slots=True)
class WiringMap:
    """The wiring of a plan, in the order of its channels."""

    campaign: str
    title: str
    client: str
    revision: int
    state: str
    head: str
    """The journal's head as printed."""
    circuits: tuple[CircuitWired, ...]
    spare: tuple[SpareChannel, ...]
    conflicts: tuple[str, ...]


def wiring_map(logbook: Logbook) -> WiringMap:
    """The wiring of the plan that is loaded. Raises Refused when none is."""
    head = logbook.head().printed
    with logbook.reading() as view:
        campaign = planned_campaign(view)
        drawing = _Drawing(Plan(view, campaign))
    return WiringMap(
        campaign.label,
        campaign.title,
        campaign.client,
        campaign.revision,
        campaign.state,
        head,
        tuple(drawing.circuits()),
        tuple(drawing.spare()),
        tuple(f"{each.finding.subject}: {each.finding.what}" for each in drawing.found),
    )


class _Drawing:
    """A plan on its way to the map."""

    def __init__(self, plan: Plan) -> None:
        self._plan = plan
        self.found = list(conflicts(plan))
        self._grids = {grid.id: grid.label for grid in plan.grids}

    def circuits(self) -> Iterator[CircuitWired]:
        """Circuits in the order of their channels."""
        order = {row: place for place, row in enumerate(self._channels())}
        last = len(order)
        for circuit in sorted(
            self._plan.circuits, key=lambda each: (order.get(each.channel, last), each.label)
        ):
            yield self._circuit(circuit)

    def spare(self) -> Iterator[SpareChannel]:
        """Channels that no circuit uses."""
        used = {circuit.channel for circuit in self._plan.circuits}
        for row in self._channels():
            if row not in used:
                each = self._plan.channels[row]
                pins = {name: each.channel.pins[name] for name in _ordered(each.channel.pins)}
                yield SpareChannel(each.label, each.channel.connector, pins)

    def _channels(self) -> list[str]:
        """Ids of channels as people count them: M1/2 before M1/10."""
        return sorted(self._plan.channels, key=lambda row: _counted(self._plan.channels[row].label))

    def _circuit(self, circuit: CircuitPlanned) -> CircuitWired:
        channel = self._plan.channels.get(circuit.channel)
        mine = [each for each in self.found if circuit.id in each.circuits]
        whole = [each for each in mine if not each.pin and not each.mark]
        return CircuitWired(
            circuit.label,
            circuit.arrangement,
            tuple(self._grids_of(circuit)),
            channel.label if channel is not None else "",
            channel.channel.connector if channel is not None else "",
            tuple(_wires(circuit, channel, mine)),
            circuit.leads.cable,
            circuit.leads.length.to("m"),
            _told(whole),
        )

    def _grids_of(self, circuit: CircuitPlanned) -> Iterator[GridWired]:
        for arm, elements in enumerate(circuit.arms, start=1):
            for element in elements:
                if element.grid is not None:
                    yield self._grid(arm, element, element.grid)

    def _grid(self, arm: int, element: Element, grid: str) -> GridWired:
        point = self._plan.point_of_grid.get(grid)
        place = self._place(point) if point is not None else ""
        return GridWired(arm, self._grids.get(grid, "?"), element.kind == "dummy", place)

    def _place(self, point: PointPlanned) -> str:
        article = self._plan.article_of(point)
        where = " ".join(part for part in (article.label if article else "", point.zone) if part)
        at = point.place
        z = f", z {at.z}" if at.z is not None else ""
        return f"{where}: x {at.x}, y {at.y}{z}, {at.side}"


def _wires(
    circuit: CircuitPlanned, channel: PlannedChannel | None, found: list[Conflict]
) -> Iterator[Wire]:
    marks = circuit.leads.marks
    pins = channel.channel.pins if channel is not None else {}
    for function in _ordered([*pins, *marks]):
        pin, mark = pins.get(function, ""), marks.get(function, "")
        mine = [
            each
            for each in found
            if (pin and each.pin == pin) or (mark and each.mark.casefold() == mark.casefold())
        ]
        yield Wire(function, pin, mark, _told(mine))


def _ordered(functions: Collection[str]) -> list[str]:
    """Functions of wires, each once, as people list them: supply, signal, sense, the rest."""
    known = [name for name in WIRES if name in functions]
    return list(dict.fromkeys([*known, *functions]))


def _told(found: list[Conflict]) -> str:
    return "; ".join(f"{each.finding.subject}: {each.finding.what}" for each in found)


def _counted(label: str) -> list[tuple[int, int, str]]:
    """A key that puts numbers within a label in their order."""
    parts = re.split(r"(\d+)", label)
    return [(1, int(part), "") if part.isdecimal() else (0, 0, part) for part in parts]
