"""A million rosette states against the bare NumPy arithmetic of them."""

from __future__ import annotations

from typing import Any

import numpy
import pytest

from gaugelog.physics.plane import principal_strains
from gaugelog.physics.rosette import grid_angles, rectangular_state, rosette_state
from tests.bench.compare import compare

STATES = 1_000_000
ONE, TWO, THREE = numpy.random.default_rng(20261201).normal(0.0, 1e-3, (3, STATES))
DELTA = grid_angles("delta")
INVERSE = numpy.linalg.inv(
    [[numpy.cos(a) ** 2, numpy.sin(a) ** 2, numpy.sin(a) * numpy.cos(a)] for a in DELTA]
)
Parts = tuple[Any, Any, Any, Any]


def _principal(x: Any, y: Any, shear: Any) -> Parts:
    """Largest, smallest, direction and shear, with no check and no word of a missing direction."""
    mean, difference = (x + y) / 2, x - y
    radius = numpy.hypot(difference, shear) / 2
    angle = numpy.arctan2(shear, difference) / 2
    return mean + radius, mean - radius, angle, 2 * radius


def _bare_rectangular() -> Parts:
    return _principal(ONE, THREE, 2 * TWO - ONE - THREE)


def _bare_delta() -> Parts:
    return _principal(*(a * ONE + b * TWO + c * THREE for a, b, c in INVERSE))


def _parts(state: Any) -> Parts:
    found = principal_strains(state)
    return found.largest, found.smallest, found.angle, found.max_shear


def _rectangular() -> Parts:
    return _parts(rectangular_state(ONE, TWO, THREE))


def _delta() -> Parts:
    return _parts(rosette_state([ONE, TWO, THREE], DELTA))


@pytest.mark.bench
@pytest.mark.xdist_group("bench")
@pytest.mark.parametrize(
    ("name", "ours", "floor"),
    [
        ("rectangular", _rectangular, _bare_rectangular),
        ("delta by least squares", _delta, _bare_delta),
    ],
)
def test_a_million_states_cost_no_more_than_twice_the_bare_arithmetic(
    name: str, ours: Any, floor: Any, capsys: pytest.CaptureFixture[str]
) -> None:
    for found, wanted in zip(ours(), floor(), strict=True):
        assert numpy.allclose(wanted, found, rtol=0, atol=1e-12)
    found = compare(ours, floor, repeats=9)
    with capsys.disabled():
        print(f"\n{found.line(f'a million rosette states, {name}')}")
    assert found.ratio <= 2.0
