"""The demo ends with signed records that foreign programs accept, and says what to type next."""

from __future__ import annotations

import json
import subprocess
from pathlib import Path

from tests.commands.conftest import Command
from tests.foreign import needs


def test_two_records_lie_beside_the_logbook(demo: Path) -> None:
    assert [path.name for path in sorted(demo.glob("records/*.pdf"))] == [
        "FB-1-r1.pdf",
        "FB-2-r1.pdf",
    ]


def test_the_input_files_are_copied_with_their_explanation(demo: Path) -> None:
    names = {path.name for path in (demo / "input").rglob("*") if path.is_file()}
    wanted = {"README.md", "campaign.toml", "criteria.toml", "grids.csv", "circuits.csv"}
    assert wanted <= names


@needs("pdfsig")
def test_a_foreign_program_finds_two_valid_signatures(demo: Path) -> None:
    for record in demo.glob("records/*.pdf"):
        told = subprocess.run(["pdfsig", record], capture_output=True, text=True, check=False)
        assert told.stdout.count("Signature is Valid") == 2, told.stdout
        assert "Digest Mismatch" not in told.stdout


@needs("qpdf")
def test_a_foreign_program_finds_the_files_whole(demo: Path) -> None:
    for record in demo.glob("records/*.pdf"):
        subprocess.run(["qpdf", "--check", record], capture_output=True, check=True)


def test_a_second_demo_in_the_same_place_is_refused(demo: Path, command: Command) -> None:
    told = command("demo", str(demo))
    assert told.code == 4
    assert "is there already" in told.err


def test_the_failed_check_was_put_right_with_a_reason(demo: Path, command: Command) -> None:
    shown = json.loads(command("journal", "show", "FB-2", "--json", "--last", "99").out)
    readings = [
        entry["body"]["fact"] for entry in shown if entry["header"]["kind"] == "reading.taken"
    ]
    failed = [reading for reading in readings if reading["verdict"]["word"] == "fail"]
    assert [reading["typed"] for reading in failed] == ["0.42 GΩ"]
    again = next(reading for reading in readings if reading.get("repeats") == failed[0]["id"])
    assert again["reason"].startswith("Flux left")
    assert again["attempt"] == 2
