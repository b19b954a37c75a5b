"""Evidence: files kept under the digest of their bytes."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.errors import StorageTrouble
from gaugelog.journal.entry import sha256
from gaugelog.journal.evidence import Evidence, FolderEvidence, MemoryEvidence


@pytest.fixture(params=["folder", "memory"])
def evidence(request: pytest.FixtureRequest, tmp_path: Path) -> Evidence:
    return MemoryEvidence() if request.param == "memory" else FolderEvidence(tmp_path / "evidence")


def test_a_file_comes_back_by_its_digest(evidence: Evidence) -> None:
    digest = evidence.put(b"photo")
    assert sha256(b"photo") == digest
    assert b"photo" == evidence.get(digest)
    assert evidence.has(digest)


def test_the_same_file_is_kept_once(evidence: Evidence) -> None:
    assert evidence.put(b"photo") == evidence.put(b"photo")
    evidence.put(b"")
    assert sorted([sha256(b"photo"), sha256(b"")]) == evidence.digests()


@pytest.mark.parametrize("digest", ["0" * 64, "../../etc/passwd", ""])
def test_what_is_not_there_is_said_so(evidence: Evidence, digest: str) -> None:
    assert not evidence.has(digest)
    with pytest.raises(StorageTrouble, match="no evidence"):
        evidence.get(digest)


def test_a_folder_files_by_the_first_two_digits(tmp_path: Path) -> None:
    digest = FolderEvidence(tmp_path).put(b"photo")
    assert [tmp_path / digest[:2] / digest] == [
        path for path in tmp_path.rglob("*") if path.is_file()
    ]


def test_a_spoilt_file_is_mended_when_the_right_one_is_put_again(tmp_path: Path) -> None:
    evidence = FolderEvidence(tmp_path)
    digest = evidence.put(b"photo")
    (tmp_path / digest[:2] / digest).write_bytes(b"cut")
    evidence.put(b"photo")
    assert b"photo" == evidence.get(digest)


def test_a_folder_that_cannot_be_written_is_trouble_in_plain_words(tmp_path: Path) -> None:
    (tmp_path / "file").write_text("in the way")
    with pytest.raises(StorageTrouble, match="can't be kept"):
        FolderEvidence(tmp_path / "file").put(b"photo")
    digest = sha256(b"x")
    (tmp_path / digest[:2] / digest).mkdir(parents=True)
    with pytest.raises(StorageTrouble, match="can't be kept"):
        FolderEvidence(tmp_path).put(b"x")


def test_a_failed_write_leaves_no_litter(tmp_path: Path) -> None:
    digest = sha256(b"x")
    (tmp_path / digest[:2] / digest).mkdir(parents=True)
    with pytest.raises(StorageTrouble):
        FolderEvidence(tmp_path).put(b"x")
    assert [digest] == [path.name for path in (tmp_path / digest[:2]).iterdir()]


def test_what_was_swapped_is_never_handed_out_but_can_be_looked_at(tmp_path: Path) -> None:
    evidence = FolderEvidence(tmp_path)
    digest = evidence.put(b"revision 2")
    (tmp_path / digest[:2] / digest).write_bytes(b"revision 1")
    with pytest.raises(StorageTrouble, match="altered or swapped"):
        evidence.get(digest)
    assert b"revision 1" == evidence.as_it_lies(digest)
