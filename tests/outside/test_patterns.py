"""Patterns of gauges against the angles that ASTM E1561 gives its rosettes."""

from __future__ import annotations

from math import radians

import pytest

from gaugelog.physics.patterns import GAPS, fits_pattern, grid_count, numbering_of
from gaugelog.physics.rosette import grid_angles
from gaugelog.physics.validity import OutOfDomain

CHECKS = (grid_count, fits_pattern, numbering_of)

E1561 = {"tee": (0, 90), "rectangular": (0, 45, 90), "delta": (0, 60, 120)}
"""Degrees from grid 1, counter-clockwise: ASTM E1561, from memory."""


def _radians(degrees: tuple[float, ...]) -> list[float]:
    return [radians(each) for each in degrees]


@pytest.mark.parametrize("pattern", E1561)
def test_the_standards_angles_fit_their_own_pattern_and_no_other(pattern: str) -> None:
    angles = _radians(E1561[pattern])
    assert len(angles) == grid_count(pattern)
    fitting = {each for each in GAPS if fits_pattern(each, angles)}
    # A shear pair is a tee by its angles: two grids square to each other.
    assert fitting - {"shear pair", "tee"} == {pattern} - {"tee"}
    assert fits_pattern(pattern, angles)


@pytest.mark.parametrize(
    ("pattern", "degrees"),
    [
        ("delta", (0, 120, 240)),
        ("delta", (0, 240, 120)),
        ("rectangular", (0, 135, 270)),
        ("rectangular", (0, -45, -90)),
        ("rectangular", (0, 90, 225)),
        ("shear pair", (0, -90)),
        ("single", (0,)),
    ],
)
def test_other_ways_of_giving_the_same_lines_fit_too(
    pattern: str, degrees: tuple[float, ...]
) -> None:
    # ASTM E1561 (from memory); a grid is a line, so directions count by half turns
    assert fits_pattern(pattern, _radians(degrees))


@pytest.mark.parametrize(
    ("pattern", "degrees"),
    [("delta", (0, 45, 90)), ("rectangular", (0, 60, 120)), ("tee", (0, 80)), ("delta", (0, 60))],
)
def test_lines_of_another_pattern_do_not_fit(pattern: str, degrees: tuple[float, ...]) -> None:
    # ASTM E1561 (from memory): 45° apart is rectangular, 60° apart is delta; a tee is square
    assert not fits_pattern(pattern, _radians(degrees))


@pytest.mark.parametrize("pattern", E1561)
@pytest.mark.parametrize("numbering", ["counter-clockwise", "clockwise"])
def test_numbering_is_read_back_from_the_angles_it_gives(pattern: str, numbering: str) -> None:
    # ASTM E1561 (from memory) numbers counter-clockwise; a mirror turns that round (geometry)
    angles = grid_angles(pattern, "clockwise" if numbering == "clockwise" else "counter-clockwise")
    assert numbering == numbering_of(angles)
    assert numbering != numbering_of(
        grid_angles(
            pattern,
            "clockwise" if numbering == "clockwise" else "counter-clockwise",
            "other side",
        )
    )


def test_a_pitch_of_120_degrees_turns_as_it_is_drawn() -> None:
    # geometry: 120° is less than half a turn, 240° is more, so it turns the other way
    assert "counter-clockwise" == numbering_of(_radians((0, 120, 240)))
    assert "clockwise" == numbering_of(_radians((0, 240, 120)))


def test_one_grid_turns_no_way() -> None:
    # definition: a sense of turning needs two directions
    with pytest.raises(OutOfDomain, match="turn no way"):
        numbering_of([0.0])
