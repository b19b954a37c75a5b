"""What printed heads prove of a backup: that it fits them, and which entries it lacks."""

from __future__ import annotations

from collections.abc import Iterator, Sequence

from gaugelog.errors import Fault, Faulty, Refused
from gaugelog.journal.entry import Head, PrintedHead
from gaugelog.journal.storage.port import Reader
from gaugelog.ledger.restored import EntriesMissing, LogbookRestored


def parse_heads(typed: Sequence[str]) -> list[PrintedHead]:
    """Read heads as copied from paper. Raises Faulty naming every one that can't be read."""
    heads: list[PrintedHead] = []
    faults: list[Fault] = []
    for text in typed:
        try:
            heads.append(Head.parse_printed(text))
        except Faulty as error:
            faults += error.faults
    if faults:
        raise Faulty(faults, "nothing was restored")
    return heads


def missing_entries(
    reader: Reader, head: Head, printed: Sequence[PrintedHead]
) -> EntriesMissing | None:
    """The entries after `head` that the printed heads prove; None where they prove none.

    A head that an earlier restore left behind proves nothing new. Raises Refused when a printed
    head is of an entry that is here with another hash.
    """
    left_behind = set(_left_behind(reader))
    fresh = [each for each in printed if str(each) not in left_behind]
    for each in fresh:
        if each.seq <= head.seq:
            _demand_met(reader, each)
    last = max((each.seq for each in fresh), default=0)
    return EntriesMissing(first=head.seq + 1, last=last) if last > head.seq else None


def _demand_met(reader: Reader, printed: PrintedHead) -> None:
    found = [reader.entry(chain, printed.seq) for chain in reader.chains()]
    if not any(entry is not None and entry.head.short == printed for entry in found):
        raise Refused(
            f"The printed head {printed} does not fit: entry {printed.seq} of this backup has "
            "another hash.",
            "Copy the head again; if it is right, this is a backup of another logbook, or its "
            "past was written anew.",
        )


def _left_behind(reader: Reader) -> Iterator[str]:
    """Printed heads of entries that an earlier restore has named missing."""
    for entry in reader.of_kinds([LogbookRestored.kind]):
        fact = LogbookRestored.model_validate(entry.body.fact)
        for each in fact.printed:
            if Head.parse_printed(each).seq >= entry.header.seq:
                yield each
