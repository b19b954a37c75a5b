"""Amend, replace, withdraw, revise and set standing, typed as a user would on a played demo."""

from __future__ import annotations

import json
import shutil
from pathlib import Path

import pytest

from tests.commands.conftest import PASSPHRASE, SMALL_JOB, Command, Outcome

WHO = ("technician", "reviewer", "planner")


@pytest.fixture
def people(demo: Path, command: Command) -> dict[str, str]:
    """Who has which role in the demo."""
    rows = json.loads(command("person", "list", "--json").out)
    return {role: row["id"] for role in WHO for row in rows if role in row["roles"]}


def _act(command: Command, who: str, *words: str) -> Outcome:
    return command(*words, "--as", who, secrets=f"{PASSPHRASE}\n")


def _accepted(command: Command) -> str:
    rows = json.loads(command("record", "--json").out)
    return str(next(row["point"] for row in rows if row["state"] == "accepted"))


def test_an_accepted_point_is_amended_and_its_file_stays(
    demo: Path, command: Command, people: dict[str, str]
) -> None:
    point = _accepted(command)
    told = _act(command, people["technician"], "amend", point, "--reason", "cable renamed")
    assert (0, True) == (told.code, "in work again" in told.err), told.err
    told = _act(command, people["technician"], "submit", point)
    assert told.code == 0, told.err
    rows = json.loads(command("record", "--json").out)
    states = [(row["state"], row["reason"]) for row in rows if row["point"] == point]
    assert [("amended", "cable renamed"), ("submitted", "cable renamed")] == states[-2:]
    revision = next(row["revision"] for row in rows if row["state"] == "amended")
    told = command("record", point, "--revision", revision, "--out", str(demo / "first.pdf"))
    assert told.code == 0, told.err
    assert "both signatures" in told.err


def test_what_is_not_accepted_is_not_amended(
    demo: Path, command: Command, people: dict[str, str]
) -> None:
    told = _act(command, people["technician"], "amend", "NO-1", "--reason", "x")
    assert (4, True) == (told.code, "no point NO-1" in told.err)


def test_a_gauge_is_replaced_and_the_point_then_withdrawn(
    demo: Path, command: Command, people: dict[str, str]
) -> None:
    point = _accepted(command)
    told = _act(command, people["reviewer"], "replace", point, "--reason", "failed in service")
    assert told.code == 0, told.err
    shown = json.loads(command("step", "next", point, "--json").out)
    assert (1, "in work") == (shown["number"], shown["state"])
    told = _act(command, people["planner"], "withdraw", point, "--reason", "not wanted any more")
    assert told.code == 0, told.err
    rows = json.loads(command("plan", "show", "--json").out)
    assert "withdrawn" == next(row["state"] for row in rows if row["point"] == point)


def test_a_released_plan_is_revised_with_a_reason(
    demo: Path, command: Command, people: dict[str, str], tmp_path: Path
) -> None:
    planner, folder = people["planner"], tmp_path / "plan"
    shutil.copytree(SMALL_JOB / "plan", folder)
    criteria = folder / "criteria.toml"
    text = criteria.read_text(encoding="utf-8").replace("coverage = 2", "coverage = 2.5")
    criteria.write_text(text, encoding="utf-8")
    assert 4 == _act(command, planner, "plan", "load", str(folder)).code
    told = _act(command, planner, "plan", "load", str(folder), "--reason", "client asks for more")
    assert (0, True) == (told.code, "coverage: 2 → 2.5" in told.out), told.err
    assert told.out == command("plan", "changes").out
    assert 0 == _act(command, planner, "plan", "release").code
    point = _accepted(command)
    touched = {row["point"]: row["touched"] for row in json.loads(_shown(command))}
    assert "coverage: 2 → 2.5" in touched[point][0]
    told = _act(command, people["reviewer"], "plan", "seen", point, "--remark", "still passes")
    assert told.code == 0, told.err
    assert {row["point"]: row["touched"] for row in json.loads(_shown(command))}[point] == []


def _shown(command: Command) -> str:
    return command("plan", "show", "--json").out


def test_stock_is_quarantined_freed_and_scrapped(
    demo: Path, command: Command, people: dict[str, str]
) -> None:
    lot = json.loads(command("stock", "list", "--json").out)["lots"][0]["lot"]
    told = _act(command, people["technician"], "stock", "quarantine", lot, "--reason", "recalled")
    assert told.code == 0, told.err
    (row,) = json.loads(command("stock", "list", "--json").out)["standing"]
    assert (lot, "quarantined", "recalled") == (row["label"], row["standing"], row["reason"])
    assert "recalled" in command("stock", "list").out
    assert 4 == _act(command, people["technician"], "stock", "free", lot, "--reason", "ok").code
    assert 0 == _act(command, people["planner"], "stock", "free", lot, "--reason", "ok").code
    told = _act(command, people["planner"], "stock", "scrap", lot, "--reason", "too old")
    assert (0, True) == (told.code, "gauges taken off the shelf" in told.err), told.err
