"""Wiring: circuits by channel, what is used twice, the circuit under the cursor, spare channels."""

from __future__ import annotations

from collections.abc import Iterable, Iterator
from dataclasses import dataclass

from textual.content import Content

from gaugelog.screens.columns import Cell, Column
from gaugelog.screens.drawn import bridge_drawn
from gaugelog.screens.listing import Listing, Row
from gaugelog.screens.words import BAD, CALM, GOOD, lines, plain
from gaugelog.work.bridges import Bridge, bridges
from gaugelog.work.wiring import CircuitWired, WiringMap, wiring_map


@dataclass(frozen=True, slots=True)
class Wired:
    """The wiring map, and each circuit as a bridge."""

    map: WiringMap
    bridges: dict[str, Bridge]


class WiringScreen(Listing[Wired]):
    """Circuits in the order of their channels; the one under the cursor is drawn."""

    about = (
        "Circuits in the order of their channels, those with something used twice first, then the "
        "spare channels. The circuit under the cursor is drawn: tabs and arms at the article at "
        "the left, the mark of each wire in the middle, the module's pins at the right. Scan a "
        "mark or a label to find its circuit."
    )

    finds = "Find or scan a channel, circuit, point or wire mark"
    columns = (
        Column("channel"),
        Column("at", least=2),
        Column("circuit", least=5),
        Column("arrangement", least=10),
        Column("grids", least=8),
        Column("state"),
    )

    def title_text(self) -> str:
        """How many circuits, conflicts and spare channels."""
        if self.found is None:
            return "wiring"
        found = self.found.map
        return (
            f"wiring: {len(found.circuits)} circuits, {len(found.conflicts)} conflicts, "
            f"{len(found.spare)} spare"
        )

    def read(self, person: str) -> Wired:
        """The wiring of the plan that is loaded."""
        book = self.desk.logbook
        return Wired(wiring_map(book), bridges(book))

    def rows(self, found: Wired) -> Iterable[Row]:
        """Circuits, those with a conflict first; then the spare channels."""
        troubled = [each for each in found.map.circuits if conflicts_of(each)]
        for each in troubled:
            yield _row(each, "Used twice")
        for each in found.map.circuits:
            if each not in troubled:
                yield _row(each, "Circuits")
        for spare in found.map.spare:
            cells = (spare.channel, spare.connector, "", "", "", "spare")
            drawn = tuple(Cell(text, CALM) for text in cells)
            yield Row(spare.channel, "Spare channels", drawn, kind="spare")

    def more(self, found: Wired, name: str, width: int) -> Content:
        """The circuit in characters, or the pins of a spare channel."""
        for each in found.map.circuits:
            if name == f"circuit {each.circuit}":
                return _circuit(each, found.bridges.get(each.circuit), width)
        for spare in found.map.spare:
            if name == f"spare {spare.channel}":
                pins = (plain(f"  {pin:>3}  {function}") for function, pin in spare.pins.items())
                where = f", connector {spare.connector}" if spare.connector else ""
                return lines(plain(f"channel {spare.channel}{where}: no circuit", "bold"), *pins)
        return plain("")


def conflicts_of(circuit: CircuitWired) -> list[str]:
    """What of a circuit is used twice, each once."""
    told = [circuit.conflict, *(wire.conflict for wire in circuit.wires)]
    return list(dict.fromkeys(each for each in told if each))


def _row(circuit: CircuitWired, section: str) -> Row:
    clash = bool(conflicts_of(circuit))
    grids = ", ".join(grid.grid for grid in circuit.grids)
    state = Cell("✗ used twice", BAD) if clash else Cell("✓", GOOD)
    marks = " ".join(wire.mark for wire in circuit.wires)
    return Row(
        circuit.circuit,
        section,
        (
            Cell(circuit.channel or "none", "" if circuit.channel else BAD),
            Cell(circuit.connector),
            Cell(circuit.circuit, "bold"),
            Cell(circuit.arrangement),
            Cell(grids),
            state,
        ),
        f"{circuit.cable} {marks}",
        "circuit",
    )


def _circuit(circuit: CircuitWired, bridge: Bridge | None, width: int) -> Content:
    told = [plain(f"{circuit.circuit}: {circuit.arrangement}", "bold")]
    told += [plain(f"✗ {each}", BAD) for each in conflicts_of(circuit)]
    if bridge is not None:
        told += [plain(each) for each in bridge_drawn(bridge, width)]
    told.append(plain(""))
    told += [plain(each, CALM) for each in _places(circuit)]
    return lines(*told)


def _places(circuit: CircuitWired) -> Iterator[str]:
    for grid in circuit.grids:
        yield f" arm {grid.arm} {grid.grid}{' (dummy)' if grid.dummy else ''}: {grid.place}"
