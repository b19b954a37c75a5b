"""A million rosette states against the bare NumPy arithmetic."""

from __future__ import annotations

import numpy as np
import pytest

from gaugelog.physics import plane, rosette
from tests.bench.compare import compare

pytestmark = [pytest.mark.bench, pytest.mark.xdist_group("bench")]

STATES = 1_000_000


def test_a_million_rosettes_take_at_most_twice_the_bare_arithmetic(
    capsys: pytest.CaptureFixture[str],
) -> None:
    rng = np.random.default_rng(1)
    one, two, three = rng.normal(0, 1e-3, (3, STATES))

    def ours() -> object:
        return plane.principal_strains(rosette.rectangular_state(one, two, three))

    def bare() -> object:
        x, y, shear = one, three, 2 * two - one - three
        centre, radius = (x + y) / 2, np.hypot(x - y, shear) / 2
        angle = np.arctan2(shear, x - y) / 2
        return centre + radius, centre - radius, angle, 2 * radius

    found = compare(ours, bare, repeats=11)
    with capsys.disabled():
        print("\n" + found.line("a million rosettes"))
    assert found.ratio <= 2
