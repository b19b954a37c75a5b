"""A point walks its route: what is let through, what is refused, what state it shows."""

from __future__ import annotations

import pytest

from gaugelog.errors import Faulty, Refused
from gaugelog.ledger.readings import ReadingRow
from gaugelog.ledger.steps import StepRow
from gaugelog.ledger.stock import GaugeRow
from gaugelog.work import people, reviews, steps
from gaugelog.work.history import check_logbook
from tests.work.job import INSULATION, WALK, WORD, Job, PlainMaker

FAILING = {**INSULATION, "insulation": "0.4 GΩ"}
GOOD = {**INSULATION, "insulation": "19 GΩ"}
BEFORE_INSULATION, BEFORE_HOLD = 10, 4


def test_a_point_walks_from_plan_to_accepted(job: Job) -> None:
    assert job.state() == "released"
    job.walk(1)
    assert job.state() == "in work"
    for who, typed in WALK[1:]:
        job.do(who, typed)
    job.submit()
    assert job.state() == "awaiting review"
    job.accept()
    assert job.state() == "accepted"
    assert check_logbook(job.book).ok


def test_a_hold_and_what_follows_it_show_as_states(job: Job) -> None:
    job.walk(BEFORE_HOLD)
    assert job.state() == "on hold"
    job.do("q.reyes", {})
    assert job.state() == "in work"
    for who, typed in WALK[5:12]:
        job.do(who, typed)
    assert job.state() == "ready to coat"


def test_a_hold_is_not_decided_by_who_did_the_work(job: Job) -> None:
    job.walk(BEFORE_HOLD)
    with pytest.raises(Refused, match="can't decide this hold"):
        job.do("t.okoro", {})


def test_a_refused_hold_sends_the_work_back(job: Job) -> None:
    job.walk(BEFORE_HOLD)
    job.do("q.reyes", {}, refuse="the line is 4 mm off")
    found = steps.next_step(job.book, "FB-1")
    assert found.step is not None
    assert found.step.id == "layout"
    job.do("t.okoro", WALK[3][1])
    assert job.state() == "on hold"


def test_a_failing_reading_is_kept_and_the_step_stays_open(job: Job) -> None:
    job.walk(BEFORE_INSULATION)
    outcome = job.do("t.okoro", FAILING)
    assert not outcome.settled
    assert job.state() == "non-conforming"
    with pytest.raises(Faulty) as caught:
        job.do("t.okoro", GOOD)
    assert "measured before" in caught.value.faults[0].what
    assert job.do("t.okoro", GOOD, reason="flux cleaned off").settled
    assert job.state() == "on hold"
    with job.book.reading() as view:
        rows = view.all(ReadingRow, check="insulation", stage="cabled")
    assert [(row.attempt, row.latest, row.word) for row in rows] == [(1, 0, "fail"), (2, 1, "pass")]


def test_a_blocking_reading_keeps_the_point_from_being_submitted(job: Job) -> None:
    job.walk(BEFORE_INSULATION)
    job.do("t.okoro", FAILING)
    with pytest.raises(Refused, match="insulation cabled of FB-1 blocks"):
        job.submit()


def test_a_window_that_is_over_refuses_the_step_and_redo_opens_it(job: Job) -> None:
    job.walk(6)
    with pytest.raises(Refused, match="too late"):
        job.do("t.okoro", WALK[6][1], minutes=60)
    steps.redo(job.book, job.keys["t.okoro"], point="FB-1", step="condition", reason="too late")
    job.do("t.okoro", WALK[5][1])
    assert job.do("t.okoro", WALK[6][1], minutes=10).settled


def test_a_step_before_its_time_is_refused(job: Job) -> None:
    job.walk(7)
    with pytest.raises(Refused, match="to wait"):
        job.do("t.okoro", WALK[7][1], minutes=2)


def test_across_a_clock_set_back_no_window_is_judged_and_that_is_flagged(job: Job) -> None:
    job.walk(6)
    moment = job.clock.now()
    job.clock.advance(25 * 60)
    later = job.clock.now()
    back = type(moment)(
        moment.utc.replace(hour=moment.utc.hour - 1), 0, later.boot, later.uptime_ms
    )
    job.clock.set(back)
    assert job.do("t.okoro", WALK[6][1], minutes=0).settled
    with job.book.storage.reading() as reader:
        last = list(reader.entries())[-1].body.fact
    assert "not judged" in last["flags"][0]
    assert any("clock" in notice.what.lower() for notice in check_logbook(job.book).notices)


def test_observed_earlier_is_kept_apart_from_entered(job: Job) -> None:
    job.do("t.okoro", {"safe": "yes"}, at="08:10")
    with job.book.reading() as view:
        (row,) = view.all(StepRow)
    assert row.observed_at == "2026-11-17T08:10:00Z"
    assert row.entered_at.startswith("2026-11-17T08:35")


@pytest.mark.parametrize(
    ("typed", "told"),
    [
        ({"gauge": "K9-01/1"}, "no gauge is called"),
        ({"meter": "IT-5"}, "does not measure resistance"),
        ({"resistance": "120 ohm"}, "can't be a gauge"),
        ({"resistance": "350.1"}, "has no unit"),
    ],
)
def test_wrong_inputs_of_a_step_are_told(job: Job, typed: dict[str, str], told: str) -> None:
    job.walk(1)
    with pytest.raises(Faulty) as caught:
        job.do("t.okoro", {**WALK[1][1], **typed})
    assert told in caught.value.faults[0].what


def test_a_gauge_is_taken_once(job: Job) -> None:
    job.walk(2)
    with job.book.reading() as view:
        taken = view.gauge("K7-03/1")
    assert taken is not None
    assert isinstance(taken, GaugeRow)
    assert taken.state == "in service"
    job.do("t.okoro", {"safe": "yes"}, "FB-2")
    with pytest.raises(Faulty) as caught:
        job.do("t.okoro", WALK[1][1], "FB-2")
    assert "in service" in caught.value.faults[0].what


def test_an_overdue_meter_and_an_expired_lot_are_refused(job: Job) -> None:
    job.walk(1)
    job.clock.advance(370 * 86400)
    with pytest.raises(Faulty) as caught:
        job.do("t.okoro", WALK[1][1])
    assert "due for calibration on 2027-06-15" in caught.value.faults[0].what


def test_skip_rules_hold(job: Job) -> None:
    with pytest.raises(Refused, match="can't be skipped"):
        steps.skip(job.book, job.keys["t.okoro"], point="FB-1", reason="no time")
    job.walk(len(WALK) - 1)
    assert steps.skip(job.book, job.keys["t.okoro"], point="FB-1", reason="engraved").settled
    job.submit()


def test_the_reviewer_is_nobody_who_did_a_step(job: Job) -> None:
    authority = job.folder.unlock_authority(WORD)
    both = people.Newcomer("b.oth", "Both", "BO", ("technician", "reviewer"))
    job.keys["b.oth"] = people.enrol(
        job.book, job.keys["c.ward"], authority, job.folder, newcomer=both, passphrase=WORD
    )
    job.walk(len(WALK) - 1)
    job.do("b.oth", WALK[-1][1])
    job.submit()
    with pytest.raises(Refused, match="did a step"):
        job.accept("b.oth")
    with pytest.raises(Refused, match="role reviewer"):
        job.accept("t.okoro")
    assert job.accept().revision == 1


def test_a_returned_point_goes_on_from_the_step_named(job: Job) -> None:
    job.walk()
    job.submit()
    reviews.give_back(
        job.book, job.keys["q.reyes"], point="FB-1", reason="coat again", redo_from="coat"
    )
    assert job.state() == "returned"
    for who, typed in WALK[12:]:
        job.do(who, typed, reason="coated again")
    assert job.submit().revision == 2
    job.accept()
    assert [row["state"] for row in reviews.records(job.book)] == ["returned", "accepted"]


def test_a_returned_point_can_be_submitted_again_as_it_is(job: Job) -> None:
    job.walk()
    job.submit()
    assert "one signature, not yet valid" in reviews.record(job.book, point="FB-1").description
    reviews.give_back(job.book, job.keys["q.reyes"], point="FB-1", reason="wrong name")
    assert "returned, never valid" in reviews.record(job.book, point="FB-1").description
    assert job.submit().revision == 2


def test_a_point_touched_while_its_record_is_drawn_is_not_submitted(job: Job) -> None:
    job.walk()

    class Slow(PlainMaker):
        def submitted(self, view, request, signer):  # type: ignore[no-untyped-def]
            steps.redo(
                job.book, job.keys["t.okoro"], point="FB-1", step="finish", reason="label fell off"
            )
            return super().submitted(view, request, signer)

    with pytest.raises(Refused, match="changed while its record was drawn"):
        reviews.submit(job.book, job.keys["t.okoro"], Slow(), point="FB-1", meaning="m")
    assert reviews.records(job.book) == []


def test_a_retry_with_the_same_deed_enters_nothing_twice(job: Job) -> None:
    before = job.book.head().seq
    steps.do(job.book, job.keys["t.okoro"], point="FB-1", typed={"safe": "yes"}, deed="deed-1")
    once = job.book.head().seq
    assert once == before + 1
    again = steps.do(
        job.book, job.keys["t.okoro"], point="FB-1", typed={"safe": "yes"}, deed="deed-1"
    )
    assert again.settled
    assert "kept before" in again.lines[0]
    assert once == job.book.head().seq


def test_a_revoked_person_can_do_nothing_more(job: Job) -> None:
    people.revoke(job.book, job.keys["c.ward"], person="t.okoro", reason="left", erase_name=True)
    with pytest.raises(Refused, match="revoked"):
        job.do("t.okoro", {"safe": "yes"})
    report = check_logbook(job.book)
    assert report.ok
    assert any("erased" in notice.what for notice in report.notices)
    with job.book.reading() as view:
        assert view.name("t.okoro") == "t.okoro (name erased)"
