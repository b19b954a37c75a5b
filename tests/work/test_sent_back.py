"""Why work was sent back stands first at the point, until it is dealt with."""

from __future__ import annotations

from gaugelog.work import dispositions, reviews, steps
from gaugelog.work.amend import amend
from tests.work.job import Job
from tests.work.walking import walk_to


def _told(job: Job) -> tuple[str, ...]:
    (listed,) = [row for row in steps.worklist(job.book) if row.point == "FB-1"]
    found = steps.next_step(job.book, "FB-1").sent_back
    assert listed.sent_back == found
    return found


def _return(job: Job, redo_from: str = "") -> None:
    job.submit()
    reviews.give_back(
        job.book, job.keys["q.reyes"], point="FB-1", reason="cable unnamed", redo_from=redo_from
    )


def test_nothing_was_sent_back_at_a_fresh_point(job: Job) -> None:
    assert () == _told(job)


def test_a_returned_record_tells_its_reason_until_it_is_submitted_anew(job: Job) -> None:
    walk_to(job, "")
    _return(job)
    (told,) = _told(job)
    assert told.startswith("Returned by Quilla Reyes (QR), 2026-11-17 ")
    assert told.endswith(": cable unnamed")
    job.submit()
    assert () == _told(job)


def test_doing_the_steps_again_is_not_yet_dealing_with_a_return(job: Job) -> None:
    walk_to(job, "")
    _return(job, "finish")
    walk_to(job, "")
    (told,) = _told(job)
    assert "cable unnamed" in told


def test_an_amended_record_tells_why(job: Job) -> None:
    walk_to(job, "")
    job.submit()
    job.accept()
    amend(job.book, job.keys["t.okoro"], point="FB-1", reason="cable renamed")
    (told,) = _told(job)
    assert told.startswith("Taken up again by Tobe Okoro (TO), ")
    assert told.endswith(": cable renamed")


def test_a_refused_hold_tells_why_until_it_is_released(job: Job) -> None:
    walk_to(job, "layout-hold")
    job.do("q.reyes", {}, refuse="lines 2 mm off")
    (told,) = _told(job)
    assert told.startswith("Hold refused (layout-hold) by Quilla Reyes (QR), ")
    walk_to(job, "layout-hold")
    assert (told,) == _told(job)
    job.do("q.reyes", {})
    assert () == _told(job)


def test_a_step_to_be_done_again_tells_why_until_it_is(job: Job) -> None:
    walk_to(job, "layout")
    steps.redo(job.book, job.keys["t.okoro"], point="FB-1", step="clean", reason="rust came up")
    (told,) = _told(job)
    assert told.startswith("To be done again (clean) by Tobe Okoro (TO), ")
    walk_to(job, "layout")
    assert () == _told(job)


def test_several_reasons_stand_in_the_order_they_were_given(job: Job) -> None:
    walk_to(job, "")
    _return(job, "finish")
    steps.redo(job.book, job.keys["t.okoro"], point="FB-1", step="polarity", reason="wrong lead")
    returned, again = _told(job)
    assert "cable unnamed" in returned
    assert "wrong lead" in again


def test_a_withdrawn_point_asks_for_nothing(job: Job) -> None:
    walk_to(job, "layout-hold")
    job.do("q.reyes", {}, refuse="lines 2 mm off")
    dispositions.withdraw(
        job.book, job.keys["c.ward"], point="FB-1", reason="not wanted", meaning="I withdraw."
    )
    assert () == _told(job)
