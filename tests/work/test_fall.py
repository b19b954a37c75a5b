"""A fall of insulation from stage to stage: it passes its floor and is flagged to the end."""

from __future__ import annotations

from html import unescape
from pathlib import Path

from gaugelog.documents.content import RecordContent, build
from gaugelog.documents.page import record_html
from gaugelog.work.ports import RecordRequest
from tests.work.job import INSULATION, Job, changed_files, released_job
from tests.work.walking import here, walk_to

FALL = {"insulation": "25 GΩ", "cabled": "18 GΩ", "coated": "1.2 GΩ"}
"""What is read at each step; 18/1.2 is 15, the floor in the field 0.5 GΩ."""


def _fallen(home: Path) -> Job:
    files = changed_files(
        home,
        ("plan/criteria.toml", 'at_least = "1 Gohm"', 'at_least = "0.5 Gohm"'),
        ("instruments.toml", 'high = "20 Gohm"', 'high = "50 Gohm"'),
    )
    job = released_job(home, files)
    for step, value in FALL.items():
        walk_to(job, step)
        job.do("t.okoro", {**INSULATION, "insulation": value})
    walk_to(job, "")
    return job


def _content(job: Job) -> RecordContent:
    with job.book.reading() as view:
        row = view.point("FB-1")
        assert row is not None
        request = RecordRequest(row.id, 1, job.book.head().printed, job.clock.now(), "I submit.")
        return build(view, request, "t.okoro")


def test_a_fifteenfold_fall_passes_and_is_flagged_from_the_step_to_the_record(
    tmp_path: Path,
) -> None:
    """25, 18, 1.2 GΩ over a floor of 0.5 GΩ: above tenfold is investigated, common practice."""
    job = _fallen(tmp_path)
    assert "" == here(job)
    content = _content(job)
    read = [each for each in content.readings if each.check == "insulation"]
    assert ["bonded", "cabled", "coated"] == [each.stage for each in read]
    assert ["pass"] * 3 == [each.verdict.word for each in read]
    assert [(), ()] == [each.verdict.flags for each in read[:2]]
    (flag,) = read[2].verdict.flags
    assert flag.startswith("Insulation fell 15 times from cabled to coated")
    assert flag in unescape(record_html(content))


def test_the_point_is_signed_off_with_the_fall_told_to_both(tmp_path: Path) -> None:
    job = _fallen(tmp_path)
    told = [job.submit().flags, job.accept().flags]
    assert all(any("Insulation fell 15 times" in flag for flag in flags) for flags in told)
    assert "accepted" == job.state()
