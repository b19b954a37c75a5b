"""Looking at work: the route as walked, attempts of the step in hand, what is wanted of whom."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.errors import Refused
from gaugelog.work import looking
from tests.work.job import INSULATION, Job, released_job


@pytest.fixture
def job(tmp_path: Path) -> Job:
    """A released job."""
    return released_job(tmp_path)


def _wanted(job: Job, person: str) -> dict[str, str]:
    return {each.next.point: each.wanted for each in looking.for_person(job.book, person)}


def test_the_route_shows_what_was_done_by_whom_and_what_is_ahead(job: Job) -> None:
    job.walk(6)
    hand = looking.in_hand(job.book, "fb-1")
    assert 23 == len(hand.route)
    assert [*["done"] * 4, "released", "done", ""] == [each.outcome for each in hand.route[:7]]
    assert ("q.reyes", True) == (hand.route[4].by, hand.route[4].hold)
    assert hand.next.step is not None
    assert "bond" == hand.next.step.id


def test_attempts_are_those_of_the_step_in_hand_oldest_first(job: Job) -> None:
    job.walk(10)
    assert () == looking.in_hand(job.book, "FB-1").attempts
    low = {**INSULATION, "insulation": "0.4 GΩ"}
    job.do("t.okoro", low)
    job.do("t.okoro", {**low, "insulation": "0.5 GΩ"}, reason="dried")
    attempts = looking.in_hand(job.book, "FB-1").attempts
    assert [("0.4 GΩ", 1), ("0.5 GΩ", 2)] == [
        (each.reading.typed, each.reading.attempt) for each in attempts
    ]
    assert all(each.explained for each in attempts)


def test_a_point_that_is_not_there_is_refused(job: Job) -> None:
    with pytest.raises(Refused, match="There is no point ZZ-1"):
        looking.in_hand(job.book, "ZZ-1")


def test_each_deed_is_wanted_of_those_who_may_do_it(job: Job) -> None:
    assert {"FB-1": "step", "FB-2": "step"} == _wanted(job, "t.okoro")
    assert {"FB-1": "", "FB-2": ""} == _wanted(job, "q.reyes")
    job.walk(4)
    assert "hold" == _wanted(job, "q.reyes")["FB-1"]
    assert "" == _wanted(job, "t.okoro")["FB-1"]
    job.do("q.reyes", {})
    job.do("t.okoro", {"clean": "yes"})
    job.clock.advance(46 * 60)  # the window for bonding is over
    assert "" == _wanted(job, "t.okoro")["FB-1"]


def test_the_end_of_the_route_wants_a_technician_then_a_reviewer_then_nobody(job: Job) -> None:
    job.walk()
    assert "submit" == _wanted(job, "t.okoro")["FB-1"]
    job.submit()
    assert ("", "review") == (_wanted(job, "t.okoro")["FB-1"], _wanted(job, "q.reyes")["FB-1"])
    assert looking.in_hand(job.book, "FB-1").next.step is None
    job.accept()
    assert ("", "") == (_wanted(job, "t.okoro")["FB-1"], _wanted(job, "q.reyes")["FB-1"])


def test_who_is_unknown_is_wanted_nowhere_and_yours_come_first(job: Job) -> None:
    assert {"FB-1": "", "FB-2": ""} == _wanted(job, "nobody")
    job.walk(4, "FB-2")
    listed = looking.for_person(job.book, "q.reyes")
    assert ["FB-2", "FB-1"] == [each.next.point for each in listed]
