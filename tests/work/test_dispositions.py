"""A gauge is replaced or a point withdrawn: the place starts anew, what was kept stays."""

from __future__ import annotations

import pytest

from gaugelog.errors import Faulty, Refused
from gaugelog.ledger.points import PointRow
from gaugelog.ledger.readings import ReadingRow
from gaugelog.ledger.stock import GaugeRow
from gaugelog.ledger.story import StoryRow
from gaugelog.work import dispositions, reviews, steps
from gaugelog.work.history import check_logbook
from tests.work.job import INSULATION, WALK, Job

WHY = "grid torn while soldering"
FAILING = {**INSULATION, "insulation": "0.4 GΩ"}
BONDED, BEFORE_INSULATION = 8, 8


def _replace(job: Job, who: str = "t.okoro", reason: str = WHY) -> None:
    dispositions.replace(
        job.book, job.keys[who], point="FB-1", reason=reason, meaning="I decided it."
    )


def _withdraw(job: Job, who: str = "c.ward") -> None:
    dispositions.withdraw(
        job.book, job.keys[who], point="FB-1", reason="client gave it up", meaning="I decided it."
    )


def _gauge(job: Job, label: str) -> GaugeRow:
    with job.book.reading() as view:
        found = view.gauge(label)
    assert found is not None
    return found


def _point(job: Job) -> PointRow:
    with job.book.reading() as view:
        found = view.point("FB-1")
    assert found is not None
    return found


def test_a_replaced_gauge_is_removed_and_the_route_starts_anew(job: Job) -> None:
    job.walk(BONDED)
    _replace(job)
    assert "removed" == _gauge(job, "K7-03/1").state
    assert ("", 2) == (_point(job).gauge, _point(job).generation)
    found = steps.next_step(job.book, "FB-1")
    assert (1, "in work", ()) == (found.number, found.state, found.blocks)


def test_the_old_place_is_prepared_again_before_the_new_piece_is_bonded(job: Job) -> None:
    job.walk(BONDED)
    _replace(job)
    done = []
    for who, typed in WALK[:7]:
        step = steps.next_step(job.book, "FB-1").step
        assert step is not None
        done.append(step.id)
        job.do(who, {**typed, "gauge": "K7-03/2"} if "gauge" in typed else typed)
    assert done.index("clean") < done.index("bond")


def test_the_removed_piece_is_not_taken_again(job: Job) -> None:
    job.walk(BONDED)
    _replace(job)
    job.do("t.okoro", {"safe": "yes"})
    with pytest.raises(Faulty) as caught:
        job.do(*WALK[1])
    assert "K7-03/1 is removed" in caught.value.faults[0].what


def test_a_new_piece_is_measured_afresh_and_judged_by_its_own_readings(job: Job) -> None:
    job.walk(BONDED)
    _replace(job)
    job.walk(BONDED, gauge="K7-03/2")
    assert "in service" == _gauge(job, "K7-03/2").state
    assert 2 == _point(job).generation
    with job.book.reading() as view:
        rows = view.all(ReadingRow, check="resistance")
    assert [(1, 0), (1, 0), (1, 1), (1, 1)] == [(row.attempt, row.latest) for row in rows]


def test_a_reading_that_blocked_the_old_piece_does_not_block_the_new_one(job: Job) -> None:
    job.walk(BEFORE_INSULATION)
    job.do("t.okoro", FAILING)
    assert "non-conforming" == job.state()
    _replace(job)
    assert "in work" == job.state()
    job.walk(gauge="K7-03/2")
    job.submit()
    job.accept()
    assert "accepted" == job.state()
    assert check_logbook(job.book).ok


def test_a_piece_taken_by_mistake_after_a_replacement_counts_no_generation(job: Job) -> None:
    job.walk(BONDED)
    _replace(job)
    job.walk(2, gauge="K7-03/2")
    steps.redo(job.book, job.keys["t.okoro"], point="FB-1", step="gauge", reason="wrong pack")
    job.do("t.okoro", {**WALK[1][1], "gauge": "K7-03/3"}, reason="another piece")
    assert 2 == _point(job).generation
    assert "on shelf" == _gauge(job, "K7-03/2").state


def test_replacing_an_accepted_gauge_amends_its_record(job: Job) -> None:
    job.walk()
    job.submit()
    job.accept()
    before = reviews.record(job.book, point="FB-1").pdf
    _replace(job, "q.reyes", "failed in service")
    job.walk(gauge="K7-03/2")
    assert 2 == job.submit().revision
    job.accept()
    assert [("amended", "failed in service"), ("accepted", "failed in service")] == [
        (row["state"], row["reason"]) for row in reviews.records(job.book)
    ]
    assert before == reviews.record(job.book, point="FB-1", revision=1).pdf


def test_the_story_names_the_piece_and_the_reason(job: Job) -> None:
    job.walk(BONDED)
    _replace(job)
    with job.book.reading() as view:
        (turn,) = view.all(StoryRow)
    assert ("gauge replaced", f"K7-03/1: {WHY}") == (turn.turn, turn.reason)


def test_without_a_bonded_gauge_there_is_nothing_to_replace(job: Job) -> None:
    with pytest.raises(Refused, match="No gauge is bonded"):
        _replace(job)
    job.walk(2)
    with pytest.raises(Refused, match="No gauge is bonded") as caught:
        _replace(job)
    assert "step redo FB-1 gauge" in caught.value.remedy


def test_under_review_nothing_is_replaced_or_withdrawn(job: Job) -> None:
    job.walk()
    job.submit()
    with pytest.raises(Refused, match="awaiting review"):
        _replace(job)
    with pytest.raises(Refused, match="awaiting review"):
        _withdraw(job)


def test_a_disposition_needs_a_reason(job: Job) -> None:
    job.walk(BONDED)
    with pytest.raises(Faulty):
        _replace(job, reason=" ")


def test_a_withdrawn_point_is_left_alone(job: Job) -> None:
    job.walk(BONDED)
    with pytest.raises(Refused, match="planner or reviewer"):
        _withdraw(job, "t.okoro")
    _withdraw(job)
    assert "withdrawn" == job.state()
    assert "removed" == _gauge(job, "K7-03/1").state
    for refused in (
        lambda: job.do(*WALK[8]),
        job.submit,
        lambda: _replace(job),
        lambda: _withdraw(job),
        lambda: steps.redo(
            job.book, job.keys["t.okoro"], point="FB-1", step="clean", reason="again"
        ),
    ):
        with pytest.raises(Refused, match="withdrawn"):
            refused()
    assert check_logbook(job.book).ok


def test_a_piece_that_was_not_bonded_goes_back_to_the_shelf(job: Job) -> None:
    job.walk(2)
    _withdraw(job)
    assert ("on shelf", "") == (_gauge(job, "K7-03/1").state, _gauge(job, "K7-03/1").point)
