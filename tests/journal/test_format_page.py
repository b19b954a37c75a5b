"""The page that lays down the form of the journal says what the program does."""

from __future__ import annotations

import re
from dataclasses import fields
from pathlib import Path

from gaugelog.journal import certificates
from gaugelog.journal.entry import FORMAT, Body, Entry, Header, sha256

PAGE = (Path(__file__).parents[2] / "docs" / "journal-format.md").read_text(encoding="utf-8")


def _named(table: str) -> set[str]:
    """The names in the first column of the table whose heading begins so."""
    rows = PAGE.split(f"| {table} |")[1].split("\n\n")[0].splitlines()[2:]
    return {name for row in rows for name in re.findall(r"`([^`]+)`", row.split("|")[1])}


def _example() -> Entry:
    block = re.search(r"```json\n(.*)\n(.*)\n```", PAGE)
    assert block
    return Entry(block[1].encode(), block[2].encode())


def test_the_example_is_an_entry_with_the_hash_and_head_that_the_page_gives() -> None:
    entry = _example()
    assert FORMAT == entry.header.format
    assert sha256(entry.body_bytes or b"") == entry.header.body
    assert {"text": "20 GΩ"} == entry.body.fact
    assert f"`{entry.hash.hex()}`" in PAGE
    assert f"`{entry.head.printed}`" in PAGE


def test_the_page_names_every_field_of_header_and_body() -> None:
    assert {one.name for one in fields(Header)} - {"unknown"} == _named("header")
    assert {one.name for one in fields(Body)} - {"unknown"} == _named("body")


def test_the_page_names_every_kind_of_the_journal_itself() -> None:
    kinds = {*certificates.CERTIFICATE_KINDS, certificates.SHEET_ERASED}
    assert kinds == _named("kind")
