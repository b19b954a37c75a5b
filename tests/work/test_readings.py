"""Readings in steps: whose they are, on which day a meter may be used, what is told of them."""

from __future__ import annotations

from datetime import UTC, datetime

import pytest

from gaugelog.errors import Faulty
from gaugelog.journal.clock import Moment
from gaugelog.ledger.readings import ReadingRow, ReadingTaken
from gaugelog.ledger.stock import GaugeRow
from gaugelog.work.history import entries_about
from tests.work.job import WALK, Job
from tests.work.walking import walk_to

TOO_HIGH = {**WALK[1][1], "resistance": "353.9 ohm"}
OTHER = {**WALK[1][1], "gauge": "K7-03/2"}
DUE = "2027-06-15"
"""When meter RM-2 of the demo falls due."""


def _taken(job: Job) -> list[ReadingTaken]:
    with job.book.reading() as view:
        return [ReadingTaken.model_validate_json(row.data) for row in view.all(ReadingRow)]


def _gauge(job: Job, label: str) -> GaugeRow:
    with job.book.reading() as view:
        found = view.gauge(label)
    assert found is not None
    return found


def test_a_reading_that_fails_names_the_piece_it_was_taken_on(job: Job) -> None:
    walk_to(job, "gauge")
    assert not job.do("t.okoro", TOO_HIGH).settled
    assert job.do("t.okoro", OTHER, reason="took another piece").settled
    failed, passed = _taken(job)
    assert ("fail", _gauge(job, "K7-03/1").id) == (failed.verdict.word, failed.gauge)
    assert ("pass", _gauge(job, "K7-03/2").id) == (passed.verdict.word, passed.gauge)
    assert failed.id == passed.repeats


def test_a_piece_that_failed_shows_its_reading_and_stays_on_the_shelf(job: Job) -> None:
    walk_to(job, "gauge")
    job.do("t.okoro", TOO_HIGH)
    about = [entry.header.kind for entry in entries_about(job.book, "K7-03/1")]
    assert [about[0], about[-1]] == ["lot.received", "reading.taken"]
    assert _gauge(job, "K7-03/1").state == "on shelf"


def test_later_readings_name_the_piece_in_place(job: Job) -> None:
    walk_to(job, "layout")
    walk_to(job, "coat")
    piece = _gauge(job, "K7-03/1").id
    assert len(_taken(job)) > 1
    assert {piece} == {reading.gauge for reading in _taken(job)}


def _at(job: Job, utc: datetime, offset_minutes: int) -> None:
    now = job.clock.now()
    job.clock.set(Moment(utc, offset_minutes, now.boot, now.uptime_ms))


@pytest.mark.parametrize(
    ("utc", "offset_minutes"),
    [
        (datetime(2027, 6, 16, 1, 0, tzinfo=UTC), -300),
        (datetime(2027, 6, 15, 21, 30, tzinfo=UTC), 120),
    ],
)
def test_a_meter_may_be_used_to_the_end_of_its_last_day_where_the_work_is(
    job: Job, utc: datetime, offset_minutes: int
) -> None:
    walk_to(job, "gauge")
    _at(job, utc, offset_minutes)
    assert job.do("t.okoro", WALK[1][1], minutes=0).settled


@pytest.mark.parametrize(
    ("utc", "offset_minutes"),
    [
        (datetime(2027, 6, 16, 5, 1, tzinfo=UTC), -300),
        (datetime(2027, 6, 15, 22, 1, tzinfo=UTC), 120),
    ],
)
def test_a_meter_is_overdue_once_the_next_day_began_where_the_work_is(
    job: Job, utc: datetime, offset_minutes: int
) -> None:
    walk_to(job, "gauge")
    _at(job, utc, offset_minutes)
    with pytest.raises(Faulty) as caught:
        job.do("t.okoro", WALK[1][1], minutes=0)
    assert f"due for calibration on {DUE}" in caught.value.faults[0].what
