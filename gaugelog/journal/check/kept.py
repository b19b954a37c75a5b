"""Step 7 and the notices: files and identity sheets are there and whole; clocks that were set."""

from __future__ import annotations

from gaugelog.errors import StorageTrouble
from gaugelog.journal.certificates import SHEET_ERASED
from gaugelog.journal.check.look import Look
from gaugelog.journal.check.report import Findings, Trouble
from gaugelog.journal.clock import Moment, jump_between
from gaugelog.journal.entry import sha256
from gaugelog.journal.evidence import Evidence
from gaugelog.journal.storage.port import Reader

_RESTORE = "Restore the file from a backup; its digest says whether it is the right one."


class Kept:
    """Step 7. Each file and sheet that an entry names is there and whole, or legally erased."""

    number = 7

    def __init__(self, findings: Findings, reader: Reader, evidence: Evidence) -> None:
        self._findings = findings
        self._reader = reader
        self._evidence = evidence
        self._files: dict[str, Look] = {}
        self._sheets: dict[str, Look] = {}
        self._erased: dict[str, str] = {}

    def see(self, look: Look) -> None:
        """Note what one entry names; each thing is examined once, at the end."""
        if look.header is None or look.body is None:
            return
        for digest in look.body.evidence:
            self._files.setdefault(digest, look)
        for digest in look.body.sheets:
            self._sheets.setdefault(digest, look)
        if look.header.kind == SHEET_ERASED:
            digest = str(look.body.fact.get("digest"))
            self._erased.setdefault(digest, look.where)
            self._findings.notice(look.where, f"It erased the identity sheet {digest[:8]}….")

    def finish(self) -> None:
        """Examine files and sheets."""
        for digest, look in self._files.items():
            self._examine_file(digest, look)
        there = set(self._reader.sheets())
        for digest in sorted(there):
            self._examine_sheet(digest)
        for digest, look in self._sheets.items():
            if digest not in there and digest not in self._erased:
                what = f"The identity sheet {digest} it names is gone, and no entry erased it."
                self._trouble(look, what)
        self._tell_of_strays()

    def _examine_file(self, digest: str, look: Look) -> None:
        try:
            self._evidence.get(digest)
        except StorageTrouble as error:
            self._trouble(look, f"The file it names is not to be had. {error.message}")

    def _examine_sheet(self, digest: str) -> None:
        place = f"identity sheet {digest[:8]}…"
        if sha256(self._reader.sheet(digest) or b"") != digest:
            self._findings.trouble(0, Trouble(7, place, "It was altered or swapped.", _RESTORE))
        if digest in self._erased:
            what = f"It was to be erased by {self._erased[digest]}, and is still there."
            self._findings.trouble(0, Trouble(7, place, what, "Erase it again."))

    def _tell_of_strays(self) -> None:
        strays = [digest for digest in self._evidence.digests() if digest not in self._files]
        if strays:
            what = f"Files that no entry names, the first {strays[0]}: {len(strays)} in all."
            self._findings.notice("the evidence", what)

    def _trouble(self, look: Look, what: str) -> None:
        self._findings.trouble(look.position, Trouble(7, look.where, what, _RESTORE))


class Clocks:
    """Gives notice where a clock was set, as far as the journal can tell."""

    number = 2

    def __init__(self, findings: Findings) -> None:
        self._findings = findings
        self._last: dict[str, Moment] = {}

    def see(self, look: Look) -> None:
        """Hold the entry's time against the one before it in its chain."""
        if look.header is None or look.header.index != 1:
            return
        moment = look.moment(look.header)
        before = self._last.get(look.filed.chain)
        self._last[look.filed.chain] = moment
        jump = jump_between(before, moment) if before else None
        if jump is not None:
            way = "back" if jump < 0 else "forward"
            what = f"The clock had been set {way} by {abs(jump):.0f} s since the entry before."
            self._findings.notice(look.where, what)

    def finish(self) -> None:
        """Nothing is left to say."""
