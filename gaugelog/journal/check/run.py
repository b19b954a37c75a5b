"""The walk through the whole journal, each entry shown once to each step."""

from __future__ import annotations

from collections.abc import Callable, Iterator, Sequence
from typing import Protocol

from gaugelog.journal.certificates import Certificates
from gaugelog.journal.check.kept import Clocks, Kept
from gaugelog.journal.check.links import Bodies, Chain, Format, Numbering
from gaugelog.journal.check.look import OF_ENTRIES, RESTORE, Look, looks, said
from gaugelog.journal.check.report import Findings, Report, Trouble
from gaugelog.journal.check.revocations import Unproven
from gaugelog.journal.check.signatures import Deeds, Issues, Validity
from gaugelog.journal.collection import no_collection
from gaugelog.journal.entry import PrintedHead
from gaugelog.journal.evidence import Evidence
from gaugelog.journal.storage.port import Reader

Progress = Callable[[int, int], None]
"""Told how many entries are done and how many there are."""

Rebuild = Callable[[], list[Trouble]]
"""Rebuilds the ledger and compares it with the one in use."""

_PROGRESS_EVERY = 256
_LEDGER = 8


class Step(Protocol):
    """What the walk asks of each step."""

    number: int

    def see(self, look: Look) -> None:
        """Look at one entry."""
        ...

    def finish(self) -> None:
        """Say what only the end shows."""
        ...


def check(
    reader: Reader,
    evidence: Evidence,
    *,
    printed: Sequence[PrintedHead] = (),
    rebuild: Rebuild | None = None,
    progress: Progress | None = None,
    may_withhold: bool = False,
) -> Report:
    """Check the whole journal. Never raises for what it reads: every trouble is in the report.

    1. Format: each header is canonical JSON of the known format; the storage's guards are there.
    2. Sequence: numbers run from 1 without a gap, each entry is filed where its header says.
    3. Chain: each entry names the hash of the one before; known and printed heads are met.
    4. Bodies: each body has the hash its header names, and can be read.
    5. Deeds and signatures: each deed is whole, and its last entry signed over its header bytes.
    6. Certificates valid then: issued before by the authority, to the actor, in force, not revoked;
       what a revoked key signed is known to have been there before.
    7. Evidence: each file and identity sheet named is there and whole, or erased by an entry.
    8. Ledger rebuilt and compared: by `rebuild`; "not asked" when None.

    `printed` are heads from paper. With `may_withhold` a missing body is no trouble, as in a
    copy that shows a client only what concerns them.
    """
    findings = Findings()
    walk = _Walk(reader, evidence, findings, printed, may_withhold)
    try:
        with no_collection():
            walk.go(progress)
    except Exception as error:  # whatever foreign bytes bring up is a trouble, not a traceback
        findings.trouble(0, Trouble(1, "the storage", f"It can't be read: {said(error)}", RESTORE))
        findings.cut_short(*OF_ENTRIES)
    finally:
        walk.close()
    if rebuild is not None:
        _compare(rebuild, findings)
    skipped = frozenset({_LEDGER}) if rebuild is None else frozenset()
    return findings.report(walk.count, list(walk.chain.heads.values()), skipped)


class _Walk:
    """The steps in their order, and how far they have come."""

    def __init__(
        self,
        reader: Reader,
        evidence: Evidence,
        findings: Findings,
        printed: Sequence[PrintedHead],
        may_withhold: bool,
    ) -> None:
        self.count = 0
        self._reader = reader
        self._findings = findings
        certificates = Certificates()
        self.chain = Chain(findings, printed)
        self._deeds = Deeds(findings, certificates)
        self._steps: tuple[Step, ...] = (
            Format(findings, reader),  # 1
            Numbering(findings),  # 2
            Clocks(findings),
            self.chain,  # 3
            Bodies(findings, may_withhold=may_withhold),  # 4
            Issues(findings, certificates),
            self._deeds,  # 5
            Validity(findings, certificates),  # 6
            Unproven(findings),
            Kept(findings, reader, evidence),  # 7
        )

    def go(self, progress: Progress | None) -> None:
        """Show each entry to each step, then let each step say the rest."""
        total = self._total()
        self._deeds.expect(total)
        for look in looks(self._reader, self._findings):
            self._show(look)
            self.count += 1
            if progress and self.count % _PROGRESS_EVERY == 0:
                progress(self.count, total)
        for step in self._steps:
            self._finished(step)
        if progress:
            progress(self.count, total)

    def close(self) -> None:
        """Let go of what the verifying needed."""
        self._deeds.close()

    def _show(self, look: Look) -> None:
        steps = iter(self._steps)
        # After a step that failed, the loop goes on with the next one.
        while step := self._failed_step(steps, look):
            what = f"It can't be examined: {said(step[1])}"
            trouble = Trouble(step[0].number, look.where, what, RESTORE)
            self._findings.trouble(look.position, trouble)

    @staticmethod
    def _failed_step(steps: Iterator[Step], look: Look) -> tuple[Step, Exception] | None:
        for step in steps:
            try:
                step.see(look)
            except Exception as error:  # as in `check`
                return step, error
        return None

    def _finished(self, step: Step) -> None:
        try:
            step.finish()
        except Exception as error:  # as in `check`
            what = f"The step can't be finished: {said(error)}"
            self._findings.trouble(0, Trouble(step.number, "the journal", what, RESTORE))

    def _total(self) -> int:
        try:
            heads = [self._reader.head(chain) for chain in self._reader.chains()]
        except Exception:  # a damaged head; the walk says more of it
            return 0
        return sum(head.seq for head in heads if head is not None)


def _compare(rebuild: Rebuild, findings: Findings) -> None:
    try:
        for place, trouble in enumerate(rebuild()):
            findings.trouble(place, trouble)
    except Exception as error:  # entries of foreign bytes can stop the rebuilding
        what = f"It can't be rebuilt: {said(error)}"
        findings.trouble(0, Trouble(_LEDGER, "the ledger", what, RESTORE))
