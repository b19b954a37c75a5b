"""How far a point is: its worst grid, what is open, what forbids a deed and what only waits."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.errors import Refused
from gaugelog.ledger.points import GridState, PointRow
from gaugelog.rules.progress import (
    WORST_FIRST,
    NextStep,
    demand_complete,
    demand_step,
    route_for,
    subject_label,
    worst_state,
)
from gaugelog.rules.windows import WindowFound
from gaugelog.work import steps
from tests.work.job import INSULATION, WALK, Job, released_job
from tests.work.walking import walk_to


@pytest.fixture
def job(tmp_path: Path) -> Job:
    """A logbook with a released plan."""
    return released_job(tmp_path)


@pytest.mark.parametrize(
    ("states", "worst"),
    [
        ([], "planned"),
        (["accepted", "accepted"], "accepted"),
        (["accepted", "in work"], "in work"),
        (["in work", "non-conforming", "on hold"], "non-conforming"),
        (["withdrawn", "accepted"], "accepted"),
        (["withdrawn", "withdrawn"], "withdrawn"),
        (["failed in service", "non-conforming"], "failed in service"),
    ],
)
def test_a_point_shows_its_worst_grid_withdrawn_ones_left_out(
    states: list[str], worst: str
) -> None:
    assert worst == worst_state(states)


def test_every_state_of_a_grid_has_its_place() -> None:
    from typing import get_args

    assert set(get_args(GridState)) == {*WORST_FIRST, "withdrawn"}


def test_a_shut_window_is_told_apart_from_what_forbids_the_deed() -> None:
    shut = WindowFound(False, True, "within 30 min of “Clean”: over")
    found = NextStep(
        "FB-1",
        "midspan",
        "in work",
        3,
        9,
        None,
        "",
        "",
        windows=(shut,),
        blocks=("The plan is not released.", shut.sentence),
    )
    assert ("The plan is not released.",) == found.forbidden


@pytest.mark.parametrize(
    ("state", "title"),
    [("in work", "submit the record"), ("returned", "submit the record"), ("accepted", "none")],
)
def test_at_the_end_of_the_route_the_record_is_next(state: str, title: str) -> None:
    assert title == NextStep("FB-1", "z", state, 9, 9, None, "", "").title


def _point(job: Job) -> PointRow:
    with job.book.reading() as view:
        row = view.point("FB-1")
    assert row is not None
    return row


def test_everything_open_is_named_before_a_point_is_submitted(job: Job) -> None:
    walk_to(job, "insulation")
    failing = {**INSULATION, "insulation": "0.4 GΩ"}
    job.do("t.okoro", failing)
    with job.book.reading() as view, pytest.raises(Refused) as caught:
        demand_complete(view, _point(job))
    assert "step 9, “" in caught.value.message
    assert "insulation bonded of FB-1 blocks" in caught.value.message


@pytest.mark.parametrize("state", ["awaiting review", "accepted"])
def test_a_point_is_submitted_once(job: Job, state: str) -> None:
    walk_to(job, "")
    job.submit()
    if state == "accepted":
        job.accept()
    with job.book.reading() as view, pytest.raises(Refused, match=f"is {state} already"):
        demand_complete(view, _point(job))


def test_a_step_that_the_route_lacks_is_told_with_those_it_has(job: Job) -> None:
    with job.book.reading() as view:
        row = _point(job)
        assert "bond" == demand_step(view, row, "bond").id
        assert len(WALK) == len(route_for(view, row).steps)
        with pytest.raises(Refused) as caught:
            demand_step(view, row, "weld")
    assert "access, gauge, clean" in caught.value.remedy


def test_a_step_on_a_circuit_names_the_circuit(job: Job) -> None:
    walk_to(job, "wires")
    found = steps.next_step(job.book, "FB-1")
    assert "C-1" == found.subject_label
    with job.book.reading() as view:
        assert "C-1" == subject_label(view, found.subject)
        assert "" == subject_label(view, "nothing")


def test_a_measured_step_that_failed_asks_for_a_reason_next_time(job: Job) -> None:
    walk_to(job, "insulation")
    assert not steps.next_step(job.book, "FB-1").again
    job.do("t.okoro", {**INSULATION, "insulation": "0.4 GΩ"})
    assert steps.next_step(job.book, "FB-1").again


def test_the_windows_of_a_step_are_told_before_it_is_done(job: Job) -> None:
    walk_to(job, "bond")
    job.clock.advance(60)
    (window,) = steps.next_step(job.book, "FB-1").windows
    assert window.open
    job.clock.advance(2 * 3600)
    found = steps.next_step(job.book, "FB-1")
    assert found.windows[0].sentence in found.blocks
