"""One entry as the check looks at it: read once, whatever its bytes are, and shown to each step."""

from __future__ import annotations

import hashlib
from collections.abc import Iterator
from dataclasses import dataclass

from gaugelog.errors import GaugelogError
from gaugelog.journal.check.report import Findings, Trouble
from gaugelog.journal.clock import Moment
from gaugelog.journal.entry import Body, Entry, Head, Header
from gaugelog.journal.header import BadEntry, parse_header
from gaugelog.journal.order import merged
from gaugelog.journal.storage.port import Filed, Reader

RESTORE = "Keep this logbook as it is, and restore the newest backup that checks."
"""What to do when the bytes of the past are not what they were."""

OF_ENTRIES = range(1, 8)
"""The steps that look at entries, which a storage that fails cuts short."""

_SHORT_CHAIN = 8


@dataclass(slots=True)
class Look:
    """An entry under examination. `header` and `body` are None where they can't be read."""

    filed: Filed
    hash: bytes
    header: Header | None
    header_trouble: str = ""
    body: Body | None = None
    position: int = 0
    _moment: Moment | None = None

    @property
    def entry(self) -> Entry:
        """The entry."""
        return self.filed.entry

    def moment(self, header: Header) -> Moment:
        """When the entry was written; read once for all steps that ask."""
        if self._moment is None:
            self._moment = header.moment
        return self._moment

    @property
    def where(self) -> str:
        """Which entry it is, for people."""
        return where(self.filed.chain, self.filed.seq)


def where(chain: str, seq: object) -> str:
    """An entry's name for people: `entry 12 of chain abcdefgh`."""
    return f"entry {seq} of chain {chain[:_SHORT_CHAIN]}"


def looks(reader: Reader, findings: Findings) -> Iterator[Look]:
    """Every entry in the ledger's order, with its place in the walk.

    A storage that fails half-way is a trouble, and ends the chain it failed in.
    """
    chains = {chain: _of_chain(reader, chain, findings) for chain in reader.chains()}
    for position, look in enumerate(merged(chains, _heads, _seq) if chains else ()):
        look.position = position
        yield look


def _of_chain(reader: Reader, chain: str, findings: Findings) -> Iterator[Look]:
    last: object = 0
    try:
        for filed in reader.filed(chain):
            last = filed.seq
            yield _look(filed)
    except Exception as error:  # a damaged file brings up anything
        what = f"The storage can't be read on from here: {said(error)}"
        findings.trouble(0, Trouble(1, where(chain, last), what, RESTORE))
        findings.cut_short(*OF_ENTRIES)


def said(error: Exception) -> str:
    """What an error says, as a sentence."""
    if isinstance(error, GaugelogError):
        return error.message
    return f"{type(error).__name__}: {error}."


def _look(filed: Filed) -> Look:
    data = filed.entry.header_bytes
    own = hashlib.sha256(data).digest()
    try:
        return Look(filed, own, parse_header(data))
    except BadEntry as error:
        return Look(filed, own, None, error.message)


def _heads(look: Look) -> tuple[Head, ...]:
    return look.header.heads if look.header else ()


def _seq(look: Look) -> int:
    # In a column that was tampered with, a number can be text.
    return look.filed.seq if isinstance(look.filed.seq, int) else 0
