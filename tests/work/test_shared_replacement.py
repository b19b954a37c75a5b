"""A gauge is replaced in a circuit that other points share: the bridge is another one for all."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.errors import Refused
from gaugelog.ledger.readings import ReadingRow
from gaugelog.ledger.story import StoryRow
from gaugelog.work import dispositions, steps
from gaugelog.work.history import check_logbook
from tests.work.arranged import Walker, released
from tests.work.job import Job
from tests.work.test_arrangements import predictions
from tests.work.test_sharing import BENDING, TWO_ON_A_DUMMY, on_channel, point_id
from tests.work.walking import here

ZERO = "zero offset"


@pytest.fixture
def bending(tmp_path: Path) -> Walker:
    """A half bridge of points A and B, wired and come to its last checks."""
    walker = Walker(released(tmp_path, BENDING))
    on_channel(walker, BENDING)
    return walker


def replace(job: Job, point: str) -> list[str]:
    """Replace the gauge of a point; whose records are left behind by it."""
    job.clock.advance(60)
    made = dispositions.replace(
        job.book, job.keys["t.okoro"], point=point, reason="grid torn", meaning="I decided it."
    )
    return dispositions.left_behind(job.book, made)


def latest(job: Job, check: str) -> list[tuple[str, int]]:
    """Word and `latest` of every reading of a check."""
    with job.book.reading() as view:
        return [(row.word, row.latest) for row in view.all(ReadingRow, check=check)]


def zero(walker: Walker, point: str, circuit: str = "C-1", typed: str = "") -> bool:
    """Read the zero of a circuit at a point, as predicted or as typed."""
    value = typed or walker.readings[circuit]["zero"]
    return walker.job.do("t.okoro", {"module": "QB-1", "zero": value}, point).settled


def again(walker: Walker, point: str, gauge: str) -> None:
    """Walk a point anew before its circuit's zero is read, on another piece."""
    job = walker.job
    job.do("t.okoro", {"safe": "yes"}, point)
    typed = {"gauge": gauge, "meter": "RM-2", "resistance": "350.12 ohm"}
    job.do("t.okoro", typed, point)
    walker.to(point, "zero")


def test_the_other_point_keeps_its_own_steps_and_does_the_circuits_again(bending: Walker) -> None:
    replace(bending.job, "A")
    assert ("access", "wires") == (here(bending.job, "A"), here(bending.job, "B"))
    (block,) = steps.next_step(bending.job.book, "B").blocks
    assert "C-1 waits for A: “Make the place safe to work at” is open there." == block
    assert check_logbook(bending.job.book).ok


def test_a_circuits_reading_taken_elsewhere_speaks_no_more_for_the_new_bridge(
    bending: Walker,
) -> None:
    assert zero(bending, "B")
    replace(bending.job, "A")
    assert [("pass", 0)] == latest(bending.job, ZERO)


def test_a_circuits_reading_that_failed_blocks_neither_point_on_the_new_piece(
    bending: Walker,
) -> None:
    job = bending.job
    assert not zero(bending, "B", typed="3.0 mV/V")
    assert ("non-conforming", "non-conforming") == (job.state("A"), job.state("B"))
    replace(job, "A")
    assert ("in work", "in work") == (job.state("A"), job.state("B"))
    again(bending, "A", "S/9")
    assert zero(bending, "A"), "it is the first reading of this bridge and needs no reason"
    assert [("fail", 0), ("pass", 1)] == latest(job, ZERO)
    bending.all()
    assert ["none left"] * 2 == [here(job, each) or "none left" for each in "AB"]
    assert check_logbook(job.book).ok


def test_the_story_of_the_other_point_tells_of_it(bending: Walker) -> None:
    replace(bending.job, "A")
    with bending.job.book.reading() as view:
        (turn,) = view.all(StoryRow, point=point_id(bending.job, "B"))
    assert ("gauge replaced", "t.okoro") == (turn.turn, turn.by)
    assert turn.reason.startswith("at A, in the same circuit: S/")
    assert turn.reason.endswith(": grid torn")


def test_a_record_of_the_other_point_is_left_behind_and_not_accepted(bending: Walker) -> None:
    bending.all()
    bending.job.submit("B")
    assert ["B"] == replace(bending.job, "A")
    with pytest.raises(Refused, match="worked on since"):
        bending.job.accept(point="B")


def test_a_dummy_that_is_replaced_opens_every_circuit_it_serves(tmp_path: Path) -> None:
    walker = Walker(released(tmp_path, TWO_ON_A_DUMMY))
    job = walker.job
    for _ in walker.points:
        for point in walker.points:
            walker.to(point, "zero")
    walker.readings = predictions(job, TWO_ON_A_DUMMY)
    assert zero(walker, "A")
    assert zero(walker, "B", "C-2")
    replace(job, "D")
    assert ("wires", "wires") == (here(job, "A"), here(job, "B"))
    assert [("pass", 0), ("pass", 0)] == latest(job, ZERO)
    for point in "AB":
        assert "waits for D" in steps.next_step(job.book, point).blocks[0]
    assert check_logbook(job.book).ok


def test_a_circuit_with_a_withdrawn_point_says_that_it_is_to_be_planned_anew(
    bending: Walker,
) -> None:
    replace(bending.job, "A")
    dispositions.withdraw(
        bending.job.book,
        bending.job.keys["c.ward"],
        point="A",
        reason="client gave it up",
        meaning="I decided it.",
    )
    blocks = steps.next_step(bending.job.book, "B").blocks
    assert ("C-1 holds a grid of A, withdrawn: plan it anew.",) == blocks
