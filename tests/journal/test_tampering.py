"""Each way to alter a journal unseen, tried with the triggers taken away, and what shows it."""

from __future__ import annotations

import base64
import sqlite3
from collections.abc import Callable, Iterator
from dataclasses import dataclass, replace
from pathlib import Path
from typing import Any

import pytest
from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from gaugelog.journal.certificates import certificate_issued
from gaugelog.journal.check import Report, check
from gaugelog.journal.entry import Body, Entry, Fact, PrintedHead, sha256
from gaugelog.journal.evidence import FolderEvidence
from gaugelog.journal.keys import Signer
from gaugelog.journal.storage.schema import GUARDS
from gaugelog.journal.storage.sqlite import SqliteStorage
from tests.journal.samples import CHAIN, SampleJournal, note, signer, stranger

ROW = "INSERT INTO entry VALUES (?, ?, ?, ?, ?, ?, ?, ?, ?)"


@dataclass
class Victim:
    """A journal of ten entries in a file, and a way to do to it what no program should.

    Entries 1 to 3 begin it; 4, 5 and 6 are deeds of one; 7 to 9 are one deed, 10 one more.
    """

    journal: SampleJournal
    path: Path
    digest: str

    def run(self, statement: str, *values: Any) -> None:
        """Run a statement on the bare file, without any guard."""
        connection = sqlite3.connect(self.path)
        for name in GUARDS:
            connection.execute(f"DROP TRIGGER IF EXISTS {name}")
        connection.execute(statement, values)
        connection.commit()
        connection.close()

    def loosen(self) -> None:
        """Take away what the table itself demands, such as one entry for each number."""
        self.run("ALTER TABLE entry RENAME TO old")
        self.run("CREATE TABLE entry AS SELECT * FROM old")

    def entry(self, seq: int) -> Entry:
        """An entry as it is now."""
        return self.journal.entries()[seq - 1]

    def put(self, entry: Entry) -> None:
        """File an entry where its header says, in the place of what is there."""
        header = entry.header
        self.run("DELETE FROM entry WHERE chain = ? AND seq = ?", header.chain, header.seq)
        self.run(
            ROW, header.chain, header.seq, bytes.fromhex(header.previous), header.deed,
            header.index, header.kind, entry.header_bytes, entry.body_bytes, entry.signature,
        )  # fmt: skip

    def check(self, *printed: PrintedHead) -> Report:
        """The check, by the program itself."""
        with SqliteStorage(self.path).reading() as reader:
            return check(reader, self.journal.evidence, printed=printed)

    def found(self, *printed: PrintedHead) -> set[tuple[int, str]]:
        """Steps and entries that the check names, the missing triggers left out."""
        report = self.check(*printed)
        assert not report.ok
        assert all(trouble.what and trouble.remedy for trouble in report.troubles)
        places = {(trouble.step, trouble.where) for trouble in report.troubles}
        return {place for place in places if place != (1, "the storage")}


def at(step: int, seq: int) -> tuple[int, str]:
    """A step and an entry, as `found` names them."""
    return step, f"entry {seq} of chain {CHAIN}"


@pytest.fixture
def victim(tmp_path: Path) -> Iterator[Victim]:
    storage = SqliteStorage(tmp_path / "logbook.db")
    storage.create()
    journal = SampleJournal(storage, FolderEvidence(tmp_path / "evidence")).start()
    digest = journal.evidence.put(b"a drawing")
    journal.keep(note("a", evidence=(digest,)))
    journal.keep(note("b"))
    journal.keep(note("c"))
    journal.keep(note("d"), note("e"), note("f"))
    journal.keep(note("g"))
    yield Victim(journal, storage.path, digest)
    storage.close()


def altered(entry: Entry, by: Signer | None = None, text: str = "", **fields: Any) -> Entry:
    """The entry with other header fields or another fact, all hashes made to fit."""
    body = entry.body_bytes or b""
    if text:
        body = replace(entry.body, fact={"text": text}).to_bytes()
    header = replace(entry.header, **{"body": sha256(body), **fields})
    if by:
        header = replace(header, certificate=by.fingerprint)
    data = header.to_bytes()
    return Entry(data, body, by.sign(data) if by else entry.signature)


def relink(
    victim: Victim, first: Entry, sign: Callable[[Entry], Entry] = lambda entry: entry
) -> None:
    """Put `first`, and write all that follows anew so that the chain fits again."""
    entries = victim.journal.entries()[first.header.seq :]
    victim.put(first)
    previous = first
    for entry in entries:
        linked = sign(altered(entry, previous=previous.hash.hex()))
        victim.put(linked)
        previous = linked


def test_an_untouched_journal_checks(victim: Victim) -> None:
    report = victim.check(victim.entry(10).head.short)
    assert report.ok, report.troubles
    assert 10 == report.entries


def test_an_edited_header_shows(victim: Victim) -> None:
    entry = victim.entry(5)
    victim.put(replace(entry, header_bytes=replace(entry.header, actor="custodian").to_bytes()))
    assert {at(3, 6), at(5, 5), at(6, 5)} == victim.found()


def test_an_edited_header_within_a_deed_shows(victim: Victim) -> None:
    entry = victim.entry(8)
    victim.put(replace(entry, header_bytes=replace(entry.header, version=2).to_bytes()))
    assert {at(3, 9)} == victim.found()


def test_an_edited_header_with_the_chain_written_anew_shows(victim: Victim) -> None:
    relink(victim, altered(victim.entry(5), kind="note.struck"))
    assert {at(5, 5), at(5, 6), at(5, 9), at(5, 10)} == victim.found()


def test_an_edited_body_shows(victim: Victim) -> None:
    body = replace(victim.entry(5).body, fact={"text": "better"}).to_bytes()
    victim.run("UPDATE entry SET body = ? WHERE seq = 5", body)
    assert {at(4, 5)} == victim.found()


def test_an_edited_body_with_its_hash_made_to_fit_shows(victim: Victim) -> None:
    victim.put(altered(victim.entry(5), text="better"))
    assert {at(3, 6), at(5, 5)} == victim.found()


def test_a_body_taken_away_shows(victim: Victim) -> None:
    victim.run("UPDATE entry SET body = NULL WHERE seq = 5")
    assert {at(4, 5)} == victim.found()


def test_a_deleted_entry_shows(victim: Victim) -> None:
    victim.run("DELETE FROM entry WHERE seq = 5")
    assert {at(2, 5)} == victim.found()


def test_a_deleted_entry_within_a_deed_shows(victim: Victim) -> None:
    victim.run("DELETE FROM entry WHERE seq = 8")
    assert {at(2, 8), at(5, 7), at(5, 9)} == victim.found()


def test_a_deleted_entry_with_all_that_follow_moved_up_shows(victim: Victim) -> None:
    victim.run("DELETE FROM entry WHERE seq = 5")
    for seq in range(6, 11):
        victim.run("UPDATE entry SET seq = ? WHERE seq = ?", seq - 1, seq)
    assert {at(3, 5), *(at(2, seq) for seq in range(5, 10))} == victim.found()


def test_an_inserted_entry_shows(victim: Victim) -> None:
    victim.loosen()
    for seq in range(10, 4, -1):
        victim.run("UPDATE entry SET seq = ? WHERE seq = ?", seq + 1, seq)
    forged = altered(
        victim.entry(4), text="x", seq=5, deed="d", previous=victim.entry(4).hash.hex()
    )
    victim.put(forged)
    found = victim.found()
    assert {at(5, 5), at(3, 6)} <= found
    assert {at(2, seq) for seq in range(6, 12)} <= found


def test_an_entry_put_after_the_last_without_a_key_shows(victim: Victim) -> None:
    last = victim.entry(10)
    victim.put(altered(last, text="x", seq=11, deed="d", previous=last.hash.hex()))
    assert {at(5, 11)} == victim.found()


def test_reordered_entries_show(victim: Victim) -> None:
    for old, new in ((5, 99), (6, 5), (99, 6)):
        victim.run("UPDATE entry SET seq = ? WHERE seq = ?", new, old)
    assert {at(2, 5), at(2, 6), at(3, 5), at(3, 6), at(3, 7)} == victim.found()


def test_an_entry_replaced_shows(victim: Victim) -> None:
    forged = altered(victim.entry(5), text="better")
    victim.run(
        "INSERT OR REPLACE INTO entry SELECT chain, seq, previous, deed, deed_index, kind, ?, ?,"
        " signature FROM entry WHERE seq = 5",
        forged.header_bytes,
        forged.body_bytes,
    )
    assert {at(3, 6), at(5, 5)} == victim.found()


def test_a_stripped_signature_shows(victim: Victim) -> None:
    victim.run("UPDATE entry SET signature = NULL WHERE seq = 9")
    assert {at(5, 9)} == victim.found()


def test_a_signature_of_another_entry_shows(victim: Victim) -> None:
    victim.run("UPDATE entry SET signature = ? WHERE seq = 5", victim.entry(6).signature)
    assert {at(5, 5)} == victim.found()


def test_a_signature_where_none_belongs_shows(victim: Victim) -> None:
    victim.run("UPDATE entry SET signature = ? WHERE seq = 8", victim.entry(9).signature)
    assert {at(5, 8)} == victim.found()


def test_a_deed_made_shorter_to_lose_its_signature_shows(victim: Victim) -> None:
    relink(victim, replace(altered(victim.entry(7), count=1), signature=None))
    assert {at(5, 7), at(5, 8), at(5, 9), at(5, 10)} == victim.found()


def test_a_tail_cut_off_shows_against_a_printed_head(victim: Victim) -> None:
    printed = victim.entry(9).head.short
    victim.run("DELETE FROM entry WHERE seq >= 7")
    assert {(3, f"printed head {printed}")} == victim.found(printed)
    (trouble,) = [one for one in victim.check(printed).troubles if one.step == 3]
    assert "ends at entry 6" in trouble.what


def test_a_tail_written_anew_by_someone_with_all_keys_shows_against_a_printed_head(
    victim: Victim,
) -> None:
    printed, key = victim.entry(9).head.short, signer("technician")

    def sign(entry: Entry) -> Entry:
        signed = entry.header.is_last
        return replace(entry, signature=key.sign(entry.header_bytes) if signed else None)

    relink(victim, sign(altered(victim.entry(5), text="better")), sign)
    assert {(1, "the storage")} == {(one.step, one.where) for one in victim.check().troubles}
    assert {(3, f"printed head {printed}")} == victim.found(printed)


def test_a_tail_cut_within_a_deed_shows_by_itself(victim: Victim) -> None:
    victim.run("DELETE FROM entry WHERE seq >= 9")
    assert {at(5, 8)} == victim.found()


def test_a_journal_emptied_shows(victim: Victim) -> None:
    victim.run("DELETE FROM entry")
    assert {(2, "the journal"), (6, "the journal")} == victim.found()


def test_a_swapped_certificate_shows(victim: Victim) -> None:
    other = stranger("technician")
    forged = certificate_issued("technician", other.certificate, "enrolled")
    victim.run("UPDATE entry SET body = ? WHERE seq = 3", Body.of(forged).to_bytes())
    found = victim.found()
    assert at(4, 3) in found
    assert {at(6, seq) for seq in (4, 5, 6, 9, 10)} <= found


def test_a_certificate_of_a_strangers_authority_shows(victim: Victim) -> None:
    # The stranger has no key of ours, so the first deed's own signature is lost as well.
    other = stranger("technician")
    forged = certificate_issued("technician", other.certificate, "enrolled")

    def sign(entry: Entry) -> Entry:
        header = replace(entry.header, certificate=other.fingerprint).to_bytes()
        return replace(entry, header_bytes=header, signature=entry.signature and other.sign(header))

    third = victim.entry(3)
    body = Body.of(forged).to_bytes()
    header = replace(third.header, body=sha256(body)).to_bytes()
    relink(victim, replace(third, header_bytes=header, body_bytes=body), sign)
    assert {at(5, 3), *(at(6, seq) for seq in (4, 5, 6, 9, 10))} == victim.found()


def test_a_certificate_that_the_fact_names_for_another_person_shows(victim: Victim) -> None:
    own = signer("custodian")
    content = certificate_issued("technician", own.certificate, "x").content
    victim.journal.keep(Fact("certificate.issued", 1, (), content), by=own)
    later = altered(victim.journal.keep(by=own)[0], by=own, actor="technician")
    victim.put(later)
    assert at(6, 12) in victim.found()


def test_a_swapped_authority_shows(victim: Victim) -> None:
    other = stranger()
    body = victim.entry(1).body
    fact = {**body.fact, "authority": base64.b64encode(other.chain[0]).decode()}
    victim.put(altered(replace(victim.entry(1), body_bytes=replace(body, fact=fact).to_bytes())))
    found = victim.found()
    assert at(3, 2) in found
    assert {at(6, seq) for seq in (3, 4, 5, 6, 9, 10)} <= found


@pytest.mark.parametrize("data", [b"another drawing", b"", None])
def test_swapped_or_missing_evidence_shows(victim: Victim, data: bytes | None) -> None:
    file = victim.path.parent / "evidence" / victim.digest[:2] / victim.digest
    if data is None:
        file.unlink()
    else:
        file.write_bytes(data)
    assert {at(7, 4)} == victim.found()


@pytest.mark.parametrize("column", ["deed", "kind"])
def test_an_entry_filed_otherwise_than_its_header_says_shows(victim: Victim, column: str) -> None:
    victim.run(f"UPDATE entry SET {column} = 'other' WHERE seq = 5")  # noqa: S608
    assert {at(2, 5)} == victim.found()


def test_triggers_taken_away_show_by_themselves(victim: Victim) -> None:
    victim.run("SELECT 1")
    report = victim.check()
    assert len(GUARDS) == len(report.troubles)
    assert {(1, "the storage")} == {(one.step, one.where) for one in report.troubles}


@pytest.mark.parametrize("column", ["chain", "seq", "deed", "deed_index", "kind", "header", "body"])
@pytest.mark.parametrize("junk", ["x", "", -1, 0.5, b"\xff\x00", None, "9" * 40])
def test_junk_in_any_column_is_trouble_and_never_a_traceback(
    victim: Victim, column: str, junk: Any
) -> None:
    victim.loosen()
    victim.run(f"UPDATE entry SET {column} = ? WHERE seq = 5", junk)  # noqa: S608
    assert not victim.check().ok


@settings(
    max_examples=60, suppress_health_check=[HealthCheck.function_scoped_fixture], deadline=None
)
@given(
    st.integers(1, 10),
    st.sampled_from(["header", "body", "signature"]),
    st.integers(0, 10**6),
    st.integers(1, 255),
)
def test_any_byte_changed_shows(victim: Victim, seq: int, part: str, place: int, mask: int) -> None:
    entry = victim.entry(seq)
    data = getattr(entry, {"header": "header_bytes", "body": "body_bytes"}.get(part, part))
    if data is None:
        return
    spoilt = bytearray(data)
    spoilt[place % len(data)] ^= mask
    victim.run(f"UPDATE entry SET {part} = ? WHERE seq = ?", bytes(spoilt), seq)  # noqa: S608
    found = victim.found()
    victim.run(f"UPDATE entry SET {part} = ? WHERE seq = ?", data, seq)  # noqa: S608
    assert (
        any(where == f"entry {seq} of chain {CHAIN}" for _, where in found)
        or at(3, seq + 1) in found
    )
