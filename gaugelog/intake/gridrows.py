"""Rows of one point brought together: the same point in each, grids numbered, labels its own."""

from __future__ import annotations

from collections.abc import Callable, Sequence

from gaugelog.intake.fields import Fields
from gaugelog.ledger.points import PlannedGrid, PointPlanned
from gaugelog.physics.patterns import grid_count

MOST_GRIDS = 12


def grouped(rows: Sequence[Fields]) -> list[tuple[str, list[Fields]]]:
    """Rows by the point they name, in order of their first.

    A row whose label is faulty stands by itself, and so do rows of one label where none numbers
    a grid: that is a label used twice, and noted.
    """
    groups: dict[str, tuple[str, list[Fields]]] = {}
    for number, row in enumerate(rows):
        label = row.label("point")
        key = label.casefold() if label and row.sound("point") else f"/{number}"
        groups.setdefault(key, (label, []))[1].append(row)
    return [part for label, group in groups.values() for part in _parted(label, group)]


def _parted(label: str, group: list[Fields]) -> list[tuple[str, list[Fields]]]:
    first, *others = group
    if not others or any(row.has("grid") for row in group):
        return [(label, group)]
    for row in others:
        remedy = f"First at {first.place}. A point of several grids numbers them: column grid."
        row.fault("point", f"“{label}” stands twice.", remedy)
    return [(label, [row]) for row in group]


def told_alike(first: Fields, point: PointPlanned, row: Fields, told: PointPlanned) -> None:
    """Note a fault at each cell of a later row that says something else of the point."""
    for column, figure in _OF_THE_POINT.items():
        given = row.has(column) and row.sound(column) and first.sound(column)
        if given and figure(told) != figure(point):
            what = f"differs from {first.place}, which is of the same point."
            row.fault(column, what, "Say the same in each row of a point, or leave it empty.")


def grids_in(
    label: str, group: Sequence[Fields], pattern: str, new_id: Callable[[], str]
) -> tuple[PlannedGrid, ...]:
    """The grids of a point in the order of their numbers, each with a label of its own."""
    first, *others = group
    numbers = [_number(row, bool(others)) for row in group]
    _each_once(group, numbers)
    _as_many_as(first, pattern, numbers)
    return tuple(
        PlannedGrid(id=new_id(), label=_label(label, number, len(numbers)), number=number)
        for number in sorted(numbers)
    )


def settle_labels(plans: Sequence[tuple[Fields, PointPlanned]]) -> None:
    """Note a fault where a point is called like a grid of another."""
    owners: dict[str, tuple[Fields, PointPlanned]] = {}
    for row, point in plans:
        for grid in point.grids:
            owner = owners.setdefault(grid.label.casefold(), (row, point))
            if owner[1] is not point and row.sound("point"):
                what = f"“{grid.label}” is a grid of {owner[1].label} too."
                row.fault("point", what, f"Call one of them another; see {owner[0].place}.")


def _number(row: Fields, several: bool) -> int:
    if not several:
        return row.maybe_whole("grid", 1, MOST_GRIDS) or 1
    return row.whole("grid", 1, MOST_GRIDS)


def _each_once(group: Sequence[Fields], numbers: Sequence[int]) -> None:
    seen: dict[int, Fields] = {}
    for row, number in zip(group, numbers, strict=True):
        if row.sound("grid") and number in seen:
            row.fault("grid", f"{number} stands twice.", f"First at {seen[number].place}.")
        seen.setdefault(number, row)


def _as_many_as(first: Fields, pattern: str, numbers: Sequence[int]) -> None:
    """A point has as many grids as its pattern, numbered from 1."""
    if not first.sound("pattern", "grid", "point"):
        return
    count = grid_count(pattern)
    if len(numbers) != count:
        rows = "one row" if len(numbers) == 1 else f"{len(numbers)} rows"
        what = f"is {pattern}, which has {count} grid{'s' * (count > 1)}; the point has {rows}."
        first.fault("pattern", what, "Give each grid a row, and the pattern of its lot.")
    elif max(numbers) > count:
        first.fault("grid", f"must number the grids from 1 to {count}.")


def _label(label: str, number: int, count: int) -> str:
    return (label if count == 1 else f"{label}.{number}") or "-"


_OF_THE_POINT: dict[str, Callable[[PointPlanned], object]] = {
    "article": lambda point: point.article.casefold(),
    "zone": lambda point: point.zone.casefold(),
    "quantity": lambda point: point.quantity,
    "purpose": lambda point: point.purpose,
    "load": lambda point: point.load,
    "strain_min_um_per_m": lambda point: point.strain_min.si(),
    "strain_max_um_per_m": lambda point: point.strain_max.si(),
    "temperature_min_degC": lambda point: point.temperature_min.si(),
    "temperature_max_degC": lambda point: point.temperature_max.si(),
    "duration_h": lambda point: point.duration and point.duration.si(),
    "cycles": lambda point: point.cycles,
    "permitted_error_um_per_m": lambda point: point.permitted_error.si(),
    "datum": lambda point: point.place.datum,
    "x_mm": lambda point: point.place.x.si(),
    "y_mm": lambda point: point.place.y.si(),
    "z_mm": lambda point: point.place.z and point.place.z.si(),
    "side": lambda point: point.place.side,
    "axis": lambda point: point.place.axis,
    "axis_deg": lambda point: point.place.angle.si(),
    "place_tolerance_mm": lambda point: point.place.tolerance.si(),
    "axis_tolerance_deg": lambda point: point.place.angle_tolerance.si(),
    "lot": lambda point: point.lot.casefold(),
    "route": lambda point: point.route,
    "pattern": lambda point: point.pattern,
    "numbering": lambda point: point.numbering,
    "seen_from": lambda point: point.seen_from,
    "dummy": lambda point: point.dummy,
}
"""What every row of a point must say alike, by its column."""
