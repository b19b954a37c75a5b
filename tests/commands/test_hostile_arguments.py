"""Every argument and option of every command given hostile text: shown as text, never a defect."""

from __future__ import annotations

from collections.abc import Iterator
from typing import Any

import pytest
import typer

from gaugelog.commands.application import application
from gaugelog.errors import ExitCode
from gaugelog.visible import visible
from tests.commands.desk import Desk

HOSTILE = {
    "escapes": "\x1b[31mred\x1b]8;;http://127.0.0.1:9/\x07link\x1b]8;;\x07\x1b]0;title\x07",
    "markup": "[red]x[/red][link=file:///etc/hostname]y[/link][/]:smile:",
    "bidi": "\u202eabc\u2066\u200f\u0007",
    "rest": "=1+1{{7*7}}{%raw%}<b>x</b>../../../etc/passwd%s$(id)`id`\U0001f600שלום",
    "long": "a" * 100_000,
}
STAYS_OUT = {"install", "review", "demo", "install-completion", "show-completion"}
"""The full screen, and the demo that takes long; each takes a label or a folder only."""

UNTOLD = {"help", "secret_fd"}


def _commands(command: Any, words: tuple[str, ...] = ()) -> Iterator[tuple[tuple[str, ...], Any]]:
    """Every command of the tree with the words that call it."""
    for name, each in getattr(command, "commands", {}).items():
        if name not in STAYS_OUT:
            yield from _commands(each, (*words, name))
    if not hasattr(command, "commands"):
        yield words, command


def _line(words: tuple[str, ...], command: Any, text: str) -> list[str]:
    """A command line with the hostile text for everything that takes a text or a path."""
    line = list(words)
    for parameter in command.params:
        if parameter.name in UNTOLD or getattr(parameter, "is_flag", False):
            continue
        value = "1" if parameter.bare_type is int else text
        if parameter.param_type_name == "option":
            line += [parameter.opts[0], value]
        else:
            line += [f"{text}={text}" if parameter.name == "pairs" else value]
    return line


COMMANDS = dict(_commands(typer.main.get_command(application())))


@pytest.mark.parametrize("kind", HOSTILE)
@pytest.mark.parametrize("words", COMMANDS, ids=" ".join)
def test_a_command_shows_hostile_arguments_as_text(
    desk: Desk, words: tuple[str, ...], kind: str
) -> None:
    told = desk.command(*_line(words, COMMANDS[words], HOSTILE[kind]))
    shown = told.out + told.err
    assert told.code in set(ExitCode) - {ExitCode.UNEXPECTED}, shown[:2000]
    assert shown == visible(shown, keep_newlines=True)
    assert "Traceback" not in shown
    assert len(shown) < 30_000


WRONG = (
    ("step", "next", "FB-1", "@"),
    ("@",),
    ("journal", "@"),
    ("step", "next", "--@"),
    ("journal", "show", "--last", "@"),
    ("--logbook", "@", "step", "next"),
)


@pytest.mark.parametrize("kind", HOSTILE)
@pytest.mark.parametrize("words", WRONG, ids=" ".join)
def test_a_command_line_that_is_none_is_told_as_text(
    desk: Desk, words: tuple[str, ...], kind: str
) -> None:
    told = desk.command(*(word.replace("@", HOSTILE[kind]) for word in words))
    assert told.code in {ExitCode.USAGE, ExitCode.STORAGE}
    assert told.err == visible(told.err, keep_newlines=True)
    assert "" == told.out
    assert len(told.err) < 30_000
