"""An exported journal, judged by OpenSSL and sha256sum alone, as its READ ME tells people to."""

from __future__ import annotations

import re
import subprocess
from pathlib import Path

import pytest

from gaugelog.journal.export import export
from tests.foreign import needs
from tests.journal.samples import CHAIN, SampleJournal, note

pytestmark = needs("openssl", "sha256sum", "sh")


def _exported(folder: Path) -> Path:
    journal = SampleJournal().start()
    digest = journal.evidence.put(b"a drawing")
    journal.keep(note("wet", evidence=(digest,)), note("dry"))
    journal.keep(note("20 Ω"))
    with journal.storage.reading() as reader:
        assert 6 == export(reader, journal.evidence, folder)
    return folder


@pytest.fixture
def exported(tmp_path: Path) -> Path:
    return _exported(tmp_path / "out")


def _openssl(folder: Path, *arguments: str) -> subprocess.CompletedProcess[str]:
    return subprocess.run(
        ["openssl", *arguments], cwd=folder, capture_output=True, text=True, check=False
    )


def _complaints(folder: Path) -> list[str]:
    """What the indented blocks of the READ ME print when run as they stand."""
    text = (folder / "READ ME.txt").read_text(encoding="utf-8")
    blocks = re.findall(r"(?<=\n\n)(?:    .*\n)+", text)
    assert 5 == len(blocks)
    lines: list[str] = []
    for block in blocks:
        done = subprocess.run(
            ["sh", "-c", block], cwd=folder, capture_output=True, text=True, check=False
        )
        assert "" == done.stderr
        lines += done.stdout.splitlines()
    return lines


def test_openssl_verifies_the_signature_over_the_header_file(exported: Path) -> None:
    header = exported / f"chain-{CHAIN}" / "000005.header.json"
    found = re.search(r'"certificate":"([0-9a-f]{64})"', header.read_text(encoding="utf-8"))
    assert found
    certificate, key = f"certificates/{found[1]}.pem", f"certificates/{found[1]}.pub.pem"
    done = _openssl(
        exported, "dgst", "-sha256", "-verify", key,
        "-signature", str(header).replace(".header.json", ".sig"), str(header),
    )  # fmt: skip
    assert "Verified OK" == done.stdout.strip()
    done = _openssl(exported, "verify", "-no_check_time", "-CAfile", "authority.pem", certificate)
    assert f"{certificate}: OK" == done.stdout.strip()


def test_the_commands_of_the_read_me_find_nothing_wrong(exported: Path) -> None:
    assert [] == _complaints(exported)


@pytest.mark.parametrize(
    ("file", "complaint"),
    [
        ("chain-chain-a/000004.header.json", "chain-chain-a/000005.header.json does not follow"),
        ("chain-chain-a/000004.body.json", "chain-chain-a/000004.body.json is not the body of"),
        ("chain-chain-a/000005.sig", "chain-chain-a/000005.header.json is not signed by"),
        ("evidence/*", "was altered"),
        ("certificates/*[0-9a-f].pub.pem", "has another key"),
    ],
)
def test_the_commands_of_the_read_me_find_an_altered_file(
    exported: Path, file: str, complaint: str
) -> None:
    path = next(exported.glob(file))
    data = bytearray(path.read_bytes())
    data[len(data) // 2] ^= 1
    path.write_bytes(data)
    assert any(complaint in line for line in _complaints(exported))


def test_the_commands_of_the_read_me_find_a_removed_entry(exported: Path) -> None:
    for path in exported.glob("chain-*/000006.*"):
        path.rename(path.with_name(path.name.replace("000006", "000007")))
    for path in exported.glob("chain-*/000004.*"):
        path.unlink()
    assert any("is not number 4" in line for line in _complaints(exported))


def test_the_letters_of_a_printed_head_come_from_openssl_too(exported: Path) -> None:
    text = (exported / "READ ME.txt").read_text(encoding="utf-8")
    printed = re.search(r"^  6:([A-Z2-7]{26})$", text, re.MULTILINE)
    assert printed
    done = subprocess.run(
        [
            "sh",
            "-c",
            "openssl dgst -sha256 -binary chain-*/000006.header.json | head -c 16 | base32",
        ],
        cwd=exported,
        capture_output=True,
        text=True,
        check=False,
    )
    assert printed[1] == done.stdout.strip().rstrip("=")
