"""The record names the certificates that are kept, and says where none is."""

from __future__ import annotations

from pathlib import Path

from gaugelog.documents.content import RecordContent
from gaugelog.documents.content.build import build
from gaugelog.documents.page import record_html
from gaugelog.intake.papers import Paper
from gaugelog.intake.stock import load_stock
from gaugelog.journal.entry import sha256
from gaugelog.journal.ids import new_id
from gaugelog.ledger.papers import PaperOf
from gaugelog.work import papers, stock
from gaugelog.work.ports import RecordRequest
from tests.work.job import Job, changed_files, released_job

LOT: tuple[PaperOf, ...] = ("lot",)
METER: tuple[PaperOf, ...] = ("instrument",)


def content_of(job: Job) -> RecordContent:
    """The record of FB-1 as it would be drawn now."""
    with job.book.reading() as view:
        row = view.point("FB-1")
        assert row is not None
        request = RecordRequest(row.id, 1, job.book.head().printed, job.clock.now(), "")
        return build(view, request)


def test_certificates_are_named_with_their_digests_and_missing_ones_as_such(tmp_path: Path) -> None:
    job = released_job(tmp_path)
    job.walk(2)
    bare = record_html(content_of(job))
    assert 2 == bare.count("no file of it is kept")  # of the lot and of the meter
    who = job.keys["t.okoro"]
    papers.add(job.book, who, Paper("<lot>.pdf", b"lot"), label="L-3504", kinds=LOT)
    papers.add(job.book, who, Paper("RM.pdf", b"meter"), label="RM-2", kinds=METER)
    content = content_of(job)
    assert content.gauge is not None
    assert [sha256(b"lot")] == [each.sha256 for each in content.gauge.certificates]
    page = record_html(content)
    assert "no file of it is kept" not in page
    assert all(text in page for text in ("&lt;lot&gt;.pdf", sha256(b"lot"), sha256(b"meter")))


def test_a_gauge_of_a_later_pack_was_received_when_its_pack_was(tmp_path: Path) -> None:
    job = released_job(tmp_path)
    later = changed_files(tmp_path, ("lots.csv", "K7-0", "K7-1"), ("lots.csv", "09-14", "11-16"))
    received = load_stock([later / "lots.csv"], new_id=new_id)
    stock.receive(job.book, job.keys["c.ward"], received)
    job.walk(2, gauge="K7-13/2")
    gauge = content_of(job).gauge
    assert gauge is not None
    assert ("K7-13/2", "2026-11-16") == (gauge.label, gauge.received_on)
