"""A logbook in one file: whole, checked, restored with an entry that says so, or not at all."""

from __future__ import annotations

import json
import resource
import shutil
import subprocess
import zipfile
from collections.abc import Callable, Iterator
from contextlib import contextmanager
from pathlib import Path
from typing import Any

import pytest

from gaugelog.errors import Faulty, GaugelogError, Refused, StorageTrouble
from gaugelog.journal.entry import Entry
from gaugelog.journal.storage.snapshot import copy_database
from gaugelog.ledger.restored import LogbookRestored
from gaugelog.work.backup import BackedUp, Restored, backup, opened, restore
from gaugelog.work.history import check_logbook, entries_about
from gaugelog.work.logbook import Logbook
from tests.foreign import needs
from tests.work.job import INSULATION, WALK, Job, copied, released_job

FAILING = {**INSULATION, "insulation": "0.4 GΩ"}


@pytest.fixture(scope="module")
def _walked(tmp_path_factory: pytest.TempPathFactory) -> Job:
    job = released_job(tmp_path_factory.mktemp("walked"))
    job.walk(3)
    return job


@pytest.fixture
def job(_walked: Job, tmp_path: Path) -> Job:
    """A job of its own whose first point has a gauge."""
    book = copied(_walked.book.folder, tmp_path / "book", _walked.clock)
    return Job(book, _walked.clock, _walked.folder, _walked.keys)


@pytest.fixture
def kept(job: Job, tmp_path: Path) -> Path:
    """A backup of it."""
    return backup(job.book, tmp_path / "kept.zip").path


def restored(
    job: Job, file: Path, folder: Path, *heads: str, who: str = "c.ward", reason: str = "disk died"
) -> Restored:
    with opened(file) as archive:
        return restore(
            archive, folder, job.keys[who], reason=reason, printed=heads, clock=job.clock
        )


def rewritten(file: Path, change: Callable[[dict[str, bytes]], None]) -> Path:
    """The backup with its files changed, as a new zip beside it."""
    with zipfile.ZipFile(file) as archive:
        files = {name: archive.read(name) for name in archive.namelist()}
    change(files)
    target = file.with_name("rewritten.zip")
    with zipfile.ZipFile(target, "w") as archive:
        for name, data in files.items():
            archive.writestr(name, data)
    return target


def last_entry(book: Logbook) -> Entry:
    return entries_about(book, "")[-1]


def test_a_backup_holds_what_the_logbook_holds(job: Job, kept: Path) -> None:
    with zipfile.ZipFile(kept) as archive:
        names = set(archive.namelist())
        about = json.loads(archive.read("backup.json"))
    evidence = {f"evidence/{each[:2]}/{each}" for each in job.book.evidence.digests()}
    assert {"backup.json", "SHA256SUMS", "logbook.toml", "logbook.db"} | evidence == names
    assert job.book.head().printed == about["head"]
    assert (job.book.id, "Job") == (about["logbook"], about["name"])


def test_a_backup_is_of_one_moment_while_work_goes_on(
    job: Job, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    for who, typed in WALK[3:10]:
        job.do(who, typed)
    head = job.book.head().printed
    copy = copy_database

    def copy_while_working(reader: Any, target: Path) -> None:
        job.do("t.okoro", FAILING)
        copy(reader, target)
        job.do("t.okoro", FAILING, reason="again")

    monkeypatch.setattr("gaugelog.work.backup.make.copy_database", copy_while_working)
    done = backup(job.book, tmp_path / "b.zip")
    assert head == done.head.printed
    assert done.report.ok
    assert head == restored(job, done.path, tmp_path / "r").at_backup
    assert check_logbook(Logbook.open(tmp_path / "r"), [head]).ok


def test_a_restored_logbook_is_sound_and_says_that_it_was_restored(
    job: Job, kept: Path, tmp_path: Path
) -> None:
    head = job.book.head()
    done = restored(job, kept, tmp_path / "new" / "folder", head.printed)
    book = Logbook.open(tmp_path / "new" / "folder", clock=job.clock)
    assert check_logbook(book, [head.printed, done.head]).ok
    entry = last_entry(book)
    fact = LogbookRestored.model_validate(entry.body.fact)
    assert (head.seq + 1, "c.ward", "logbook.restored") == (
        entry.header.seq,
        entry.header.actor,
        entry.header.kind,
    )
    assert entry.signature is not None
    with opened(kept) as archive:
        assert archive.digest() == fact.backup
    assert (head.printed, None, "disk died") == (fact.head, fact.missing, fact.reason)


def test_work_goes_on_in_a_restored_logbook(job: Job, kept: Path, tmp_path: Path) -> None:
    restored(job, kept, tmp_path / "r")
    old = job.book.folder
    again = Job(Logbook.open(tmp_path / "r", clock=job.clock), job.clock, job.folder, job.keys)
    shutil.rmtree(old)
    again.do("t.okoro", {"x": "0 mm", "y": "0 mm", "axis": "0 deg"})
    assert "in work" == again.state() or "on hold" == again.state()
    assert check_logbook(again.book).ok


def test_a_printed_head_proves_exactly_which_entries_are_missing(
    job: Job, kept: Path, tmp_path: Path
) -> None:
    at_backup = job.book.head().seq
    job.do("t.okoro", {"x": "0 mm", "y": "0 mm", "axis": "0 deg"})
    printed = [job.book.head().printed]
    job.do("q.reyes", {})
    printed.append(job.book.head().printed)
    done = restored(job, kept, tmp_path / "r", *printed)
    assert done.missing is not None
    assert (at_backup + 1, job.book.head().seq) == (done.missing.first, done.missing.last)
    assert f"entries {at_backup + 1}…{job.book.head().seq}" == str(done.missing)
    fact = last_entry(Logbook.open(tmp_path / "r")).body.fact
    assert {"first": at_backup + 1, "last": job.book.head().seq} == fact["missing"]
    assert printed == fact["printed"]


def test_the_check_knows_a_head_that_a_restore_left_behind(
    job: Job, kept: Path, tmp_path: Path
) -> None:
    job.do("t.okoro", {"x": "0 mm", "y": "0 mm", "axis": "0 deg"})
    lost = job.book.head().printed
    restored(job, kept, tmp_path / "r", lost)
    book = Logbook.open(tmp_path / "r")
    (trouble,) = check_logbook(book, [lost]).troubles
    assert f"entry {book.head().seq} of chain" in trouble.what
    assert "after a restore" in trouble.what


def test_a_head_left_behind_by_one_restore_proves_nothing_at_the_next(
    job: Job, kept: Path, tmp_path: Path
) -> None:
    job.do("t.okoro", {"x": "0 mm", "y": "0 mm", "axis": "0 deg"})
    lost = job.book.head().printed
    restored(job, kept, tmp_path / "r", lost)
    second = backup(Logbook.open(tmp_path / "r", clock=job.clock), tmp_path / "second.zip")
    assert restored(job, second.path, tmp_path / "s", lost).missing is None


def test_a_printed_head_with_another_hash_is_refused(job: Job, kept: Path, tmp_path: Path) -> None:
    with pytest.raises(Refused, match="entry 2 of this backup has another hash"):
        restored(job, kept, tmp_path / "r", f"2:{'A' * 26}")
    assert not (tmp_path / "r").exists()


def test_every_head_that_cannot_be_read_is_named_at_once(
    job: Job, kept: Path, tmp_path: Path
) -> None:
    with pytest.raises(Faulty) as caught:
        restored(job, kept, tmp_path / "r", "twelve", "12:short")
    assert 2 == len(caught.value.faults)
    assert not (tmp_path / "r").exists()


def test_a_reason_is_asked_for(job: Job, kept: Path, tmp_path: Path) -> None:
    with pytest.raises(Faulty, match="nothing was restored"):
        restored(job, kept, tmp_path / "r", reason="  ")


def test_someone_without_a_fitting_role_restores_nothing(
    job: Job, kept: Path, tmp_path: Path
) -> None:
    (tmp_path / "r").mkdir()
    with pytest.raises(Refused, match="role"):
        restored(job, kept, tmp_path / "r", who="q.reyes")
    assert [] == list((tmp_path / "r").iterdir())


def test_a_folder_with_something_in_it_is_left_alone(job: Job, kept: Path, tmp_path: Path) -> None:
    (tmp_path / "r").mkdir()
    (tmp_path / "r" / "mine.txt").write_text("mine", encoding="utf-8")
    with pytest.raises(StorageTrouble, match="not empty"):
        restored(job, kept, tmp_path / "r")
    assert "mine" == (tmp_path / "r" / "mine.txt").read_text(encoding="utf-8")


def test_a_backup_unpacked_by_hand_is_no_logbook(kept: Path, tmp_path: Path) -> None:
    with zipfile.ZipFile(kept) as archive:
        archive.extractall(tmp_path / "by-hand")
    with pytest.raises(StorageTrouble, match="restoring was not finished") as caught:
        Logbook.open(tmp_path / "by-hand")
    assert "gaugelog restore" in caught.value.remedy


def test_killed_before_the_entry_the_folder_refuses_everything(
    job: Job, kept: Path, tmp_path: Path
) -> None:
    with opened(kept) as archive:
        (tmp_path / "r").mkdir()
        archive.unpack(tmp_path / "r")  # and here the power goes
    with pytest.raises(StorageTrouble, match="restoring was not finished"):
        Logbook.open(tmp_path / "r")


def test_a_backup_never_replaces_a_file(job: Job, kept: Path) -> None:
    before = kept.read_bytes()
    with pytest.raises(Refused, match="there already"):
        backup(job.book, kept)
    assert before == kept.read_bytes()


def test_a_logbook_without_trouble_is_backed_up_without_trouble(job: Job, tmp_path: Path) -> None:
    done = backup(job.book, tmp_path / "b.zip")
    assert isinstance(done, BackedUp)
    assert done.report.ok
    assert done.size == done.path.stat().st_size
    assert [done.path] == [each for each in tmp_path.iterdir() if "b.zip" in each.name]


def test_lost_evidence_is_told_and_the_rest_is_kept(job: Job, tmp_path: Path) -> None:
    digest = job.book.evidence.digests()[0]
    (job.book.folder / "evidence" / digest[:2] / digest).unlink()
    done = backup(job.book, tmp_path / "b.zip")
    assert not done.report.ok
    found = restored(job, done.path, tmp_path / "r")
    assert found.troubles
    assert digest in found.troubles[0]
    fact = last_entry(Logbook.open(tmp_path / "r")).body.fact
    assert list(found.troubles) == fact["troubles"]


def test_a_journal_that_is_not_sound_is_not_restored(job: Job, tmp_path: Path) -> None:
    with job.book.storage.writing() as writer:
        writer.connection.execute("DROP TRIGGER entry_is_never_changed")
        writer.connection.execute("UPDATE entry SET body = x'7b7d' WHERE seq = 4")
    done = backup(job.book, tmp_path / "b.zip")
    assert not done.report.ok
    with pytest.raises(StorageTrouble, match="not sound"):
        restored(job, done.path, tmp_path / "r")
    assert not (tmp_path / "r").exists()


# Backups that were damaged, swapped or made up.

DB, TOML, SUMS, ABOUT = "logbook.db", "logbook.toml", "SHA256SUMS", "backup.json"


def _renamed(old: str, new: str) -> Callable[[dict[str, bytes]], None]:
    def change(files: dict[str, bytes]) -> None:
        files[new] = files.pop(old)

    return change


def _smuggled(name: str) -> Callable[[dict[str, bytes]], None]:
    """A further file that even the sums name."""

    def change(files: dict[str, bytes]) -> None:
        files[name] = b"x"
        digest = "2d711642b726b04401627ca9fbac32f5c8530fb1903cc4db02258717921a4881"
        files[SUMS] += f"{digest}  {name}\n".encode()

    return change


def _replaced(name: str, old: bytes, new: bytes) -> Callable[[dict[str, bytes]], None]:
    def change(files: dict[str, bytes]) -> None:
        assert old in files[name]
        files[name] = files[name].replace(old, new)

    return change


def _without(name: str) -> Callable[[dict[str, bytes]], None]:
    def change(files: dict[str, bytes]) -> None:
        del files[name]

    return change


HOSTILE: dict[str, tuple[Callable[[dict[str, bytes]], None], str]] = {
    "a path out of the folder": (_smuggled("../../escaped"), "no backup holds"),
    "a path from the root": (_smuggled("/etc/escaped"), "no backup holds"),
    "a path of another system": (_smuggled("C:\\escaped"), "no backup holds"),
    "evidence out of its folder": (_smuggled("evidence/../../escaped"), "no backup holds"),
    "evidence in a wrong folder": (_smuggled(f"evidence/aa/{'b' * 64}"), "no backup holds"),
    "a file more than the sums": (_renamed(DB, f"evidence/aa/{'a' * 64}"), "does not name"),
    "no database": (_without(DB), "logbook.db is missing"),
    "no sums": (_without(SUMS), "SHA256SUMS is missing"),
    "no settings": (_without(TOML), "logbook.toml is missing"),
    "nothing of itself": (_without(ABOUT), "backup.json is missing"),
    "another database": (_replaced(DB, b"SQLite", b"sqlITE"), "differs from its digest"),
    "sums that are none": (_replaced(SUMS, b"  logbook.db", b" "), "line .* can't be read"),
    "a list in place of itself": (lambda files: files.update({ABOUT: b"[]"}), "no JSON object"),
    "another format": (_replaced(ABOUT, b"-backup 1", b"-backup 9"), "another format"),
    "no head": (_replaced(ABOUT, b'"head"', b'"tail"'), "says no head"),
    "settings without the mark": (_replaced(TOML, b'state = "backup"', b"#"), "not that of a"),
    "settings that are none": (_replaced(TOML, b'name = "', b"name = "), "damaged"),
    "another logbook's": (_replaced(ABOUT, b'"logbook": "', b'"logbook": "x'), "different logboo"),
    "another head": (_replaced(ABOUT, b'"head": "', b'"head": "9'), "differs from its digest|end"),
}


@pytest.mark.parametrize("how", HOSTILE)
def test_a_backup_that_was_meddled_with_restores_nothing(
    how: str, job: Job, kept: Path, tmp_path: Path
) -> None:
    change, told = HOSTILE[how]
    before = {each for each in tmp_path.parent.rglob("*") if "escaped" in each.name}
    with pytest.raises(StorageTrouble, match=told) as caught:
        restored(job, rewritten(kept, change), tmp_path / "r")
    assert "\n" not in caught.value.message
    assert not (tmp_path / "r").exists()
    assert before == {each for each in tmp_path.parent.rglob("*") if "escaped" in each.name}


def test_a_name_given_twice_is_refused(job: Job, kept: Path, tmp_path: Path) -> None:
    with zipfile.ZipFile(kept, "a") as archive, pytest.warns(UserWarning, match="Duplicate"):
        archive.writestr(TOML, "other")
    with pytest.raises(StorageTrouble, match="twice"):
        restored(job, kept, tmp_path / "r")


@pytest.mark.parametrize("data", [b"", b"PK\x03\x04", b"no zip at all" * 100])
def test_what_is_no_zip_is_told(data: bytes, job: Job, tmp_path: Path) -> None:
    file = tmp_path / "b.zip"
    file.write_bytes(data)
    with pytest.raises(StorageTrouble, match="damaged or no backup"):
        restored(job, file, tmp_path / "r")


def test_a_backup_that_is_not_there_is_told(job: Job, tmp_path: Path) -> None:
    with pytest.raises(StorageTrouble, match="can't be read: No such file"):
        restored(job, tmp_path / "b.zip", tmp_path / "r")


def test_damage_anywhere_restores_nothing_or_all(job: Job, kept: Path, tmp_path: Path) -> None:
    """One byte in 101 places: every restore either succeeds whole or leaves nothing."""
    data = kept.read_bytes()
    refused = 0
    for place in range(0, len(data), len(data) // 100):
        spoilt = tmp_path / "spoilt.zip"
        spoilt.write_bytes(data[:place] + bytes([data[place] ^ 0x55]) + data[place + 1 :])
        target = tmp_path / f"r{place}"
        try:
            restored(job, spoilt, target)
        except GaugelogError:
            refused += 1
            assert not target.exists()
        else:
            assert check_logbook(Logbook.open(target)).ok
            shutil.rmtree(target)
    assert refused > 90


# A disk with no room.


@contextmanager
def _files_no_larger_than(size: int) -> Iterator[None]:
    soft, hard = resource.getrlimit(resource.RLIMIT_FSIZE)
    resource.setrlimit(resource.RLIMIT_FSIZE, (size, hard))
    try:
        yield
    finally:
        resource.setrlimit(resource.RLIMIT_FSIZE, (soft, hard))


@pytest.mark.parametrize("room", [0, 10_000, 100_000])
def test_no_room_for_a_backup_leaves_nothing(room: int, job: Job, tmp_path: Path) -> None:
    (tmp_path / "out").mkdir()
    with _files_no_larger_than(room), pytest.raises(StorageTrouble) as caught:
        backup(job.book, tmp_path / "out" / "b.zip")
    assert str(tmp_path / "out" / "b.zip") in caught.value.message
    assert [] == list((tmp_path / "out").iterdir())


@pytest.mark.parametrize("room", [0, 10_000, 100_000])
def test_no_room_while_restoring_leaves_nothing(
    room: int, job: Job, kept: Path, tmp_path: Path
) -> None:
    with _files_no_larger_than(room), pytest.raises(StorageTrouble):
        restored(job, kept, tmp_path / "r")
    assert not (tmp_path / "r").exists()


def test_a_full_disk_takes_no_backup_and_is_told_as_such(
    job: Job, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setattr(shutil, "disk_usage", lambda _folder: shutil._ntuple_diskusage(1, 1, 0))
    with pytest.raises(StorageTrouble, match="has room for 0 kB"):
        backup(job.book, tmp_path / "b.zip")
    assert [] == [each for each in tmp_path.iterdir() if "b.zip" in each.name]


def test_a_full_disk_is_told_before_anything_is_unpacked(
    job: Job, kept: Path, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setattr(shutil, "disk_usage", lambda _folder: shutil._ntuple_diskusage(1, 1, 0))
    with pytest.raises(StorageTrouble, match="has room for 0 MiB"):
        restored(job, kept, tmp_path / "r")
    assert not (tmp_path / "r").exists()


def test_a_folder_that_is_not_there_takes_no_backup(job: Job, tmp_path: Path) -> None:
    with pytest.raises(StorageTrouble, match="No such file"):
        backup(job.book, tmp_path / "nowhere" / "b.zip")


# Judged by foreign programs.


@needs("unzip", "sha256sum", "sqlite3")
def test_foreign_programs_find_the_backup_whole(kept: Path, tmp_path: Path) -> None:
    # Info-ZIP's test of every member, coreutils' check of every sum, SQLite's own check
    assert 0 == subprocess.run(["unzip", "-tqq", kept], check=False).returncode
    subprocess.run(["unzip", "-qq", kept, "-d", tmp_path / "out"], check=True)
    summed = subprocess.run(
        ["sha256sum", "--strict", "--check", "SHA256SUMS"],
        cwd=tmp_path / "out",
        check=False,
        capture_output=True,
        text=True,
    )
    assert 0 == summed.returncode, summed.stdout
    judged = subprocess.run(
        ["sqlite3", "-readonly", tmp_path / "out" / "logbook.db", "PRAGMA integrity_check"],
        check=True,
        capture_output=True,
        text=True,
    )
    assert "ok\n" == judged.stdout
