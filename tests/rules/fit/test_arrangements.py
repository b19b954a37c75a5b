"""What the plan check says of arrangements, dummies and patterns that do not fit."""

from __future__ import annotations

from dataclasses import replace
from pathlib import Path

import pytest

from gaugelog.rules.fit import PlanFinding
from gaugelog.work import plan
from tests.work import arranged
from tests.work.arranged import MODULE, Sketch, planned_job, refusals
from tests.work.test_arrangements import SKETCHES


def with_arms(name: str, *arms: str) -> Sketch:
    """A sketch with other arms in its one circuit."""
    sketch = SKETCHES[name]
    arrangement, _, wires = sketch.circuits[0]
    one, two, three, four = arms
    return replace(sketch, circuits=((arrangement, (one, two, three, four), wires),))


def _whats(found: list[PlanFinding]) -> list[str]:
    return [finding.what for finding in found]


@pytest.mark.parametrize("name", SKETCHES)
def test_every_arrangement_that_is_right_is_not_refused(tmp_path: Path, name: str) -> None:
    assert [] == refusals(tmp_path, SKETCHES[name])


@pytest.mark.parametrize(
    ("name", "arms", "what"),
    [
        ("half bending", ("grid A", MODULE, "grid B", MODULE), "arm 2 must hold a grid"),
        ("half bending", ("grid A", MODULE, "grid B", MODULE), "arm 3 must not hold a grid"),
        (
            "half bending",
            ("grid A", MODULE, "grid B", MODULE),
            "arm 2 lies at the article and can't hold a resistor of the module",
        ),
        (
            "half with dummy",
            ("grid A", "completion 350 ohm", MODULE, MODULE),
            "arm 2 must hold a dummy",
        ),
        ("half bending", ("grid A", "dummy B", MODULE, MODULE), "arm 2 must not hold a dummy"),
        (
            "half with dummy",
            ("grid A", "dummy B", "module 120 ohm", MODULE),
            "arms 3 and 4 are not of one nominal resistance",
        ),
        (
            "quarter two-wire",
            ("grid A", "module 120 ohm", MODULE, MODULE),
            "arms 1 and 2 are not of one nominal resistance",
        ),
    ],
)
def test_an_arm_that_holds_what_it_must_not_is_refused(
    tmp_path: Path, name: str, arms: tuple[str, ...], what: str
) -> None:
    assert what in _whats(refusals(tmp_path, with_arms(name, *arms)))


def test_a_trim_does_not_count_among_nominal_resistances(tmp_path: Path) -> None:
    trimmed = with_arms("half bending", "grid A + trim 0.5 ohm", "grid B", MODULE, MODULE)
    assert [] == refusals(tmp_path, trimmed)


def test_a_half_bridge_of_the_module_may_be_of_another_resistance(tmp_path: Path) -> None:
    other = with_arms("half bending", "grid A", "grid B", "module 1 kohm", "module 1 kohm")
    assert [] == refusals(tmp_path, other)


def test_a_dummy_where_a_grid_must_feel_strain_is_refused(tmp_path: Path) -> None:
    swapped = with_arms("half with dummy", "grid B", "dummy A", MODULE, MODULE)
    assert {
        "has the dummy B where a grid must feel strain",
        "has A as a dummy, which is planned to feel strain",
    } == set(_whats(refusals(tmp_path, swapped)))


@pytest.mark.parametrize(
    ("cell", "other", "what"),
    [
        ("counter-clockwise", "clockwise", "those of lot R-1 are numbered counter-clockwise"),
        ("gauge side", "other side", "seen from the other side those of lot R-1 are numbered"),
        ("R-1", "D-1", "is planned as rectangular, but lot D-1 is delta"),
    ],
)
def test_a_pattern_unlike_its_lots_is_refused(
    tmp_path: Path, cell: str, other: str, what: str
) -> None:
    job = planned_job(tmp_path, SKETCHES["rectangular rosette"])
    grids = tmp_path / "plan" / "grids.csv"
    text = grids.read_text(encoding="utf-8")
    assert cell in text
    grids.write_text(text.replace(cell, other), encoding="utf-8")
    plan.load(job.book, job.keys["c.ward"], plan.understand(job.book, tmp_path / "plan"))
    found = [each for each in plan.check(job.book) if each.level == "refusal"]
    assert any(what in each for each in _whats(found))


def test_clockwise_from_the_other_side_is_counter_clockwise_from_the_gauges(
    tmp_path: Path,
) -> None:
    job = planned_job(tmp_path, SKETCHES["rectangular rosette"])
    grids = tmp_path / "plan" / "grids.csv"
    text = grids.read_text(encoding="utf-8").replace("counter-clockwise", "clockwise")
    grids.write_text(text.replace("gauge side", "other side"), encoding="utf-8")
    plan.load(job.book, job.keys["c.ward"], plan.understand(job.book, tmp_path / "plan"))
    assert [] == [each for each in plan.check(job.book) if each.level == "refusal"]


MIXED = Sketch(
    (("A", "single"), ("B", "shear pair")),
    (
        ("half bending", ("grid A", "grid B.1", MODULE, MODULE), 3),
        ("quarter two-wire", ("grid B.2", MODULE, MODULE, MODULE), 2),
    ),
)


@pytest.mark.parametrize(("factor", "warned"), [("2.05", 0), ("2.02", 1)])
def test_factors_that_differ_by_more_than_the_usual_tolerance_are_warned_of(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch, factor: str, warned: int
) -> None:
    # 2.08 and 2.05 lie 0.73 % off their mean, 2.08 and 2.02 lie 1.46 %; 1 % is usual.
    lots = arranged.LOTS.replace("2.05; 2.05", f"{factor}; {factor}")
    monkeypatch.setattr(arranged, "LOTS", lots)
    found = plan.check(planned_job(tmp_path, MIXED).book)
    differing = [each for each in found if "grids' factors differ" in each.what]
    assert ["warning"] * warned == [each.level for each in differing]
    assert all("2.02 to 2.08, mean 2.05" == each.figure for each in differing)
