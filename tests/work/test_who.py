"""Who may do what: roles, the second person, and the reviewer who never did a step."""

from __future__ import annotations

import pytest

from gaugelog.errors import Faulty, Refused
from gaugelog.ledger.points import PointRow
from gaugelog.ledger.stock import GaugeRow
from gaugelog.rules.who import workers_of
from gaugelog.work import people, reviews, steps
from tests.work.job import INSULATION, Job, PlainMaker
from tests.work.walking import enrol, typed_here, walk_to


def _workers(job: Job) -> set[str]:
    with job.book.reading() as view:
        row = view.point("FB-1")
        assert row is not None
        return workers_of(view, row.id)


def _redo(job: Job, step: str) -> None:
    steps.redo(job.book, job.keys["t.okoro"], point="FB-1", step=step, reason="not good enough")


def test_who_witnessed_a_hold_decides_it_again_after_work_went_back(job: Job) -> None:
    walk_to(job, "condition")
    _redo(job, "clean")
    walk_to(job, "condition")
    assert {"t.okoro"} == _workers(job)


def test_who_witnessed_a_hold_may_accept_after_work_went_back(job: Job) -> None:
    walk_to(job, "")
    _redo(job, "layout")
    walk_to(job, "")
    job.submit()
    assert 1 == job.accept().revision


def test_whose_step_was_done_again_by_another_still_did_a_step(job: Job) -> None:
    enrol(job, "b.oth", "technician", "reviewer")
    walk_to(job, "finish")
    job.do("b.oth", typed_here(job)[1])
    _redo(job, "finish")
    walk_to(job, "")
    job.submit()
    assert {"b.oth", "t.okoro"} == _workers(job)
    with pytest.raises(Refused, match="did a step of this point and can't accept it"):
        job.accept("b.oth")


def test_who_skipped_a_step_is_no_second_person(job: Job) -> None:
    enrol(job, "b.oth", "technician", "reviewer")
    walk_to(job, "finish")
    steps.skip(job.book, job.keys["b.oth"], point="FB-1", reason="engraved instead")
    job.submit()
    with pytest.raises(Refused, match="can't return it"):
        reviews.give_back(job.book, job.keys["b.oth"], point="FB-1", reason="x")


def test_whose_reading_failed_did_a_step_too(job: Job) -> None:
    enrol(job, "b.oth", "technician", "reviewer")
    walk_to(job, "insulation")
    failing = {**INSULATION, "insulation": "0.4 GΩ"}
    job.do("b.oth", failing)
    walk_to(job, "coating-hold")
    with pytest.raises(Refused, match="can't decide this hold"):
        job.do("b.oth", {})


def test_the_two_signatures_are_of_two_people(job: Job) -> None:
    enrol(job, "b.oth", "technician", "reviewer")
    walk_to(job, "")
    maker = PlainMaker()
    reviews.submit(job.book, job.keys["b.oth"], maker, point="FB-1", meaning="I submit.")
    with pytest.raises(Refused, match="signed this record and can't accept it"):
        job.accept("b.oth")
    assert 1 == job.accept("q.reyes").revision


@pytest.mark.parametrize("who", ["q.reyes", "c.ward"])
def test_only_technicians_do_steps_and_go_back(job: Job, who: str) -> None:
    with pytest.raises(Refused, match="role technician"):
        job.do(who, {"safe": "yes"})
    walk_to(job, "gauge")
    with pytest.raises(Refused, match="role technician"):
        steps.redo(job.book, job.keys[who], point="FB-1", step="access", reason="r")


def test_only_technicians_submit_and_only_reviewers_decide(job: Job) -> None:
    walk_to(job, "")
    with pytest.raises(Refused, match="role technician"):
        reviews.submit(job.book, job.keys["q.reyes"], PlainMaker(), point="FB-1", meaning="m")
    job.submit()
    with pytest.raises(Refused, match="role reviewer"):
        job.accept("c.ward")
    with pytest.raises(Refused, match="role reviewer"):
        reviews.give_back(job.book, job.keys["c.ward"], point="FB-1", reason="r")


def test_a_planner_alone_is_no_second_person_of_a_hold(job: Job) -> None:
    walk_to(job, "layout-hold")
    with pytest.raises(Refused, match="role technician or reviewer"):
        job.do("c.ward", {})


def test_another_technician_may_witness_a_hold(job: Job) -> None:
    enrol(job, "m.ate", "technician")
    walk_to(job, "layout-hold")
    assert job.do("m.ate", {}).settled
    assert {"t.okoro"} == _workers(job)


def test_only_a_custodian_enrols_and_revokes(job: Job) -> None:
    with pytest.raises(Refused, match="role custodian"):
        people.revoke(job.book, job.keys["q.reyes"], person="t.okoro", reason="r")


def test_whose_role_was_taken_can_act_in_it_no_more(job: Job) -> None:
    enrol(job, "t.okoro", "reviewer")
    with pytest.raises(Refused, match="role technician"):
        job.do("t.okoro", {"safe": "yes"})


def _gauge(job: Job, label: str) -> GaugeRow:
    with job.book.reading() as view:
        row = view.gauge(label)
    assert row is not None
    return row


def _point(job: Job) -> PointRow:
    with job.book.reading() as view:
        row = view.point("FB-1")
    assert row is not None
    return row


def test_a_gauge_mistaken_for_another_goes_back_on_the_shelf(job: Job) -> None:
    walk_to(job, "clean")
    _redo(job, "gauge")
    walk_to(job, "clean", gauge="K7-03/2")
    assert ("on shelf", "") == (_gauge(job, "K7-03/1").state, _gauge(job, "K7-03/1").point)
    assert "in service" == _gauge(job, "K7-03/2").state
    assert (1, _gauge(job, "K7-03/2").id) == (_point(job).generation, _point(job).gauge)


def test_a_bonded_gauge_that_is_replaced_is_removed_for_good(job: Job) -> None:
    walk_to(job, "wires")
    _redo(job, "gauge")
    walk_to(job, "wires", gauge="K7-03/2")
    assert "removed" == _gauge(job, "K7-03/1").state
    assert 2 == _point(job).generation
    _redo(job, "gauge")
    with pytest.raises(Faulty) as caught:
        walk_to(job, "wires", gauge="K7-03/1")
    assert "K7-03/1 is removed." == caught.value.faults[0].what


def test_the_same_gauge_may_be_entered_again(job: Job) -> None:
    walk_to(job, "wires")
    _redo(job, "gauge")
    walk_to(job, "wires")
    assert "in service" == _gauge(job, "K7-03/1").state
    assert 1 == _point(job).generation
