"""What a bridge shows of a leak across one of its grids."""

from __future__ import annotations

import pytest

from gaugelog.rules.leaked import middle_leak

ONE_GRID = -350 / (2.0 * (350 + 2 * 10e6))
"""Half the leakage of 10 MΩ across 350 Ω at K = 2, by parallel resistance: −8.75 µm/m."""


@pytest.mark.parametrize(
    ("arrangement", "arm", "shown"),
    [
        ("quarter three-wire", 1, ONE_GRID),
        ("half bending", 1, ONE_GRID / 2),
        ("half bending", 2, -ONE_GRID / 2),
        ("full bending", 3, ONE_GRID / 4),
        ("full bending", 4, -ONE_GRID / 4),
    ],
)
def test_a_bridge_shows_its_part_of_a_leak(arrangement: str, arm: int, shown: float) -> None:
    # bridge factors 1, 2 and 4: Dally and Riley (from memory)
    found = middle_leak(350.0, 2.0, 10e6, arm, arrangement, 0.3)
    assert -8.75e-6 == pytest.approx(ONE_GRID, rel=1e-3)
    assert shown == pytest.approx(found, rel=1e-9)
