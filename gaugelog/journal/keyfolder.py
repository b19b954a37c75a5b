"""The folder of private keys: one sealed file for each certificate, readable by its owner only."""

from __future__ import annotations

import os
from pathlib import Path

from cryptography import x509
from cryptography.hazmat.primitives.asymmetric import ec
from cryptography.hazmat.primitives.serialization import Encoding

from gaugelog.errors import KeyTrouble
from gaugelog.journal.authority import Authority, check_person_id
from gaugelog.journal.entry import sha256
from gaugelog.journal.files import write_whole
from gaugelog.journal.keyfile import KeyFile, seal, unseal
from gaugelog.journal.signer import UnlockedKey, common_name

_AUTHORITY = "_authority"
"""A name no person can have: ids begin with a letter or digit."""


class KeyFolder:
    """Private keys of one logbook, outside it, in a folder only their owner may read.

    `<person>.p12` is the key in use; each key also stays as `<person>~<fingerprint>.p12`.
    `kdf_rounds` is how costly a passphrase is to try; fewer than 600 000 is for tests only.
    """

    def __init__(self, path: Path, kdf_rounds: int = 600_000) -> None:
        self.path = path
        self._rounds = kdf_rounds

    def people(self) -> list[str]:
        """The ids of the people whose keys are here, sorted."""
        names = (file.stem for file in self.path.glob("*.p12"))
        return sorted(name for name in names if name != _AUTHORITY and "~" not in name)

    def has_authority(self) -> bool:
        """Whether the authority's key is here."""
        return self._file(_AUTHORITY).is_file()

    def save(
        self,
        person: str,
        key: ec.EllipticCurvePrivateKey,
        certificate_der: bytes,
        authority_der: bytes,
        passphrase: str,
        parents: tuple[bytes, ...] = (),
    ) -> None:
        """Seal a person's key as the one in use; one that was in use before stays beside it.

        Raises KeyTrouble when the passphrase is too short or the folder can't be written.
        """
        check_person_id(person)
        certificate = x509.load_der_x509_certificate(certificate_der)
        if common_name(certificate) != person:
            raise KeyTrouble(
                f"The certificate is not of {person}.", "Save it under the person it names."
            )
        others = [x509.load_der_x509_certificate(der) for der in (authority_der, *parents)]
        parts = KeyFile(key, certificate, tuple(others))
        data = seal(person, parts, passphrase, self._rounds)
        self._write(f"{person}~{sha256(certificate_der)}", data)
        self._write(person, data)

    def unlock(self, person: str, passphrase: str) -> UnlockedKey:
        """Open the key a person has in use.

        Raises KeyTrouble when there is none, the passphrase is wrong, or the file is damaged.
        """
        check_person_id(person)
        found = unseal(self._read(person, f"the key of {person}"), passphrase, f"{person}'s key")
        certificate = found.certificate.public_bytes(Encoding.DER)
        if not isinstance(found.key, ec.EllipticCurvePrivateKey):
            raise KeyTrouble(
                f"The key of {person} is not on an elliptic curve.", "Enrol the person again."
            )
        unlocked = UnlockedKey(found.key, certificate, _upwards(found))
        if unlocked.person != person:
            raise KeyTrouble(
                f"The file of {person} holds the key of {unlocked.person}.",
                "Put the right file in its place.",
            )
        return unlocked

    def change_passphrase(self, person: str, old: str, new: str) -> None:
        """Seal the key in use again under another passphrase. Raises KeyTrouble as `unlock`."""
        key = self.unlock(person, old)
        authority, *parents = key.chain
        self.save(person, key.private_key, key.certificate, authority, new, tuple(parents))

    def save_authority(self, authority: Authority, passphrase: str) -> None:
        """Seal the authority's key. Raises KeyTrouble when the passphrase is too short."""
        certificate, *parents = (x509.load_der_x509_certificate(der) for der in authority.chain)
        parts = KeyFile(authority.private_key, certificate, tuple(parents))
        data = seal(_AUTHORITY, parts, passphrase, self._rounds)
        self._write(_AUTHORITY, data)

    def unlock_authority(self, passphrase: str) -> Authority:
        """Open the authority's key. Raises KeyTrouble as `unlock`."""
        data = self._read(_AUTHORITY, "the key of the logbook's authority")
        found = unseal(data, passphrase, "the authority's key")
        parents = [other.public_bytes(Encoding.DER) for other in found.others]
        return Authority(found.key, found.certificate, parents)

    def _file(self, name: str) -> Path:
        return self.path / f"{name}.p12"

    def _read(self, name: str, what: str) -> bytes:
        try:
            return self._file(name).read_bytes()
        except FileNotFoundError:
            raise KeyTrouble(
                f"There is no file with {what} in {self.path}.",
                "Use the machine it is on, bring the file here, or have the person enrolled again.",
            ) from None
        except OSError as error:
            raise KeyTrouble(
                f"The file with {what} can't be read: {error.strerror}.",
                "See that it belongs to you and that you may read it.",
            ) from None

    def _write(self, name: str, data: bytes) -> None:
        try:
            self.path.mkdir(mode=0o700, parents=True, exist_ok=True)
            self.path.chmod(0o700)
            write_whole(self._file(name), data, mode=0o600)
        except OSError as error:
            raise KeyTrouble(
                f"The key can't be written in {self.path}: {os.strerror(error.errno or 0)}.",
                "See that the folder belongs to you and the disk has room.",
            ) from None


def _upwards(found: KeyFile) -> list[bytes]:
    """The certificates above the person's own, each followed by the one that issued it."""
    above: list[x509.Certificate] = []
    left, lower = list(found.others), found.certificate
    while issuer := next((one for one in left if one.subject == lower.issuer), None):
        left.remove(issuer)
        above.append(issuer)
        lower = issuer
    if not above:
        raise KeyTrouble(
            "The key's file lacks the certificate of the authority.", "Enrol the person again."
        )
    return [certificate.public_bytes(Encoding.DER) for certificate in above]
