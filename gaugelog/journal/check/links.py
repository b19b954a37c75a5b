"""Steps 1 to 4: each entry by itself and its link to the one before."""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Sequence

from gaugelog.journal.check.look import RESTORE, Look, where
from gaugelog.journal.check.report import Findings, Trouble
from gaugelog.journal.entry import Head, PrintedHead, parse_body, sha256
from gaugelog.journal.head import NO_HASH
from gaugelog.journal.header import BadEntry
from gaugelog.journal.storage.port import Reader

RESTORED = "logbook.restored"
"""The kind of the entry that says a logbook was restored, and by which printed heads."""


class Format:
    """Step 1. Headers are canonical bytes of a known format; the storage's guards are there."""

    number = 1

    def __init__(self, findings: Findings, reader: Reader) -> None:
        self._findings = findings
        self._reader = reader

    def see(self, look: Look) -> None:
        """Look at one entry."""
        if look.header is None:
            trouble = Trouble(1, look.where, look.header_trouble, RESTORE)
            self._findings.trouble(look.position, trouble)

    def finish(self) -> None:
        """Look at the guards, and at the storage beneath the entries."""
        for damage in self._reader.damages():
            self._findings.trouble(0, Trouble(1, "the storage", damage, RESTORE))
        for missing in self._reader.missing_guards():
            remedy = "Find out who took it away; then restore the newest backup that checks."
            self._findings.trouble(0, Trouble(1, "the storage", missing, remedy))


class Numbering:
    """Step 2. Numbers run from 1 without a gap; each entry is filed as its header says."""

    number = 2

    def __init__(self, findings: Findings) -> None:
        self._findings = findings
        self._last: dict[str, int] = {}

    def see(self, look: Look) -> None:
        """Look at one entry."""
        filed, header = look.filed, look.header
        expected = self._last.get(filed.chain, 0) + 1
        if filed.seq != expected:
            self._missing(look, expected)
        self._last[filed.chain] = filed.seq if isinstance(filed.seq, int) else expected
        if header is None:
            return
        said = (header.chain, header.seq, header.deed, header.index, header.kind)
        if filed[:-1] != said:
            place = f"entry {header.seq} of chain {header.chain}"
            part = f"{header.index} of deed {header.deed}, kind {header.kind}"
            what = f"It is filed otherwise than its header says: {place}, {part}."
            self._findings.trouble(look.position, Trouble(2, look.where, what, RESTORE))

    def finish(self) -> None:
        """A journal that has begun is never empty."""
        if not self._last:
            what = "It holds no entry; a journal that has begun holds at least one."
            self._findings.trouble(0, Trouble(2, "the journal", what, RESTORE))

    def _missing(self, look: Look, expected: int) -> None:
        chain, seq = look.filed.chain, look.filed.seq
        if isinstance(seq, int) and seq > expected:
            place, last = where(chain, expected), seq - 1
            what = "It is missing." if last == expected else f"It and all up to {last} are missing."
        else:
            place, what = look.where, f"Its number is {seq!r} where {expected} should be."
        self._findings.trouble(look.position, Trouble(2, place, what, RESTORE))


class Chain:
    """Step 3. Each entry names the hash of the one before, known heads and printed heads fit."""

    number = 3

    def __init__(self, findings: Findings, printed: Sequence[PrintedHead]) -> None:
        self._findings = findings
        self.heads: dict[str, Head] = {}
        self._printed: dict[int, list[PrintedHead]] = defaultdict(list)
        for head in printed:
            self._printed[head.seq].append(head)
        self._hashes: dict[str, dict[int, bytes]] = defaultdict(dict)
        self._restored: list[Look] = []

    def see(self, look: Look) -> None:
        """Look at one entry."""
        filed, own = look.filed, look.hash
        before = self.heads.get(filed.chain, Head(filed.chain, 0, NO_HASH))
        self.heads[filed.chain] = Head(filed.chain, filed.seq, own)
        if filed.seq in self._printed:
            self._meet(self.heads[filed.chain])
        if look.header is not None:
            if look.header.kind == RESTORED:
                self._restored.append(look)
            if filed.seq == before.seq + 1 and look.header.previous != before.hash.hex():
                what = f"It does not follow entry {before.seq} as that stands: one was altered."
                self._findings.trouble(look.position, Trouble(3, look.where, what, RESTORE))
            if look.header.heads:
                self._look_aside(look, look.header.heads)
        self._hashes[filed.chain][filed.seq] = own

    def finish(self) -> None:
        """Name the printed heads that nothing met."""
        for head in (head for heads in self._printed.values() for head in heads):
            what = self._unmet(head)
            self._findings.trouble(head.seq, Trouble(3, f"printed head {head}", what, RESTORE))

    def _unmet(self, head: PrintedHead) -> str:
        """Why nothing met a printed head."""
        for look in self._restored:
            printed = look.body.fact.get("printed", ()) if look.body is not None else ()
            if head.seq >= look.filed.seq and str(head) in printed:
                return f"What it stands for was lost: {look.where} says so, after a restore."
        last = max((known.seq for known in self.heads.values()), default=0)
        if last < head.seq:
            return f"The journal ends at entry {last}; what came after was cut off."
        return f"Entry {head.seq} as it stands has another hash: the past was written anew."

    def _meet(self, head: Head) -> None:
        left = [printed for printed in self._printed[head.seq] if printed != head.short]
        self._printed[head.seq] = left

    def _look_aside(self, look: Look, known: tuple[Head, ...]) -> None:
        for head in known:
            found = self._hashes[head.chain].get(head.seq)
            if found != head.hash:
                says = "is not here" if found is None else "has another hash"
                what = f"It knew {where(head.chain, head.seq)}, which {says}."
                self._findings.trouble(look.position, Trouble(3, look.where, what, RESTORE))


class Bodies:
    """Step 4. Each body is there, is the one its header names, and can be read."""

    number = 4

    def __init__(self, findings: Findings, *, may_withhold: bool) -> None:
        self._findings = findings
        self._may_withhold = may_withhold

    def see(self, look: Look) -> None:
        """Look at one entry, and keep its body for the steps that follow."""
        data = look.entry.body_bytes
        if data is None:
            if not self._may_withhold:
                self._trouble(look, "Its body is missing.")
            return
        if look.header is not None and look.header.body != sha256(data):
            self._trouble(look, "Its body is not the one that its header names: it was altered.")
            return
        try:
            look.body = parse_body(data)
        except BadEntry as error:
            self._trouble(look, error.message)

    def finish(self) -> None:
        """Nothing is left to say."""

    def _trouble(self, look: Look, what: str) -> None:
        self._findings.trouble(look.position, Trouble(4, look.where, what, RESTORE))
