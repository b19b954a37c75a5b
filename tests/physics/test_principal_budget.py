"""Principal values of a rosette: what correlation gives and takes, and where nothing is told."""

from __future__ import annotations

import math
from math import pi

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.physics.circuit_budget import circuit_budget
from gaugelog.physics.estimates import Estimate, normal
from gaugelog.physics.montecarlo import simulate
from gaugelog.physics.principal_budget import (
    direction_model,
    grid_names,
    principal_budgets,
    principal_budgets_notices,
    principal_model,
    rosette_correlations,
    rosette_estimates,
)
from gaugelog.physics.reading import PlannedCircuit
from gaugelog.physics.rosette import PATTERNS
from gaugelog.physics.validity import OutOfDomain

RECTANGULAR = PATTERNS["rectangular"]
READ = [normal(each * 1e-6, 3e-6) for each in (400.0, 300.0, -200.0)]


def _together(r: float) -> dict[tuple[str, str], float]:
    return {("grid 1", "grid 2"): r, ("grid 1", "grid 3"): r, ("grid 2", "grid 3"): r}


def test_the_scenarios_rosette_has_its_principal_strains_and_direction() -> None:
    found = principal_budgets(READ, RECTANGULAR)
    assert found.angle is not None
    assert [460.6, -260.6] == pytest.approx(
        [found.largest.value * 1e6, found.smallest.value * 1e6], abs=0.05
    )
    assert 16.8 == pytest.approx(math.degrees(found.angle.value), abs=0.05)


def test_errors_that_go_together_leave_the_direction_alone() -> None:
    apart, together = (principal_budgets(READ, RECTANGULAR, _together(r)) for r in (0.0, 1.0))
    assert apart.angle is not None
    assert together.angle is not None
    assert together.angle.linear < 1e-6 * apart.angle.linear
    assert 3e-6 == pytest.approx(together.largest.linear)
    assert 0.0 == pytest.approx(together.radius.linear, abs=1e-12)


@given(st.floats(-pi / 2, pi / 2))
def test_turning_the_field_leaves_the_uncertainty_of_a_rectangular_rosettes_radius_bounded(
    turn: float,
) -> None:
    strains = [normal(1e-4 + 3e-4 * math.cos(2 * (angle - turn)), 3e-6) for angle in RECTANGULAR]
    found = principal_budgets(strains, RECTANGULAR)
    assert found.angle is not None
    assert 3e-4 == pytest.approx(found.radius.value)
    assert 3e-6 / math.sqrt(2) <= found.radius.linear * 1.0001
    assert found.radius.linear <= 3e-6 * math.sqrt(1.5) * 1.0001
    assert found.angle.uncertainty < 0.02


def test_a_direction_across_grid_one_does_not_jump() -> None:
    strains = [normal(each, 1e-6) for each in (-1e-4, 1e-4, 3e-4)]
    found = principal_budgets(strains, RECTANGULAR)
    assert found.angle is not None
    assert pi / 2 == pytest.approx(found.angle.value)
    assert found.angle.uncertainty < 0.01


def test_a_state_alike_in_every_direction_tells_its_mean_and_no_direction() -> None:
    found = principal_budgets([normal(1e-4, 2e-6)] * 3, RECTANGULAR)
    assert found.angle is None
    assert 1e-4 == pytest.approx(found.largest.value)
    assert "no direction is told" in principal_budgets_notices(found)[0].message


def test_a_circle_smaller_than_its_uncertainty_is_noticed() -> None:
    near = [normal(each * 1e-6, 3e-6) for each in (102.0, 100.0, 98.0)]
    assert 1 == len(principal_budgets_notices(principal_budgets(near, RECTANGULAR)))
    assert () == principal_budgets_notices(principal_budgets(READ, RECTANGULAR))


def test_a_state_one_step_from_alike_still_has_its_budget() -> None:
    near = [normal(each * 1e-6, 2e-6) for each in (100.0, 100.0, 98.0)]
    found = principal_budgets(near, RECTANGULAR)
    assert found.angle is not None
    assert math.isfinite(found.angle.uncertainty)


def test_budgets_agree_with_their_simulations() -> None:
    inputs = dict(zip(grid_names(3), READ, strict=True))
    pairs = _together(0.5)
    found = principal_budgets(READ, RECTANGULAR, pairs)
    assert found.angle is not None
    models = {
        "largest": (principal_model(RECTANGULAR, "largest"), found.largest),
        "smallest": (principal_model(RECTANGULAR, "smallest"), found.smallest),
        "radius": (principal_model(RECTANGULAR, "radius"), found.radius),
        "angle": (direction_model(RECTANGULAR, found.angle.value), found.angle),
    }
    for model, expected in models.values():
        simulated = simulate(model, inputs, pairs, draws=100_000)
        assert expected.uncertainty == pytest.approx(simulated.uncertainty, rel=0.02)
        assert expected.value == pytest.approx(simulated.mean, abs=0.05 * expected.uncertainty)


def test_the_grids_of_one_lot_and_module_are_correlated_through_their_budgets() -> None:
    shared: dict[str, Estimate] = {"factor": normal(2.1, 0.02), "scatter": normal(0.0, 2e-6)}
    budgets = [
        circuit_budget(PlannedCircuit(each.value, 23.0, setting=2.1), shared) for each in READ
    ]
    pairs = rosette_correlations(budgets, ("factor",))
    assert pairs["grid 1", "grid 2"] > 0.5
    assert pairs["grid 1", "grid 3"] < -0.3
    estimates = rosette_estimates(budgets)
    assert [each.value for each in READ] == pytest.approx([each.value for each in estimates])
    apart = principal_budgets(estimates, RECTANGULAR)
    together = principal_budgets(estimates, RECTANGULAR, pairs)
    assert apart.angle is not None
    assert together.angle is not None
    assert together.angle.uncertainty < apart.angle.uncertainty


@pytest.mark.parametrize(
    ("act", "sentence"),
    [
        (lambda: principal_model(RECTANGULAR, "width"), "part must be one of largest"),
        (lambda: principal_budgets(READ, (0.0, 0.0, 1.0)), "angles must hold three different"),
        (lambda: principal_budgets(READ[:2], RECTANGULAR), "angles must have one angle"),
    ],
)
def test_input_without_meaning_is_named_in_a_sentence(act: object, sentence: str) -> None:
    assert callable(act)
    with pytest.raises(OutOfDomain, match=sentence):
        act()
