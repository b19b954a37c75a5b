"""The shipped demo, played whole once: every kind of point to its signed record, and what next."""

from __future__ import annotations

import json
import re
import shlex
import shutil
import subprocess
from datetime import datetime, timedelta
from pathlib import Path
from typing import Any

import pikepdf
import pytest

from gaugelog.commands import run, session
from gaugelog.journal.keys import KeyFolder
from tests.commands.conftest import CHEAP_ROUNDS, PASSPHRASE, Command
from tests.foreign import needs

pytestmark = pytest.mark.xdist_group("whole demo")

STATES = {"FB-7": "awaiting review", "DK-2": "in work"}
"""Points that are not accepted at the end: something is left to type."""

REVISIONS = {"FB-2": 2, "FB-3": 2}
"""Points whose newest record is not the first."""


@pytest.fixture(scope="module")
def played(tmp_path_factory: pytest.TempPathFactory) -> tuple[Path, str]:
    folder = tmp_path_factory.mktemp("whole") / "demo"
    whole, told = KeyFolder.__init__, list[str]()

    def cheap(self: KeyFolder, path: Path, kdf_rounds: int = CHEAP_ROUNDS) -> None:
        whole(self, path, CHEAP_ROUNDS)

    with pytest.MonkeyPatch.context() as patch:
        patch.setattr(KeyFolder, "__init__", cheap)
        patch.setattr("gaugelog.commands.demo.put", lambda *lines: told.extend(lines))
        assert run(["demo", str(folder)]) == 0
    return folder, "\n".join(told)


@pytest.fixture
def whole(played: tuple[Path, str], tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    """A copy of the played demo; its logbook is the current folder, its keys are found."""
    folder = tmp_path / "demo"
    shutil.copytree(played[0], folder)
    monkeypatch.chdir(folder / "logbook")
    monkeypatch.setenv(session.KEYS_VARIABLE, str(folder / "keys"))
    return folder


def _plan(command: Command) -> list[dict[str, str]]:
    found: list[dict[str, str]] = json.loads(command("plan", "show", "--json").out)
    return found


def test_every_point_is_accepted_but_for_what_is_left_to_type(
    whole: Path, command: Command
) -> None:
    states = {row["point"]: row["state"] for row in _plan(command)}
    assert len(states) == 15
    assert {point: STATES.get(point, "accepted") for point in states} == states


def test_each_point_but_the_open_one_has_its_newest_record(whole: Path, command: Command) -> None:
    points = [row["point"] for row in _plan(command) if row["state"] != "in work"]
    wanted = {f"{point}-r{REVISIONS.get(point, 1)}.pdf" for point in points}
    assert wanted == {path.name for path in (whole / "records").iterdir()}


def test_every_kind_of_point_that_the_work_names_is_there(whole: Path) -> None:
    plan = whole / "input" / "plan"
    circuits = (plan / "circuits.csv").read_text(encoding="utf-8")
    grids = (plan / "grids.csv").read_text(encoding="utf-8")
    for arrangement in (
        "quarter three-wire",
        "quarter two-wire",
        "half with dummy",
        "full bending",
        "full torsion",
    ):
        assert arrangement in circuits
    for kind in ("rectangular", "delta", "shear pair", "hot-cure-bond", "long-gauge-concrete"):
        assert kind in grids


def test_the_journal_holds_a_failure_a_return_an_amendment_and_a_replacement(
    whole: Path, command: Command
) -> None:
    shown = json.loads(command("journal", "show", "--json", "--last", "9999").out)
    kinds = {entry["header"]["kind"] for entry in shown}
    assert {"point.returned", "point.reopened", "disposition.made"} <= kinds
    assert {"photo.kept", "meter.checked"} <= kinds
    readings = [
        entry["body"]["fact"] for entry in shown if entry["header"]["kind"] == "reading.taken"
    ]
    words = [reading["verdict"]["word"] for reading in readings]
    assert (1, 0) == (words.count("fail"), words.count("conditional fail"))
    # A story in which hardly anything passes would say that its values were made up badly.
    assert words.count("conditional pass") <= 0.1 * len(words)


def test_nobody_works_at_night(whole: Path, command: Command) -> None:
    shown = json.loads(command("journal", "show", "--json", "--last", "9999").out)
    hours = {
        (datetime.fromisoformat(header["time"]) + timedelta(hours=1)).hour
        for header in (entry["header"] for entry in shown)
    }
    assert {7, 18} == {min(hours), max(hours)}


def test_the_whole_journal_is_found_in_order(whole: Path, command: Command) -> None:
    told = command("journal", "check")
    assert told.code == 0, told.out + told.err


@needs("pdfsig", "qpdf")
def test_foreign_programs_find_every_record_whole_and_signed(whole: Path) -> None:
    for record in (whole / "records").iterdir():
        told = subprocess.run(["pdfsig", record], capture_output=True, text=True, check=False)
        signed = 1 if record.name.startswith("FB-7") else 2
        assert signed == told.stdout.count("Signature is Valid"), told.stdout
        subprocess.run(["qpdf", "--check", record], capture_output=True, check=True)


def _data(record: Path) -> dict[str, Any]:
    """The data that a record carries."""
    with pikepdf.open(record) as opened:
        found: dict[str, Any] = json.loads(
            opened.attachments["record.json"].get_file().read_bytes()
        )
    return found


def test_each_record_carries_its_circuits_as_data(whole: Path, command: Command) -> None:
    circuits = {row["point"]: row["circuit"].split(", ") for row in _plan(command)}
    for record in (whole / "records").iterdir():
        point = record.name.rsplit("-r", 1)[0]
        assert circuits[point] == [each["label"] for each in _data(record)["circuits"]]


@pytest.mark.parametrize(
    ("point", "value"),
    [("FB-1", "+0.70 µm/m per K"), ("FB-4", "cancels"), ("PB-1", "cancels"), ("SH-1", "cancels")],
)
def test_a_record_says_what_warmth_does_to_its_circuit(point: str, value: str, whole: Path) -> None:
    corrections = _data(whole / "records" / f"{point}-r1.pdf")["budget"]["corrections"]
    said = [each["value"] for each in corrections if each["name"].startswith("thermal output")]
    assert [value] == said


def test_a_dummys_record_says_nothing_of_a_strain(whole: Path) -> None:
    assert _data(whole / "records" / "FB-5-r1.pdf")["budget"] is None


def test_only_a_gauge_that_was_given_up_is_said_to_be_gone(whole: Path) -> None:
    gone = {
        record.name: {each["earlier_gauge"] for each in _data(record)["readings"]} - {""}
        for record in (whole / "records").iterdir()
    }
    assert {name: gauges for name, gauges in gone.items() if gauges} == {"DK-1-r1.pdf": {"C6-01/1"}}


def test_what_the_summary_says_to_type_runs(
    whole: Path, played: tuple[Path, str], command: Command
) -> None:
    lines = re.findall(r"gaugelog (\S[^#\n]*?)\s+#", played[1])
    assert any(line.startswith("step do") for line in lines)
    for line in lines:
        words = shlex.split(line)
        told = command(*words, secrets=f"{PASSPHRASE}\n" if "--as" in words else "")
        assert told.code == 0, (line, told.out + told.err)
