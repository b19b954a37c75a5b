"""Step 6, looked at from the end: what a revoked key signed, and a revocation never knew of."""

from __future__ import annotations

from dataclasses import dataclass

from gaugelog.journal.certificates import CERTIFICATE_REVOKED, JOURNAL_BEGUN
from gaugelog.journal.check.links import RESTORED
from gaugelog.journal.check.look import Look, where
from gaugelog.journal.check.report import Findings, Trouble

_REMEDY = (
    "Ask who holds that chain. Until then take nothing from it: a key that was lost can write a "
    "time of its choice."
)


@dataclass(frozen=True, slots=True)
class _Revoked:
    """A revocation: its chain and number, where that is, and how far its writer knew each chain."""

    chain: str
    seq: int
    where: str
    known: dict[str, int]

    def was_known_to(self, look: Look) -> bool:
        """Whether an entry was written with this revocation known; then step 6 has judged it."""
        heads = look.header.heads if look.header else ()
        return look.filed.chain == self.chain or any(
            head.chain == self.chain and head.seq >= self.seq for head in heads
        )


class Unproven:
    """A revoked key may not write into the past: its entries are good only where known in time.

    The time in an entry is its writer's word. That an entry is older than a revocation is proven
    only by the revocation's own chain, or by the heads that it names.
    """

    number = 6

    def __init__(self, findings: Findings) -> None:
        self._findings = findings
        self._revoked: dict[str, _Revoked] = {}
        self._last: dict[tuple[str, str], Look] = {}
        self._begun: set[str] = set()

    def see(self, look: Look) -> None:
        """Note how far each certificate signed each chain, and what a revocation knew."""
        header = look.header
        if header is None:
            return
        if header.chain not in self._begun:
            self._begun.add(header.chain)
            self._greet(look, header.kind)
        if header.is_last:
            self._last[header.certificate, header.chain] = look
        if header.kind == CERTIFICATE_REVOKED and look.body is not None:
            known = {head.chain: head.seq for head in header.heads}
            known[header.chain] = header.seq + header.count - header.index
            fingerprint = str(look.body.fact.get("fingerprint"))
            found = _Revoked(header.chain, header.seq, look.where, known)
            self._revoked.setdefault(fingerprint, found)

    def finish(self) -> None:
        """Name the last entry in each chain that a revocation of its certificate never knew."""
        for (certificate, chain), look in self._last.items():
            revoked = self._revoked.get(certificate)
            if revoked is None or look.filed.seq <= revoked.known.get(chain, 0):
                continue
            if revoked.was_known_to(look):
                continue
            what = (
                f"Its certificate was revoked by {revoked.where}, which did not know of it: "
                "that it was signed before can't be proven."
            )
            self._findings.trouble(look.position, Trouble(6, look.where, what, _REMEDY))

    def _greet(self, look: Look, kind: str) -> None:
        if kind not in {JOURNAL_BEGUN, RESTORED}:
            what = f"A chain begins here with {kind}; no entry says whose copy it is."
            self._findings.notice(where(look.filed.chain, look.filed.seq), what)
