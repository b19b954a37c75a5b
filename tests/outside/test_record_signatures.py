"""Poppler's pdfsig and OpenSSL judge the signatures of a record, its authority trusted.

pdfsig ends with 0 even on a broken signature, so its words are read.
"""

from __future__ import annotations

import re
import subprocess
from pathlib import Path

import pytest
from cryptography import x509
from cryptography.hazmat.primitives.serialization import Encoding

from tests.documents.drawn import accepted, people, submitted
from tests.documents.signers import ACCEPTED, crew
from tests.foreign import needs

pytestmark = [pytest.mark.xdist_group("record"), needs("pdfsig", "certutil", "openssl")]


def _trusting(folder: Path, authority: bytes) -> Path:
    """An NSS folder that trusts this authority."""
    store, root = folder / "nss", folder / "root.der"
    store.mkdir()
    root.write_bytes(authority)
    for arguments in (
        ("-N", "--empty-password"),
        ("-A", "-n", "logbook", "-t", "CT,C,C", "-i", str(root)),
    ):
        subprocess.run(("certutil", *arguments, "-d", store), check=True, capture_output=True)
    return store


def judged(folder: Path, pdf: bytes, authority: bytes) -> list[dict[str, str]]:
    """What pdfsig says of each signature, as its own headings have it."""
    path = folder / "record.pdf"
    path.write_bytes(pdf)
    done = subprocess.run(
        ("pdfsig", "-nssdir", _trusting(folder, authority), path),
        capture_output=True,
        text=True,
        check=False,
    )
    parts = re.split(r"Signature #\d+:\n", done.stdout)[1:]
    return [dict(re.findall(r"^  - ([^:\n]+)(?:: (.*))?$", part, re.M)) for part in parts]


def test_both_signatures_are_valid_and_their_certificates_trusted(tmp_path: Path) -> None:
    first, second = judged(tmp_path, accepted(), people().authority.certificate)
    for each in (first, second):
        assert "Signature is Valid." == each["Signature Validation"]
        assert "Certificate is Trusted." == each["Certificate Validation"]
        assert "SHA-256" == each["Signing Hash Algorithm"]
        assert "ETSI.CAdES.detached" == each["Signature Type"]
    assert "Total document signed" in second
    assert "Not total document signed" in first


def test_names_and_fields_are_those_of_the_two_people(tmp_path: Path) -> None:
    found = judged(tmp_path, accepted(), people().authority.certificate)
    assert [("technician", "t.okondo"), ("reviewer", "w.brandt")] == [
        (each["Signature Field Name"], each["Signer Certificate Common Name"]) for each in found
    ]


def test_a_submitted_record_has_one_valid_signature_over_all_of_it(tmp_path: Path) -> None:
    (only, *others) = judged(tmp_path, submitted(), people().authority.certificate)
    assert "Signature is Valid." == only["Signature Validation"]
    assert "Total document signed" in only
    assert [] == [each for each in others if "Signature Validation" in each]


def test_another_authority_is_not_trusted(tmp_path: Path) -> None:
    for each in judged(tmp_path, accepted(), crew().authority.certificate):
        assert "Certificate is Trusted." != each["Certificate Validation"]


def test_a_changed_page_shows(tmp_path: Path) -> None:
    place = accepted().index(b"stream") + 40
    changed = bytearray(accepted())
    changed[place] ^= 1
    for each in judged(tmp_path, bytes(changed), people().authority.certificate):
        assert "Signature is Valid." != each["Signature Validation"]


def test_a_later_addition_shows_as_not_signed(tmp_path: Path) -> None:
    added = accepted() + b"\n% more\n"
    found = judged(tmp_path, added, people().authority.certificate)
    assert all("Not total document signed" in each for each in found)


def _cut_out(folder: Path, pdf: bytes, number: int) -> tuple[Path, Path]:
    """A signature and the bytes it covers, as files, by the PDF's own ByteRange."""
    spans = re.findall(rb"/ByteRange\s*\[\s*(\d+)\s+(\d+)\s+(\d+)\s+(\d+)\s*\]", pdf)
    start, length, after, rest = (int(each) for each in spans[number])
    held = pdf[start + length : after].strip(b"<>")
    signature, covered = folder / "signature.der", folder / "covered.bin"
    signature.write_bytes(bytes.fromhex(held.decode()))
    covered.write_bytes(pdf[start : start + length] + pdf[after : after + rest])
    return signature, covered


def _openssl_verifies(folder: Path, signature: Path, covered: Path) -> bool:
    root = folder / "root.pem"
    certificate = x509.load_der_x509_certificate(people().authority.certificate)
    root.write_bytes(certificate.public_bytes(Encoding.PEM))
    when = str(int(ACCEPTED.utc.timestamp()))
    command: list[str | Path] = [
        *("openssl", "cms", "-verify", "-binary", "-inform", "DER", "-in", signature),
        *("-content", covered, "-CAfile", root, "-purpose", "any", "-attime", when),
        *("-out", folder / "out.bin"),
    ]
    done = subprocess.run(command, capture_output=True, check=False)
    return done.returncode == 0


@pytest.mark.parametrize("number", [0, 1])
def test_openssl_verifies_each_signature_over_the_bytes_it_covers(
    number: int, tmp_path: Path
) -> None:
    signature, covered = _cut_out(tmp_path, accepted(), number)
    assert _openssl_verifies(tmp_path, signature, covered)
    covered.write_bytes(covered.read_bytes().replace(b"%PDF-1.7", b"%PDF-1.6"))
    assert not _openssl_verifies(tmp_path, signature, covered)
