"""Speed of the journal against floors measured in the same run."""

from __future__ import annotations

import hashlib
import sqlite3
from collections.abc import Callable, Iterator
from concurrent.futures import ThreadPoolExecutor
from pathlib import Path

import pytest
from cryptography.hazmat.primitives.asymmetric import ec
from cryptography.hazmat.primitives.hashes import SHA256

from gaugelog.journal.append import append
from gaugelog.journal.canonical import JsonValue
from gaugelog.journal.check import check
from gaugelog.journal.entry import Fact
from gaugelog.journal.ids import new_id
from gaugelog.journal.storage.sqlite import SqliteStorage
from tests.bench.compare import compare
from tests.journal.samples import CHAIN, SampleJournal, signer

pytestmark = pytest.mark.bench

_ECDSA = ec.ECDSA(SHA256())
_DEEDS = 24_000


def _reading(place: int) -> Fact:
    """A fact as long as a reading."""
    content: dict[str, JsonValue] = {
        "reading": new_id(),
        "grid": new_id(),
        "check": "insulation",
        "stage": "bonded",
        "typed": f"{place % 90 + 10}.5 GΩ",
        "value": {"value": f"{place % 90 + 10}.5", "unit": "Gohm"},
        "instrument": new_id(),
        "observed": "2026-12-01T09:00:00Z",
    }
    return Fact("reading.taken", 1, (new_id(), new_id()), content)


@pytest.fixture
def journal(tmp_path: Path) -> Iterator[SampleJournal]:
    storage = SqliteStorage(tmp_path / "logbook.db")
    storage.create()
    yield SampleJournal(storage).start()
    storage.close()


def _fill(journal: SampleJournal) -> None:
    """Deeds of one reading and deeds of two entries in turn, as when a step is done."""
    with journal.storage.writing() as writer:
        for place in range(_DEEDS):
            facts = [_reading(place)] * (1 + place % 2)
            append(writer, CHAIN, facts, signer("technician"), journal.clock.now(), new_id())


def test_a_check_takes_at_most_twice_reading_hashing_and_verifying(journal: SampleJournal) -> None:
    _fill(journal)
    assert isinstance(journal.storage, SqliteStorage)
    result = compare(_checked(journal), _read_hashed_verified(journal.storage.path), repeats=5)
    print("\n" + result.line(f"journal check, {_DEEDS * 3 // 2} entries"))
    assert 2.0 >= result.ratio


def _checked(journal: SampleJournal) -> Callable[[], object]:
    def ours() -> None:
        with journal.storage.reading() as reader:
            assert check(reader, journal.evidence).ok

    return ours


def _read_hashed_verified(path: Path) -> Callable[[], object]:
    """The floor: plain rows, both hashes, every signature on both cores."""
    keys = [signer(person).private_key.public_key() for person in ("custodian", "technician")]

    def verify(batch: list[tuple[bytes, bytes]]) -> None:
        for header, signature in batch:
            key = keys[0] if b'"actor":"custodian"' in header else keys[1]
            key.verify(signature, header, _ECDSA)

    def floor() -> None:
        connection = sqlite3.connect(path)
        signed: list[tuple[bytes, bytes]] = []
        for header, body, signature in connection.execute(
            "SELECT header, body, signature FROM entry ORDER BY chain, seq"
        ):
            hashlib.sha256(header).digest()
            hashlib.sha256(body).digest()
            if signature is not None:
                signed.append((header, signature))
        connection.close()
        with ThreadPoolExecutor(2) as threads:
            list(threads.map(verify, (signed[::2], signed[1::2])))

    return floor


def test_an_append_takes_at_most_twice_a_durable_commit_and_a_signature(
    journal: SampleJournal, tmp_path: Path
) -> None:
    with journal.storage.reading() as reader:
        sample = next(reader.entries(CHAIN, after=2))

    facts = [_reading(place) for place in range(50)]

    def ours() -> None:
        for fact in facts:
            journal.keep(fact)

    connection = _plain_table(tmp_path / "plain.db")
    key = signer("technician").private_key

    def floor() -> None:
        for _ in range(50):
            signature = key.sign(sample.header_bytes, _ECDSA)
            connection.execute("BEGIN IMMEDIATE")
            connection.execute(
                "INSERT INTO entry VALUES (?, ?, ?)",
                (sample.header_bytes, sample.body_bytes, signature),
            )
            connection.execute("COMMIT")

    result = compare(ours, floor)
    connection.close()
    print("\n" + result.line("50 appends"))
    assert 2.0 >= result.ratio


def _plain_table(path: Path) -> sqlite3.Connection:
    connection = sqlite3.connect(path, isolation_level=None)
    connection.execute("PRAGMA journal_mode = WAL")
    connection.execute("PRAGMA synchronous = FULL")
    connection.execute("CREATE TABLE entry (header BLOB, body BLOB, signature BLOB)")
    return connection
