"""A reading acknowledged against a durable commit and a signature; replay against bulk insert."""

from __future__ import annotations

import sqlite3
from collections.abc import Callable
from dataclasses import replace
from pathlib import Path

import pytest
from cryptography.hazmat.primitives.asymmetric import ec
from cryptography.hazmat.primitives.hashes import SHA256
from sqlalchemy import create_engine, insert

from gaugelog.journal.entry import Entry
from gaugelog.ledger import fold, schema
from gaugelog.ledger.buffer import Buffer
from gaugelog.work import steps
from tests.bench.compare import compare
from tests.work.job import INSULATION, Job, released_job

pytestmark = [pytest.mark.bench, pytest.mark.xdist_group("bench")]

FAILING = {**INSULATION, "insulation": "0.4 GΩ"}
READINGS = 10_000


@pytest.fixture
def job(tmp_path: Path) -> Job:
    """A point at its insulation check, with one failed reading."""
    made = released_job(tmp_path)
    made.walk(8)
    made.do("t.okoro", FAILING)
    return made


def _reading(job: Job) -> Callable[[], object]:
    def act() -> None:
        for _ in range(20):
            steps.do(job.book, job.keys["t.okoro"], point="FB-1", typed=FAILING, reason="again")

    return act


def _bare(folder: Path) -> Callable[[], object]:
    """Twenty durable commits of a row as large as a reading's entry, each with a signature."""
    connection = sqlite3.connect(folder / "bare.db", isolation_level=None)
    connection.execute("PRAGMA journal_mode = WAL")
    connection.execute("PRAGMA synchronous = FULL")
    connection.execute(
        "CREATE TABLE entry (seq INTEGER PRIMARY KEY, header BLOB, body BLOB, s BLOB)"
    )
    key = ec.generate_private_key(ec.SECP256R1())

    def act() -> None:
        for _ in range(20):
            connection.execute("BEGIN IMMEDIATE")
            signature = key.sign(b"h" * 700, ec.ECDSA(SHA256()))
            connection.execute(
                "INSERT INTO entry (header, body, s) VALUES (?, ?, ?)",
                (b"h" * 700, b"b" * 1500, signature),
            )
            connection.execute("COMMIT")

    return act


def test_a_reading_is_acknowledged(
    job: Job, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    found = compare(_reading(job), _bare(tmp_path), repeats=9)
    with capsys.disabled():
        print("\n" + found.line("20 readings acknowledged"))
    # The issue sets no bound; this one keeps a slip of an order of magnitude from passing.
    assert found.ratio <= 60


def _many(job: Job) -> list[Entry]:
    """A journal with thousands of readings: the last one's entry, again under other ids."""
    with job.book.storage.reading() as reader:
        entries = list(reader.entries())
    last = entries[-1]
    assert last.body_bytes is not None
    own = last.body.fact["id"]
    made = list(entries)
    before = own
    for number in range(READINGS):
        name = f"r{number:025d}"
        body = last.body_bytes.replace(own.encode(), name.encode())
        if b'"repeats"' in body:
            body = body.replace(
                f'"repeats":"{last.body.fact["repeats"]}"'.encode(),
                f'"repeats":"{before}"'.encode(),
            )
        header = last.header_bytes.replace(
            f'"seq":{last.header.seq}'.encode(), f'"seq":{last.header.seq + 1 + number}'.encode()
        )
        made.append(replace(last, header_bytes=header, body_bytes=body))
        before = name
    return made


def test_replay_takes_at_most_three_times_a_bulk_insert(
    job: Job, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    job.do("t.okoro", FAILING, reason="again")
    entries = _many(job)
    rows = fold.fold(entries)
    found = compare(
        lambda: _replayed(tmp_path / "ours.db", entries),
        lambda: _inserted(tmp_path / "floor.db", rows),
        repeats=7,
    )
    barely = compare(
        lambda: _replayed(tmp_path / "ours.db", entries),
        lambda: _inserted_barely(tmp_path / "floor.db", rows),
        repeats=5,
    )
    with capsys.disabled():
        print("\n" + found.line(f"replay of {len(entries)} entries"))
        print(barely.line("the same against sqlite3.executemany, stated only"))
    assert found.ratio <= 3


def _replayed(file: Path, entries: list[Entry]) -> None:
    """The ledger folded anew and written in one transaction, as `Logbook.rebuild` does."""
    file.unlink(missing_ok=True)
    connection = sqlite3.connect(file, isolation_level=None)
    fresh = [Entry(each.header_bytes, each.body_bytes, each.signature) for each in entries]
    connection.execute("BEGIN IMMEDIATE")
    rows = fold.fold(fresh, one_chain=True)
    schema.create_tables(connection)
    schema.write(connection, rows)
    connection.execute("COMMIT")
    connection.close()


def _inserted(file: Path, rows: Buffer) -> None:
    """The same rows by SQLAlchemy's bulk insert, a table at a time, in one transaction."""
    file.unlink(missing_ok=True)
    engine = create_engine(f"sqlite:///{file}")
    with engine.begin() as connection:
        for model in schema.TABLES:
            table = schema.table_of(model)
            table.create(connection)
            kept = [row for row in rows.rows.get(table.name, {}).values() if row is not None]
            if kept:
                connection.execute(insert(table), kept)
    engine.dispose()


def _inserted_barely(file: Path, rows: Buffer) -> None:
    """The same rows as they are by the database's own module, in one transaction."""
    file.unlink(missing_ok=True)
    connection = sqlite3.connect(file, isolation_level=None)
    connection.execute("BEGIN IMMEDIATE")
    schema.create_tables(connection)
    for name, table in rows.rows.items():
        kept = [row for row in table.values() if row is not None]
        if kept:
            columns = list(kept[0])
            marks = ", ".join("?" * len(columns))
            named = ", ".join(f'"{column}"' for column in columns)
            connection.executemany(
                f'INSERT INTO "{name}" ({named}) VALUES ({marks})',  # noqa: S608 (our own names)
                [tuple(row[column] for column in columns) for row in kept],
            )
    connection.execute("COMMIT")
    connection.close()
