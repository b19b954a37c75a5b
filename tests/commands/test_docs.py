"""What the documents say is so: every command has help, the README's commands and codes exist."""

from __future__ import annotations

import re
import shlex
from pathlib import Path
from typing import Any

import pytest
import typer.main

from gaugelog.commands.application import application
from gaugelog.commands.examples import EXAMPLES, MEANING, epilog_for
from gaugelog.errors import ExitCode
from tests.commands.conftest import Command

ROOT = Path(__file__).parents[2]
README = (ROOT / "README.md").read_text(encoding="utf-8")


def _commands(group: Any, path: tuple[str, ...] = ()) -> list[tuple[tuple[str, ...], Any]]:
    found = []
    for name, command in getattr(group, "commands", {}).items():
        found.append(((*path, name), command))
        found.extend(_commands(command, (*path, name)))
    return found


COMMANDS = _commands(typer.main.get_command(application()))


@pytest.mark.parametrize(
    ("path", "command"), COMMANDS, ids=[" ".join(path) for path, _ in COMMANDS]
)
def test_every_command_and_option_has_help(path: tuple[str, ...], command: Any) -> None:
    assert command.help, path
    for option in command.params:
        assert option.name == "help" or option.help, (path, option.name)


@pytest.mark.parametrize(
    ("path", "command"),
    [each for each in COMMANDS if not hasattr(each[1], "commands")],
    ids=[" ".join(path) for path, each in COMMANDS if not hasattr(each, "commands")],
)
def test_every_command_has_examples_that_can_be_typed(path: tuple[str, ...], command: Any) -> None:
    examples = EXAMPLES[" ".join(path)]
    assert examples
    for line in examples:
        words = shlex.split(line)
        assert ["gaugelog", *path] == words[: len(path) + 1], line
        command.make_context(" ".join(path), words[len(path) + 1 :])  # raises where it can't be


def test_no_example_is_of_a_command_that_is_gone() -> None:
    assert set(EXAMPLES) == {" ".join(path) for path, each in COMMANDS if each.epilog}


def test_every_exit_code_has_a_meaning_under_each_help() -> None:
    assert list(ExitCode) == list(MEANING)
    told = epilog_for("step do")
    assert "130 stopped with Ctrl-C" in told
    assert "Units are typed with the figure" in told
    assert "Units" not in epilog_for("plan show")


def test_every_command_the_readme_types_exists() -> None:
    known = {path for path, _ in COMMANDS}
    typed = re.findall(r"^    gaugelog (.+?)(?:\s+#.*)?$", README, re.MULTILINE)
    assert len(typed) > 10
    for line in typed:
        words = [word for word in shlex.split(line) if not word.startswith("-")]
        assert any(tuple(words[:length]) in known for length in (1, 2)), line


def test_every_group_is_in_the_readme() -> None:
    for path, _ in COMMANDS:
        assert path[0] in README, path


def test_exit_codes_stand_in_the_readme() -> None:
    for code in ExitCode:
        assert re.search(rf"^\| {int(code)} \|", README, re.MULTILINE), code


def test_help_is_shown_for_no_arguments(command: Command) -> None:
    told = command()
    assert "Usage" in told.out + told.err


def test_a_slip_in_a_commands_name_is_told(command: Command) -> None:
    told = command("plam")
    assert told.code == 2
    assert "plam" in told.err


def test_the_version_is_told(command: Command) -> None:
    assert command("--version").out.startswith("gaugelog ")


def test_the_readmes_job_runs_as_it_is_written(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch, command: Command
) -> None:
    monkeypatch.setenv("GAUGELOG_KEYS", str(tmp_path / "keys"))
    (tmp_path / "demo_project").symlink_to(ROOT / "demo_project")
    monkeypatch.chdir(tmp_path)
    job = README[README.index("## A job from start") : README.index("and so on, step by step")]
    lines = re.findall(r"^    gaugelog (.+?)(?:\s{2,}#.*)?$", job, re.MULTILINE)
    assert len(lines) == 15
    for line in lines:
        words = shlex.split(line)
        asks = "--as" in words or words[0] == "start"
        told = command(*words, secrets="long enough\nlong enough\n" if asks else "")
        assert told.code == 0, (line, told.err)
        if words[0] == "start":
            monkeypatch.chdir(tmp_path / "bridge")
