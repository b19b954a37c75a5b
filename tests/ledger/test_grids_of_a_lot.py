"""A lot's figures by the number of the grid."""

from __future__ import annotations

from tests.rules.test_verdicts import LOT, q


def test_each_grid_has_the_figures_of_its_own_number() -> None:
    one = LOT.grids[0]
    two = one.model_copy(update={"number": 2, "gauge_factor": q("2.10", "1")})
    lot = LOT.model_copy(update={"grids": (one, two)})
    assert one == lot.grid(1)
    assert two == lot.grid(2)


def test_one_figure_stands_for_every_grid() -> None:
    assert LOT.grids[0] == LOT.grid(3)
