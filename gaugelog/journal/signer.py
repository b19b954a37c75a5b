"""Who signs: a person's unlocked key with the certificate that names its owner."""

from __future__ import annotations

from collections.abc import Sequence
from typing import Protocol

from cryptography import x509
from cryptography.hazmat.primitives.asymmetric import ec
from cryptography.hazmat.primitives.hashes import SHA256
from cryptography.x509.oid import NameOID

from gaugelog.errors import KeyTrouble
from gaugelog.journal.entry import sha256

_SIGNATURE = ec.ECDSA(SHA256())


class Signer(Protocol):
    """What the journal and the signer of documents ask of a person's key."""

    @property
    def person(self) -> str:
        """The person's id."""
        ...

    @property
    def certificate(self) -> bytes:
        """The person's certificate, DER."""
        ...

    @property
    def fingerprint(self) -> str:
        """SHA-256 of the certificate's DER, 64 hexadecimal digits."""
        ...

    @property
    def chain(self) -> tuple[bytes, ...]:
        """The authority that issued the certificate and those above it, DER, nearest first."""
        ...

    @property
    def private_key(self) -> ec.EllipticCurvePrivateKey:
        """The private key, for a library that signs by itself."""
        ...

    def sign(self, data: bytes) -> bytes:
        """ECDSA P-256 with SHA-256 over `data`, DER."""
        ...


class UnlockedKey:
    """A private key in memory; see `Signer`. Its repr names the person and nothing secret."""

    def __init__(
        self, key: ec.EllipticCurvePrivateKey, certificate: bytes, chain: Sequence[bytes]
    ) -> None:
        self.certificate = certificate
        self.chain = tuple(chain)
        self.person = common_name(x509.load_der_x509_certificate(certificate))
        self.fingerprint = sha256(certificate)
        self._key = key

    def __repr__(self) -> str:
        return f"UnlockedKey({self.person!r})"

    def __reduce__(self) -> tuple[object, ...]:
        raise KeyTrouble("An unlocked key is never written down.", "Unlock it where it is used.")

    @property
    def private_key(self) -> ec.EllipticCurvePrivateKey:
        """The private key."""
        return self._key

    def sign(self, data: bytes) -> bytes:
        """ECDSA P-256 with SHA-256 over `data`, DER."""
        return self._key.sign(data, _SIGNATURE)


def common_name(certificate: x509.Certificate) -> str:
    """The one common name of a certificate's subject. Raises KeyTrouble when it has not one."""
    names = certificate.subject.get_attributes_for_oid(NameOID.COMMON_NAME)
    if len(names) != 1:
        raise KeyTrouble(
            "The certificate does not name one person.", "Enrol the person with this logbook."
        )
    return str(names[0].value)
