"""`gaugelog --help` stays light: heavy libraries wait until a command needs them."""

from __future__ import annotations

import json
import subprocess
import sys
from typing import Any

import pytest
import typer

from gaugelog.commands.application import application

HEAVY = [
    "sqlmodel",
    "sqlalchemy",
    "textual",
    "weasyprint",
    "pyhanko",
    "numpy",
    "pint",
    "pydantic",
    "cryptography",
    "uncertainties",
]


def test_the_command_tree_loads_no_heavy_library() -> None:
    code = (
        "import json, sys\n"
        "from gaugelog.commands.application import application\n"
        "application()\n"
        f"print(json.dumps([name for name in {HEAVY!r} if name in sys.modules]))\n"
    )
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    assert json.loads(done.stdout) == []


def _help_of(words: list[str] | None, capsys: pytest.CaptureFixture[str]) -> str:
    application(words)(args=["--help"], prog_name="gaugelog", standalone_mode=False)
    return capsys.readouterr().out


def test_the_help_is_the_same_when_only_what_is_called_is_there_in_full(
    capsys: pytest.CaptureFixture[str],
) -> None:
    assert _help_of(None, capsys) == _help_of(["--help"], capsys)


def _parameters(command: Any) -> list[str]:
    """Names of a command's parameters, or of a group's commands and theirs."""
    commands = getattr(command, "commands", {}).values()
    below = [name for each in commands for name in _parameters(each)]
    return [*(parameter.name for parameter in command.params), *below]


def test_a_command_that_is_called_is_there_in_full() -> None:
    whole: Any = typer.main.get_command(application())
    for words in (["step", "next"], ["record"], ["--logbook", "plan", "journal", "check"]):
        some: Any = typer.main.get_command(application(words))
        for name in set(words) & set(whole.commands):
            assert _parameters(whole.commands[name]) == _parameters(some.commands[name])
