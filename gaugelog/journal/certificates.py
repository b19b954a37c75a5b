"""The journal's own facts: who may sign from when to when, read from the chain itself."""

from __future__ import annotations

import base64
from collections.abc import Mapping
from dataclasses import dataclass
from datetime import datetime

from cryptography import x509
from cryptography.exceptions import InvalidSignature
from cryptography.hazmat.primitives.asymmetric import ec
from cryptography.hazmat.primitives.serialization import Encoding, PublicFormat

from gaugelog.errors import KeyTrouble
from gaugelog.journal.entry import Entry, Fact, sha256
from gaugelog.journal.header import BadEntry
from gaugelog.journal.signer import common_name
from gaugelog.journal.storage.port import Reader

JOURNAL_BEGUN = "journal.begun"
CERTIFICATE_ISSUED = "certificate.issued"
CERTIFICATE_REVOKED = "certificate.revoked"
SHEET_ERASED = "sheet.erased"

CERTIFICATE_KINDS = (JOURNAL_BEGUN, CERTIFICATE_ISSUED, CERTIFICATE_REVOKED)
"""The kinds that `Certificates` reads."""


def journal_begun(authority: bytes, *, program: str, name: str) -> Fact:
    """A logbook begins, under an authority (DER); `program` is name and version."""
    content = {"authority": _base64(authority), "program": program, "name": name}
    return Fact(JOURNAL_BEGUN, 1, (), content)


def certificate_issued(person: str, certificate: bytes, reason: str) -> Fact:
    """A person may sign with a certificate (DER) from this deed on."""
    content = {
        "person": person,
        "certificate": _base64(certificate),
        "fingerprint": sha256(certificate),
        "reason": reason,
    }
    return Fact(CERTIFICATE_ISSUED, 1, (person,), content)


def certificate_revoked(person: str, fingerprint: str, reason: str) -> Fact:
    """A certificate is good for nothing after this deed."""
    content = {"person": person, "fingerprint": fingerprint, "reason": reason}
    return Fact(CERTIFICATE_REVOKED, 1, (person,), content)


def sheet_erased(digest: str, reason: str, about: tuple[str, ...] = ()) -> Fact:
    """An identity sheet was erased; the digest stays to say which."""
    return Fact(SHEET_ERASED, 1, about, {"digest": digest, "reason": reason})


@dataclass(frozen=True, slots=True)
class Issued:
    """A certificate that the journal holds, read once; `trouble` says why it is good for nothing.

    Times are UTC; `key` is the public key (DER), None when it is not on an elliptic curve.
    """

    person: str
    fingerprint: str
    der: bytes
    since: datetime
    until: datetime
    key: bytes | None
    trouble: str | None


class Certificates:
    """Who may sign, as known after the entries applied so far. Apply them in the ledger's order.

    An issue counts from its own deed on, so that the first custodian can sign the deed that
    certifies them; a revocation counts after its deed, which the revoked key may still sign.
    """

    def __init__(self) -> None:
        self.authority: bytes | None = None
        self._by_fingerprint: dict[str, Issued] = {}
        self._revoked_by: dict[str, str] = {}

    def apply(self, entry: Entry) -> None:
        """Take in one entry; kinds other than the journal's own are passed over.

        Raises BadEntry when an entry about certificates can't be read.
        """
        kind = entry.header.kind
        if kind == JOURNAL_BEGUN:
            self._begin(_bytes(entry, "authority"))
        elif kind == CERTIFICATE_ISSUED:
            self._issue(_bytes(entry, "certificate"), _text(entry, "person"))
        elif kind == CERTIFICATE_REVOKED:
            self._revoked_by.setdefault(_text(entry, "fingerprint"), entry.header.deed)

    def of_person(self, person: str) -> list[Issued]:
        """The certificates of a person, the oldest first, revoked ones too."""
        return [one for one in self._by_fingerprint.values() if one.person == person]

    def all(self) -> list[Issued]:
        """Every certificate, in the order of issue."""
        return list(self._by_fingerprint.values())

    def is_revoked(self, fingerprint: str) -> bool:
        """Whether a certificate was revoked by an entry applied so far."""
        return fingerprint in self._revoked_by

    def public_key(self, fingerprint: str) -> bytes | None:
        """The public key of a certificate (DER), or None when there is none to verify with."""
        issued = self._by_fingerprint.get(fingerprint)
        return issued.key if issued else None

    def valid(self, fingerprint: str, entry: Entry) -> str | None:
        """Why `entry` could not be signed with a certificate then, or None when it could."""
        header = entry.header
        return self.standing(fingerprint, header.actor, header.moment.utc, header.deed)

    def standing(self, fingerprint: str, person: str, when: datetime, deed: str = "") -> str | None:
        """Why a person can't sign with a certificate at a time (UTC), or None when they can."""
        issued = self._by_fingerprint.get(fingerprint)
        if issued is None:
            return "The certificate was not issued by any entry before."
        if issued.trouble:
            return issued.trouble
        if issued.person != person:
            return f"The certificate is that of {issued.person}, not of {person}."
        return self._out_of_force(issued, when, deed)

    def _out_of_force(self, issued: Issued, when: datetime, deed: str) -> str | None:
        if self._revoked_by.get(issued.fingerprint, deed) != deed:
            return "The certificate had been revoked."
        if when < issued.since:
            return f"The certificate was not good before {issued.since:%Y-%m-%d %H:%M} UTC."
        if when > issued.until:
            return f"The certificate had expired on {issued.until:%Y-%m-%d %H:%M} UTC."
        return None

    def _begin(self, authority: bytes) -> None:
        if self.authority not in {None, authority}:
            raise BadEntry("It names another authority than the journal began with.")
        self.authority = authority

    def _issue(self, der: bytes, person: str) -> None:
        # The first word stands: issued again, a certificate can't shed its trouble.
        self._by_fingerprint.setdefault(sha256(der), read_certificate(der, person, self.authority))


def certificates_of(reader: Reader) -> Certificates:
    """Who may sign, as known at the end of one view of the journal."""
    certificates = Certificates()
    # Kind by kind, which comes to the same as the ledger's order once all of them are known.
    for kind in CERTIFICATE_KINDS:
        for entry in reader.of_kinds([kind]):
            certificates.apply(entry)
    return certificates


def read_certificate(der: bytes, person: str, authority: bytes | None) -> Issued:
    """Read a certificate and whether it is what it should be. Raises BadEntry when unreadable."""
    try:
        certificate = x509.load_der_x509_certificate(der)
        key = certificate.public_key()
        since, until = certificate.not_valid_before_utc, certificate.not_valid_after_utc
        trouble = _trouble(certificate, person, authority)
    except Exception as error:  # foreign bytes bring up anything
        raise BadEntry(f"Its certificate can't be read: {error}.") from None
    public = key.public_bytes(Encoding.DER, PublicFormat.SubjectPublicKeyInfo)
    elliptic = isinstance(key, ec.EllipticCurvePublicKey)
    return Issued(person, sha256(der), der, since, until, public if elliptic else None, trouble)


def _trouble(certificate: x509.Certificate, person: str, authority: bytes | None) -> str | None:
    try:
        if common_name(certificate) != person:
            return f"The certificate does not name {person}."
    except KeyTrouble as error:
        return error.message
    if authority is None:
        return "The certificate was issued before the journal named its authority."
    try:
        certificate.verify_directly_issued_by(x509.load_der_x509_certificate(authority))
    except (InvalidSignature, ValueError, TypeError):
        return "The certificate was not issued by the journal's authority."
    return None


def _base64(data: bytes) -> str:
    return base64.b64encode(data).decode("ascii")


def _text(entry: Entry, name: str) -> str:
    value = _fact(entry).get(name)
    if not isinstance(value, str):
        raise BadEntry(f"Its fact gives no text as {name}.")
    return value


def _bytes(entry: Entry, name: str) -> bytes:
    try:
        return base64.b64decode(_text(entry, name), validate=True)
    except ValueError:
        raise BadEntry(f"Its fact gives no base64 as {name}.") from None


def _fact(entry: Entry) -> Mapping[str, object]:
    return entry.body.fact
