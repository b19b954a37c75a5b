"""A circuit of several points: its steps wait for each of them, and count for each of them."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.errors import Refused
from gaugelog.ledger.points import GridRow
from gaugelog.ledger.readings import ReadingRow
from gaugelog.ledger.steps import StepRow
from gaugelog.rules.taken import readings_at
from gaugelog.work import steps
from gaugelog.work.history import check_logbook
from tests.work.arranged import MODULE, Sketch, Walker, refusals, released
from tests.work.job import Job
from tests.work.test_arrangements import SKETCHES, predictions
from tests.work.walking import enrol, here

BENDING = SKETCHES["half bending"]
TWO_ON_A_DUMMY = Sketch(
    (("A", "single"), ("B", "single"), ("D", "dummy")),
    tuple(("half with dummy", (f"grid {each}", "dummy D", MODULE, MODULE), 3) for each in "AB"),
    supply="common",
)


@pytest.fixture
def bending(tmp_path: Path) -> Walker:
    """A half bridge of points A and B, both still to be begun."""
    return Walker(released(tmp_path, BENDING))


def on_channel(walker: Walker, sketch: Sketch) -> None:
    """Every point as far as its circuit's last checks."""
    for _ in walker.points:
        for point in walker.points:
            walker.to(point, "zero")
    walker.readings = predictions(walker.job, sketch)


def point_id(job: Job, label: str) -> str:
    """The id of a point."""
    with job.book.reading() as view:
        row = view.point(label)
    assert row is not None
    return row.id


def redo(job: Job, point: str, step: str) -> None:
    """Go back at a point."""
    steps.redo(job.book, job.keys["t.okoro"], point=point, step=step, reason="another plug")


def test_nobody_wires_a_bridge_of_which_one_gauge_is_not_bonded(bending: Walker) -> None:
    bending.to("A")
    found = steps.next_step(bending.job.book, "A")
    assert ("wires", "C-1") == (here(bending.job, "A"), found.subject_label)
    assert ("C-1 waits for B: “Make the place safe to work at” is open there.",) == found.blocks
    with pytest.raises(Refused, match="C-1 waits for B"):
        bending.job.do("t.okoro", {"solder": "SO-17", "flux-removed": "yes"}, "A")


def test_a_step_on_a_circuit_is_done_once_and_counts_for_both_points(bending: Walker) -> None:
    bending.to("A")
    bending.to("B", "cabled")
    assert ("cabled", "cabled") == (here(bending.job, "A"), here(bending.job, "B"))
    with bending.job.book.reading() as view:
        rows = view.all(StepRow, step="wires")
    assert {point_id(bending.job, label) for label in "AB"} == {row.point for row in rows}
    assert {"t.okoro"} == {row.by for row in rows}
    assert 1 == len({(row.subject, row.seq) for row in rows})


def test_who_does_a_step_on_a_circuit_has_worked_at_each_of_its_points(bending: Walker) -> None:
    enrol(bending.job, "u.hart", "technician", "reviewer")
    bending.to("A")
    bending.to("B", "wires")
    bending.job.do("u.hart", {"solder": "SO-17", "flux-removed": "yes"}, "B")
    bending.to("A", "coating-hold")
    with pytest.raises(Refused, match=r"u\.hart did a step of this point"):
        bending.job.do("u.hart", {}, "A")


def test_a_circuits_reading_stands_at_each_point_and_is_counted_once(bending: Walker) -> None:
    on_channel(bending, BENDING)
    job = bending.job
    assert not job.do("t.okoro", {"module": "QB-1", "zero": "3.0 mV/V"}, "A").settled
    assert ("non-conforming", "non-conforming") == (job.state("A"), job.state("B"))
    assert steps.next_step(job.book, "B").again
    right = {"module": "QB-1", "zero": bending.readings["C-1"]["zero"]}
    assert job.do("t.okoro", right, "B", reason="plug was loose").settled
    assert ("in work", "in work") == (job.state("A"), job.state("B"))
    with job.book.reading() as view:
        attempts = [row.attempt for row in view.all(ReadingRow, check="zero offset")]
        at_a, at_b = (
            [
                row.id
                for row in readings_at(view, point_id(job, label))
                if row.check == "zero offset"
            ]
            for label in "AB"
        )
    assert [1, 2] == attempts
    assert at_a == at_b


def test_going_back_at_one_point_opens_the_circuits_steps_at_the_other(bending: Walker) -> None:
    on_channel(bending, BENDING)
    bending.to("A", "shunt")
    redo(bending.job, "A", "bonded")
    assert ("bonded", "wires") == (here(bending.job, "A"), here(bending.job, "B"))
    assert "C-1 waits for A" in steps.next_step(bending.job.book, "B").blocks[0]
    assert check_logbook(bending.job.book).ok


def test_a_record_is_not_accepted_when_its_circuit_was_worked_on_since(bending: Walker) -> None:
    on_channel(bending, BENDING)
    bending.all()
    bending.job.submit("B")
    redo(bending.job, "A", "zero")
    assert "awaiting review" == bending.job.state("B")
    with pytest.raises(Refused, match="worked on since"):
        bending.job.accept(point="B")
    typed = {"module": "QB-1", "zero": bending.readings["C-1"]["zero"]}
    bending.job.do("t.okoro", typed, "A", reason="another plug")
    with pytest.raises(Refused, match="worked on since"):
        bending.job.accept(point="B")


def test_a_shared_dummy_is_walked_with_its_first_circuit_and_holds_up_no_other(
    tmp_path: Path,
) -> None:
    walker = Walker(released(tmp_path, TWO_ON_A_DUMMY))
    job = walker.job
    walker.to("D")
    assert "C-1 waits for A" in steps.next_step(job.book, "D").blocks[0]
    walker.to("A", "cabled")
    walker.to("D", "loop")
    walker.to("B", "cabled")
    assert ("cabled", "loop") == (here(job, "B"), here(job, "D"))
    dummy = point_id(job, "D")
    with job.book.reading() as view:
        (grid,) = view.all(GridRow, point=dummy)
        wired = view.all(StepRow, point=dummy, step="wires")
    assert [grid.circuit] == [row.subject for row in wired]


def test_a_shared_dummy_on_supplies_of_their_own_is_refused(tmp_path: Path) -> None:
    separate = Sketch(TWO_ON_A_DUMMY.points, TWO_ON_A_DUMMY.circuits)
    (found,) = refusals(tmp_path, separate)
    assert "D" == found.subject
    assert "is shared by C-1, C-2, whose supply is neither common nor switched" == found.what
    assert "M1/1 separate, M1/2 separate" == found.figure


@pytest.mark.parametrize("supply", ["common", "switched"])
def test_a_dummy_is_shared_on_a_common_or_switched_supply(tmp_path: Path, supply: str) -> None:
    shared = Sketch(TWO_ON_A_DUMMY.points, TWO_ON_A_DUMMY.circuits, supply=supply)
    assert [] == refusals(tmp_path, shared)


def test_another_piece_for_the_second_grid_of_a_rosette_is_refused(tmp_path: Path) -> None:
    job = released(tmp_path, SKETCHES["rectangular rosette"])
    job.do("t.okoro", {"safe": "yes"}, "A")
    first = {"gauge": "R/1", "meter": "RM-2", "resistance": "350.1 ohm"}
    job.do("t.okoro", first, "A")
    with pytest.raises(Refused, match=r"are of one gauge, and R/1 was taken for A\.1"):
        job.do("t.okoro", {**first, "gauge": "R/2"}, "A")
    assert job.do("t.okoro", {**first, "resistance": "350.2 ohm"}, "A").settled


def test_a_rosette_is_bonded_once_and_read_grid_by_grid(tmp_path: Path) -> None:
    walker = Walker(released(tmp_path, SKETCHES["rectangular rosette"]))
    walker.to("A", "wires")
    did = [(step, subject) for _, step, subject in walker.done]
    assert 1 == sum(step == "bond" for step, _ in did)
    assert ["A.1", "A.2", "A.3"] == [subject for step, subject in did if step == "bonded"]
