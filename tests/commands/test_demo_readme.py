"""The commands that the demo's README names do what it says, with the files beside it."""

from __future__ import annotations

import re
import shlex
import shutil
from pathlib import Path

import pytest

from gaugelog.commands import session
from tests.commands.conftest import Command

DEMO = Path(__file__).parents[2] / "demo_project"
WORD = "long enough"
SIGNED = {"stock receive", "instrument add", "plan load", "plan release"}


def _named() -> list[str]:
    """The commands that the README begins with, in their order; the demo plays itself."""
    readme = (DEMO / "README.md").read_text(encoding="utf-8")
    text = " ".join(readme[: readme.index("## What holds")].split())
    return [line for line in re.findall(r"`gaugelog ([^`]+)`", text) if line != "demo"]


def test_they_load_check_and_release_the_plan(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch, command: Command
) -> None:
    monkeypatch.setenv(session.KEYS_VARIABLE, str(tmp_path / "keys"))
    began = command(
        *("start", str(tmp_path / "job"), "--name", "Job", "--custodian", "p.lind"),
        *("--custodian-name", "Petra Lind", "--initials", "PL", "--role", "planner"),
        secrets=f"{WORD}\n",
    )
    assert began.code == 0, began.err
    monkeypatch.setenv("GAUGELOG_LOGBOOK", str(tmp_path / "job"))
    monkeypatch.chdir(shutil.copytree(DEMO, tmp_path / "files"))
    lines = _named()
    assert {" ".join(line.split()[:2]) for line in lines} == SIGNED | {"plan check"}
    for line in lines:
        words = shlex.split(line)
        signs = " ".join(words[:2]) in SIGNED
        told = command(
            *words, *(("--as", "p.lind") if signs else ()), secrets=f"{WORD}\n" if signs else ""
        )
        assert told.code == 0, (line, told.out + told.err)
    assert "DK-2" in command("plan", "show").out
