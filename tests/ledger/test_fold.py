"""The fold: replaying the journal gives the tables that grew deed by deed."""

from __future__ import annotations

import sqlite3
from dataclasses import replace
from pathlib import Path

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from gaugelog.errors import Faulty, Refused
from gaugelog.journal.entry import Entry, Fact
from gaugelog.ledger import fold, schema
from gaugelog.ledger.buffer import Buffer
from gaugelog.work import reviews, steps
from gaugelog.work.history import check_logbook
from tests.work.job import INSULATION, WALK, Job, released_job

FAILING = {**INSULATION, "insulation": "0.4 GΩ"}


def _differences(job: Job) -> list[str]:
    with job.book.storage.reading() as reader:
        return [f"{trouble.where}: {trouble.what}" for trouble in fold.compare(reader)]


@pytest.fixture
def walked(tmp_path: Path) -> Job:
    """A job with an accepted point."""
    job = released_job(tmp_path)
    job.walk(10)
    job.do("t.okoro", FAILING)
    job.do("t.okoro", WALK[10][1], reason="dried")
    for who, typed in WALK[11:]:
        job.do(who, typed)
    job.submit()
    job.accept()
    return job


def test_replay_gives_what_grew_deed_by_deed(walked: Job) -> None:
    assert _differences(walked) == []


def test_rebuilding_changes_nothing(walked: Job) -> None:
    def dump() -> list[str]:
        with sqlite3.connect(walked.book.folder / "logbook.db") as database:
            return [
                str(sorted(map(str, schema.load_rows(database, table)))) for table in schema.names()
            ]

    before = dump()
    walked.book.rebuild()
    assert before == dump()


@pytest.mark.parametrize(
    ("statement", "told"),
    [
        ("UPDATE reading SET word = 'pass' WHERE word = 'fail'", "word"),
        ("UPDATE grid SET state = 'accepted' WHERE label = 'FB-2'", "state"),
        ("DELETE FROM gauge WHERE number = 3", "missing"),
        ("UPDATE person SET roles = '[\"custodian\"]' WHERE id = 't.okoro'", "roles"),
        (
            "INSERT INTO instrument SELECT 'x', 'XX', type, serial, due, data, seq FROM instrument"
            " LIMIT 1",
            "No entry",
        ),
    ],
)
def test_a_table_edited_by_hand_is_found_and_named(walked: Job, statement: str, told: str) -> None:
    with sqlite3.connect(walked.book.folder / "logbook.db") as database:
        database.execute(statement)
    report = check_logbook(walked.book)
    assert not report.ok
    assert {trouble.step for trouble in report.troubles} == {8}
    assert told in report.troubles[0].what
    assert report.troubles[0].where.startswith("table ")


def test_kinds_of_a_newer_program_change_nothing(walked: Job) -> None:
    with walked.book.deed(walked.keys["c.ward"]) as deed:
        deed.keep_fact(Fact("moon.landed", 3, ("t.okoro",), {"crater": "Tycho"}))
    assert _differences(walked) == []
    assert check_logbook(walked.book).ok


def test_a_withheld_body_changes_nothing(walked: Job) -> None:
    with walked.book.storage.reading() as reader:
        entry = next(e for e in reader.entries() if e.header.kind == "reading.taken")
    assert list(fold.apply(Buffer(), replace_body(entry))) == []


def replace_body(entry: Entry) -> Entry:
    """The entry without its body."""
    return replace(entry, body_bytes=None)


_ACTS = ("do", "fail", "refuse", "skip", "redo", "submit", "return", "accept")


def _act(job: Job, word: str) -> None:
    found = steps.next_step(job.book, "FB-1")
    place = found.number - 1 if found.step is not None else len(WALK)
    if word in {"do", "fail", "refuse"} and place < len(WALK):
        who, typed = WALK[place]
        typed = FAILING if word == "fail" and "insulation" in typed else typed
        refuse = "not straight" if word == "refuse" and not typed else ""
        job.do(who, typed, minutes=32, reason="again", refuse=refuse)
    elif word == "skip":
        steps.skip(job.book, job.keys["t.okoro"], point="FB-1", reason="no need")
    elif word == "redo":
        steps.redo(job.book, job.keys["t.okoro"], point="FB-1", step="clean", reason="dirty")
    elif word == "submit":
        job.submit()
    elif word == "return":
        reviews.give_back(
            job.book, job.keys["q.reyes"], point="FB-1", reason="look again", redo_from="coated"
        )
    elif word == "accept":
        job.accept()


@settings(
    max_examples=12, deadline=None, suppress_health_check=[HealthCheck.function_scoped_fixture]
)
@given(acts=st.lists(st.sampled_from([*_ACTS, *["do"] * 12]), max_size=30))
def test_any_walk_is_replayed_as_it_grew(
    tmp_path_factory: pytest.TempPathFactory, acts: list[str]
) -> None:
    job = released_job(tmp_path_factory.mktemp("walk"))
    for word in acts:
        try:
            _act(job, word)
        except (Faulty, Refused):
            continue
    assert _differences(job) == []
    assert check_logbook(job.book).ok
