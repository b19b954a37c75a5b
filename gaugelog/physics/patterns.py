"""Patterns of gauges with several grids: how many grids, at which angles, numbered which way.

Angles are built angles in radians from grid 1, counter-clockwise for the viewer of the gauge's
own side. A grid measures along a line, so angles half a turn apart are the same direction.
"""

from __future__ import annotations

from collections.abc import Sequence
from math import pi

from gaugelog.physics.rosette import Numbering
from gaugelog.physics.validity import OutOfDomain, one_of

GAPS: dict[str, tuple[float, ...]] = {
    "single": (pi,),
    "tee": (pi / 2, pi / 2),
    "shear pair": (pi / 2, pi / 2),
    "rectangular": (pi / 4, pi / 4, pi / 2),
    "delta": (pi / 3, pi / 3, pi / 3),
}
"""The angles between neighbouring lines of each pattern, smallest first, round half a turn."""

TURNED_APART = pi / 360
"""Half a degree: closer than this, angles are the same."""


def grid_count(pattern: str) -> int:
    """How many grids a pattern has.

    Source: ASTM E1561 (tee, rectangular and delta rosettes); a shear pair is two grids square to
    each other, common practice.
    """
    return len(GAPS[one_of("pattern", pattern, tuple(GAPS))])


def fits_pattern(pattern: str, angles: Sequence[float]) -> bool:
    """Whether grids at these built angles, radians, make up the pattern, however numbered.

    Source: ASTM E1561, rectangular rosette at 0, 45, 90° and delta rosette at 0, 60, 120°.
    """
    wanted = GAPS[one_of("pattern", pattern, tuple(GAPS))]
    lines = sorted(angle % pi for angle in angles)
    if len(lines) != len(wanted):
        return False
    round_again = [*lines[1:], lines[0] + pi]
    gaps = sorted(after - line for line, after in zip(lines, round_again, strict=True))
    return all(
        abs(gap - want) < TURNED_APART for gap, want in zip(gaps, sorted(wanted), strict=True)
    )


def numbering_of(angles: Sequence[float]) -> Numbering:
    """Which way grid 2 lies from grid 1, by the shorter way round, for the viewer of the gauge.

    Source: ASTM E1561 (grids numbered counter-clockwise); common practice.
    """
    if len(angles) < 2:
        raise OutOfDomain("angles", "of one grid turn no way.")
    turn = (angles[1] - angles[0] + pi) % (2 * pi) - pi
    return "counter-clockwise" if turn > 0 else "clockwise"
