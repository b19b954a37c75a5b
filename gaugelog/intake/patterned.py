"""The pattern of a point's gauge as its row gives it, and which way its grids are numbered."""

from __future__ import annotations

from typing import cast

from gaugelog.intake.fields import Fields
from gaugelog.intake.griddata import pattern_of
from gaugelog.ledger.points import Numbering, SeenFrom

NUMBERED = frozenset({"shear pair", "rectangular", "delta"})
"""Patterns whose sign of shear turns with the numbering; of a tee either way reads alike."""

NUMBERINGS = ("counter-clockwise", "clockwise")
SIDES = ("gauge side", "other side")


def pattern_facts(row: Fields) -> tuple[str, Numbering, SeenFrom]:
    """Pattern, numbering and the side it is seen from; never guessed where they matter."""
    pattern = pattern_of(row)
    return (
        pattern,
        cast("Numbering", _way(row, pattern, "numbering", NUMBERINGS)),
        cast("SeenFrom", _way(row, pattern, "seen_from", SIDES)),
    )


def _way(row: Fields, pattern: str, name: str, options: tuple[str, ...]) -> str:
    if row.has(name):
        return row.choice(name, options)
    if row.sound("pattern", name) and pattern in NUMBERED:
        what = f"is missing; the grids of a {pattern} gauge are numbered one way round."
        row.fault(name, what, f"Say {' or '.join(options)}.")
    return ""
