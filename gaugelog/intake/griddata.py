"""What a certificate says of each grid of a gauge: factor, transverse sensitivity, angle.

A gauge with several grids gives a value for each, grid 1 first: `2.08; 2.09; 2.08`. One value
alone stands for all of them.
"""

from __future__ import annotations

from collections.abc import Sequence
from math import radians

from gaugelog.intake.fields import Fields
from gaugelog.ledger.base import Quantity
from gaugelog.ledger.stock import GridData
from gaugelog.physics.patterns import GAPS, fits_pattern, grid_count

PATTERNS = tuple(GAPS)
ANGLES = "grid_angles_deg"
_FIGURES = {
    "gauge_factor": "1",
    "gauge_factor_tolerance_percent": "%",
    "transverse_sensitivity_percent": "%",
}
_USUAL = {"tee": "0; 90", "shear pair": "0; 90", "rectangular": "0; 45; 90", "delta": "0; 60; 120"}


def pattern_of(row: Fields, name: str = "pattern") -> str:
    """The pattern that a row names, `single` where it names none; “rosette” may stand after it."""
    return row.choice(name, PATTERNS, "single", trailing=" rosette")


def grids_of(row: Fields, pattern: str) -> tuple[GridData, ...]:
    """The grids of a lot's gauges, as its row gives them."""
    count = grid_count(pattern) if row.sound("pattern") else None
    factors, tolerances, transverse = (
        _values(row, name, unit, count, positive=name != "transverse_sensitivity_percent")
        for name, unit in _FIGURES.items()
    )
    angles = _angles(row, pattern, count or 1)
    return tuple(
        GridData(
            number=number,
            gauge_factor=factor,
            gauge_factor_tolerance=tolerance,
            transverse_sensitivity=across,
            angle=angle,
        )
        for number, (factor, tolerance, across, angle) in enumerate(
            zip(factors, tolerances, transverse, angles, strict=False), start=1
        )
    )


def _values(
    row: Fields, name: str, unit: str, count: int | None, *, positive: bool = False
) -> list[Quantity]:
    """A value for each of `count` grids; with no count known, the one value or the first."""
    found = row.numbers(name, unit, positive=positive)
    wanted = count or 1
    if len(found) == 1:
        return found * wanted
    if count is not None and len(found) != count:
        what = f"gives {len(found)} values for {_grids(count)}."
        row.fault(name, what, "Give one for all of them, or one for each, grid 1 first.")
    return (found + found[:1] * wanted)[:wanted]


def _angles(row: Fields, pattern: str, count: int) -> list[Quantity]:
    """The built angle of each grid; asked for where there are several, for it is never guessed."""
    if not row.has(ANGLES):
        if count > 1:
            remedy = f"From grid 1, counter-clockwise, like {_USUAL[pattern]}."
            row.fault(ANGLES, f"is missing; a {pattern} gauge has {_grids(count)}.", remedy)
        return [Quantity(value="0", unit="deg")] * count
    found = row.numbers(ANGLES, "deg")
    if row.sound(ANGLES, "pattern") and not _fits(pattern, found):
        shown = "; ".join(each.value for each in found)
        remedy = f"Like {_USUAL[pattern]}." if count > 1 else "Leave it empty for one grid."
        row.fault(ANGLES, f"“{shown}” are not the angles of a {pattern} gauge.", remedy)
    return (found + [Quantity(value="0", unit="deg")] * count)[:count]


def _fits(pattern: str, angles: Sequence[Quantity]) -> bool:
    degrees = [each.to("deg") for each in angles]
    return degrees[0] == 0 and fits_pattern(pattern, [radians(each) for each in degrees])


def _grids(count: int) -> str:
    return "one grid" if count == 1 else f"{count} grids"
