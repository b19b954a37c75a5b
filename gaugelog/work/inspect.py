"""A quick look at a logbook's health: guards, ledger version, authority, clock. For the doctor."""

from __future__ import annotations

from collections.abc import Iterator

from gaugelog.errors import GaugelogError
from gaugelog.journal.certificates import certificates_of
from gaugelog.journal.entry import sha256
from gaugelog.ledger import schema
from gaugelog.work.logbook import Logbook

Look = tuple[str, str, str, str]
"""Level (`ok`, `note` or `trouble`), subject, what was found, what to do."""


def inspect(logbook: Logbook) -> Iterator[Look]:
    """What a look at the logbook finds, without the whole check."""
    with logbook.storage.reading() as reader:
        guards = reader.missing_guards()
        version = schema.ledger_version(reader.connection)
        authority = certificates_of(reader).authority
        head = reader.head(logbook.chain)
        last = reader.entry(logbook.chain, head.seq) if head is not None else None
    for guard in guards:
        yield ("trouble", "Guard", guard, "Check the journal; restore from a backup if it differs.")
    if not guards:
        yield ("ok", "Guards", "the journal's triggers are in place", "")
    yield ("ok", "Ledger", f"version {version}", "")
    if authority is not None:
        printed = " ".join(_in_fours(sha256(authority)))
        yield ("note", "Authority", f"SHA-256 {printed}", "Confirm it on paper with your client.")
    if last is not None and last.header.moment.utc > logbook.clock.now().utc:
        yield (
            "trouble",
            "Clock",
            f"this machine's clock lies before the last entry ({last.header.time})",
            "Set the clock right; entries made now would be flagged.",
        )
    yield from _writable(logbook)


def _in_fours(text: str) -> list[str]:
    return [text[place : place + 4] for place in range(0, len(text), 4)]


def _writable(logbook: Logbook) -> Iterator[Look]:
    try:
        with logbook.storage.writing():
            pass
    except GaugelogError as error:
        yield ("trouble", "Writing", error.message, error.remedy)
    else:
        yield ("ok", "Writing", "the logbook can be written", "")
