"""`gaugelog backup` and `gaugelog restore` at the command line."""

from __future__ import annotations

import json
import zipfile
from pathlib import Path

import pytest

from tests.commands.conftest import PASSPHRASE, Command, Outcome

CUSTODIAN = "p.lind"


def _restore(command: Command, *words: str, secrets: str = f"{PASSPHRASE}\n") -> Outcome:
    return command(
        "restore", "../b.zip", "../r", "--reason", "laptop lost", *words, secrets=secrets
    )


@pytest.fixture
def backed_up(demo: Path, command: Command) -> str:
    """A backup of the demo beside its logbook; gives the head that was printed."""
    told = command("backup", "../b.zip")
    assert told.code == 0, told.err
    return told.out.strip()


def test_a_backup_prints_the_head_and_says_what_is_not_in_it(demo: Path, command: Command) -> None:
    told = command("backup", "../b.zip")
    assert told.code == 0
    assert command("journal", "head").out == told.out
    assert "11 files" in told.err
    assert "The journal is sound" in told.err
    assert "keys" in told.err
    assert (demo / "b.zip").is_file()


def test_a_backup_is_told_as_json(demo: Path, command: Command) -> None:
    told = json.loads(command("backup", "../b.zip", "--json").out)
    assert told["sound"] is True
    assert told["bytes"] == (demo / "b.zip").stat().st_size
    assert told["head"] + "\n" == command("journal", "head").out


def test_a_backup_with_evidence_lost_ends_with_a_code(demo: Path, command: Command) -> None:
    next((demo / "logbook" / "evidence").rglob("?" * 64)).unlink()
    told = command("backup", "../b.zip")
    assert told.code == 1
    assert "not to be had" in told.err
    assert (demo / "b.zip").is_file()


def test_restoring_gives_a_sound_logbook_and_names_what_is_missing(
    demo: Path, command: Command, backed_up: str
) -> None:
    seq = int(backed_up.partition(":")[0])
    told = _restore(command, "--as", CUSTODIAN, "--head", f"{seq + 3}:{'A' * 26}")
    assert told.code == 0, told.err
    assert f"Entries {seq + 1}…{seq + 3} are not in this backup" in told.err
    assert told.out.startswith(f"{seq + 1}:")
    check = command("--logbook", "../r", "journal", "check", "--head", backed_up)
    assert check.code == 0, check.out
    shown = command("--logbook", "../r", "journal", "show", "--last", "1").out
    assert "logbook.restored: from a backup at" in shown
    assert "laptop lost" in shown


def test_one_missing_entry_is_named_as_one(demo: Path, command: Command, backed_up: str) -> None:
    seq = int(backed_up.partition(":")[0]) + 1
    told = _restore(command, "--as", CUSTODIAN, "--head", f"{seq}:{'A' * 26}")
    assert f"Entry {seq} is not in this backup" in told.err


def test_a_head_that_the_backup_has_proves_nothing_missing(
    demo: Path, command: Command, backed_up: str
) -> None:
    told = _restore(command, "--as", CUSTODIAN, "--head", backed_up, "--json")
    assert "proves anything missing" in told.err
    data = json.loads(told.out)
    assert (backed_up, None) == (data["head_at_backup"], data["missing"])


def test_without_a_head_what_is_missing_is_not_known(
    demo: Path, command: Command, backed_up: str
) -> None:
    told = _restore(command, "--as", CUSTODIAN)
    assert told.code == 0
    assert "not known" in told.err


def test_a_wrong_passphrase_restores_nothing(demo: Path, command: Command, backed_up: str) -> None:
    told = _restore(command, "--as", CUSTODIAN, secrets="wrong indeed\n")
    assert told.code == 5
    assert not (demo / "r").exists()


def test_a_key_that_is_not_here_is_named(
    demo: Path, command: Command, backed_up: str, monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setenv("GAUGELOG_KEYS", str(demo / "elsewhere"))
    told = _restore(command, "--as", CUSTODIAN)
    assert told.code == 5
    assert str(demo / "elsewhere") in told.err
    assert not (demo / "r").exists()


def test_nobody_named_restores_nothing(demo: Path, command: Command, backed_up: str) -> None:
    told = _restore(command)
    assert told.code == 5
    assert "Who acts was not said" in told.err


def test_a_damaged_backup_is_told_in_one_sentence(
    demo: Path, command: Command, backed_up: str
) -> None:
    data = (demo / "b.zip").read_bytes()
    (demo / "b.zip").write_bytes(data[: len(data) // 2])
    told = _restore(command, "--as", CUSTODIAN)
    assert told.code == 6
    assert "damaged or no backup" in told.err
    assert "Traceback" not in told.err
    assert not (demo / "r").exists()


def test_a_file_that_is_there_is_not_written_over(
    demo: Path, command: Command, backed_up: str
) -> None:
    told = command("backup", "../b.zip")
    assert told.code == 4
    assert "there already" in told.err


def test_unpacked_by_hand_every_command_says_what_to_do(
    demo: Path, command: Command, backed_up: str
) -> None:
    with zipfile.ZipFile(demo / "b.zip") as archive:
        archive.extractall(demo / "by-hand")
    for words in (("plan", "show"), ("step", "next"), ("journal", "check"), ("backup", "../c.zip")):
        told = command("--logbook", "../by-hand", *words)
        assert told.code == 6, words
        assert "gaugelog restore" in told.err
