"""Place and axis as laid out against the plan's tolerance."""

from __future__ import annotations

import pytest

from gaugelog.ledger.base import Quantity
from gaugelog.ledger.routes import AXIS, PLACE_X, PLACE_Y, RouteStep, StepInput
from gaugelog.rules.placed import axis_effect, placed_troubles
from tests.rules.test_verdicts import POINT

STEP = RouteStep(
    id="layout",
    title="Lay out",
    subject="place",
    instruction="Lay out.",
    inputs=(
        StepInput(name="x", kind="quantity", prompt="x", unit="mm", type=PLACE_X),
        StepInput(name="y", kind="quantity", prompt="y", unit="mm", type=PLACE_Y),
        StepInput(name="axis", kind="quantity", prompt="axis", unit="deg", type=AXIS),
    ),
)


def _entered(x: str, y: str, axis: str) -> dict[str, Quantity]:
    return {
        "x": Quantity(value=x, unit="mm"),
        "y": Quantity(value=y, unit="mm"),
        "axis": Quantity(value=axis, unit="deg"),
    }


def test_a_layout_on_its_tolerance_is_let_through() -> None:
    # Common practice: ±1 mm and ±2° unless the plan says otherwise.
    assert placed_troubles(STEP, _entered("1.0", "-1.0", "2.0"), POINT) == ()


def test_everything_out_of_tolerance_is_told_at_once() -> None:
    told = placed_troubles(STEP, _entered("1.2", "-4", "-2.5"), POINT)
    assert told == (
        "The position x is 1.2 mm, planned 0 mm ± 1 mm.",
        "The position y is -4 mm, planned 0 mm ± 1 mm.",
        "The axis direction is -2.5 °, planned 0 ° ± 2 °.",
    )


def test_the_effect_of_the_axis_is_told_in_micrometres_per_metre() -> None:
    # −(1 + ν) sin²β at 100 µm/m: 5° off and ν = 0.3 give −0.99 µm/m.
    effect = axis_effect(STEP, _entered("0", "0", "5"), POINT, 0.3)
    assert "axis +5° off: -0.99 µm/m at 100 µm/m" in effect


@pytest.mark.parametrize(
    ("axis", "planned", "told"),
    [
        ("180", "0", 0),
        ("181", "0", 0),
        ("-179", "0", 0),
        ("-89", "90", 0),
        ("359", "0", 0),
        ("177", "0", 1),
        ("90", "0", 1),
    ],
)
def test_an_axis_has_no_head_and_no_tail(axis: str, planned: str, told: int) -> None:
    place = POINT.place.model_copy(update={"angle": Quantity(value=planned, unit="deg")})
    point = POINT.model_copy(update={"place": place})
    assert told == len(placed_troubles(STEP, _entered("0", "0", axis), point))


def test_the_effect_of_an_axis_counts_from_the_nearer_end() -> None:
    effect = axis_effect(STEP, _entered("0", "0", "185"), POINT, 0.3)
    assert "axis +5° off: -0.99 µm/m at 100 µm/m" in effect


@pytest.mark.parametrize("axis", ["0", "0.0", "180"])
def test_an_axis_as_planned_has_no_effect_to_tell(axis: str) -> None:
    assert axis_effect(STEP, _entered("0", "0", axis), POINT, 0.3) == ""
