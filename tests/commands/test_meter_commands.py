"""Meters checked on a reference, certificates kept and packs received, as a user types them."""

from __future__ import annotations

import json
from pathlib import Path

import pytest

from gaugelog.journal.entry import sha256
from tests.commands.conftest import PASSPHRASE, Command, Outcome
from tests.intake.test_references import BOX, VALUE


@pytest.fixture
def act(demo: Path, command: Command) -> Command:
    """Run a command as the demo's technician, with a reference entered."""
    rows = json.loads(command("person", "list", "--json").out)
    who = next(row["id"] for row in rows if row["roles"] == ["technician"])

    def typed(*words: str) -> Outcome:
        return command(*words, "--as", who, secrets=f"{PASSPHRASE}\n")

    (demo / "references.toml").write_text(BOX + VALUE, encoding="utf-8")
    assert 0 == typed("instrument", "add", str(demo / "references.toml")).code
    return typed


def test_a_meter_is_checked_and_its_checks_are_listed(act: Command, command: Command) -> None:
    told = act("instrument", "check", "RM-2", "reference=RB-1", "reads=350.1 ohm")
    assert 0 == told.code, told.err
    assert "RM-2 on RB-1, 350 Ω: reads 350.1 Ω, 0.1 Ω off; at most" in told.out
    told = act("instrument", "check", "RM-2", "reference=RB-1", "reads=352 ohm")
    assert (1, True) == (told.code, "FAIL" in told.out)
    rows = json.loads(command("instrument", "checks", "RM-2", "--json").out)
    assert ["pass", "fail"] == [row["outcome"] for row in rows]
    assert "352 Ω" in command("instrument", "checks").out


def test_slips_in_a_check_are_told_at_once(act: Command, command: Command) -> None:
    told = act("instrument", "check", "RM-2", "refrence=RB-1")
    assert 3 == told.code
    assert all(name in told.err for name in ("refrence", "reference", "reads"))


def test_certificates_are_kept_and_counted(demo: Path, act: Command, command: Command) -> None:
    (demo / "cert.pdf").write_bytes(b"%PDF-1.7 of the meter")
    told = act("instrument", "certificate", "RM-2", str(demo / "cert.pdf"))
    assert (0, True) == (told.code, sha256(b"%PDF-1.7 of the meter") in told.err), told.err
    told = act("stock", "certificate", "L-3504", str(demo / "cert.pdf"))
    assert 0 == told.code, told.err
    meters = json.loads(command("instrument", "list", "--json").out)
    assert {"RM-2": 1} == {
        row["label"]: row["certificates"] for row in meters if row["certificates"]
    }
    stock = json.loads(command("stock", "list", "--json").out)
    assert 1 == next(row["certificates"] for row in stock["lots"] if row["lot"] == "L-3504")
    assert 4 == act("stock", "certificate", "L-3504", str(demo / "cert.pdf")).code
    assert 3 == act("stock", "certificate", "L-3504", str(demo / "none.pdf")).code


def test_packs_that_come_later_are_received_and_a_wrong_file_is_one_fault(
    demo: Path, act: Command
) -> None:
    lots = (demo / "input" / "lots.csv").read_text(encoding="utf-8").splitlines()
    row = next(line for line in lots if line.startswith("L-3504"))
    (demo / "more.csv").write_text(
        f"{lots[0]}\n{row.replace('K7-03', 'K7-77')}\n", encoding="utf-8"
    )
    told = act("stock", "receive", str(demo / "more.csv"))
    assert (0, True) == (told.code, "1 pack more of lots in stock" in told.err), told.err
    told = act("stock", "receive", str(demo / "references.toml"))
    assert (3, 1) == (told.code, told.err.count("✗")), told.err
