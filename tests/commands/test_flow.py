"""A point from an empty folder to a signed record, typed as a user would, and what is refused."""

from __future__ import annotations

import json
import shutil
from pathlib import Path

import pytest

from gaugelog.commands import session
from tests.commands.conftest import Command

ROOT = Path(__file__).parents[2]
FILES = ROOT / "tests" / "small_job"
WORD = "long enough"


@pytest.fixture
def job(tmp_path: Path, monkeypatch: pytest.MonkeyPatch, command: Command) -> Path:
    """A logbook with people, stock, meters and a released plan of one day's work."""
    monkeypatch.setenv(session.KEYS_VARIABLE, str(tmp_path / "keys"))
    folder = tmp_path / "job"
    told = command(
        "start",
        str(folder),
        *("--name", "Job 7", "--custodian", "c.ward", "--custodian-name", "C. Ward"),
        *("--initials", "CW", "--role", "planner"),
        secrets=f"{WORD}\n",
    )
    assert told.code == 0, told.err
    monkeypatch.chdir(folder)
    for person, role in (("t.okoro", "technician"), ("q.reyes", "reviewer")):
        told = command(
            *("person", "enrol", person, "--name", person, "--initials", "XX"),
            *("--role", role, "--as", "c.ward"),
            secrets=f"{WORD}\n{WORD}\n",
        )
        assert told.code == 0, told.err
    for words in (
        ("stock", "receive", str(FILES / "lots.csv"), str(FILES / "consumables.csv")),
        ("instrument", "add", str(FILES / "instruments.toml")),
        ("plan", "load", str(FILES / "plan")),
        ("plan", "release"),
    ):
        told = command(*words, "--as", "c.ward", secrets=f"{WORD}\n")
        assert told.code == 0, told.err
    return folder


@pytest.fixture
def empty(tmp_path: Path, monkeypatch: pytest.MonkeyPatch, command: Command) -> Path:
    """A logbook that was started just now; the current folder."""
    monkeypatch.setenv(session.KEYS_VARIABLE, str(tmp_path / "keys"))
    folder = tmp_path / "fresh"
    told = command(
        *("start", str(folder), "--name", "Job 8", "--custodian", "c.ward"),
        *("--custodian-name", "C. Ward", "--initials", "CW"),
        secrets=f"{WORD}\n",
    )
    assert f"Next: cd {folder}; gaugelog person enrol" in told.err
    monkeypatch.chdir(folder)
    return folder


@pytest.mark.parametrize(
    ("words", "following"),
    [
        (("plan", "show"), "gaugelog plan load FOLDER"),
        (("plan", "check"), "gaugelog plan load FOLDER"),
        (("wiring", "show"), "gaugelog plan load FOLDER"),
        (("step", "next"), "gaugelog plan load FOLDER"),
        (("stock", "list"), "gaugelog stock receive lots.csv"),
        (("instrument", "list"), "gaugelog instrument add instruments.toml"),
        (("record",), "gaugelog step next"),
    ],
)
def test_where_nothing_is_yet_the_next_command_is_told(
    empty: Path, command: Command, words: tuple[str, ...], following: str
) -> None:
    told = command(*words)
    assert following in told.err
    assert "" == told.out


def _do(command: Command, *words: str, who: str = "t.okoro") -> str:
    told = command("step", "do", "FB-1", *words, "--as", who, secrets=f"{WORD}\n")
    assert told.code == 0, told.err
    return told.out + told.err


def test_the_first_steps_are_led_and_kept(job: Path, command: Command) -> None:
    shown = command("step", "next", "FB-1").out
    assert "Make the place safe to work at" in shown
    assert "CAUTION" in shown
    _do(command, "safe=yes")
    told = _do(command, "gauge=K7-03/1", "meter=RM-2", "resistance=350.2 ohm")
    assert "resistance received 350.2 ohm: PASS" in told
    assert "ruling limit" in told
    assert "Degrease" in command("step", "next", "FB-1").out


def test_what_is_to_be_read_first_stands_first(job: Path, command: Command) -> None:
    rain = ("rain stopped the work", "--as", "t.okoro")
    assert 0 == command("step", "note", "FB-1", *rain, secrets=f"{WORD}\n").code
    first, second, *_ = command("step", "next", "FB-1").out.splitlines()
    assert first.startswith("FB-1, zone midspan")
    assert second.startswith("  READ FIRST: Note (access) by t.okoro (XX), ")
    assert "rain stopped the work" in " ".join(command("step", "next").out.split())


def test_another_gauges_value_is_refused_before_it_is_a_reading(
    job: Path, command: Command
) -> None:
    _do(command, "safe=yes")
    for typed, hint in (("120 ohm", "120 Ω gauge"), ("35.12 ohm", "decimal point")):
        told = command(
            *("step", "do", "FB-1", "gauge=K7-03/1", "meter=RM-2", f"resistance={typed}"),
            *("--as", "t.okoro"),
            secrets=f"{WORD}\n",
        )
        assert told.code == 3
        assert hint in told.err
    shown = json.loads(command("journal", "show", "--json", "--last", "99").out)
    assert not [entry for entry in shown if entry["header"]["kind"] == "reading.taken"]


def test_every_fault_of_a_step_is_named_at_once(job: Path, command: Command) -> None:
    _do(command, "safe=yes")
    told = command(
        *("step", "do", "FB-1", "gauge=K9-99/1", "meter=XX", "resistance=350", "colour=red"),
        *("--as", "t.okoro"),
        secrets=f"{WORD}\n",
    )
    assert told.code == 3
    for name in ("colour", "gauge", "meter", "resistance"):
        assert name in told.err
    assert "4 faults" in told.err


def test_a_wrong_passphrase_is_told_and_nothing_is_kept(job: Path, command: Command) -> None:
    before = command("journal", "head").out
    told = command("step", "do", "FB-1", "safe=yes", "--as", "t.okoro", secrets="not this one\n")
    assert told.code == 5
    assert "passphrase" in told.err
    assert before == command("journal", "head").out


def test_nobody_named_is_told_how_to_name_them(job: Path, command: Command) -> None:
    told = command("step", "do", "FB-1", "safe=yes", secrets=f"{WORD}\n")
    assert told.code == 5
    assert "--as" in told.err


def test_a_point_that_is_not_ready_is_not_submitted(job: Path, command: Command) -> None:
    told = command("submit", "FB-1", "--as", "t.okoro", secrets=f"{WORD}\n")
    assert told.code == 4
    assert "is open" in told.err


def test_a_reviewer_does_no_steps(job: Path, command: Command) -> None:
    told = command("step", "do", "FB-1", "safe=yes", "--as", "q.reyes", secrets=f"{WORD}\n")
    assert told.code == 4
    assert "technician" in told.err


def test_a_draft_can_be_drawn_at_any_time(job: Path, command: Command) -> None:
    told = command("record", "FB-1", "--draft", "--out", str(job / "draft.pdf"))
    assert told.code == 0
    assert (job / "draft.pdf").read_bytes().startswith(b"%PDF-")


def test_a_released_plan_is_not_loaded_over(job: Path, command: Command) -> None:
    told = command("plan", "load", str(FILES / "plan"), "--as", "c.ward", secrets=f"{WORD}\n")
    assert told.code == 4
    assert "released" in told.err


def test_a_plan_with_faults_stores_nothing(job: Path, tmp_path: Path, command: Command) -> None:
    plan = tmp_path / "plan"
    shutil.copytree(FILES / "plan", plan)
    grids = (plan / "grids.csv").read_text(encoding="utf-8")
    (plan / "grids.csv").write_text(grids.replace("midspan,B", "nowhere,B"), encoding="utf-8")
    (plan / "criteria.toml").write_text("title = 1\n", encoding="utf-8")
    told = command("plan", "load", str(plan), "--as", "c.ward", secrets=f"{WORD}\n")
    assert told.code == 3
    assert "grids.csv, row 2, column zone" in told.err
    assert "criteria.toml, title" in told.err


def test_a_revoked_person_signs_no_more(job: Path, command: Command) -> None:
    told = command(
        *("person", "revoke", "t.okoro", "--reason", "left the firm", "--as", "c.ward"),
        secrets=f"{WORD}\n",
    )
    assert told.code == 0
    told = command("step", "do", "FB-1", "safe=yes", "--as", "t.okoro", secrets=f"{WORD}\n")
    assert told.code == 4
    assert "revoked" in told.err
    assert command("journal", "check").code == 0


def test_someone_enrolled_anew_signs_again(job: Path, command: Command) -> None:
    for words in (
        ("person", "revoke", "t.okoro", "--reason", "lost the laptop"),
        ("person", "enrol", "t.okoro", "--name", "T. O.", "--initials", "TO"),
    ):
        extra = ("--role", "technician") if words[1] == "enrol" else ()
        told = command(*words, *extra, "--as", "c.ward", secrets=f"{WORD}\n{WORD}\n")
        assert told.code == 0, told.err
    _do(command, "safe=yes")
    assert command("journal", "check").code == 0


def test_a_record_goes_to_no_folder_that_is_not_there(job: Path, command: Command) -> None:
    told = command("record", "FB-1", "--draft", "--out", str(job / "none" / "x.pdf"))
    assert told.code == 6
    assert "can't be written" in told.err


def test_a_hold_is_not_refused_without_a_reason(job: Path, command: Command) -> None:
    told = command("step", "do", "FB-1", "--refuse", "", "--as", "q.reyes", secrets=f"{WORD}\n")
    assert told.code == 3
    assert "--refuse" in told.err


def test_a_step_shows_what_the_plan_says_of_it(job: Path, command: Command) -> None:
    assert "permit: Work from the inspection gantry only" in command("step", "next", "FB-1").out
    _do(command, "safe=yes")
    assert "on the shelf: K7-03/1" in command("step", "next", "FB-1").out
