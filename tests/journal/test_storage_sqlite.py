"""The contract on SQLite, and what only a file can suffer."""

from __future__ import annotations

import sqlite3
import subprocess
from pathlib import Path

import pytest

from gaugelog.errors import StorageTrouble
from gaugelog.journal.storage import port, sqlite
from gaugelog.journal.storage.schema import GUARDS
from gaugelog.journal.storage.sqlite import SqliteStorage
from tests.foreign import needs
from tests.journal.samples import CHAIN, SampleJournal
from tests.journal.storage_contract import StorageContract, keep


def new_storage(folder: Path) -> SqliteStorage:
    """A journal in a new file."""
    storage = SqliteStorage(folder / "logbook.db")
    storage.create()
    return storage


@pytest.fixture
def storage(tmp_path: Path) -> SqliteStorage:
    return new_storage(tmp_path)


class TestSqlite(StorageContract):
    """SQLite keeps the contract."""

    @pytest.fixture
    def storage(self, tmp_path: Path) -> SqliteStorage:
        return new_storage(tmp_path)


@pytest.mark.parametrize(
    "statement",
    [
        "UPDATE entry SET body = NULL",
        "UPDATE entry SET seq = 9 WHERE seq = 1",
        "DELETE FROM entry",
        "DELETE FROM entry WHERE seq = 1",
        "INSERT OR REPLACE INTO entry SELECT * FROM entry WHERE seq = 1",
        "REPLACE INTO entry SELECT * FROM entry WHERE seq = 1",
        "INSERT OR IGNORE INTO entry SELECT * FROM entry WHERE seq = 1",
        "INSERT OR REPLACE INTO entry (rowid, chain, seq, previous, deed, deed_index, kind, header)"
        " VALUES (1, 'x', 1, x'00', 'd', 1, 'k', x'00')",
        "INSERT OR REPLACE INTO entry SELECT chain, 99, previous, 'd', 1, kind, header, body,"
        " signature FROM entry WHERE seq = 1",
        "INSERT OR REPLACE INTO entry SELECT chain, 99, x'00', deed, deed_index, kind, header,"
        " body, signature FROM entry WHERE seq = 1",
        "UPDATE sheet SET data = x'00'",
    ],
)
@pytest.mark.parametrize("recursive", ["ON", "OFF"])
def test_triggers_refuse_to_alter_an_entry(
    storage: SqliteStorage, statement: str, recursive: str
) -> None:
    SampleJournal(storage).start()
    with storage.writing() as writer:
        writer.put_sheet(b"name")
    before = _dump(storage.path)
    connection = sqlite3.connect(storage.path)
    connection.execute(f"PRAGMA recursive_triggers = {recursive}")
    with pytest.raises(sqlite3.IntegrityError, match="is never"):
        connection.execute(statement)
    connection.close()
    assert before == _dump(storage.path)


def _dump(path: Path) -> list[str]:
    connection = sqlite3.connect(path)
    lines = list(connection.iterdump())
    connection.close()
    return lines


def test_what_others_write_through_the_connection_shares_the_transaction(
    storage: SqliteStorage,
) -> None:
    with storage.writing() as writer:
        writer.connection.execute("CREATE TABLE ledger (x TEXT)")

    def fail_at_the_end() -> None:
        with storage.writing() as writer:
            keep(writer)
            writer.connection.execute("INSERT INTO ledger VALUES ('a')")
            writer.connection.execute("INSERT INTO nowhere VALUES ('a')")

    with pytest.raises(sqlite3.OperationalError):
        fail_at_the_end()
    with storage.reading() as reader:
        assert [] == list(reader.entries())
        assert [] == reader.connection.execute("SELECT * FROM ledger").fetchall()


def test_a_missing_or_altered_trigger_is_named(storage: SqliteStorage) -> None:
    names = list(GUARDS)
    connection = sqlite3.connect(storage.path)
    connection.execute(f"DROP TRIGGER {names[0]}")
    connection.execute(f"DROP TRIGGER {names[1]}")
    connection.execute(f"CREATE TRIGGER {names[1]} BEFORE DELETE ON entry BEGIN SELECT 1; END")
    connection.close()
    with storage.reading() as reader:
        missing = reader.missing_guards()
    assert [f"The trigger {names[0]} is missing.", f"The trigger {names[1]} is altered."] == missing


def test_what_was_committed_is_seen_by_another_program(storage: SqliteStorage) -> None:
    SampleJournal(storage).start()
    connection = sqlite3.connect(storage.path)
    assert (3,) == connection.execute("SELECT count(*) FROM entry").fetchone()
    assert ("wal",) == connection.execute("PRAGMA journal_mode").fetchone()
    assert ("ok",) == connection.execute("PRAGMA integrity_check").fetchone()
    connection.close()


def test_commits_are_synchronous(storage: SqliteStorage) -> None:
    full = 2
    with storage.writing() as writer:
        assert (full,) == writer.connection.execute("PRAGMA synchronous").fetchone()


def test_the_bytes_of_an_erased_sheet_are_gone_from_the_files(storage: SqliteStorage) -> None:
    secret = b"Somebody's name " * 8
    with storage.writing() as writer:
        digest = writer.put_sheet(secret)
    with storage.writing() as writer:
        writer.erase_sheet(digest)
    files = [path.read_bytes() for path in storage.path.parent.iterdir()]
    assert files
    assert not any(secret[:16] in data for data in files)


def test_a_journal_is_not_laid_over_another(storage: SqliteStorage) -> None:
    with pytest.raises(StorageTrouble, match="a journal in"):
        SqliteStorage(storage.path).create()
    with storage.writing() as writer:
        keep(writer)


def _open(path: Path) -> StorageTrouble:
    storage = SqliteStorage(path)
    with pytest.raises(StorageTrouble) as caught, storage.reading() as reader:
        list(reader.entries())
    storage.close()
    assert str(path) in caught.value.message
    assert caught.value.remedy
    return caught.value


def test_a_file_that_is_not_there_is_said_so_and_not_made(tmp_path: Path) -> None:
    assert "is not there" in _open(tmp_path / "none.db").message
    assert [] == list(tmp_path.iterdir())


def test_a_file_that_is_no_database_is_said_so(tmp_path: Path) -> None:
    path = tmp_path / "text.db"
    path.write_text("not a database, but long enough to be looked at as one\n" * 40)
    assert "not a logbook's database" in _open(path).message


def test_a_database_without_a_journal_is_said_so(tmp_path: Path) -> None:
    path = tmp_path / "other.db"
    connection = sqlite3.connect(path)
    connection.execute("CREATE TABLE entry (x TEXT)")
    connection.close()
    assert "holds no journal" in _open(path).message


def test_a_damaged_file_is_said_so(storage: SqliteStorage) -> None:
    SampleJournal(storage).start()
    storage.close()
    size = storage.path.stat().st_size
    with storage.path.open("r+b") as file:
        file.seek(4096)
        file.write(b"\xff" * (size - 4096))
    assert "is damaged" in _open(storage.path).message


def test_a_full_disk_stores_nothing_and_says_so(storage: SqliteStorage) -> None:
    SampleJournal(storage).start()

    def fill() -> None:
        with storage.writing() as writer:
            pages = writer.connection.execute("PRAGMA page_count").fetchone()[0]
            writer.connection.execute(f"PRAGMA max_page_count = {pages}")
            for _ in range(100):
                keep(writer)

    with pytest.raises(StorageTrouble, match="disk is full"):
        fill()
    with SqliteStorage(storage.path).reading() as reader:
        head = reader.head(CHAIN)
    assert head is not None
    assert 3 == head.seq


def test_an_error_code_of_a_read_only_file_is_put_in_plain_words(storage: SqliteStorage) -> None:
    def write() -> None:
        with storage.writing() as writer:
            writer.connection.execute("PRAGMA query_only = ON")
            keep(writer)

    with pytest.raises(StorageTrouble, match="may not be written") as caught:
        write()
    assert "permission" in caught.value.remedy


def test_a_writer_gives_up_after_a_while(
    storage: SqliteStorage, monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setattr(sqlite, "GIVE_UP_SECONDS", 0.1)
    waits: list[float] = []
    with storage.writing(), pytest.raises(StorageTrouble, match="Another process"):
        _write_once(SqliteStorage(storage.path), waits)
    assert waits
    assert 30 == port.GIVE_UP_SECONDS


def _write_once(storage: SqliteStorage, waits: list[float]) -> None:
    with storage.writing(waits.append) as writer:
        keep(writer)


@needs("sqlite3")
def test_the_shell_of_sqlite_finds_the_file_whole(storage: SqliteStorage) -> None:
    SampleJournal(storage).start()
    done = subprocess.run(
        ["sqlite3", str(storage.path), "PRAGMA integrity_check; SELECT count(*) FROM entry;"],
        capture_output=True,
        text=True,
        check=False,
    )
    assert "ok\n3\n" == done.stdout
