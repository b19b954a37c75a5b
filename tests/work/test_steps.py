"""Deeds at a step: holds, times, going back, skipping, retries; nothing that was said is lost."""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import replace
from datetime import timedelta
from pathlib import Path
from typing import Any

import pytest

from gaugelog.errors import ExitCode, Faulty, Refused
from gaugelog.ledger.readings import ReadingRow
from gaugelog.ledger.steps import StepRow
from gaugelog.work import plan, steps
from tests.work.job import DEMO, INSULATION, WALK, Job, start_job
from tests.work.test_plan_deeds import stocked
from tests.work.walking import here, typed_here, walk_to

__all__ = ["stocked"]

FAILING = {**INSULATION, "insulation": "0.4 GΩ"}


def _last_fact(job: Job) -> Mapping[str, Any]:
    with job.book.storage.reading() as reader:
        return list(reader.entries())[-1].body.fact


def _faults(caught: pytest.ExceptionInfo[Faulty]) -> str:
    return "\n".join(str(fault) for fault in caught.value.faults)


def test_a_note_at_a_hold_is_kept(job: Job) -> None:
    walk_to(job, "layout-hold")
    job.do("q.reyes", {}, note="line checked with a rule")
    with job.book.reading() as view:
        (row,) = view.all(StepRow, step="layout-hold")
    assert ("released", "line checked with a rule") == (row.outcome, row.note)


def test_a_refused_hold_keeps_reason_and_note(job: Job) -> None:
    walk_to(job, "layout-hold")
    job.do("q.reyes", {}, refuse="4 mm off", note="measured twice")
    assert "4 mm off; measured twice" == _last_fact(job)["reason"]


def test_a_hold_is_not_refused_without_a_reason(job: Job) -> None:
    walk_to(job, "layout-hold")
    with pytest.raises(Faulty) as caught:
        job.do("q.reyes", {}, refuse="  ")
    assert "Say why the hold is refused" in _faults(caught)
    assert "on hold" == job.state()


def test_a_value_that_no_hold_asks_for_is_not_dropped_in_silence(job: Job) -> None:
    walk_to(job, "layout-hold")
    with pytest.raises(Faulty) as caught:
        job.do("q.reyes", {"x": "1 mm"})
    assert "x: is not asked for here. Asked for: none." in _faults(caught)


def test_a_step_that_is_no_hold_can_not_be_refused(job: Job) -> None:
    with pytest.raises(Refused, match="is no hold"):
        job.do("t.okoro", {"safe": "yes"}, refuse="no")


@pytest.mark.parametrize(
    ("at", "told"),
    [
        ("25:00", "is no time"),
        ("9:30", "is no time"),
        ("soon", "is no time"),
        ("0001-01-01 00:00+01:00", "is no time"),
        ("9999-12-31 23:59-01:00", "is no time"),
        ("0900-01-01 00:00", "is too long ago"),
        ("2006-11-17 08:00", "is too long ago"),
        ("23:59", "lies in the future"),
        ("2036-11-17 08:00", "lies in the future"),
    ],
)
def test_a_time_that_can_not_be_meant_is_told(job: Job, at: str, told: str) -> None:
    with pytest.raises(Faulty) as caught:
        job.do("t.okoro", {"safe": "yes"}, at=at)
    assert told in _faults(caught)


@pytest.mark.parametrize(
    ("at", "kept"),
    [
        ("08:10", "2026-11-17T08:10:00Z"),
        ("08:10:30", "2026-11-17T08:10:30Z"),
        ("2026-11-16 17:00", "2026-11-16T17:00:00Z"),
        ("2026-11-17T09:10+02:00", "2026-11-17T07:10:00Z"),
        ("", "2026-11-17T08:35:00Z"),
    ],
)
def test_a_time_is_understood_on_this_machines_clock(job: Job, at: str, kept: str) -> None:
    job.do("t.okoro", {"safe": "yes"}, at=at)
    assert kept == _last_fact(job)["observed_at"]


def test_a_step_observed_before_the_one_it_follows_needs_a_reason(job: Job) -> None:
    walk_to(job, "clean")
    with pytest.raises(Refused, match="08:01 lies before “Take the gauge") as refused:
        job.do("t.okoro", typed_here(job)[1], at="08:01")
    assert "--reason" in refused.value.remedy
    job.do("t.okoro", typed_here(job)[1], at="08:01", reason="done before the gauge was taken")
    told = "Observed before step gauge, which it follows. Reason: done before the gauge was taken"
    assert [told] == _last_fact(job)["flags"]


def test_a_hold_observed_before_the_step_it_follows_keeps_the_reason(job: Job) -> None:
    walk_to(job, "layout-hold")
    with pytest.raises(Refused, match="lies before “Lay out the gauge lines”"):
        job.do("q.reyes", {}, at="08:01")
    job.do("q.reyes", {}, at="08:01", reason="looked before lunch")
    assert str(_last_fact(job)["reason"]).endswith("Reason: looked before lunch")


def test_when_a_skip_was_entered_binds_no_later_step(job: Job) -> None:
    walk_to(job, "finish")
    steps.skip(job.book, job.keys["c.ward"], point="FB-1", reason="engraved at the works")
    job.clock.advance(600)
    steps.redo(job.book, job.keys["t.okoro"], point="FB-1", step="polarity", reason="wrong channel")
    when = f"{job.clock.now().local:%H:%M}"
    job.do("t.okoro", typed_here(job)[1], minutes=0, at=when, reason="the other plug")
    assert [] == _last_fact(job)["flags"]


def test_across_a_clock_that_was_set_an_earlier_time_is_kept_and_flagged(job: Job) -> None:
    walk_to(job, "clean")
    now = job.clock.now()
    job.clock.set(replace(now, utc=now.utc - timedelta(hours=1)))
    job.do("t.okoro", typed_here(job)[1], minutes=1)
    assert ["Observed before step gauge, which it follows."] == _last_fact(job)["flags"]


@pytest.mark.parametrize("step", ["finish", "gauge"])
def test_work_does_not_go_back_to_what_is_not_done_yet(job: Job, step: str) -> None:
    walk_to(job, "gauge")
    with pytest.raises(Refused, match="is not done yet"):
        steps.redo(job.book, job.keys["t.okoro"], point="FB-1", step=step, reason="r")


def test_work_goes_back_with_a_reason_to_a_step_of_the_route(job: Job) -> None:
    walk_to(job, "layout")
    with pytest.raises(Faulty):
        steps.redo(job.book, job.keys["t.okoro"], point="FB-1", step="clean", reason=" ")
    with pytest.raises(Refused, match="no step polish"):
        steps.redo(job.book, job.keys["t.okoro"], point="FB-1", step="polish", reason="r")
    steps.redo(job.book, job.keys["t.okoro"], point="FB-1", step="gauge", reason="r")
    assert "gauge" == here(job)


def test_work_does_not_go_back_while_the_record_is_under_review(job: Job) -> None:
    walk_to(job, "")
    job.submit()
    for _ in range(2):
        with pytest.raises(Refused, match=f"FB-1 is {job.state()}"):
            steps.redo(job.book, job.keys["t.okoro"], point="FB-1", step="clean", reason="r")
        if job.state() == "awaiting review":
            job.accept()


def test_nothing_is_skipped_without_a_reason_or_ahead_of_the_release(stocked: Job) -> None:
    facts = plan.understand(stocked.book, DEMO / "plan")
    (route,) = facts.routes
    lenient = tuple(step.model_copy(update={"skip": "with reason"}) for step in route.steps[:1])
    changed = route.model_copy(update={"steps": (*lenient, *route.steps[1:])})
    object.__setattr__(facts, "routes", (changed,))
    plan.load(stocked.book, stocked.keys["c.ward"], facts)
    with pytest.raises(Refused, match="can't be skipped now: The plan is not released"):
        steps.skip(stocked.book, stocked.keys["t.okoro"], point="FB-1", reason="not needed")
    with pytest.raises(Faulty):
        steps.skip(stocked.book, stocked.keys["t.okoro"], point="FB-1", reason="")


def test_a_hold_and_the_end_of_the_route_can_not_be_skipped(job: Job) -> None:
    walk_to(job, "layout-hold")
    with pytest.raises(Refused, match="can't be skipped"):
        steps.skip(job.book, job.keys["t.okoro"], point="FB-1", reason="r")
    walk_to(job, "")
    with pytest.raises(Refused, match="no step left"):
        steps.skip(job.book, job.keys["t.okoro"], point="FB-1", reason="r")


def test_a_step_is_not_done_at_the_end_of_the_route(job: Job) -> None:
    walk_to(job, "")
    with pytest.raises(Refused, match="no step left"):
        job.do("t.okoro", {})
    job.submit()
    with pytest.raises(Refused, match="Wait for the review"):
        job.do("t.okoro", {})


def test_there_is_no_step_of_a_point_that_is_not_there(job: Job) -> None:
    with pytest.raises(Refused, match="no point FB-9"):
        job.do("t.okoro", {}, "FB-9")
    with pytest.raises(Refused, match="no point FB-9"):
        steps.next_step(job.book, "FB-9")


def test_every_fault_of_a_step_is_named_at_once(job: Job) -> None:
    walk_to(job, "gauge")
    typed = {"gauge": "K9/1", "meter": "RM-9", "resistance": "350", "colour": "red"}
    with pytest.raises(Faulty) as caught:
        job.do("t.okoro", typed)
    told = _faults(caught)
    assert 4 == len(caught.value.faults), told
    for part in ("K9/1", "RM-9", "has no unit", "colour: is not asked for"):
        assert part in told
    assert "point FB-1, step gauge, meter" in told


def test_a_retry_after_a_failing_reading_shows_the_verdict_again(job: Job) -> None:
    walk_to(job, "insulation")
    once = job.do("t.okoro", FAILING, deed="deed-7")
    again = job.do("t.okoro", FAILING, deed="deed-7")
    assert not again.settled
    assert ExitCode.TROUBLE == again.exit_code
    assert once.readings == again.readings
    with job.book.reading() as view:
        assert 1 == len(view.all(ReadingRow, check="insulation"))


def test_a_deed_id_stands_for_one_deed_of_one_person(job: Job) -> None:
    job.do("t.okoro", {"safe": "yes"}, deed="deed-1")
    with pytest.raises(Refused, match="deed-1 was another one"):
        job.do("t.okoro", {"safe": "yes"}, "FB-2", deed="deed-1")
    with pytest.raises(Refused, match="deed-1 was another one"):
        job.do("q.reyes", {"safe": "yes"}, deed="deed-1")


def test_attempts_are_counted_and_all_kept_with_their_reasons(job: Job) -> None:
    walk_to(job, "insulation")
    job.do("t.okoro", FAILING, reason="first: not kept, there is nothing to explain")
    for reason in ("cleaned", "dried"):
        job.do("t.okoro", FAILING, reason=reason)
    with job.book.storage.reading() as reader:
        facts = [e.body.fact for e in reader.entries() if e.header.kind == "reading.taken"][1:]
    kept = [(f["attempt"], f["reason"]) for f in facts if f["check"] == "insulation"]
    assert [(1, ""), (2, "cleaned"), (3, "dried")] == kept
    assert facts[-1]["repeats"] == facts[-2]["id"]


def test_a_worklist_names_what_each_point_needs(tmp_path: Path, job: Job) -> None:
    walk_to(job, "layout-hold", "FB-2", "K7-03/2")
    first, second = steps.worklist(job.book)
    assert ("FB-1", "access") == (first.point, first.step.id if first.step else "")
    assert (5, len(WALK), "on hold") == (second.number, second.count, second.state)
    assert [] == steps.worklist(start_job(tmp_path / "other").book)


def test_nothing_is_kept_of_a_step_when_the_point_went_on_since_it_was_seen(job: Job) -> None:
    seen = steps.next_step(job.book, "FB-1")
    job.do("t.okoro", {"safe": "yes"})
    head = job.book.head()
    with pytest.raises(Refused, match="FB-1 went on meanwhile: it is at “Take the gauge"):
        job.do("t.okoro", {"safe": "yes"}, seen=seen)
    with pytest.raises(Refused, match="FB-1 went on meanwhile"):
        steps.skip(job.book, job.keys["t.okoro"], point="FB-1", reason="r", seen=seen)
    assert head == job.book.head()
    job.do("t.okoro", WALK[1][1], seen=steps.next_step(job.book, "FB-1"))
