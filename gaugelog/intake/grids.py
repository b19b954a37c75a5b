"""`grids.csv`: a row a grid, with its point, its place, its lot and its route."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import dataclass
from typing import Literal, cast

from gaugelog.intake.fields import LONGEST_LABEL, Fields, Gathered, in_order
from gaugelog.intake.gridrows import grids_in, grouped, settle_labels, told_alike
from gaugelog.intake.patterned import pattern_facts
from gaugelog.intake.tables import Columns, rows_of
from gaugelog.ledger.points import Place, PointPlanned
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
    others=(
        "grid",
        "pattern",
        "numbering",
        "seen_from",
        "dummy",
        "z_mm",
        "quantity",
        "duration_h",
        "cycles",
    ),
)


@dataclass(frozen=True, slots=True)
class GridPlan:
    """A point as its first row gives it; article, lot and route still by label."""

    fields: Fields
    point: PointPlanned


def read_grids(
    name: str, data: bytes, campaign: str, new_id: Callable[[], str], faults: Gathered
) -> list[GridPlan]:
    """Understand `grids.csv`; faults are gathered, and then what is given means nothing.

    A point with several grids has a row for each, numbered in the column `grid`; what its later
    rows say of the point must be what the first says, or be left empty.
    """
    rows = rows_of(name, data, COLUMNS, faults)
    groups = grouped(rows)
    plans = [_planned(label, group, campaign, new_id) for label, group in groups]
    settle_labels([(plan.fields, plan.point) for plan in plans])
    return plans


def _planned(label: str, group: list[Fields], campaign: str, new_id: Callable[[], str]) -> GridPlan:
    first, *others = group
    point = _point(label, first, campaign, new_id)
    for row in others:
        following = row.following(COLUMNS.known)
        told_alike(first, point, following, _point(label, following, campaign, new_id))
    grids = grids_in(label, group, point.pattern, new_id)
    return GridPlan(first, point.model_copy(update={"grids": grids}))


def _point(label: str, row: Fields, campaign: str, new_id: Callable[[], str]) -> PointPlanned:
    """The point as one row gives it, its grids still to be numbered."""
    load = row.choice("load", ("static", "dynamic"))
    pattern, numbering, seen_from = pattern_facts(row)
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
        route=row.text("route", longest=LONGEST_LABEL) or "-",
        pattern=pattern,
        numbering=numbering,
        seen_from=seen_from,
        dummy=row.choice("dummy", ("no", "yes"), "no") == "yes",
        grids=(),
    )
    _in_order(row, point)
    _unstrained(row, point)
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


def _unstrained(row: Fields, point: PointPlanned) -> None:
    for name, strain in (
        ("strain_min_um_per_m", point.strain_min),
        ("strain_max_um_per_m", point.strain_max),
    ):
        if point.dummy and row.sound(name) and strain.si() != 0:
            what = f"{strain} for a dummy, which lies where there is no strain."
            row.fault(name, what, "Give 0, or say no in the column dummy.")


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
