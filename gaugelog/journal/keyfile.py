"""A private key and its certificates as a PKCS#12 file that is costly to guess.

AES-256-CBC under PBKDF2 with HMAC-SHA256, and a MAC with SHA-256. The library writes the MAC with
2 048 rounds whatever the encryption takes, which would leave the passphrase as easy to guess as
that. So the MAC is made again with the same number of rounds as the encryption.
"""

from __future__ import annotations

import hashlib
import hmac
import secrets
from dataclasses import dataclass, field

from asn1crypto import pkcs12 as asn1_pkcs12
from cryptography import x509
from cryptography.hazmat.primitives.asymmetric import ec, rsa
from cryptography.hazmat.primitives.hashes import SHA256
from cryptography.hazmat.primitives.serialization import PrivateFormat, pkcs12

from gaugelog.errors import KeyTrouble
from gaugelog.journal.canonical import nfc

LEAST_PASSPHRASE = 8
"""The fewest characters a passphrase may have."""

_SALT_BYTES = 16
_BLOCK_BYTES = 64
_MAC_KEY = b"\x03"


SealedKey = ec.EllipticCurvePrivateKey | rsa.RSAPrivateKey
"""The kinds of key that a file may hold: people's are elliptic, an organisation's may be RSA."""


@dataclass(frozen=True)
class KeyFile:
    """What a PKCS#12 file holds. The key never shows in a repr."""

    key: SealedKey = field(repr=False)
    certificate: x509.Certificate
    others: tuple[x509.Certificate, ...]


def check_passphrase(passphrase: str) -> None:
    """Refuse a passphrase of fewer than eight characters. Raises KeyTrouble."""
    if len(nfc(passphrase)) < LEAST_PASSPHRASE:
        raise KeyTrouble(
            "The passphrase has fewer than eight characters.",
            "Choose a longer one; several words are easy to keep in mind.",
        )


def seal(name: str, parts: KeyFile, passphrase: str, kdf_rounds: int) -> bytes:
    """Return the key and its certificates as the bytes of a PKCS#12 file."""
    check_passphrase(passphrase)
    secret = nfc(passphrase)
    encryption = (
        PrivateFormat.PKCS12.encryption_builder()
        .kdf_rounds(kdf_rounds)
        .key_cert_algorithm(pkcs12.PBES.PBESv2SHA256AndAES256CBC)
        .hmac_hash(SHA256())
        .build(secret.encode("utf-8"))
    )
    data = pkcs12.serialize_key_and_certificates(
        name.encode("utf-8"), parts.key, parts.certificate, parts.others, encryption
    )
    return _with_costly_mac(data, secret, kdf_rounds)


def unseal(data: bytes, passphrase: str, what: str) -> KeyFile:
    """Read a PKCS#12 file. `what` names the key in the message.

    Raises KeyTrouble when the passphrase is wrong, the file is damaged, or a part is missing.
    """
    if not _is_whole(data):
        raise KeyTrouble(f"The file of {what} is damaged.", "Restore the file from a backup.")
    try:
        found = pkcs12.load_pkcs12(data, nfc(passphrase).encode("utf-8"))
    except Exception:  # whatever a damaged file brings up
        # The cause is cut off: nothing that saw the passphrase may reach a log.
        raise KeyTrouble(
            f"The passphrase does not open {what}.",
            "Type it again. A lost one can't be recovered: the custodian enrols the person anew.",
        ) from None
    if found.key is None or found.cert is None:
        raise KeyTrouble(
            f"The file of {what} lacks the private key or its certificate.",
            "Export both together as one PKCS#12 file.",
        )
    others = tuple(extra.certificate for extra in found.additional_certs)
    if not isinstance(found.key, SealedKey):
        raise KeyTrouble(
            f"The private key of {what} is of a kind that is not used here.",
            "Use a key on an elliptic curve, or RSA.",
        )
    return KeyFile(found.key, found.cert.certificate, others)


def pkcs12_mac_key(secret: str, salt: bytes, rounds: int) -> bytes:
    """The key of the MAC: RFC 7292, appendix B.2, for SHA-256 and one block of output (32 bytes).

    `secret` is taken as big-endian UTF-16 with two zero bytes, as the standard says.
    """
    password = secret.encode("utf-16-be") + b"\x00\x00"
    start = _MAC_KEY * _BLOCK_BYTES + _filled(salt) + _filled(password)
    key = hashlib.sha256(start).digest()
    for _ in range(rounds - 1):
        key = hashlib.sha256(key).digest()
    return key


def _filled(text: bytes) -> bytes:
    """`text` repeated to fill whole blocks."""
    length = -(-len(text) // _BLOCK_BYTES) * _BLOCK_BYTES
    return (text * (length // len(text) + 1))[:length]


def _with_costly_mac(data: bytes, secret: str, rounds: int) -> bytes:
    sealed = asn1_pkcs12.Pfx.load(data)
    salt = secrets.token_bytes(_SALT_BYTES)
    content: bytes = sealed["auth_safe"]["content"].native
    key = pkcs12_mac_key(secret, salt, rounds)
    sealed["mac_data"]["mac"]["digest"] = hmac.digest(key, content, "sha256")
    sealed["mac_data"]["mac_salt"] = salt
    sealed["mac_data"]["iterations"] = rounds
    whole: bytes = sealed.dump(force=True)
    return whole


def _is_whole(data: bytes) -> bool:
    try:
        return bool(asn1_pkcs12.Pfx.load(data, strict=True)["version"].native == "v3")
    except (ValueError, TypeError, KeyError, IndexError):
        return False
