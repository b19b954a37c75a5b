"""Gauge lots and consumables from CSV or XLSX: a row a pack, a row a consumable lot."""

from __future__ import annotations

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from pathlib import Path
from typing import cast, get_args

from gaugelog.errors import Faulty
from gaugelog.intake.fields import Fields, Gathered, distinct, in_order
from gaugelog.intake.files import read_bytes
from gaugelog.intake.griddata import grids_of, pattern_of
from gaugelog.intake.tables import Columns, heading_of, rows_of
from gaugelog.intake.typed import number_of
from gaugelog.ledger.base import Quantity
from gaugelog.ledger.stock import (
    ConsumableKind,
    ConsumableReceived,
    CurePoint,
    LotReceived,
    PackReceived,
)

LOT_COLUMNS = Columns(
    needed=(
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
    ),
    others=(
        "pattern",
        "grid_angles_deg",
        "expansion_class_ppm_per_K",
        "temperature_min_degC",
        "temperature_max_degC",
        "strain_limit_um_per_m",
        "test_voltage_max_V",
        "expires",
    ),
)
CONSUMABLE_COLUMNS = Columns(
    needed=("consumable", "kind", "maker", "name", "received_on"),
    others=(
        "expires",
        "pot_life_min",
        "cure_schedule",
        "temperature_min_degC",
        "temperature_max_degC",
        "humidity_min_percent",
        "humidity_max_percent",
        "wire_resistance_ohm_per_m",
    ),
)

MOST_PIECES = 500
NewId = Callable[[], str]


@dataclass(frozen=True, slots=True)
class Stock:
    """What was received."""

    lots: tuple[LotReceived, ...]
    consumables: tuple[ConsumableReceived, ...]


def load_stock(files: Sequence[Path], new_id: NewId) -> Stock:
    """Understand stock files; which kind a file is shows in its heading.

    Raises Faulty naming every fault of every file at once.
    """
    faults: Gathered = []
    lots: list[Fields] = []
    consumables: list[Fields] = []
    for path in files:
        try:
            data = read_bytes(path)
            if _holds_consumables(heading_of(path.name, data)):
                consumables += rows_of(path.name, data, CONSUMABLE_COLUMNS, faults)
            else:
                lots += rows_of(path.name, data, LOT_COLUMNS, faults)
        except Faulty as error:
            faults += error.faults
    stock = Stock(_lots(lots, new_id), _consumables(consumables, new_id))
    if faults:
        raise Faulty(faults)
    return stock


def _holds_consumables(heading: list[str]) -> bool:
    return any("consumable" in cell.casefold() for cell in heading)


def _lots(rows: list[Fields], new_id: NewId) -> tuple[LotReceived, ...]:
    packs: list[PackReceived] = []
    by_lot: dict[str, list[tuple[Fields, LotReceived, PackReceived]]] = {}
    for row in rows:
        lot, pack = _lot_data(row), _pack(row, new_id)
        packs.append(pack)
        by_lot.setdefault(lot.label.casefold(), []).append((row, lot, pack))
    distinct(rows, "pack", [pack.label for pack in packs])
    return tuple(_lot(found, new_id) for found in by_lot.values())


def _pack(row: Fields, new_id: NewId) -> PackReceived:
    count = row.whole("pieces", 1, MOST_PIECES)
    return PackReceived(
        id=new_id(), label=row.label("pack"), pieces=tuple(new_id() for _ in range(count))
    )


def _lot(found: list[tuple[Fields, LotReceived, PackReceived]], new_id: NewId) -> LotReceived:
    """One lot from the rows of its packs, which must all carry its certificate's figures."""
    (first_row, first, _), others = found[0], found[1:]
    for row, lot, _ in others:
        for column, figure in _CERTIFIED.items():
            if row.sound(column) and first_row.sound(column) and figure(lot) != figure(first):
                what = f"differs from {first_row.place}, which is of the same lot."
                row.fault(column, what, "One lot has one certificate: the same figures each row.")
    packs = tuple(pack for _, _, pack in found)
    return first.model_copy(update={"id": new_id(), "packs": packs})


def _plain(quantity: Quantity | None) -> float | None:
    return None if quantity is None else quantity.si()


_CERTIFIED: dict[str, Callable[[LotReceived], object]] = {
    "maker": lambda lot: lot.maker,
    "type": lambda lot: lot.type,
    "resistance_ohm": lambda lot: _plain(lot.nominal_resistance),
    "resistance_tolerance_percent": lambda lot: _plain(lot.resistance_tolerance),
    "pattern": lambda lot: lot.pattern,
    "gauge_factor": lambda lot: [grid.gauge_factor.si() for grid in lot.grids],
    "gauge_factor_tolerance_percent": lambda lot: [
        grid.gauge_factor_tolerance.si() for grid in lot.grids
    ],
    "transverse_sensitivity_percent": lambda lot: [
        grid.transverse_sensitivity.si() for grid in lot.grids
    ],
    "grid_angles_deg": lambda lot: [grid.angle.si() for grid in lot.grids],
    "grid_length_mm": lambda lot: _plain(lot.grid_length),
    "grid_width_mm": lambda lot: _plain(lot.grid_width),
    "received_on": lambda lot: lot.received_on,
    "expansion_class_ppm_per_K": lambda lot: _plain(lot.expansion_class),
    "temperature_min_degC": lambda lot: _plain(lot.temperature_min),
    "temperature_max_degC": lambda lot: _plain(lot.temperature_max),
    "strain_limit_um_per_m": lambda lot: _plain(lot.strain_limit),
    "test_voltage_max_V": lambda lot: _plain(lot.test_voltage_max),
    "expires": lambda lot: lot.expires,
}
"""What every row of a lot must say alike, by its column."""


def _lot_data(row: Fields) -> LotReceived:
    """A lot as one row gives it, without its packs."""
    pattern = pattern_of(row)
    lot = LotReceived(
        id="-",
        label=row.label("lot"),
        maker=row.text("maker"),
        type=row.text("type"),
        pattern=pattern,
        nominal_resistance=row.number("resistance_ohm", "ohm", positive=True),
        resistance_tolerance=row.number("resistance_tolerance_percent", "%", positive=True),
        grid_length=row.number("grid_length_mm", "mm", positive=True),
        grid_width=row.number("grid_width_mm", "mm", positive=True),
        grids=grids_of(row, pattern),
        expansion_class=row.maybe_number("expansion_class_ppm_per_K", "ppm/K"),
        temperature_min=row.maybe_number("temperature_min_degC", "degC"),
        temperature_max=row.maybe_number("temperature_max_degC", "degC"),
        strain_limit=row.maybe_number("strain_limit_um_per_m", "um/m", positive=True),
        test_voltage_max=row.maybe_number("test_voltage_max_V", "V", positive=True),
        expires=row.maybe_day("expires"),
        received_on=row.day("received_on"),
        packs=(),
    )
    _check_dates(row, lot.received_on, lot.expires)
    if lot.temperature_min is not None and lot.temperature_max is not None:
        figures = (lot.temperature_min.si(), lot.temperature_max.si())
        what = "lies below the lowest temperature."
        in_order(row, "temperature_min_degC", "temperature_max_degC", figures, what)
    return lot


def _check_dates(row: Fields, received_on: str, expires: str | None) -> None:
    if row.sound("received_on", "expires") and expires is not None and expires < received_on:
        row.fault("expires", "lies before the day it was received.", "Refuse it, or mend the date.")


def _consumables(rows: list[Fields], new_id: NewId) -> tuple[ConsumableReceived, ...]:
    found = tuple(_consumable(row, new_id) for row in rows)
    distinct(rows, "consumable", [item.label for item in found])
    return found


def _consumable(row: Fields, new_id: NewId) -> ConsumableReceived:
    kind = row.choice("kind", get_args(ConsumableKind))
    found = ConsumableReceived(
        id=new_id(),
        label=row.label("consumable"),
        type=cast("ConsumableKind", kind),
        maker=row.text("maker"),
        name=row.text("name"),
        expires=row.maybe_day("expires"),
        received_on=row.day("received_on"),
        pot_life=row.maybe_number("pot_life_min", "min", positive=True),
        temperature_min=row.maybe_number("temperature_min_degC", "degC"),
        temperature_max=row.maybe_number("temperature_max_degC", "degC"),
        humidity_min=row.maybe_number("humidity_min_percent", "%RH"),
        humidity_max=row.maybe_number("humidity_max_percent", "%RH"),
        cure=_cure(row),
        wire_resistance=row.maybe_number("wire_resistance_ohm_per_m", "ohm/m", positive=True),
    )
    _check_dates(row, found.received_on, found.expires)
    return found


def _cure(row: Fields) -> tuple[CurePoint, ...]:
    """`150=60; 175=30`: at 150 °C or above 60 min, at 175 °C or above 30 min."""
    found: list[CurePoint] = []
    for part in row.text("cure_schedule", needed=False).split(";"):
        if not part.strip():
            continue
        hot, _, long = (piece.strip() for piece in part.partition("="))
        celsius, minutes = number_of(hot), number_of(long)
        if celsius is None or minutes is None or float(minutes) <= 0:
            remedy = "Like: 150=60; 175=30, each °C=minutes."
            row.fault("cure_schedule", f"“{part.strip()[:40]}” is no °C=minutes.", remedy)
            return ()
        found.append(
            CurePoint(
                temperature=Quantity(value=celsius, unit="degC"),
                duration=Quantity(value=minutes, unit="min"),
            )
        )
    return tuple(sorted(found, key=lambda point: point.temperature.si()))
