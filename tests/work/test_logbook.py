"""A logbook as a folder: found, opened, refused; its ledger's tables can be laid down anew."""

from __future__ import annotations

import sqlite3
from collections.abc import Iterator
from contextlib import contextmanager
from pathlib import Path

import pytest

from gaugelog.errors import StorageTrouble
from gaugelog.journal.storage.port import OnWait
from gaugelog.journal.storage.sqlite import SqliteStorage, SqliteWriter
from gaugelog.work import steps
from gaugelog.work.history import check_logbook
from gaugelog.work.logbook import SIGN, Logbook, find_logbook
from tests.work.job import WALK, Job


@pytest.mark.parametrize(
    "harm",
    [
        "DROP TABLE grid",
        "ALTER TABLE point RENAME COLUMN blocked TO obstructed",
        "ALTER TABLE step DROP COLUMN note",
    ],
)
def test_a_ledger_out_of_shape_is_told_and_rebuilt_without_loss(job: Job, harm: str) -> None:
    job.walk(4)
    with sqlite3.connect(job.book.folder / "logbook.db") as database:
        database.execute(harm)
    with pytest.raises(StorageTrouble, match="not as Gaugelog laid them down") as caught:
        _use(job)
    assert "journal rebuild" in caught.value.remedy
    assert not check_logbook(job.book).ok
    job.book.rebuild()
    assert check_logbook(job.book).ok
    assert job.state() == "on hold"


def _use(job: Job) -> None:
    steps.next_step(job.book, "FB-1")
    job.do("q.reyes", {}, refuse="look again")
    job.do(*WALK[3])


def test_a_logbook_is_found_from_any_folder_within_it(job: Job) -> None:
    inner = job.book.folder / "evidence" / "deeper"
    inner.mkdir()
    assert job.book.folder == find_logbook(inner, None)
    assert job.book.folder == find_logbook(Path("/"), job.book.folder)


def test_where_there_is_no_logbook_that_is_told(tmp_path: Path) -> None:
    with pytest.raises(StorageTrouble, match="no logbook here"):
        find_logbook(tmp_path, None)
    with pytest.raises(StorageTrouble, match="no logbook in"):
        find_logbook(tmp_path, tmp_path)


def test_a_new_logbook_takes_no_folder_that_holds_something(tmp_path: Path) -> None:
    (tmp_path / "notes.txt").touch()
    with pytest.raises(StorageTrouble, match="is not empty"):
        Logbook.create(tmp_path, "Job")
    assert ["notes.txt"] == [path.name for path in tmp_path.iterdir()]


@pytest.mark.parametrize(
    ("text", "told"),
    [
        ("format = 1", "is damaged"),
        ("format = [", "is damaged"),
        ("\udcff", "is damaged"),
        ('format = "x"\nid = "i"\nname = "n"\nchain = "c"', "is damaged"),
        ('format = 2\nid = "i"\nname = "n"\nchain = "c"', "newer Gaugelog"),
    ],
)
def test_settings_that_can_not_be_read_are_told(job: Job, text: str, told: str) -> None:
    settings = job.book.folder / SIGN
    settings.write_bytes(text.encode("utf-8", "surrogateescape"))
    with pytest.raises(StorageTrouble, match=told):
        Logbook.open(job.book.folder)


def test_a_logbook_without_its_sign_or_its_database_is_told(job: Job) -> None:
    (job.book.folder / "logbook.db").unlink()
    with pytest.raises(StorageTrouble):
        Logbook.open(job.book.folder)
    (job.book.folder / SIGN).unlink()
    with pytest.raises(StorageTrouble, match="can't be read"):
        Logbook.open(job.book.folder)


@pytest.mark.parametrize("name", ["Brücke", 'with "quotes" and \\', "two\nlines", "\t\x7f"])
def test_any_name_of_a_logbook_is_read_back(tmp_path: Path, name: str) -> None:
    made = Logbook.create(tmp_path / "book", name)
    assert name == made.name
    assert name == Logbook.open(tmp_path / "book").name


def test_a_logbook_of_a_newer_version_is_left_alone(job: Job) -> None:
    with sqlite3.connect(job.book.folder / "logbook.db") as database:
        database.execute("UPDATE ledger_version SET value = 9999")
    database.close()
    with pytest.raises(StorageTrouble, match="newer Gaugelog"):
        Logbook.open(job.book.folder)


@pytest.mark.parametrize("change", [('id = "', 'id = "../'), ('chain = "', 'chain = "x y')])
def test_settings_that_are_no_names_are_refused(job: Job, change: tuple[str, str]) -> None:
    file = job.book.folder / "logbook.toml"
    file.write_text(file.read_text().replace(*change))
    with pytest.raises(StorageTrouble, match="damaged"):
        Logbook.open(job.book.folder)


def test_a_deed_that_waited_bears_the_time_it_was_kept(job: Job) -> None:
    before = job.book.clock.now().utc

    class Waiting(SqliteStorage):
        @contextmanager
        def writing(self, on_wait: OnWait | None = None) -> Iterator[SqliteWriter]:
            job.clock.advance(20)
            with super().writing(on_wait) as writer:
                yield writer

    job.book.storage = Waiting(job.book.folder / "logbook.db")
    with job.book.deed(job.keys["t.okoro"]) as deed:
        assert 20 == (deed.moment.utc - before).total_seconds()
