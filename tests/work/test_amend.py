"""An accepted point is taken up again: its first record stays, the next one says why it is."""

from __future__ import annotations

import pytest

from gaugelog.errors import Faulty, Refused
from gaugelog.ledger.story import StoryRow
from gaugelog.work import reviews, steps
from gaugelog.work.amend import amend
from gaugelog.work.history import check_logbook
from tests.work.job import WALK, Job

COATED_AGAIN = 12
WHY = "coating nicked by the scaffolders"


@pytest.fixture
def accepted(job: Job) -> Job:
    """A job whose point FB-1 is accepted."""
    job.walk()
    job.submit()
    job.accept()
    return job


def _amend(job: Job, redo_from: str = "coat") -> None:
    amend(job.book, job.keys["t.okoro"], point="FB-1", reason=WHY, redo_from=redo_from)


def _coat_again(job: Job) -> None:
    for who, typed in WALK[COATED_AGAIN:]:
        job.do(who, typed, reason="coated again")


def _turns(job: Job) -> list[tuple[str, int, str]]:
    with job.book.reading() as view:
        return [(row.turn, row.revision, row.reason) for row in view.all(StoryRow)]


def test_the_point_is_in_work_again_from_the_step_named(accepted: Job) -> None:
    _amend(accepted)
    found = steps.next_step(accepted.book, "FB-1")
    assert found.step is not None
    assert ("in work", "coat") == (found.state, found.step.id)


def test_without_a_step_nothing_is_done_again(accepted: Job) -> None:
    _amend(accepted, "")
    assert "submit the record" == steps.next_step(accepted.book, "FB-1").title
    assert 2 == accepted.submit().revision


def test_the_next_record_revises_the_accepted_one_and_says_why(accepted: Job) -> None:
    _amend(accepted)
    _coat_again(accepted)
    accepted.submit()
    accepted.accept()
    assert [("1", "amended", WHY), ("2", "accepted", WHY)] == [
        (row["revision"], row["state"], row["reason"]) for row in reviews.records(accepted.book)
    ]
    with accepted.book.storage.reading() as reader:
        facts = [
            entry.body.fact for entry in reader.entries() if entry.header.kind == "point.submitted"
        ]
    assert [(None, ""), (1, WHY)] == [(fact.get("revises"), fact["reason"]) for fact in facts]
    assert check_logbook(accepted.book).ok


def test_the_earlier_file_stays_and_is_handed_out(accepted: Job) -> None:
    before = reviews.record(accepted.book, point="FB-1").pdf
    _amend(accepted)
    _coat_again(accepted)
    accepted.submit()
    assert before == reviews.record(accepted.book, point="FB-1", revision=1).pdf
    assert before != reviews.record(accepted.book, point="FB-1").pdf


def test_a_returned_amendment_still_revises_the_accepted_record(accepted: Job) -> None:
    _amend(accepted, "")
    accepted.submit()
    reviews.give_back(accepted.book, accepted.keys["q.reyes"], point="FB-1", reason="not yet")
    accepted.submit()
    accepted.accept()
    assert ["amended", "returned", "accepted"] == [
        row["state"] for row in reviews.records(accepted.book)
    ]
    with accepted.book.storage.reading() as reader:
        last = [e.body.fact for e in reader.entries() if e.header.kind == "point.submitted"][-1]
    assert (3, 1) == (last["revision"], last["revises"])


def test_an_amended_record_can_be_amended_again(accepted: Job) -> None:
    for revision in (2, 3):
        _amend(accepted, "")
        assert revision == accepted.submit().revision
        accepted.accept()
    with accepted.book.storage.reading() as reader:
        last = [e.body.fact for e in reader.entries() if e.header.kind == "point.submitted"][-1]
    assert 2 == last["revises"]


def test_the_story_tells_each_turn_in_order(job: Job) -> None:
    job.walk(4)
    job.do("q.reyes", {}, refuse="the line is 4 mm off")
    job.do("t.okoro", WALK[3][1])
    job.do("q.reyes", {})
    for who, typed in WALK[5:]:
        job.do(who, typed)
    job.submit()
    reviews.give_back(job.book, job.keys["q.reyes"], point="FB-1", reason="label is missing")
    steps.redo(job.book, job.keys["t.okoro"], point="FB-1", step="finish", reason="labelled now")
    job.do(*WALK[-1])
    job.submit()
    job.accept()
    _amend(job, "")
    assert [
        ("hold refused", 0, "the line is 4 mm off"),
        ("hold released", 0, ""),
        ("submitted", 1, ""),
        ("returned", 1, "label is missing"),
        ("step reopened", 0, "labelled now"),
        ("submitted", 2, ""),
        ("accepted", 2, ""),
        ("amendment", 2, WHY),
    ] == _turns(job)


def test_a_hold_released_at_once_is_no_turn(accepted: Job) -> None:
    assert [("submitted", 1, ""), ("accepted", 1, "")] == _turns(accepted)


def test_only_an_accepted_point_is_amended_and_only_once(job: Job) -> None:
    job.walk()
    with pytest.raises(Refused, match="no accepted record to amend"):
        _amend(job)
    job.submit()
    with pytest.raises(Refused, match="no accepted record to amend"):
        _amend(job)
    job.accept()
    _amend(job)
    with pytest.raises(Refused, match="no accepted record to amend"):
        _amend(job)


def test_an_amendment_needs_a_reason_a_technician_and_a_step_of_the_route(accepted: Job) -> None:
    book, keys = accepted.book, accepted.keys
    with pytest.raises(Faulty) as caught:
        amend(book, keys["t.okoro"], point="FB-1", reason="  ")
    assert "reason" == caught.value.faults[0].where
    with pytest.raises(Refused, match="role technician"):
        amend(book, keys["q.reyes"], point="FB-1", reason=WHY)
    with pytest.raises(Refused, match="has no step polish"):
        _amend(accepted, "polish")
    with pytest.raises(Refused, match="no point FB-9"):
        amend(book, keys["t.okoro"], point="FB-9", reason=WHY)
