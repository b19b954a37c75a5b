"""Appending: chained, counted, signed once a deed, and the same when asked again."""

from __future__ import annotations

import base64
from dataclasses import replace
from itertools import pairwise

import pytest
from cryptography import x509
from cryptography.hazmat.primitives.asymmetric import ec
from cryptography.hazmat.primitives.hashes import SHA256
from hypothesis import given
from hypothesis import strategies as st

from gaugelog import __version__
from gaugelog.errors import Refused
from gaugelog.journal.append import append, begin, touched_since
from gaugelog.journal.canonical import NotCanonical
from gaugelog.journal.entry import Entry, Fact, Header
from tests.journal.samples import CHAIN, START, SampleJournal, authority, note, signer


@pytest.fixture
def journal() -> SampleJournal:
    return SampleJournal().start()


def test_a_journal_begins_with_its_authority_and_its_custodian(journal: SampleJournal) -> None:
    first, second, third = journal.entries()
    assert ("journal.begun", "certificate.issued", "certificate.issued") == (
        first.header.kind,
        second.header.kind,
        third.header.kind,
    )
    assert f"gaugelog {__version__}" == first.body.fact["program"]
    assert "custodian" == second.body.fact["person"]
    assert "custodian" == third.header.actor
    assert "0" * 64 == first.header.previous


def test_a_journal_does_not_begin_twice(journal: SampleJournal) -> None:
    with pytest.raises(Refused), journal.storage.writing() as writer:
        begin(writer, [], signer(), START, "other", "deed-2")


def test_beginning_again_with_the_same_deed_gives_the_same_entries() -> None:
    with SampleJournal().storage.writing() as writer:
        once = begin(writer, [], signer(), START, CHAIN, "deed-1", name="Footbridge")
        again = begin(writer, [], signer(), START, CHAIN, "deed-1", name="Footbridge")
    assert once == again


def test_each_entry_names_the_hash_of_the_one_before(journal: SampleJournal) -> None:
    journal.keep(note("a"), note("b"))
    entries = journal.entries()
    for before, after in pairwise(entries):
        assert before.hash.hex() == after.header.previous
        assert before.header.seq + 1 == after.header.seq


def test_a_deed_is_counted_and_only_its_last_entry_signed(journal: SampleJournal) -> None:
    kept = journal.keep(note("a"), note("b"), note("c"))
    assert [(1, 3), (2, 3), (3, 3)] == [(one.header.index, one.header.count) for one in kept]
    assert [False, False, True] == [one.signature is not None for one in kept]
    assert 1 == len({one.header.deed for one in kept})


def test_the_signature_is_over_the_header_bytes(journal: SampleJournal) -> None:
    last = journal.keep()[-1]
    key = x509.load_der_x509_certificate(signer("technician").certificate).public_key()
    assert isinstance(key, ec.EllipticCurvePublicKey)
    assert last.signature
    key.verify(last.signature, last.header_bytes, ec.ECDSA(SHA256()))
    assert signer("technician").fingerprint == last.header.certificate


def test_a_header_tells_when_and_on_which_run_of_the_machine(journal: SampleJournal) -> None:
    header = journal.keep()[0].header
    assert journal.clock.now() == header.moment


def test_a_deed_asked_for_again_is_given_back(journal: SampleJournal) -> None:
    fact = Fact("note.taken", 1, ("p",), {"list": ("a", ("b",)), "text": "x"})
    once = journal.keep(fact, deed="deed-1")
    assert once == journal.keep(fact, deed="deed-1")
    assert 4 == len(journal.entries())


@pytest.mark.parametrize(
    "other",
    [
        note("dirty"),
        note(about=("point-2",)),
        note(evidence=("e" * 64,)),
        replace(note(), version=2),
        replace(note(), kind="note.struck"),
    ],
)
def test_a_deed_with_other_facts_under_the_same_id_is_refused(
    journal: SampleJournal, other: Fact
) -> None:
    journal.keep(note(), deed="deed-1")
    with pytest.raises(Refused, match="other facts"):
        journal.keep(other, deed="deed-1")
    with pytest.raises(Refused, match="other facts"):
        journal.keep(note(), note(), deed="deed-1")
    with pytest.raises(Refused, match="other facts"):
        journal.keep(note(), deed="deed-1", by=signer())


def test_a_fact_that_cannot_be_kept_stores_nothing(journal: SampleJournal) -> None:
    with pytest.raises(NotCanonical):
        journal.keep(note(), Fact("note.taken", 1, (), {"value": 0.5}))  # type: ignore[dict-item]
    assert 3 == len(journal.entries())


def test_a_deed_without_facts_is_a_mistake_of_the_caller(journal: SampleJournal) -> None:
    with pytest.raises(ValueError, match="facts is empty"), journal.storage.writing() as writer:
        append(writer, CHAIN, [], signer(), START, "deed-1")


def test_an_entry_knows_the_heads_of_other_chains(journal: SampleJournal) -> None:
    other = replace(journal, chain="chain-b")
    other.keep()
    here = journal.keep()[0]
    there = other.keep()[0]
    assert ["chain-b"] == [head.chain for head in here.header.heads]
    assert (here.head,) == there.header.heads


def test_what_touched_a_subject_since_an_entry_is_found(journal: SampleJournal) -> None:
    journal.keep(note(about=("point-1",)))
    later = journal.keep(note(about=("point-2", "lot-1")), note(about=()), note(about=("point-1",)))

    def touched(about: set[str], seq: int) -> list[Entry]:
        with journal.storage.reading() as reader:
            return touched_since(reader, about, seq, CHAIN)

    assert [later[2]] == touched({"point-1"}, 4)
    assert [later[0], later[2]] == touched({"point-1", "lot-1"}, 4)
    assert [] == touched({"point-1"}, 7)


@given(st.lists(st.integers(1, 4), max_size=6))
def test_any_row_of_deeds_makes_one_chain(counts: list[int]) -> None:
    journal = SampleJournal().start()
    for count in counts:
        journal.keep(*[note(str(place)) for place in range(count)])
    headers: list[Header] = [entry.header for entry in journal.entries()]
    assert list(range(1, 4 + sum(counts))) == [header.seq for header in headers]
    signed = [entry.header.seq for entry in journal.entries() if entry.signature]
    assert [header.seq for header in headers if header.index == header.count] == signed


def test_the_authority_is_in_the_first_entry_whole() -> None:
    first = SampleJournal().start().entries()[0]
    assert authority().certificate == base64.b64decode(first.body.fact["authority"])
