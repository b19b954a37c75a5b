"""Certificates as evidence: kept at receipt or later, named by digest, missing where they are."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.errors import Refused
from gaugelog.intake.instruments import load_instruments
from gaugelog.intake.papers import Paper
from gaugelog.intake.stock import load_stock
from gaugelog.journal.entry import sha256
from gaugelog.journal.ids import new_id
from gaugelog.ledger.papers import CertificateRow, PaperOf
from gaugelog.work import instruments, papers, stock
from gaugelog.work.history import check_logbook, entries_about
from tests.work.job import Job, changed_files, start_job

LOTS: tuple[PaperOf, ...] = ("lot", "consumable")
METERS: tuple[PaperOf, ...] = ("instrument",)
SHEET = Paper("L-3504.pdf", b"%PDF-1.7 data of lot L-3504")


def rows(job: Job) -> list[CertificateRow]:
    """Every certificate that is kept."""
    with job.book.reading() as view:
        return view.all(CertificateRow)


def add(
    job: Job, paper: Paper, label: str, kinds: tuple[PaperOf, ...], who: str = "t.okoro"
) -> str:
    """Keep a certificate; its digest."""
    return papers.add(job.book, job.keys[who], paper, label=label, kinds=kinds).file


def test_a_lots_certificate_that_comes_later_is_kept_bit_for_bit(job: Job) -> None:
    digest = add(job, SHEET, "l-3504", LOTS)
    assert (sha256(SHEET.data), SHEET.data) == (digest, job.book.evidence.get(digest))
    (row,) = rows(job)
    assert ("L-3504.pdf", "t.okoro", digest) == (row.name, row.by, row.file)
    assert "certificate.kept" == entries_about(job.book, "L-3504")[-1].header.kind


def test_certificates_that_come_with_the_delivery_are_kept_in_the_same_deed(tmp_path: Path) -> None:
    files = changed_files(
        tmp_path,
        ("lots.csv", "expires\n", "expires,certificate_file\n"),
        ("lots.csv", "2029-09-01\n", "2029-09-01,cert.pdf\n"),
        (
            "instruments.toml",
            "due = 2027-06-15\n",
            'due = 2027-06-15\ncertificate_file = "RM.pdf"\n',
        ),
    )
    (files / "cert.pdf").write_bytes(SHEET.data)
    (files / "RM.pdf").write_bytes(b"%PDF-1.7 of the meter")
    job = start_job(tmp_path)
    received = load_stock([files / "lots.csv", files / "consumables.csv"], new_id=new_id)
    done = stock.receive(job.book, job.keys["c.ward"], received, received.papers)
    assert 1 == done.certificates
    given: dict[str, Paper] = {}
    meters = load_instruments(files / "instruments.toml", new_id, given)
    instruments.add(job.book, job.keys["c.ward"], meters, given)
    assert [("cert.pdf", ""), ("RM.pdf", "CAL-26-0719")] == [
        (row.name, row.number) for row in rows(job)
    ]
    assert check_logbook(job.book).ok


def test_a_meter_calibrated_anew_has_a_certificate_of_its_own(job: Job, tmp_path: Path) -> None:
    add(job, Paper("old.pdf", b"old"), "RM-2", METERS)
    new = 'certificate_number = "CAL-27-0001"'
    files = changed_files(tmp_path, ("instruments.toml", 'certificate_number = "CAL-26-0719"', new))
    meters = load_instruments(files / "instruments.toml", new_id=new_id)
    instruments.add(job.book, job.keys["c.ward"], meters)
    add(job, Paper("new.pdf", b"new"), "RM-2", METERS)
    numbers = [(row.name, row.number) for row in rows(job)]
    assert [("old.pdf", "CAL-26-0719"), ("new.pdf", "CAL-27-0001")] == numbers
    assert 1 == len({row.item for row in rows(job)})


def test_the_same_file_is_kept_once_and_another_beside_it(job: Job) -> None:
    add(job, SHEET, "L-3504", LOTS)
    with pytest.raises(Refused, match="certificate of L-3504 is kept already"):
        add(job, SHEET, "L-3504", LOTS)
    add(job, Paper("thermal output.pdf", b"%PDF-1.7 another sheet"), "L-3504", LOTS)
    assert 2 == len(rows(job))


def test_what_is_not_there_and_who_may_not_are_refused(job: Job) -> None:
    with pytest.raises(Refused, match="No lot or consumable is called RM-2"):
        add(job, SHEET, "RM-2", LOTS)
    with pytest.raises(Refused, match="No instrument is called L-3504"):
        add(job, SHEET, "L-3504", METERS)
    with pytest.raises(Refused, match="does not have the role"):
        add(job, SHEET, "L-3504", LOTS, who="q.reyes")
    assert [] == rows(job)


def test_a_certificate_that_is_missing_is_named_by_the_check(job: Job) -> None:
    digest = add(job, SHEET, "L-3504", LOTS)
    (job.book.folder / "evidence" / digest[:2] / digest).unlink()
    (trouble,) = check_logbook(job.book).troubles
    assert digest in f"{trouble.where} {trouble.what}"
