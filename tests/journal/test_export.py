"""The journal written out as files; what they prove is judged in tests/outside."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.errors import StorageTrouble
from gaugelog.journal.export import export
from tests.journal.samples import CHAIN, SampleJournal, authority, note, signer


@pytest.fixture
def journal() -> SampleJournal:
    return SampleJournal().start()


def exported(journal: SampleJournal, folder: Path) -> int:
    with journal.storage.reading() as reader:
        return export(reader, journal.evidence, folder)


def test_every_entry_is_written_byte_for_byte(journal: SampleJournal, tmp_path: Path) -> None:
    journal.keep(note("20 Ω"), note("b"))
    assert 5 == exported(journal, tmp_path / "out")
    place = tmp_path / "out" / f"chain-{CHAIN}"
    for entry in journal.entries():
        name = f"{entry.header.seq:06d}"
        assert entry.header_bytes == (place / f"{name}.header.json").read_bytes()
        assert entry.body_bytes == (place / f"{name}.body.json").read_bytes()
    signed = sorted(path.name for path in place.glob("*.sig"))
    assert ["000003.sig", "000005.sig"] == signed
    assert journal.entries()[4].signature == (place / "000005.sig").read_bytes()


def test_certificates_evidence_and_the_guide_are_there(
    journal: SampleJournal, tmp_path: Path
) -> None:
    digest, stray = journal.evidence.put(b"a drawing"), journal.evidence.put(b"named by nothing")
    journal.keep(note(evidence=(digest,)))
    exported(journal, tmp_path)
    names = {path.name for path in (tmp_path / "certificates").iterdir()}
    prints = (signer().fingerprint, signer("technician").fingerprint)
    assert {f"{one}.{end}" for one in prints for end in ("pem", "pub.pem")} == names
    assert b"a drawing" == (tmp_path / "evidence" / digest).read_bytes()
    assert not (tmp_path / "evidence" / stray).exists()
    assert "BEGIN CERTIFICATE" in (tmp_path / "authority.pem").read_text()
    assert journal.entries()[-1].head.printed in (tmp_path / "READ ME.txt").read_text()
    assert authority().certificate


def test_a_folder_that_holds_files_is_left_alone(journal: SampleJournal, tmp_path: Path) -> None:
    (tmp_path / "mine.txt").write_text("mine")
    with pytest.raises(StorageTrouble, match="holds files already"):
        exported(journal, tmp_path)
    assert ["mine.txt"] == [path.name for path in tmp_path.iterdir()]


def test_a_folder_that_cannot_be_made_is_trouble_in_plain_words(
    journal: SampleJournal, tmp_path: Path
) -> None:
    (tmp_path / "file").write_text("in the way")
    with pytest.raises(StorageTrouble, match="can't be written"):
        exported(journal, tmp_path / "file" / "out")


def test_progress_is_told_entry_by_entry(journal: SampleJournal, tmp_path: Path) -> None:
    told: list[tuple[int, int]] = []
    with journal.storage.reading() as reader:
        export(reader, journal.evidence, tmp_path, lambda done, total: told.append((done, total)))
    assert [(1, 3), (2, 3), (3, 3)] == told
