"""The order of entries from several chains."""

from __future__ import annotations

import random
from dataclasses import replace

from hypothesis import given
from hypothesis import strategies as st

from gaugelog.journal.entry import Entry, Head
from gaugelog.journal.order import ledger_order
from tests.journal.samples import SampleJournal


def _written(turns: list[str]) -> list[Entry]:
    """Entries of a journal to which chains wrote in turn, each knowing all that was there."""
    journal = SampleJournal()
    return [replace(journal, chain=turn).keep()[0] for turn in turns]


def _names(entries: list[Entry]) -> list[str]:
    return [f"{entry.header.chain}{entry.header.seq}" for entry in entries]


TURNS = st.lists(st.sampled_from("abc"), max_size=12)


@given(TURNS, st.randoms(use_true_random=False))
def test_the_order_depends_on_the_set_only(turns: list[str], dice: random.Random) -> None:
    entries = _written(turns)
    shuffled = list(entries)
    dice.shuffle(shuffled)
    assert _names(ledger_order(entries)) == _names(ledger_order(shuffled))


@given(TURNS)
def test_an_entry_comes_after_all_that_its_writer_knew(turns: list[str]) -> None:
    entries = _written(turns)
    assert _names(entries) == _names(ledger_order(entries))


def test_chains_that_knew_nothing_of_each_other_go_by_their_ids() -> None:
    entries = [*_written(["b", "b"]), *_written(["a"]), *_written(["c"])]
    assert ["a1", "b1", "b2", "c1"] == _names(ledger_order(entries))


def test_what_is_not_in_the_set_is_not_waited_for() -> None:
    entries = _written(["b", "a", "b"])
    assert ["a1", "b2"] == _names(ledger_order(entries[1:]))
    assert ["a1"] == _names(ledger_order([entries[1]]))


def test_forged_heads_that_wait_for_each_other_do_not_hang() -> None:
    entries = [
        replace(
            entry,
            header_bytes=replace(entry.header, heads=(Head(other, 9, bytes(32)),)).to_bytes(),
        )
        for entry, other in zip(_written(["a", "b"]), ["b", "a"], strict=True)
    ]
    assert ["a1", "b1"] == _names(ledger_order(entries))
