"""Looking at the journal: entries about a subject, the whole check, the export."""

from __future__ import annotations

from collections.abc import Sequence
from pathlib import Path

from gaugelog.errors import Refused
from gaugelog.journal.check import Report, check
from gaugelog.journal.check.report import Trouble
from gaugelog.journal.entry import Entry, Head
from gaugelog.journal.export import export
from gaugelog.ledger import fold
from gaugelog.ledger.people import PersonRow
from gaugelog.ledger.photos import PhotoRow
from gaugelog.work.logbook import Logbook

_LONGEST_NUMBER = 15
"""Digits of an entry's number; a longer one is no entry's."""


def check_logbook(logbook: Logbook, printed: Sequence[str] = ()) -> Report:
    """Check journal, evidence and ledger; `printed` are heads as they stand on paper.

    Raises Faulty when a printed head can't be read.
    """
    heads = [Head.parse_printed(text) for text in printed]
    with logbook.storage.reading() as reader:

        def rebuilt() -> list[Trouble]:
            return fold.compare(reader)

        return check(reader, logbook.evidence, printed=heads, rebuild=rebuilt)


def entries_about(logbook: Logbook, what: str) -> list[Entry]:
    """Entries about a subject, by its label or id; one entry by its number; all when empty.

    Raises Refused when nothing is called that.
    """
    with logbook.storage.reading() as reader:
        if not what:
            return list(reader.entries())
        if what.isdecimal():
            found = reader.entry(logbook.chain, int(what)) if len(what) <= _LONGEST_NUMBER else None
            if found is None:
                raise Refused(f"There is no entry {what[:20]}.", "See `gaugelog journal head`.")
            return [found]
    with logbook.reading() as view:
        person = view.get(PersonRow, what)
        subject = person.id if person else view.subject(what)
    with logbook.storage.reading() as reader:
        entries = list(reader.entries())
        return [entry for entry in entries if entry.body_bytes and subject in entry.body.about]


def export_journal(logbook: Logbook, folder: Path, *, photos: bool = False) -> int:
    """Write the journal out to be checked without Gaugelog; returns the number of entries.

    Originals of photos may tell where they were taken: they go along only when asked for.
    """
    with logbook.reading() as view:
        originals = set() if photos else {row.file for row in view.all(PhotoRow)}
    with logbook.storage.reading() as reader:
        return export(reader, logbook.evidence, folder, left_out=originals)
