"""Stock: gauge lots with their packs and pieces, and consumable lots, as received."""

from __future__ import annotations

from collections.abc import Iterator
from typing import ClassVar, Literal

from sqlmodel import Field, SQLModel

from gaugelog.ledger.base import DateText, DecimalText, FactBody, Id, Part, Quantity
from gaugelog.ledger.rows import At, Change, Known, Put, have

GaugeState = Literal["on shelf", "in service", "removed", "scrapped"]
ConsumableKind = Literal["adhesive", "coating", "solder", "cable", "cleaner", "other"]


class GridData(Part):
    """One grid of the lot's pattern: its factor and transverse sensitivity, as certified."""

    number: int
    gauge_factor: Quantity
    gauge_factor_tolerance: Quantity
    """Half-width in per cent of the factor, k = 2 unless the certificate says otherwise."""
    transverse_sensitivity: Quantity
    angle: Quantity
    """Direction of the grid in the pattern, counter-clockwise from grid 1."""


class PackReceived(Part):
    """One pack of a lot, with the ids of the pieces in it, in the order they are numbered."""

    id: Id
    label: str
    pieces: tuple[Id, ...]


class LotReceived(FactBody):
    """A gauge lot as received, with its certificate's figures and its packs."""

    kind: ClassVar[str] = "lot.received"

    id: Id
    label: str
    maker: str
    type: str
    pattern: str = "single"
    nominal_resistance: Quantity
    resistance_tolerance: Quantity
    """Half-width in per cent of the nominal resistance."""
    grid_length: Quantity
    grid_width: Quantity
    grids: tuple[GridData, ...]
    expansion_class: Quantity | None = None
    """Expansion coefficient of the material the gauge is matched to, ppm/K."""
    temperature_min: Quantity | None = None
    temperature_max: Quantity | None = None
    strain_limit: Quantity | None = None
    thermal_output: tuple[DecimalText, ...] = ()
    """Thermal output on the material of its class by the lot's sheet: coefficients of a
    polynomial in °C, the constant first, µm/m."""
    thermal_output_factor: DecimalText | None = None
    """Gauge factor that it was measured with; none: that of the grid."""
    test_voltage_max: Quantity | None = None
    expires: DateText | None = None
    received_on: DateText
    packs: tuple[PackReceived, ...]
    certificate: str = ""
    """Digest of the certificate among the evidence, or empty."""

    def grid(self, number: int) -> GridData:
        """What the certificate says of the grid with this number; one grid stands for all."""
        return next((each for each in self.grids if each.number == number), self.grids[0])


class PacksReceived(FactBody):
    """More packs of a lot that is in stock, under the same certificate."""

    kind: ClassVar[str] = "packs.received"

    lot: Id
    label: str
    received_on: DateText
    packs: tuple[PackReceived, ...]


class CurePoint(Part):
    """One line of a cure schedule: at this temperature or above, so long."""

    temperature: Quantity
    duration: Quantity


class ConsumableReceived(FactBody):
    """A lot of adhesive, coating, solder, cable or cleaner as received."""

    kind: ClassVar[str] = "consumable.received"

    id: Id
    label: str
    type: ConsumableKind
    maker: str
    name: str
    expires: DateText | None = None
    received_on: DateText
    pot_life: Quantity | None = None
    temperature_min: Quantity | None = None
    temperature_max: Quantity | None = None
    humidity_min: Quantity | None = None
    humidity_max: Quantity | None = None
    """The surroundings its data sheet allows while it is used."""
    cure: tuple[CurePoint, ...] = ()
    wire_resistance: Quantity | None = None
    """Resistance of one conductor per metre, for a cable."""


class LotRow(SQLModel, table=True):
    """A gauge lot."""

    __tablename__ = "lot"

    id: str = Field(primary_key=True)
    label: str = Field(index=True)
    maker: str
    type: str
    data: str
    """The whole of `LotReceived` as JSON."""
    seq: int


class GaugeRow(SQLModel, table=True):
    """One physical gauge, named by its pack and number: `K7-03/4`."""

    __tablename__ = "gauge"

    id: str = Field(primary_key=True)
    label: str = Field(index=True)
    lot: str = Field(index=True)
    pack: str
    number: int
    state: str
    point: str
    """The point it was taken for, or empty."""
    received_on: str
    """The day its pack came."""


class ConsumableRow(SQLModel, table=True):
    """A consumable lot."""

    __tablename__ = "consumable"

    id: str = Field(primary_key=True)
    label: str = Field(index=True)
    type: str
    name: str
    expires: str
    """A date, or empty when it does not expire."""
    data: str
    """The whole of `ConsumableReceived` as JSON."""
    seq: int


def apply_lot_received(_known: Known, at: At, fact: LotReceived) -> Iterator[Change]:
    """The lot is in stock, with each of its gauges on the shelf."""
    yield Put(
        "lot",
        {
            "id": fact.id,
            "label": fact.label,
            "maker": fact.maker,
            "type": fact.type,
            "data": at.data,
            "seq": at.seq,
        },
    )
    yield from _gauges(fact.id, fact.packs, fact.received_on)


def apply_packs_received(known: Known, _at: At, fact: PacksReceived) -> Iterator[Change]:
    """The gauges of the packs are on the shelf with the others of their lot."""
    have(known, "lot", fact.lot)
    yield from _gauges(fact.lot, fact.packs, fact.received_on)


def _gauges(lot: str, packs: tuple[PackReceived, ...], received_on: str) -> Iterator[Change]:
    for pack in packs:
        for number, piece in enumerate(pack.pieces, start=1):
            gauge = {
                "id": piece,
                "label": f"{pack.label}/{number}",
                "lot": lot,
                "pack": pack.id,
                "number": number,
                "state": "on shelf",
                "point": "",
                "received_on": received_on,
            }
            yield Put("gauge", gauge)


def apply_consumable_received(_known: Known, at: At, fact: ConsumableReceived) -> Iterator[Change]:
    """The consumable lot is in stock."""
    yield Put(
        "consumable",
        {
            "id": fact.id,
            "label": fact.label,
            "type": fact.type,
            "name": fact.name,
            "expires": fact.expires or "",
            "data": at.data,
            "seq": at.seq,
        },
    )
