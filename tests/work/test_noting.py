"""Notes left at a step that stays open: told there until it is done, and in the point's story."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.errors import Faulty, Refused
from gaugelog.ledger import fold
from gaugelog.ledger.story import StoryRow
from gaugelog.work import steps
from gaugelog.work.noting import leave_note
from tests.work.job import INSULATION, WALK, Job, released_job

LOW = {**INSULATION, "insulation": "0.4 GΩ"}
NOTE = "damp under the tab, drying until tomorrow"


@pytest.fixture
def job(tmp_path: Path) -> Job:
    """A point whose insulation failed."""
    made = released_job(tmp_path)
    made.walk(10)
    made.do("t.okoro", LOW)
    return made


def _leave(job: Job, who: str = "t.okoro", note: str = NOTE, point: str = "FB-1") -> None:
    leave_note(job.book, job.keys[who], point=point, note=note)


def test_a_note_is_told_at_its_step_until_the_step_is_done(job: Job) -> None:
    _leave(job)
    (told,) = steps.next_step(job.book, "FB-1").sent_back
    assert "Note (cabled) by Tobe Okoro (TO)" in told
    assert told.endswith(NOTE)
    assert steps.next_step(job.book, "FB-1").again
    job.do("t.okoro", WALK[10][1], reason="dried")
    assert () == steps.next_step(job.book, "FB-1").sent_back


def test_a_note_stands_in_the_story_and_changes_no_state(job: Job) -> None:
    before = job.state()
    _leave(job)
    assert before == job.state() == "non-conforming"
    with job.book.reading() as view:
        (turn,) = view.all(StoryRow)
    assert ("note left", "cabled", "t.okoro", NOTE) == (
        turn.turn,
        turn.step,
        turn.by,
        turn.reason,
    )


def test_the_ledger_is_rebuilt_with_its_notes(job: Job) -> None:
    _leave(job)
    with job.book.storage.reading() as reader:
        assert [] == fold.compare(reader)


def test_who_leaves_a_note_may_still_judge_the_point(job: Job) -> None:
    _leave(job, "q.reyes")
    job.do("t.okoro", WALK[10][1], reason="dried")
    assert job.do("q.reyes", {}).settled


def test_a_note_without_words_or_without_an_open_step_is_refused(job: Job) -> None:
    with pytest.raises(Faulty):
        _leave(job, note="  ")
    with pytest.raises(Refused, match="There is no point"):
        _leave(job, point="ZZ-1")
    job.do("t.okoro", WALK[10][1], reason="dried")
    for who, typed in WALK[11:]:
        job.do(who, typed)
    with pytest.raises(Refused, match="FB-1 has no step open"):
        _leave(job)
