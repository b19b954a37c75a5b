"""`grids.csv`: a row a grid, with its point, its place, its lot and its route."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import Literal, cast

from gaugelog.intake.fields import Fields, Gathered, distinct, in_order
from gaugelog.intake.tables import Columns, rows_of
from gaugelog.ledger.points import Place, PlannedGrid, PointPlanned
from gaugelog.physics.temperature import ABSOLUTE_ZERO

COLUMNS = Columns(
    needed=(
        "point",
        "article",
        "zone",
        "purpose",
        "load",
        "strain_min_um_per_m",
        "strain_max_um_per_m",
        "temperature_min_degC",
        "temperature_max_degC",
        "permitted_error_um_per_m",
        "datum",
        "x_mm",
        "y_mm",
        "side",
        "axis",
        "axis_deg",
        "place_tolerance_mm",
        "axis_tolerance_deg",
        "lot",
        "route",
    ),
    others=("z_mm", "quantity", "duration_h", "cycles"),
)


@dataclass(frozen=True, slots=True)
class GridPlan:
    """A point as its row gives it; article, lot and route still by label."""

    fields: Fields
    point: PointPlanned


def read_grids(
    name: str, data: bytes, campaign: str, new_id: Callable[[], str], faults: Gathered
) -> list[GridPlan]:
    """Understand `grids.csv`; faults are gathered, and then what is given means nothing."""
    rows = rows_of(name, data, COLUMNS, faults)
    found = [GridPlan(row, _point(row, campaign, new_id)) for row in rows]
    distinct(rows, "point", [plan.point.label for plan in found])
    return found


def _point(row: Fields, campaign: str, new_id: Callable[[], str]) -> PointPlanned:
    label = row.label("point")
    load = row.choice("load", ("static", "dynamic"))
    point = PointPlanned(
        id=new_id(),
        label=label,
        campaign=campaign,
        article=row.label("article") or "-",
        zone=row.label("zone"),
        quantity=row.text("quantity", needed=False) or "strain",
        purpose=row.text("purpose"),
        load=cast("Literal['static', 'dynamic']", load),
        strain_min=row.number("strain_min_um_per_m", "um/m"),
        strain_max=row.number("strain_max_um_per_m", "um/m"),
        temperature_min=row.number("temperature_min_degC", "degC"),
        temperature_max=row.number("temperature_max_degC", "degC"),
        duration=row.maybe_number("duration_h", "h", positive=True),
        cycles=row.maybe_whole("cycles", 0, 10**12),
        permitted_error=row.number("permitted_error_um_per_m", "um/m", positive=True),
        place=_place(row),
        lot=row.label("lot") or "-",
        route=row.text("route") or "-",
        grids=(PlannedGrid(id=new_id(), label=label or "-", number=1),),
    )
    _in_order(row, point)
    return point


def _in_order(row: Fields, point: PointPlanned) -> None:
    strains = (point.strain_min.si(), point.strain_max.si())
    in_order(
        row,
        "strain_min_um_per_m",
        "strain_max_um_per_m",
        strains,
        "lies below the smallest strain.",
    )
    temperatures = (point.temperature_min.si(), point.temperature_max.si())
    in_order(
        row,
        "temperature_min_degC",
        "temperature_max_degC",
        temperatures,
        "lies below the lowest temperature.",
    )
    for name, figure in (
        ("temperature_min_degC", temperatures[0]),
        ("temperature_max_degC", temperatures[1]),
    ):
        if row.sound(name) and figure <= ABSOLUTE_ZERO:
            row.fault(name, "lies below absolute zero.")


def _place(row: Fields) -> Place:
    return Place(
        datum=row.text("datum"),
        x=row.number("x_mm", "mm"),
        y=row.number("y_mm", "mm"),
        z=row.maybe_number("z_mm", "mm"),
        side=row.text("side"),
        axis=row.text("axis"),
        angle=row.number("axis_deg", "deg"),
        tolerance=row.number("place_tolerance_mm", "mm", positive=True),
        angle_tolerance=row.number("axis_tolerance_deg", "deg", positive=True),
    )
