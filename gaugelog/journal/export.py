"""The journal written out as plain files, to be checked by anyone without this program."""

from __future__ import annotations

import ssl
from collections.abc import Callable, Collection
from pathlib import Path

from cryptography import x509
from cryptography.hazmat.primitives.serialization import Encoding, PublicFormat

from gaugelog.errors import StorageTrouble
from gaugelog.journal.certificates import Certificates, certificates_of
from gaugelog.journal.entry import Entry
from gaugelog.journal.evidence import Evidence
from gaugelog.journal.export_guide import guide
from gaugelog.journal.storage.port import Reader

Progress = Callable[[int, int], None]
"""Told how many entries are done and how many there are."""


def export(
    reader: Reader,
    evidence: Evidence,
    folder: Path,
    progress: Progress | None = None,
    left_out: Collection[str] = (),
) -> int:
    """Write every entry, certificate and evidence file into `folder`; returns how many entries.

    An entry is `chain-<id>/000012.header.json`, `.body.json` and, at the end of a deed, `.sig`,
    each the exact bytes that were hashed or signed. Evidence files whose digests are `left_out`
    are not written, and the guide says so; nor are files that no entry names. `READ ME.txt` tells
    how to check them with openssl and sha256sum only. Raises StorageTrouble when the folder holds
    files or can't be written.
    """
    try:
        _demand_empty(folder)
        count = _write_entries(reader, folder, progress)
        _write_certificates(certificates_of(reader), folder)
        _write_evidence(evidence, folder, _named(reader) - set(left_out))
        (folder / "READ ME.txt").write_text(guide(_heads(reader), len(left_out)), encoding="utf-8")
    except OSError as error:
        raise StorageTrouble(
            f"The journal can't be written to {folder}: {error.strerror}.",
            "See that you may write there and the disk has room.",
        ) from None
    return count


def _demand_empty(folder: Path) -> None:
    folder.mkdir(parents=True, exist_ok=True)
    if any(folder.iterdir()):
        raise StorageTrouble(
            f"{folder} holds files already.", "Name a new or empty folder for the export."
        )


def _write_entries(reader: Reader, folder: Path, progress: Progress | None) -> int:
    total = sum(head.seq for head in map(reader.head, reader.chains()) if head)
    done = 0
    for chain in reader.chains():
        place = folder / f"chain-{chain}"
        place.mkdir()
        for filed in reader.filed(chain):
            _write_entry(filed.entry, place, f"{filed.seq:06d}")
            done += 1
            if progress:
                progress(done, total)
    return done


def _write_entry(entry: Entry, place: Path, name: str) -> None:
    (place / f"{name}.header.json").write_bytes(entry.header_bytes)
    if entry.body_bytes is not None:
        (place / f"{name}.body.json").write_bytes(entry.body_bytes)
    if entry.signature is not None:
        (place / f"{name}.sig").write_bytes(entry.signature)


def _write_certificates(certificates: Certificates, folder: Path) -> None:
    place = folder / "certificates"
    place.mkdir()
    if certificates.authority is not None:
        pem = ssl.DER_cert_to_PEM_cert(certificates.authority)
        (folder / "authority.pem").write_text(pem, encoding="ascii")
    for issued in certificates.all():
        pem = ssl.DER_cert_to_PEM_cert(issued.der)
        (place / f"{issued.fingerprint}.pem").write_text(pem, encoding="ascii")
        key = x509.load_der_x509_certificate(issued.der).public_key()
        public = key.public_bytes(Encoding.PEM, PublicFormat.SubjectPublicKeyInfo)
        (place / f"{issued.fingerprint}.pub.pem").write_bytes(public)


def _named(reader: Reader) -> set[str]:
    """The digests of every file that an entry names."""
    bodies = (entry.body for entry in reader.entries() if entry.body_bytes is not None)
    return {digest for body in bodies for digest in body.evidence}


def _write_evidence(evidence: Evidence, folder: Path, wanted: Collection[str]) -> None:
    place = folder / "evidence"
    place.mkdir()
    for digest in evidence.digests():
        if digest not in wanted:
            continue
        (place / digest).write_bytes(evidence.as_it_lies(digest))


def _heads(reader: Reader) -> list[tuple[str, str]]:
    heads = (reader.head(chain) for chain in reader.chains())
    return [(head.chain, head.printed) for head in heads if head is not None]
