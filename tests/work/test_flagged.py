"""What a step was flagged with stands on the record, where the reviewer reads it."""

from __future__ import annotations

from html import unescape

from gaugelog.documents.content import RecordContent, build
from gaugelog.documents.page import record_html
from gaugelog.work.ports import RecordRequest
from tests.work.job import Job
from tests.work.test_qualified import qualify
from tests.work.walking import typed_here, walk_to

LAPSED = "bonding <b>& more until 2026-11-16"


def _content(job: Job) -> RecordContent:
    with job.book.reading() as view:
        row = view.point("FB-1")
        assert row is not None
        request = RecordRequest(row.id, 1, job.book.head().printed, job.clock.now(), "I submit.")
        return build(view, request, "t.okoro")


def _flags(content: RecordContent) -> dict[str, tuple[str, ...]]:
    return {step.step: step.flags for step in content.steps if step.flags}


def test_flags_are_on_the_record_beside_their_step(job: Job) -> None:
    walk_to(job, "clean")
    job.do("t.okoro", typed_here(job)[1], at="08:01", reason="found in the notebook")
    flags = _flags(_content(job))
    assert ["clean"] == list(flags)
    assert "found in the notebook" in flags["clean"][0]
    assert f"Flagged: {flags['clean'][0]}" in unescape(record_html(_content(job)))


def test_a_step_without_a_flag_shows_none(job: Job) -> None:
    walk_to(job, "clean")
    content = _content(job)
    assert {} == _flags(content)
    assert "Flagged" not in record_html(content)


def test_a_lapsed_qualification_is_on_the_record_and_never_markup(job: Job) -> None:
    qualify(job, "t.okoro", "technician", LAPSED, "wiring until 2027-01-01")
    job.do("t.okoro", typed_here(job)[1])
    content = _content(job)
    flag = "The qualification “bonding <b>& more” of t.okoro ended on 2026-11-16."
    assert {"access": (flag,)} == _flags(content)
    assert "bonding <b>" not in record_html(content)
    assert "bonding &lt;b&gt;&amp; more" in record_html(content)
    (person,) = [each for each in content.people if each.id == "t.okoro"]
    assert "2026-11-16" == person.qualifications[0].until
