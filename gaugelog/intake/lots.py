"""Gauge lots from tables: a row a pack, a lot from the rows of its packs."""

from __future__ import annotations

from collections.abc import Callable, Sequence

from gaugelog.intake.fields import Fields, distinct, in_order
from gaugelog.intake.griddata import grids_of, pattern_of
from gaugelog.intake.papers import COLUMN as CERTIFICATE
from gaugelog.intake.papers import Paper
from gaugelog.intake.received import Placed, check_dates
from gaugelog.intake.tables import Columns
from gaugelog.ledger.base import Quantity
from gaugelog.ledger.stock import LotReceived, PackReceived

CURVE = "thermal_output_um_per_m"
CURVE_FACTOR = "thermal_output_factor"

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
        CURVE,
        CURVE_FACTOR,
        "expires",
        CERTIFICATE,
    ),
)

MOST_PIECES = 500
NewId = Callable[[], str]
Papers = dict[str, tuple[Paper, ...]]
"""Certificates' files by the id of what they are of."""


def read_lots(rows: Sequence[Placed], new_id: NewId, papers: Papers) -> tuple[LotReceived, ...]:
    """The lots of these rows; the certificates that they name are added to `papers`."""
    packs: list[PackReceived] = []
    by_lot: dict[str, list[tuple[Fields, LotReceived, PackReceived]]] = {}
    given: dict[str, list[Paper]] = {}
    for each in rows:
        lot, pack = _lot_data(each.row), _pack(each.row, new_id)
        packs.append(pack)
        by_lot.setdefault(lot.label.casefold(), []).append((each.row, lot, pack))
        paper = each.paper
        if paper is not None:
            given.setdefault(lot.label.casefold(), []).append(paper)
    distinct([each.row for each in rows], "pack", [pack.label for pack in packs])
    lots = {label: _lot(found, new_id) for label, found in by_lot.items()}
    for label, found in given.items():
        papers[lots[label].id] = tuple(dict.fromkeys(found))
    return tuple(lots.values())


def _pack(row: Fields, new_id: NewId) -> PackReceived:
    count = row.whole("pieces", 1, MOST_PIECES)
    return PackReceived(
        id=new_id(), label=row.label("pack"), pieces=tuple(new_id() for _ in range(count))
    )


def _lot(found: list[tuple[Fields, LotReceived, PackReceived]], new_id: NewId) -> LotReceived:
    """One lot from the rows of its packs, which must all carry its certificate's figures."""
    (first_row, first, _), others = found[0], found[1:]
    for row, lot, _ in others:
        both = [each for each in _SAME if row.sound(each) and first_row.sound(each)]
        for column in both:
            if _SAME[column](lot) != _SAME[column](first):
                what = f"differs from {first_row.place}, which is of the same lot."
                row.fault(column, what, "One lot has one certificate: the same figures each row.")
    packs = tuple(pack for _, _, pack in found)
    return first.model_copy(update={"id": new_id(), "packs": packs})


def _plain(quantity: Quantity | None) -> float | None:
    return None if quantity is None else quantity.si()


def unlike(lot: LotReceived, known: LotReceived) -> list[str]:
    """The columns in which a lot differs from the one of that label that is in stock.

    The day it came is no figure of its certificate.
    """
    return [name for name, figure in CERTIFIED.items() if figure(lot) != figure(known)]


CERTIFIED: dict[str, Callable[[LotReceived], object]] = {
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
    "expansion_class_ppm_per_K": lambda lot: _plain(lot.expansion_class),
    "temperature_min_degC": lambda lot: _plain(lot.temperature_min),
    "temperature_max_degC": lambda lot: _plain(lot.temperature_max),
    "strain_limit_um_per_m": lambda lot: _plain(lot.strain_limit),
    "test_voltage_max_V": lambda lot: _plain(lot.test_voltage_max),
    CURVE: lambda lot: [float(each) for each in lot.thermal_output],
    CURVE_FACTOR: lambda lot: (
        None if lot.thermal_output_factor is None else float(lot.thermal_output_factor)
    ),
    "expires": lambda lot: lot.expires,
}
"""What a lot's certificate says, by its column."""

_SAME: dict[str, Callable[[LotReceived], object]] = {
    **CERTIFIED,
    "received_on": lambda lot: lot.received_on,
}
"""What every row of a lot in one delivery must say alike."""


def _curve(row: Fields) -> tuple[str, ...]:
    """Coefficients of the curve of thermal output in °C, the constant first; none without one."""
    if not row.has(CURVE):
        return ()
    return tuple(each.value for each in row.numbers(CURVE, "um/m"))


def _curve_factor(row: Fields) -> str | None:
    """The factor that the curve was measured with; it says nothing without a curve."""
    found = row.maybe_number(CURVE_FACTOR, "1", positive=True)
    if found is not None and not row.has(CURVE):
        row.fault(CURVE_FACTOR, "has no curve.", f"Give {CURVE}, or leave this empty.")
    return None if found is None else found.value


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
        thermal_output=_curve(row),
        thermal_output_factor=_curve_factor(row),
        expires=row.maybe_day("expires"),
        received_on=row.day("received_on"),
        packs=(),
    )
    check_dates(row, lot.received_on, lot.expires)
    if lot.temperature_min is not None and lot.temperature_max is not None:
        figures = (lot.temperature_min.si(), lot.temperature_max.si())
        what = "lies below the lowest temperature."
        in_order(row, "temperature_min_degC", "temperature_max_degC", figures, what)
    return lot
