"""How commands talk: data to stdout, talk to stderr, foreign text never acts on the terminal."""

from __future__ import annotations

import json
import os
import sys
import traceback
from collections.abc import Callable, Iterable, Sequence
from contextlib import suppress
from typing import TYPE_CHECKING, Any

from gaugelog.commands.folding import folded
from gaugelog.errors import ExitCode, Fault, Faulty, GaugelogError
from gaugelog.visible import visible

if TYPE_CHECKING:
    from rich.console import Console
    from typer.exceptions import TyperException


def console(*, stderr: bool = False) -> Console:
    """A rich console that reads no markup, no emoji names, and wraps no data to a pipe."""
    from rich.console import Console

    stream = sys.stderr if stderr else sys.stdout
    width = None if stream.isatty() else 160
    return Console(
        stderr=stderr, markup=False, emoji=False, highlight=False, soft_wrap=False, width=width
    )


def be_heard() -> None:
    """Give a process that was started without stdout or stderr somewhere to write to."""
    # They stay open until the process ends, as the ones they stand for would.
    if sys.stdout is None:
        sys.stdout = open(os.devnull, "w", encoding="utf-8")  # noqa: SIM115, PTH123
    if sys.stderr is None:
        sys.stderr = open(os.devnull, "w", encoding="utf-8")  # noqa: SIM115, PTH123


_LONGEST_TALK = 4000


def say(*lines: str) -> None:
    """Talk to the person, on stderr, folded to the terminal; what can't be told stops no work."""
    for line in lines:
        with suppress(OSError):
            for part in folded(visible(_brief(line), keep_newlines=True), sys.stderr):
                sys.stderr.write(part + "\n")


def _brief(line: str) -> str:
    """The talk with its middle left out where somebody typed what no screen can hold."""
    if len(line) <= _LONGEST_TALK:
        return line
    kept = _LONGEST_TALK // 2
    return f"{line[:kept]} … {len(line) - 2 * kept} characters left out … {line[-kept:]}"


def put(*lines: str) -> None:
    """Give data, on stdout."""
    for line in lines:
        sys.stdout.write(visible(line, keep_newlines=True) + "\n")


def ask(prompt: str, *, default: str = "", needed: bool = False) -> str:
    """What a person answers at the terminal, told on stderr; Enter alone takes `default`.

    With `needed` an empty answer is asked for again. Raises typer.Abort when nobody is left to
    ask, or at Ctrl-C.
    """
    import typer

    shown = bool(default)
    while True:
        answer = typer.prompt(visible(prompt), default=default, show_default=shown, err=True)
        if answer.strip() or not needed:
            return str(answer).strip()


def put_prose(*lines: str) -> None:
    """Give sentences as data, on stdout, folded between words to fit the terminal."""
    for line in lines:
        put(*folded(visible(line, keep_newlines=True), sys.stdout))


def put_json(value: object) -> None:
    """Give data as JSON on stdout: two-space indent, unseen characters escaped."""
    text = json.dumps(value, ensure_ascii=False, indent=2, default=str)
    sys.stdout.write(_escape_unseen(text) + "\n")


def _escape_unseen(text: str) -> str:
    # JSON has its own way to show a control or bidi character, and it stays data.
    return "".join(
        char if char == "\n" or visible(char) == char else json.dumps(char)[1:-1] for char in text
    )


def put_table(
    title: str, columns: Sequence[str], rows: Iterable[Sequence[str]], *, empty: str
) -> None:
    """Give a table on stdout that fits the terminal (see `tables.draw`).

    With no rows, `empty` is told on stderr instead: stdout stays free of talk.
    """
    from gaugelog.commands.tables import draw

    body = [[visible(cell, keep_newlines=True) for cell in row] for row in rows]
    if not body:
        say(empty)
        return
    draw(title, columns, body, console())


def tell_error(error: GaugelogError) -> None:
    """Say what stopped the program and what to do, every fault on its own line."""
    if isinstance(error, Faulty):
        tell_faults(error.faults)
    say(f"gaugelog: {error.message}")
    if error.remedy:
        say(f"  {error.remedy}")


def tell_faults(faults: Iterable[Fault]) -> None:
    """Name each fault: its place, what is wrong, and what to do on the next line."""
    for fault in faults:
        say(f"  ✗ {fault.where}: {fault.what}")
        if fault.remedy:
            say(f"      → {fault.remedy}")


def tell_usage(error: TyperException) -> None:
    """Say why a command line can't be understood; one without any word was shown the help."""
    message = error.format_message()
    if not message:
        return
    context = getattr(error, "ctx", None)
    if context is not None:
        say(context.get_usage())
    say(f"gaugelog: {message}")
    if context is not None:
        say(f"  See `{context.command_path} --help`.")


def tell_unexpected(error: Exception, *, debug: bool) -> int:
    """Own up to a defect; the traceback only with `--debug`. Returns the exit code."""
    if debug:
        sys.stderr.write("".join(traceback.format_exception(error)))
    kind = type(error).__name__
    say(f"gaugelog: this is a defect of Gaugelog ({kind}: {error}); nothing half-done was stored.")
    if not debug:
        say("  Run the same command with `gaugelog --debug …` and report what it prints.")
    return int(ExitCode.UNEXPECTED)


def waiting() -> Callable[[float], None]:
    """A callback that says once that another program is writing, and that we wait."""
    told: list[bool] = []

    def on_wait(_seconds: float) -> None:
        if not told:
            say("Waiting: another program is writing to this logbook …")
            told.append(True)

    return on_wait


def as_json(value: Any) -> Any:
    """A pydantic model, a dataclass, or a collection of them, as plain JSON data."""
    from dataclasses import fields, is_dataclass

    if hasattr(value, "model_dump"):
        return value.model_dump(mode="json")
    if is_dataclass(value) and not isinstance(value, type):
        return {item.name: as_json(getattr(value, item.name)) for item in fields(value)}
    if isinstance(value, (list, tuple)):
        return [as_json(item) for item in value]
    return value
