"""Entries: exact bytes in, exact bytes out, and plain words for bytes that are wrong."""

from __future__ import annotations

import hashlib
import json
from dataclasses import replace
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.errors import Faulty
from gaugelog.journal.canonical import canonical
from gaugelog.journal.entry import (
    BadEntry,
    Body,
    Entry,
    Fact,
    Head,
    Header,
    PrintedHead,
    parse_body,
    parse_header,
)
from tests.journal.samples import START

HEADER = Header(
    format="gaugelog-journal 1",
    chain="chain-a",
    seq=12,
    heads=(Head("chain-b", 3, bytes(range(32))),),
    deed="deed-1",
    index=1,
    count=2,
    time="2026-12-01T09:00:00.000000Z",
    offset="-03:30",
    boot="boot-1",
    uptime_ms=0,
    actor="ann",
    certificate="c" * 64,
    kind="note.taken",
    version=1,
    body="b" * 64,
    previous="a" * 64,
)
FACT = Fact("note.taken", 2, ("point-1", "lot-1"), {"text": "20 GΩ"}, ("e" * 64,), ("d" * 64,))


def _fields() -> dict[str, Any]:
    fields: dict[str, Any] = json.loads(HEADER.to_bytes())
    return fields


def test_a_header_reads_back_from_its_bytes() -> None:
    assert HEADER == parse_header(HEADER.to_bytes())


def test_fields_of_a_newer_program_are_kept() -> None:
    newer = replace(HEADER, unknown={"witness": ["x", {"y": None}]})
    assert newer == parse_header(newer.to_bytes())
    body = replace(Body.of(FACT), unknown={"more": 1})
    assert body == parse_body(body.to_bytes())


@given(
    st.integers(1, 2**53 - 1),
    st.integers(0, 2**53 - 1),
    st.lists(st.integers(1, 2**53 - 1), max_size=3),
    st.booleans(),
)
def test_the_quick_way_and_the_slow_way_to_read_a_header_agree(
    seq: int, uptime_ms: int, known: list[int], newer: bool
) -> None:
    heads = tuple(Head(f"chain-{place}", seq, bytes(32)) for place, seq in enumerate(known))
    header = replace(HEADER, seq=seq, uptime_ms=uptime_ms, heads=heads)
    if newer:
        header = replace(header, unknown={"zz": 1})
    assert header == parse_header(header.to_bytes())


def test_a_header_tells_its_moment() -> None:
    assert replace(START, offset_minutes=-210, uptime_ms=0) == HEADER.moment


@pytest.mark.parametrize(
    ("name", "wrong"),
    [
        ("format", "gaugelog-journal 2"),
        ("chain", "../chain"),
        ("seq", 0),
        ("seq", "1"),
        ("seq", True),
        ("index", 3),
        ("time", "2026-13-01T09:00:00.000000Z"),
        ("time", "2026-12-01"),
        ("offset", "1:00"),
        ("boot", ""),
        ("uptime_ms", -1),
        ("actor", "a b"),
        ("certificate", "C" * 64),
        ("kind", "Note"),
        ("version", None),
        ("body", "b" * 63),
        ("previous", ""),
        ("heads", None),
        ("heads", [1]),
        ("heads", [{"chain": "b", "seq": 0, "hash": "a" * 64}]),
        ("heads", [{"chain": "b", "seq": 1, "hash": "a" * 64, "x": 1}]),
    ],
)
def test_a_header_with_a_wrong_field_is_refused_by_name(name: str, wrong: Any) -> None:
    with pytest.raises(BadEntry) as caught:
        parse_header(canonical({**_fields(), name: wrong}))
    assert "Its header" in caught.value.message
    assert caught.value.remedy


@pytest.mark.parametrize("name", sorted(_fields()))
def test_a_header_that_lacks_a_field_is_refused(name: str) -> None:
    fields = _fields()
    del fields[name]
    with pytest.raises(BadEntry):
        parse_header(canonical(fields))


def test_a_header_in_other_bytes_than_the_canonical_is_refused() -> None:
    with pytest.raises(BadEntry, match="canonical form"):
        parse_header(json.dumps(_fields()).encode())
    with pytest.raises(BadEntry, match="not a JSON object"):
        parse_header(b"[]")


def test_a_body_reads_back_from_its_bytes() -> None:
    body = Body.of(FACT)
    assert body == replace(parse_body(body.to_bytes()), fact=body.fact)
    assert FACT == parse_body(body.to_bytes()).as_fact("note.taken", 2)


def test_equal_facts_have_bodies_that_cannot_be_guessed() -> None:
    assert Body.of(FACT).to_bytes() != Body.of(FACT).to_bytes()


@pytest.mark.parametrize(
    ("name", "wrong"),
    [
        ("about", None),
        ("about", [1]),
        ("evidence", ["abc"]),
        ("sheets", "d"),
        ("fact", []),
        ("salt", 1),
    ],
)
def test_a_body_with_a_wrong_part_is_refused(name: str, wrong: Any) -> None:
    fields = json.loads(Body.of(FACT).to_bytes())
    with pytest.raises(BadEntry, match="Its body"):
        parse_body(canonical({**fields, name: wrong}))


def test_an_entry_is_named_by_the_hash_of_its_header_bytes() -> None:
    entry = Entry(HEADER.to_bytes(), Body.of(FACT).to_bytes())
    assert hashlib.sha256(HEADER.to_bytes()).digest() == entry.hash
    assert Head("chain-a", 12, entry.hash) == entry.head
    assert replace(FACT, version=1) == entry.fact


def test_a_withheld_body_is_said_to_be_withheld() -> None:
    with pytest.raises(BadEntry, match="withheld"):
        _ = Entry(HEADER.to_bytes(), None).body


def test_a_head_is_printed_as_number_and_26_letters() -> None:
    head = Head("chain-a", 12, bytes(32))
    assert f"12:{'A' * 26}" == head.printed
    assert PrintedHead(12, "A" * 26) == head.short


@given(st.integers(1, 10**12), st.binary(min_size=32, max_size=32))
def test_a_printed_head_is_read_as_people_copy_it(seq: int, digest: bytes) -> None:
    head = Head("chain-a", seq, digest)
    copied = head.printed.lower().replace("o", "0").replace("i", "1").replace("b", "8")
    copied = f" {copied[: len(str(seq)) + 7]} {copied[len(str(seq)) + 7 :]}"
    assert head.short == Head.parse_printed(copied)


@pytest.mark.parametrize("text", ["", "12", "12:", "x:AAAA", f"0:{'A' * 26}", f"12:{'A' * 25}9"])
def test_what_is_no_printed_head_is_refused_with_what_to_do(text: str) -> None:
    with pytest.raises(Faulty) as caught:
        Head.parse_printed(text)
    assert "is not a printed head" in str(caught.value.faults[0])
