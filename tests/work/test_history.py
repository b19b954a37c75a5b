"""Entries are found by label, id or number, and told in a line."""

from __future__ import annotations

from dataclasses import replace
from pathlib import Path

import pytest

from gaugelog.errors import Faulty, Refused
from gaugelog.journal.entry import Fact
from gaugelog.work.history import check_logbook, entries_about, export_journal
from gaugelog.work.telling import about_line, labels, what_line
from tests.work.job import Job


@pytest.fixture
def walked(job: Job) -> Job:
    """A job whose first point has a gauge."""
    job.walk(3)
    return job


def test_entries_are_found_by_label_person_and_number(walked: Job) -> None:
    kinds = [entry.header.kind for entry in entries_about(walked.book, "fb-1")]
    assert ["step.done", "reading.taken", "step.done", "step.done"] == kinds[-4:]
    assert [4] == [entry.header.seq for entry in entries_about(walked.book, "4")]
    assert "person.enrolled" in {e.header.kind for e in entries_about(walked.book, "t.okoro")}
    assert walked.book.head().seq == len(entries_about(walked.book, ""))


@pytest.mark.parametrize("what", ["nowhere", "²", "0", "99999", "9" * 40, "9" * 5000])
def test_what_is_not_there_is_said(walked: Job, what: str) -> None:
    with pytest.raises(Refused) as caught:
        entries_about(walked.book, what)
    assert len(caught.value.message) < 100


def test_an_entry_is_told_in_a_line(walked: Job) -> None:
    with walked.book.reading() as view:
        names = labels(view)
    entries = {entry.header.kind: entry for entry in entries_about(walked.book, "")}
    reading = entries["reading.taken"]
    assert "reading.taken: resistance received 350.12 ohm, PASS" == what_line(reading)
    assert about_line(reading, names).startswith("FB-1")
    lot = about_line(entries["lot.received"], names)
    assert lot.startswith("L-3504, K7-03/1")
    assert lot.endswith("and 7 more")


def test_a_withheld_body_is_told_as_such(walked: Job) -> None:
    (entry,) = entries_about(walked.book, "3")
    bare = replace(entry, body_bytes=None)
    assert bare.header.kind == what_line(bare)
    assert "body withheld" == about_line(bare, {})


def test_a_kind_as_a_newer_program_wrote_it_is_told_by_its_name(walked: Job) -> None:
    with walked.book.deed(walked.keys["c.ward"]) as deed:
        deed.keep_fact(Fact("point.accepted", 7, ("t.okoro",), {"verdict": {"of": "many"}}))
    assert "point.accepted" == what_line(entries_about(walked.book, "")[-1])


def test_a_printed_head_is_held_against_the_journal(walked: Job) -> None:
    head = walked.book.head().printed
    assert check_logbook(walked.book, [head]).ok
    other = head[:-1] + ("A" if head[-1] != "A" else "B")
    assert not check_logbook(walked.book, [other]).ok
    with pytest.raises(Faulty):
        check_logbook(walked.book, ["no head"])


def test_the_export_holds_every_entry(walked: Job, tmp_path: Path) -> None:
    count = export_journal(walked.book, tmp_path / "out")
    assert count == walked.book.head().seq
    assert count == len(list((tmp_path / "out").rglob("*.header.json")))
