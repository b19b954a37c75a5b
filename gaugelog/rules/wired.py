"""A planned circuit as wired: its own grids' resistances as read, its own leads."""

from __future__ import annotations

from dataclasses import dataclass

from gaugelog.errors import Refused
from gaugelog.ledger.circuits import CircuitPlanned, CircuitRow, Element
from gaugelog.ledger.points import GridRow, PointPlanned, PointRow
from gaugelog.ledger.readings import ReadingRow, ReadingTaken
from gaugelog.ledger.stock import GaugeRow, LotReceived, LotRow
from gaugelog.ledger.view import View
from gaugelog.physics.circuit import Circuit
from gaugelog.physics.circuit import Element as Part
from gaugelog.rules.accuracy import range_for
from gaugelog.rules.certificate import certificate_at
from gaugelog.rules.layout import layout_of
from gaugelog.rules.placed import poisson_at


@dataclass(frozen=True, slots=True)
class Wired:
    """A circuit from what was read: for predictions. Uncertainties are standard ones, ohm.

    `factor` is the mean gauge factor of its active grids, which the channel is set to,
    `resistance` the nominal value of the first; `read` names the grids whose resistance was read,
    the others stand at their nominal value. `poisson` is the article's, where a grid lies across.
    """

    circuit: Circuit
    factor: float
    resistance: float
    uncertainties: dict[str, float]
    read: tuple[str, ...]
    poisson: float = 0.0


@dataclass(frozen=True, slots=True)
class _Grid:
    label: str
    resistance: float
    uncertainty: float
    factor: float
    nominal: float
    read: bool
    poisson: float


def planned_circuit(view: View, circuit: str) -> CircuitPlanned:
    """The circuit with this id as planned. Raises Refused when there is none."""
    row = view.get(CircuitRow, circuit)
    if row is None:
        raise Refused("The circuit of this step is not known.", "Check the journal.")
    return CircuitPlanned.model_validate_json(row.data)


def wired(view: View, planned: CircuitPlanned) -> Wired:
    """The circuit with the last resistance read of each of its grids, and its reel's wires.

    Raises Refused when a grid has no gauge yet.
    """
    grids = {grid: _grid(view, grid) for grid in planned.grids}
    one, two, three, four = (
        tuple(
            _part(element, grids, f"arm {number}.{place}") for place, element in enumerate(arm, 1)
        )
        for number, arm in enumerate(planned.arms, start=1)
    )
    layout = layout_of(planned)
    wire = planned.leads.resistance_per_length.si() * planned.leads.length.si()
    first = next(iter(grids.values()))
    circuit = Circuit(layout, (one, two, three, four), dict.fromkeys(layout.wires, wire))
    factors = [part.factor for part in circuit.elements if part.kind == "grid"]
    return Wired(
        circuit,
        float(sum(factors) / len(factors)),
        first.nominal,
        {grid.label: grid.uncertainty for grid in grids.values()},
        tuple(grid.label for grid in grids.values() if grid.read),
        first.poisson,
    )


def _part(element: Element, grids: dict[str, _Grid], name: str) -> Part:
    if element.grid is not None:
        grid = grids[element.grid]
        return Part(grid.label, element.kind, grid.resistance, grid.factor)
    if element.resistance is None:
        raise Refused(f"{name} has neither a grid nor a resistance.", "Load the plan again.")
    return Part(name, element.kind, element.resistance.si())


def _grid(view: View, grid: str) -> _Grid:
    row = view.get(GridRow, grid)
    point = view.get(PointRow, row.point) if row is not None else None
    gauge = view.get(GaugeRow, point.gauge) if point is not None and point.gauge else None
    lot_row = view.get(LotRow, gauge.lot) if gauge is not None else None
    if row is None or lot_row is None:
        raise Refused("A grid of this circuit has no gauge yet.", "Do its first steps first.")
    lot = LotReceived.model_validate_json(lot_row.data)
    factor = lot.grid(row.number).gauge_factor.si()
    poisson = poisson_at(view, PointPlanned.model_validate_json(point.data)) if point else 0.0
    nominal = lot.nominal_resistance.si()
    read = _last_resistance(view, grid)
    reading = ReadingTaken.model_validate_json(read.data) if read is not None else None
    if read is None or reading is None or reading.value is None:
        spread = nominal * lot.resistance_tolerance.si() / 3**0.5
        return _Grid(row.label, nominal, spread, factor, nominal, False, poisson)
    value = reading.value.si()
    meter = certificate_at(view, reading.instrument, read.seq)
    spread = range_for(meter, "resistance", reading.value, reading.qualifier).uncertainty(value)
    return _Grid(row.label, value, spread, factor, nominal, True, poisson)


def _last_resistance(view: View, grid: str) -> ReadingRow | None:
    rows = view.all(ReadingRow, subject=grid, check="resistance", latest=1)
    sound = [row for row in rows if not row.blocks]
    return sound[-1] if sound else None
