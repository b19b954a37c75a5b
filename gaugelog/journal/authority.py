"""The authority of a logbook: it certifies the keys of the people who sign in it.

A logbook has an authority of its own, or an organisation's takes its place. A certificate names
the person by id only: it stays in the journal for ever, and names are elsewhere.
"""

from __future__ import annotations

from collections.abc import Sequence
from datetime import datetime, timedelta

from cryptography import x509
from cryptography.hazmat.primitives.asymmetric import ec
from cryptography.hazmat.primitives.hashes import SHA256
from cryptography.hazmat.primitives.serialization import Encoding
from cryptography.x509.oid import NameOID

from gaugelog.errors import Fault, Faulty, KeyTrouble
from gaugelog.journal.clock import Clock
from gaugelog.journal.header import NAME
from gaugelog.journal.keyfile import SealedKey, unseal

_YEAR = timedelta(days=365.25)
_AUTHORITY_YEARS = 30
_LONGEST_NAME = 64
"""The longest common name that X.509 has room for, in bytes of UTF-8."""

_ONE_DAY = timedelta(days=1)


def new_key() -> ec.EllipticCurvePrivateKey:
    """A fresh private key on the curve P-256."""
    return ec.generate_private_key(ec.SECP256R1())


def check_person_id(person: str) -> None:
    """Refuse a person's id that can't stand in a certificate and a file name. Raises Faulty."""
    if NAME.fullmatch(person) is None:
        remedy = "Use 1 to 64 letters, digits, dots, hyphens, underscores; the first no sign."
        raise Faulty([Fault("person", f"{person!r} can't be the id of a person.", remedy)])


class Authority:
    """A certificate authority with its unlocked key.

    `certificate` is its DER; `chain` is that and, for an organisation's authority, those above.
    """

    def __init__(
        self, key: SealedKey, certificate: x509.Certificate, parents: Sequence[bytes] = ()
    ) -> None:
        self._key = key
        self._certificate = certificate
        self.certificate = certificate.public_bytes(Encoding.DER)
        self.chain = (self.certificate, *parents)

    def __repr__(self) -> str:
        return f"Authority({self.name!r})"

    @property
    def name(self) -> str:
        """The subject of its certificate."""
        return self._certificate.subject.rfc4514_string()

    @property
    def private_key(self) -> SealedKey:
        """The key, to be sealed in a file."""
        return self._key

    @classmethod
    def create(cls, logbook_name: str, clock: Clock) -> Authority:
        """A new authority for a logbook, good for 30 years."""
        key = new_key()
        name = _common_name(_cut(f"Gaugelog authority of {logbook_name}"))
        start = _day_before(clock)
        builder = (
            _builder(name, name, key.public_key(), start, start + _AUTHORITY_YEARS * _YEAR)
            .add_extension(x509.BasicConstraints(ca=True, path_length=0), critical=True)
            .add_extension(_usage(certify=True), critical=True)
        )
        return cls(key, builder.sign(key, SHA256()))

    @classmethod
    def from_pkcs12(cls, data: bytes, passphrase: str) -> Authority:
        """An organisation's authority from its PKCS#12 file (certificate and key).

        Raises KeyTrouble when the file does not open or its certificate may not certify people.
        """
        found = unseal(data, passphrase, "the organisation's authority")
        if not _may_certify(found.certificate):
            raise KeyTrouble(
                "The organisation's certificate is not that of an authority.",
                "Ask for a certificate that may sign certificates (CA true, keyCertSign).",
            )
        parents = [other.public_bytes(Encoding.DER) for other in found.others]
        return cls(found.key, found.certificate, parents)

    def issue(
        self, person_id: str, public_key: ec.EllipticCurvePublicKey, clock: Clock, years: int = 5
    ) -> bytes:
        """Certify a person's key for `years`; returns the certificate as DER.

        It is good from one day earlier, so that a clock a little slow elsewhere does no harm, and
        never longer than the authority itself. Raises KeyTrouble when the authority has expired.
        """
        check_person_id(person_id)
        start = max(_day_before(clock), self._certificate.not_valid_before_utc)
        end = min(clock.now().utc + years * _YEAR, self._certificate.not_valid_after_utc)
        if end <= clock.now().utc:
            raise KeyTrouble(
                "The certificate of the logbook's authority has expired.",
                "Begin a new logbook, or use an organisation's authority that is in force.",
            )
        subject = _common_name(person_id)
        builder = (
            _builder(subject, self._certificate.subject, public_key, start, end)
            .add_extension(x509.BasicConstraints(ca=False, path_length=None), critical=True)
            .add_extension(_usage(certify=False), critical=True)
            .add_extension(self._key_identifier(), critical=False)
        )
        return builder.sign(self._key, SHA256()).public_bytes(Encoding.DER)

    def _key_identifier(self) -> x509.AuthorityKeyIdentifier:
        try:
            own = self._certificate.extensions.get_extension_for_class(x509.SubjectKeyIdentifier)
        except x509.ExtensionNotFound:
            return x509.AuthorityKeyIdentifier.from_issuer_public_key(self._key.public_key())
        return x509.AuthorityKeyIdentifier.from_issuer_subject_key_identifier(own.value)


def _cut(name: str) -> str:
    """The name, no longer than a certificate has room for, and no letter cut in half."""
    return name.encode()[:_LONGEST_NAME].decode(errors="ignore").strip()


def _common_name(name: str) -> x509.Name:
    return x509.Name([x509.NameAttribute(NameOID.COMMON_NAME, name)])


def _day_before(clock: Clock) -> datetime:
    return clock.now().utc - _ONE_DAY


def _builder(
    subject: x509.Name,
    issuer: x509.Name,
    public_key: ec.EllipticCurvePublicKey,
    start: datetime,
    end: datetime,
) -> x509.CertificateBuilder:
    return (
        x509.CertificateBuilder()
        .subject_name(subject)
        .issuer_name(issuer)
        .public_key(public_key)
        .serial_number(x509.random_serial_number())
        .not_valid_before(start)
        .not_valid_after(end)
        .add_extension(x509.SubjectKeyIdentifier.from_public_key(public_key), critical=False)
    )


def _usage(*, certify: bool) -> x509.KeyUsage:
    return x509.KeyUsage(
        digital_signature=not certify,
        content_commitment=not certify,
        key_encipherment=False,
        data_encipherment=False,
        key_agreement=False,
        key_cert_sign=certify,
        crl_sign=certify,
        encipher_only=False,
        decipher_only=False,
    )


def _may_certify(certificate: x509.Certificate) -> bool:
    try:
        extensions = certificate.extensions
        if not extensions.get_extension_for_class(x509.BasicConstraints).value.ca:
            return False
    except (x509.ExtensionNotFound, ValueError):
        return False
    try:
        return extensions.get_extension_for_class(x509.KeyUsage).value.key_cert_sign
    except x509.ExtensionNotFound:
        return True
