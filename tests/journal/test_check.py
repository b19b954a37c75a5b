"""The check of a journal that nobody touched: what is sound, what is noted, what was forbidden."""

from __future__ import annotations

import json
from dataclasses import replace
from datetime import timedelta

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.journal.certificates import (
    certificate_issued,
    certificate_revoked,
    journal_begun,
    sheet_erased,
)
from gaugelog.journal.check import Report, Trouble, check
from gaugelog.journal.clock import SetClock
from gaugelog.journal.entry import Entry, Fact, Head, PrintedHead
from gaugelog.journal.keys import UnlockedKey, new_key
from gaugelog.journal.storage.memory import MemoryStorage
from tests.journal.samples import CHAIN, START, SampleJournal, authority, note, signer, stranger


@pytest.fixture
def journal() -> SampleJournal:
    return SampleJournal().start()


def report_of(journal: SampleJournal, *printed: PrintedHead) -> Report:
    with journal.storage.reading() as reader:
        return check(reader, journal.evidence, printed=printed)


def troubles(journal: SampleJournal) -> list[tuple[int, str, str]]:
    return [(one.step, one.where, one.what) for one in report_of(journal).troubles]


def only_trouble(journal: SampleJournal) -> tuple[int, str, str]:
    (trouble,) = troubles(journal)
    return trouble


def notices(journal: SampleJournal) -> list[str]:
    report = report_of(journal)
    assert report.ok, report.troubles
    return [f"{one.where}: {one.what}" for one in report.notices]


def test_a_sound_journal_has_eight_steps_without_trouble(journal: SampleJournal) -> None:
    kept = journal.keep(note("a"), note("b"))
    report = report_of(journal, kept[0].head.short, kept[1].head.short)
    assert report.ok
    assert 5 == report.entries
    assert (kept[1].head,) == report.heads
    assert list(range(1, 9)) == [step.number for step in report.steps]
    assert ["ok"] * 7 + ["not asked"] == [step.outcome for step in report.steps]
    assert () == report.notices
    assert f"sound: 5 entries checked, head {kept[1].head.printed}" in report.summary


def test_the_report_is_plain_data(journal: SampleJournal) -> None:
    report = report_of(journal, PrintedHead(99, "A" * 26))
    data = json.loads(json.dumps(report.as_json()))
    assert not data["ok"]
    assert 3 == data["entries"]
    assert "trouble" == data["steps"][2]["outcome"]
    assert f"printed head 99:{'A' * 26}" == data["steps"][2]["troubles"][0]["where"]
    assert "NOT sound: 1 trouble found in 3 entries" in data["summary"]
    assert CHAIN == data["heads"][0]["chain"]


def test_a_printed_head_with_other_letters_says_the_past_was_written_anew(
    journal: SampleJournal,
) -> None:
    (trouble,) = report_of(journal, PrintedHead(2, "A" * 26)).troubles
    assert (3, f"printed head 2:{'A' * 26}") == (trouble.step, trouble.where)
    assert "written anew" in trouble.what


def test_progress_is_told_up_to_the_end(journal: SampleJournal) -> None:
    journal.keep(*[note(str(place)) for place in range(600)])
    told: list[tuple[int, int]] = []
    with journal.storage.reading() as reader:
        check(reader, journal.evidence, progress=lambda done, total: told.append((done, total)))
    assert [(256, 603), (512, 603), (603, 603)] == told


def test_the_ledger_is_compared_when_asked(journal: SampleJournal) -> None:
    def rebuild() -> list[Trouble]:
        return [Trouble(8, "table point", "A row differs.")]

    with journal.storage.reading() as reader:
        assert check(reader, journal.evidence, rebuild=list).ok
        report = check(reader, journal.evidence, rebuild=rebuild)
    assert [(8, "table point")] == [(one.step, one.where) for one in report.troubles]
    assert "trouble" == report.steps[7].outcome


def test_a_ledger_that_cannot_be_rebuilt_is_trouble_and_no_traceback(
    journal: SampleJournal,
) -> None:
    def rebuild() -> list[Trouble]:
        raise KeyError("point")

    with journal.storage.reading() as reader:
        report = check(reader, journal.evidence, rebuild=rebuild)
    assert "can't be rebuilt" in report.troubles[0].what


def test_a_certificate_that_no_entry_issued_is_named(journal: SampleJournal) -> None:
    journal.keep(by=signer("visitor"))
    found = troubles(journal)
    assert [5, 6] == [step for step, _, _ in found]
    assert "not issued by any entry before" in found[1][2]


def test_a_certificate_issued_only_later_is_no_good_before(journal: SampleJournal) -> None:
    visitor = signer("visitor")
    journal.keep(by=visitor)
    journal.keep(certificate_issued("visitor", visitor.certificate, "late"), by=signer())
    journal.keep(by=visitor)
    assert {f"entry 4 of chain {CHAIN}"} == {where for _, where, _ in troubles(journal)}


def test_a_certificate_of_another_authority_is_named(journal: SampleJournal) -> None:
    other = stranger("visitor")
    journal.keep(certificate_issued("visitor", other.certificate, "enrolled"), by=signer())
    journal.keep(by=other)
    step, where, what = only_trouble(journal)
    assert (6, f"entry 5 of chain {CHAIN}") == (step, where)
    assert "not issued by the journal's authority" in what


def test_a_revoked_certificate_is_no_good_after_its_deed(journal: SampleJournal) -> None:
    technician = signer("technician")
    revoked = certificate_revoked("technician", technician.fingerprint, "left")
    journal.keep(note(), revoked, note(), by=technician)
    assert report_of(journal).ok
    journal.keep(by=technician)
    step, where, what = only_trouble(journal)
    assert (6, f"entry 7 of chain {CHAIN}") == (step, where)
    assert "revoked" in what


def revoke_technician(journal: SampleJournal) -> None:
    """The technician's key is lost."""
    fingerprint = signer("technician").fingerprint
    journal.keep(certificate_revoked("technician", fingerprint, "lost"), by=signer())


def written_into_the_past(journal: SampleJournal) -> Entry:
    """An entry of a lost key in a chain of its own, which claims to know only the beginning."""
    first = journal.entries()[-1]
    forger = SampleJournal(MemoryStorage(), journal.evidence, SetClock(START), "a")
    with journal.storage.reading() as reader, forger.storage.writing() as writer:
        for entry in reader.entries():
            writer.insert(entry)
    forged = forger.keep(by=signer("technician"))[0]
    assert forged.header.heads[0].seq == first.header.seq
    return forged


def test_a_lost_key_cannot_write_into_the_past(journal: SampleJournal) -> None:
    forged = written_into_the_past(journal)
    revoke_technician(journal)
    with journal.storage.writing() as writer:
        writer.insert(forged)
    step, where, what = only_trouble(journal)
    assert (6, "entry 1 of chain a") == (step, where)
    assert "can't be proven" in what
    assert "no entry says whose copy" in report_of(journal).notices[0].what


def test_what_a_revocation_knew_of_another_chain_stays_good(journal: SampleJournal) -> None:
    laptop = replace(journal, chain="laptop")
    laptop.keep(by=signer("technician"))
    revoke_technician(journal)
    assert report_of(journal).ok
    laptop.keep(by=signer("technician"))
    assert (6, "entry 2 of chain laptop") == only_trouble(journal)[:2]


def test_a_person_enrolled_again_signs_with_the_new_certificate(journal: SampleJournal) -> None:
    key = new_key()
    der = authority().issue("technician", key.public_key(), journal.clock)
    renewed = UnlockedKey(key, der, authority().chain)
    old = signer("technician")
    journal.keep(
        certificate_revoked("technician", old.fingerprint, "lost"),
        certificate_issued("technician", der, "enrolled again"),
        by=signer(),
    )
    journal.keep(by=renewed)
    assert report_of(journal).ok


def test_an_expired_certificate_is_no_good_after_its_day(journal: SampleJournal) -> None:
    journal.clock.advance(6 * 366 * 86400)
    journal.keep()
    step, _, what = only_trouble(journal)
    assert 6 == step
    assert "had expired on 2031-12-01" in what


def test_a_certificate_is_no_good_before_its_first_day(journal: SampleJournal) -> None:
    late = SetClock(START)
    late.advance(10 * 86400)
    key = new_key()
    der = authority().issue("visitor", key.public_key(), late)
    visitor = UnlockedKey(key, der, authority().chain)
    journal.keep(certificate_issued("visitor", der, "enrolled"), by=signer())
    journal.keep(by=visitor)
    assert "was not good before 2026-12-10" in only_trouble(journal)[2]


def test_a_second_authority_is_trouble(journal: SampleJournal) -> None:
    other = stranger().chain[0]
    journal.keep(journal_begun(other, program="x", name="y"), by=signer())
    assert "another authority" in only_trouble(journal)[2]


@pytest.mark.parametrize("kind", ["certificate.issued", "certificate.revoked", "journal.begun"])
@pytest.mark.parametrize("content", [{}, {"person": "x", "certificate": "AAAA", "authority": 1}])
def test_a_fact_about_certificates_that_cannot_be_read_is_trouble(
    journal: SampleJournal, kind: str, content: dict[str, str]
) -> None:
    journal.keep(Fact(kind, 1, (), content), by=signer())
    assert (6, f"entry 4 of chain {CHAIN}") == only_trouble(journal)[:2]


def test_a_clock_set_back_is_noted_and_no_trouble(journal: SampleJournal) -> None:
    journal.keep()
    now = journal.clock.now()
    journal.clock.set(replace(now, utc=now.utc - timedelta(hours=1)))
    journal.keep()
    where = f"entry 5 of chain {CHAIN}"
    assert [f"{where}: The clock had been set back by 3600 s since the entry before."] == notices(
        journal
    )


def test_an_erased_sheet_is_noted_and_no_trouble(journal: SampleJournal) -> None:
    with journal.storage.writing() as writer:
        sheet = writer.put_sheet(b"a name")
    journal.keep(note(sheets=(sheet,)))
    assert [] == notices(journal)
    with journal.storage.writing() as writer:
        writer.erase_sheet(sheet)
    journal.keep(sheet_erased(sheet, "asked for"), by=signer())
    where = f"entry 5 of chain {CHAIN}"
    assert [f"{where}: It erased the identity sheet {sheet[:8]}…."] == notices(journal)


def test_a_sheet_gone_without_an_entry_is_trouble(journal: SampleJournal) -> None:
    with journal.storage.writing() as writer:
        sheet = writer.put_sheet(b"a name")
    journal.keep(note(sheets=(sheet,)))
    with journal.storage.writing() as writer:
        writer.erase_sheet(sheet)
    assert (7, f"entry 4 of chain {CHAIN}") == only_trouble(journal)[:2]


def test_a_sheet_that_was_to_be_erased_and_is_there_is_trouble(journal: SampleJournal) -> None:
    with journal.storage.writing() as writer:
        sheet = writer.put_sheet(b"a name")
    journal.keep(sheet_erased(sheet, "asked for"), by=signer())
    step, where, what = only_trouble(journal)
    assert (7, f"identity sheet {sheet[:8]}…") == (step, where)
    assert "still there" in what


def test_files_that_no_entry_names_are_noted(journal: SampleJournal) -> None:
    digest = journal.evidence.put(b"left over")
    assert [f"the evidence: Files that no entry names, the first {digest}: 1 in all."] == notices(
        journal
    )


def test_bodies_may_be_withheld_where_that_is_allowed(journal: SampleJournal) -> None:
    journal.keep(note("a secret of another client"))
    shown = MemoryStorage()
    with shown.writing() as writer:
        for entry in journal.entries():
            withheld = entry.header.kind == "note.taken"
            writer.insert(replace(entry, body_bytes=None if withheld else entry.body_bytes))
    with shown.reading() as reader:
        assert check(reader, journal.evidence, may_withhold=True).ok
        report = check(reader, journal.evidence)
    assert [(4, f"entry 4 of chain {CHAIN}")] == [(one.step, one.where) for one in report.troubles]


def test_several_chains_are_checked_in_the_order_of_the_ledger(journal: SampleJournal) -> None:
    # Chain "a" sorts before the chain that issued the certificate it signs with.
    laptop = replace(journal, chain="a")
    laptop.keep()
    journal.keep()
    laptop.keep()
    report = report_of(journal)
    assert report.ok, report.troubles
    assert 6 == report.entries
    assert {"a", CHAIN} == {head.chain for head in report.heads}


def test_a_known_head_of_another_chain_that_is_not_here_is_trouble(journal: SampleJournal) -> None:
    laptop = replace(journal, chain="laptop")
    laptop.keep()
    journal.keep()
    alone = MemoryStorage()
    with alone.writing() as writer:
        for entry in journal.entries():
            if entry.header.chain == CHAIN:
                writer.insert(entry)
    step, where, what = only_trouble(replace(journal, storage=alone))
    assert (3, f"entry 4 of chain {CHAIN}") == (step, where)
    assert "It knew entry 1 of chain laptop, which is not here." == what


@given(st.lists(st.tuples(st.sampled_from([CHAIN, "a", "z"]), st.integers(1, 3)), max_size=8))
def test_whatever_was_appended_to_whichever_chain_is_sound(turns: list[tuple[str, int]]) -> None:
    journal = SampleJournal().start()
    for chain, count in turns:
        replace(journal, chain=chain).keep(*[note(str(place)) for place in range(count)])
    report = report_of(journal)
    assert report.ok, report.troubles
    assert 3 + sum(count for _, count in turns) == report.entries


def test_an_empty_journal_is_trouble() -> None:
    assert [2, 6] == [step for step, _, _ in troubles(SampleJournal())]


def test_a_head_of_the_report_is_the_head_of_the_chain(journal: SampleJournal) -> None:
    with journal.storage.reading() as reader:
        head = reader.head(CHAIN)
    assert isinstance(head, Head)
    assert (head,) == report_of(journal).heads
