"""Keys and certificates, judged by OpenSSL."""

from __future__ import annotations

import re
import subprocess
from pathlib import Path

import pytest
from cryptography.hazmat.primitives.serialization import Encoding, PublicFormat

from gaugelog.journal.keyfile import pkcs12_mac_key
from gaugelog.journal.keys import KeyFolder
from tests.foreign import needs
from tests.journal.samples import authority, signer

SECRET = "correct horse battery"


def _openssl(*arguments: str) -> subprocess.CompletedProcess[str]:
    return subprocess.run(["openssl", *arguments], capture_output=True, text=True, check=False)


@needs("openssl")
def test_openssl_opens_a_sealed_key_and_sees_all_its_rounds(tmp_path: Path) -> None:
    own = signer("ann")
    keys = KeyFolder(tmp_path)
    keys.save("ann", own.private_key, own.certificate, own.chain[0], SECRET)
    done = _openssl(
        "pkcs12", "-info", "-noout", "-in", str(tmp_path / "ann.p12"), "-passin", f"pass:{SECRET}"
    )
    assert 0 == done.returncode, done.stderr
    assert "MAC: sha256, Iteration 600000" in done.stderr
    encryptions = re.findall("PBES2.*", done.stderr)
    assert ["PBES2, PBKDF2, AES-256-CBC, Iteration 600000, PRF hmacWithSHA256"] * 2 == encryptions
    done = _openssl(
        "pkcs12", "-nodes", "-in", str(tmp_path / "ann.p12"), "-passin", "pass:wrong passphrase"
    )
    assert "Mac verify error" in done.stderr


@needs("openssl")
def test_openssl_finds_a_person_certified_by_the_authority(tmp_path: Path) -> None:
    from ssl import DER_cert_to_PEM_cert

    for name, der in (("ca.pem", authority().certificate), ("ann.pem", signer("ann").certificate)):
        (tmp_path / name).write_text(DER_cert_to_PEM_cert(der))
    done = _openssl(
        "verify", "-x509_strict", "-no_check_time", "-CAfile", str(tmp_path / "ca.pem"),
        str(tmp_path / "ann.pem"),
    )  # fmt: skip
    assert 0 == done.returncode, done.stderr
    text = _openssl("x509", "-noout", "-text", "-in", str(tmp_path / "ann.pem")).stdout
    assert "Digital Signature, Non Repudiation" in text
    assert "CA:FALSE" in text


@needs("openssl")
def test_openssl_verifies_what_a_key_signed(tmp_path: Path) -> None:
    own = signer("ann")
    (tmp_path / "data").write_bytes(b"data")
    (tmp_path / "sig").write_bytes(own.sign(b"data"))
    public = own.private_key.public_key()
    (tmp_path / "pub").write_bytes(
        public.public_bytes(Encoding.PEM, PublicFormat.SubjectPublicKeyInfo)
    )
    done = _openssl(
        "dgst", "-sha256", "-verify", str(tmp_path / "pub"), "-signature", str(tmp_path / "sig"),
        str(tmp_path / "data"),
    )  # fmt: skip
    assert "Verified OK" == done.stdout.strip()


@needs("openssl")
@pytest.mark.parametrize("secret", ["correct horse battery", "päßword", "x" * 40])
@pytest.mark.parametrize(("salt", "rounds"), [("00" * 8, 1), ("0102030405060708" * 2, 1000)])
def test_the_key_of_the_mac_is_that_of_openssl(secret: str, salt: str, rounds: int) -> None:
    # RFC 7292, appendix B.2, with id 3 for the MAC.
    password = secret.encode("utf-16-be").hex() + "0000"
    done = _openssl(
        "kdf", "-keylen", "32", "-kdfopt", "digest:SHA2-256", "-kdfopt", f"hexpass:{password}",
        "-kdfopt", f"hexsalt:{salt}", "-kdfopt", f"iter:{rounds}", "-kdfopt", "id:3", "PKCS12KDF",
    )  # fmt: skip
    assert 0 == done.returncode, done.stderr
    expected = done.stdout.strip().replace(":", "").lower()
    assert expected == pkcs12_mac_key(secret, bytes.fromhex(salt), rounds).hex()
