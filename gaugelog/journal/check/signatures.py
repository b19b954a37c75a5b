"""Steps 5 and 6: deeds are whole and signed, by certificates that were good at the time."""

from __future__ import annotations

from gaugelog.journal.certificates import CERTIFICATE_KINDS, Certificates
from gaugelog.journal.check.look import RESTORE, Look, where
from gaugelog.journal.check.report import Findings, Trouble
from gaugelog.journal.check.verifier import Signed, Verifier
from gaugelog.journal.entry import Header
from gaugelog.journal.header import BadEntry
from gaugelog.journal.verifying import Signature

_MANY = 4000
"""Entries from which on a second process saves more time than it takes to start."""

_OUTSIDE = "Someone wrote here without the key. " + RESTORE


class Deeds:
    """Step 5. A deed's entries are all there, in order and alike; the last is signed, truly."""

    number = 5

    def __init__(self, findings: Findings, certificates: Certificates) -> None:
        self._findings = findings
        self._certificates = certificates
        self._unfinished: dict[str, Look] = {}
        self._begun: dict[str, tuple[str, int]] = {}
        self._verifier = Verifier(self._bad_signature)

    def see(self, look: Look) -> None:
        """Look at one entry."""
        before = self._unfinished.pop(look.filed.chain, None)
        header = look.header
        if header is None:
            return
        if before is None or before.header is None:
            self._start(look, header)
        elif not _continues(before.header, header):
            self._cut_short(before, before.header)
            self._start(look, header)
        if header.is_last:
            self._demand_signature(look, header)
        else:
            self._unfinished[look.filed.chain] = look
            if look.entry.signature is not None:
                self._trouble(look, "It carries a signature, which only the last of a deed does.")

    def finish(self) -> None:
        """Wait for the signatures that are still being verified; name deeds that were cut off."""
        for look in self._unfinished.values():
            if look.header is not None:
                self._cut_short(look, look.header)
        self._verifier.finish()

    def expect(self, entries: int) -> None:
        """Make ready for so many entries."""
        if entries >= _MANY:
            self._verifier.call_for_help()

    def close(self) -> None:
        """Let go of what the verifying needed."""
        self._verifier.close()

    def _start(self, look: Look, header: Header) -> None:
        if header.index != 1:
            self._trouble(
                look, f"It is {header.index} of {header.count} of a deed that lacks more."
            )
        own = (look.filed.chain, look.filed.seq)
        first = self._begun.setdefault(header.deed, own)
        if first != own and header.index == 1:
            self._trouble(look, f"Its deed was done before, at {where(*first)}.")

    def _cut_short(self, look: Look, header: Header) -> None:
        self._trouble(look, f"Its deed has {header.count} entries and ends here at {header.index}.")

    def _demand_signature(self, look: Look, header: Header) -> None:
        signature = look.entry.signature
        if signature is None:
            self._trouble(look, "It ends its deed and carries no signature.", _OUTSIDE)
            return
        key = self._certificates.public_key(header.certificate)
        if key is None:
            self._trouble(look, "Its signature can't be verified: its certificate is not known.")
            return
        made = Signature(key, signature, look.entry.header_bytes)
        self._verifier.add(Signed(look.position, look.filed.chain, look.filed.seq, made))

    def _bad_signature(self, signed: Signed) -> None:
        what = "Its signature does not fit it: it was altered, or signed by another key."
        self._findings.trouble(signed.position, Trouble(5, signed.where, what, _OUTSIDE))

    def _trouble(self, look: Look, what: str, remedy: str = RESTORE) -> None:
        self._findings.trouble(look.position, Trouble(5, look.where, what, remedy))


class Issues:
    """Learns of certificates before any signature is judged; troubles count to step 6."""

    number = 6

    def __init__(self, findings: Findings, certificates: Certificates) -> None:
        self._findings = findings
        self._certificates = certificates

    def see(self, look: Look) -> None:
        """Take in what the entry says of certificates, if its body is the one that was signed."""
        if look.header is None or look.body is None or look.header.kind not in CERTIFICATE_KINDS:
            return
        try:
            self._certificates.apply(look.entry)
        except BadEntry as error:
            trouble = Trouble(6, look.where, error.message, RESTORE)
            self._findings.trouble(look.position, trouble)

    def finish(self) -> None:
        """A journal names the authority it began with."""
        if self._certificates.authority is None:
            what = "No entry names the authority it began with."
            self._findings.trouble(0, Trouble(6, "the journal", what, RESTORE))


class Validity:
    """Step 6. Each deed's certificate was issued by the authority and in force at its time."""

    number = 6

    def __init__(self, findings: Findings, certificates: Certificates) -> None:
        self._findings = findings
        self._certificates = certificates

    def see(self, look: Look) -> None:
        """Look at one entry."""
        header = look.header
        if header is None or not header.is_last:
            return
        when = look.moment(header).utc
        what = self._certificates.standing(header.certificate, header.actor, when, header.deed)
        if what:
            self._findings.trouble(look.position, Trouble(6, look.where, what, _OUTSIDE))

    def finish(self) -> None:
        """Nothing is left to say."""


def _continues(before: Header, header: Header) -> bool:
    return _of_deed(before) == _of_deed(header) and header.index == before.index + 1


def _of_deed(header: Header) -> tuple[object, ...]:
    return (header.deed, header.count, header.actor, header.certificate, header.time, header.boot)
