"""The demo's acts: a story that does not fit its logbook is a defect, and says where."""

from __future__ import annotations

import tomllib
from datetime import datetime, timedelta
from pathlib import Path
from typing import Any

import pytest

from gaugelog.commands.acts import Stage, StoryFault, play, title_of
from gaugelog.work import steps
from tests.commands.conftest import SMALL_JOB
from tests.work.job import Job, PlainMaker, released_job

USUAL: dict[str, Any] = tomllib.loads((SMALL_JOB / "story.toml").read_text(encoding="utf-8"))[
    "usual"
]


@pytest.fixture
def job(tmp_path: Path) -> Job:
    """A logbook with a released plan."""
    return released_job(tmp_path)


@pytest.fixture
def stage(job: Job) -> Stage:
    """The job as the stage of a story."""
    return Stage(job.book, job.clock, job.keys, PlainMaker(), USUAL, SMALL_JOB)


def _next(job: Job, point: str = "FB-1") -> str:
    found = steps.next_step(job.book, point).step
    return found.id if found is not None else ""


def test_a_walk_stops_before_the_step_it_is_to_leave_open(job: Job, stage: Stage) -> None:
    lines = {"gauge": {"gauge": "K7-03/1", "resistance": "350.1 ohm"}}
    play(stage, {"walk": "FB-1", "until": "clean", "typed": lines})
    assert _next(job) == "clean"


def test_what_is_typed_stands_over_what_is_usual(job: Job, stage: Stage) -> None:
    before = job.clock.now().utc
    play(stage, {"walk": "FB-1", "until": "gauge", "typed": {"access": {"wait": 90}}})
    assert job.clock.now().utc - before == timedelta(minutes=90)


def test_lines_are_one_attempt_after_the_other(job: Job, stage: Stage) -> None:
    tries = [
        {"gauge": "K7-03/1", "resistance": "355.1 ohm"},
        {"gauge": "K7-03/2", "resistance": "350.1 ohm", "reason": "another piece of the pack"},
    ]
    play(stage, {"walk": "FB-1", "until": "clean", "typed": {"gauge": tries}})
    assert _next(job) == "clean"


def test_a_line_for_a_step_that_never_comes_is_a_defect(stage: Stage) -> None:
    with pytest.raises(StoryFault, match="never came to polish"):
        play(stage, {"walk": "FB-1", "until": "gauge", "typed": {"polish": {}}})


def test_what_is_usual_is_typed_once_only(stage: Stage) -> None:
    failing = {"gauge": "K7-03/1", "resistance": "355.1 ohm"}
    usual = {**USUAL, "step": {**USUAL["step"], "gauge": {"wait": 1, "meter": "RM-2", **failing}}}
    again = Stage(stage.book, stage.clock, stage.keys, stage.maker, usual, SMALL_JOB)
    with pytest.raises(StoryFault, match="did not settle gauge"):
        play(again, {"walk": "FB-1", "until": "clean"})


def test_a_time_that_is_past_is_a_defect(stage: Stage) -> None:
    with pytest.raises(StoryFault, match="is past"):
        play(stage, {"walk": "FB-1", "until": "gauge", "at": datetime(2020, 1, 1, 8, 0)})


@pytest.mark.parametrize("act", [{}, {"walk": "FB-1", "submit": "FB-1"}, {"dance": "FB-1"}])
def test_an_act_is_exactly_one_of_those_there_are(act: dict[str, Any], stage: Stage) -> None:
    with pytest.raises(StoryFault, match="An act is one of"):
        play(stage, act)


def test_an_act_is_told_in_a_few_words() -> None:
    assert title_of({"walk": ["PB-1", "PB-2"], "until": "wires"}) == "walk PB-1, PB-2 until wires"
