"""Gauge lots and consumables from CSV: a row a pack, a row a consumable lot."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from pathlib import Path
from typing import cast, get_args

from gaugelog.errors import Faulty
from gaugelog.intake.fields import Fields, Gathered, distinct
from gaugelog.intake.files import read_bytes, rows_of, text_of
from gaugelog.ledger.base import Quantity
from gaugelog.ledger.stock import (
    ConsumableKind,
    ConsumableReceived,
    GridData,
    LotReceived,
    PackReceived,
)

LOT_COLUMNS = (
    "lot",
    "pack",
    "pieces",
    "maker",
    "type",
    "resistance_ohm",
    "resistance_tolerance_percent",
    "gauge_factor",
    "gauge_factor_tolerance_percent",
    "transverse_sensitivity_percent",
    "grid_length_mm",
    "grid_width_mm",
    "received_on",
)
LOT_OPTIONAL = (
    "expansion_class_ppm_per_K",
    "temperature_min_degC",
    "temperature_max_degC",
    "strain_limit_um_per_m",
    "test_voltage_max_V",
    "expires",
)
CONSUMABLE_COLUMNS = ("consumable", "kind", "maker", "name", "received_on")
CONSUMABLE_OPTIONAL = ("expires", "pot_life_min", "wire_resistance_ohm_per_m")

MOST_PIECES = 500
NewId = Callable[[], str]


@dataclass(frozen=True, slots=True)
class Stock:
    """What was received."""

    lots: tuple[LotReceived, ...]
    consumables: tuple[ConsumableReceived, ...]


def load_stock(files: Sequence[Path], new_id: NewId) -> Stock:
    """Understand stock files; which kind a file is shows in its first column.

    Raises Faulty naming every fault of every file at once.
    """
    faults: Gathered = []
    lots: list[LotReceived] = []
    consumables: list[ConsumableReceived] = []
    for path in files:
        try:
            data = read_bytes(path)
            if text_of(path.name, data).lstrip().startswith("consumable"):
                consumables += _consumables(path.name, data, new_id, faults)
            else:
                lots += _lots(path.name, data, new_id, faults)
        except Faulty as error:
            faults += error.faults
    if faults:
        raise Faulty(faults)
    return Stock(tuple(lots), tuple(consumables))


def _fields(name: str, number: int, cells: dict[str, str], faults: Gathered) -> Fields:
    return Fields(f"{name}, row {number}", cells, faults, joint=", column ")


def _lots(name: str, data: bytes, new_id: NewId, faults: Gathered) -> list[LotReceived]:
    rows = [
        _fields(name, number, cells, faults)
        for number, cells in rows_of(name, data, LOT_COLUMNS, LOT_OPTIONAL)
    ]
    packs: dict[str, list[tuple[Fields, PackReceived]]] = {}
    labels: list[str] = []
    for row in rows:
        pack = _pack(row, new_id)
        labels.append(pack.label)
        packs.setdefault(row.label("lot"), []).append((row, pack))
    distinct(rows, "pack", labels)
    return [_lot(label, found, new_id) for label, found in packs.items()]


def _pack(row: Fields, new_id: NewId) -> PackReceived:
    count = row.whole("pieces", 1, MOST_PIECES)
    return PackReceived(
        id=new_id(), label=row.label("pack"), pieces=tuple(new_id() for _ in range(count))
    )


def _lot(label: str, found: list[tuple[Fields, PackReceived]], new_id: NewId) -> LotReceived:
    lots = [_lot_data(row, label) for row, _ in found]
    for row, lot in zip((row for row, _ in found), lots, strict=True):
        for name in LotReceived.model_fields:
            if getattr(lot, name) != getattr(lots[0], name):
                what = f"differs in {name.replace('_', ' ')} from the lot's first row."
                row.fault("lot", what, "One lot has one certificate: the same figures each row.")
    packs = tuple(pack for _, pack in found)
    return lots[0].model_copy(update={"id": new_id(), "packs": packs})


def _lot_data(row: Fields, label: str) -> LotReceived:
    grid = GridData(
        number=1,
        gauge_factor=row.positive("gauge_factor", "1"),
        gauge_factor_tolerance=row.positive("gauge_factor_tolerance_percent", "%"),
        transverse_sensitivity=row.number("transverse_sensitivity_percent", "%"),
        angle=Quantity(value="0", unit="deg"),
    )
    return LotReceived(
        id="-",
        label=label,
        maker=row.text("maker"),
        type=row.text("type"),
        nominal_resistance=row.positive("resistance_ohm", "ohm"),
        resistance_tolerance=row.positive("resistance_tolerance_percent", "%"),
        grid_length=row.positive("grid_length_mm", "mm"),
        grid_width=row.positive("grid_width_mm", "mm"),
        grids=(grid,),
        expansion_class=row.maybe_number("expansion_class_ppm_per_K", "ppm/K"),
        temperature_min=row.maybe_number("temperature_min_degC", "degC"),
        temperature_max=row.maybe_number("temperature_max_degC", "degC"),
        strain_limit=row.maybe_number("strain_limit_um_per_m", "um/m"),
        test_voltage_max=row.maybe_number("test_voltage_max_V", "V"),
        expires=row.maybe_day("expires"),
        received_on=row.day("received_on"),
        packs=(),
    )


def _consumables(
    name: str, data: bytes, new_id: NewId, faults: Gathered
) -> list[ConsumableReceived]:
    rows = [
        _fields(name, number, cells, faults)
        for number, cells in rows_of(name, data, CONSUMABLE_COLUMNS, CONSUMABLE_OPTIONAL)
    ]
    found = [_consumable(row, new_id) for row in rows]
    distinct(rows, "consumable", [item.label for item in found])
    return found


def _consumable(row: Fields, new_id: NewId) -> ConsumableReceived:
    kind = row.choice("kind", get_args(ConsumableKind))
    return ConsumableReceived(
        id=new_id(),
        label=row.label("consumable"),
        type=cast("ConsumableKind", kind),
        maker=row.text("maker"),
        name=row.text("name"),
        expires=row.maybe_day("expires"),
        received_on=row.day("received_on"),
        pot_life=row.maybe_number("pot_life_min", "min"),
        wire_resistance=row.maybe_number("wire_resistance_ohm_per_m", "ohm/m"),
    )
