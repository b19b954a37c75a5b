"""`gaugelog --help` against a bare program with typer and rich of as many commands."""

from __future__ import annotations

import subprocess
import sys
from pathlib import Path

import pytest

from tests.bench.compare import compare

pytestmark = [pytest.mark.bench, pytest.mark.xdist_group("bench")]

BARE = '''
import typer
from rich.console import Console

app = typer.Typer(help="A bare program.", rich_markup_mode="markdown", no_args_is_help=True)


def a_command(name: str = typer.Argument(help="A name."), loud: bool = typer.Option(False)) -> None:
    """Say something."""
    Console().print(name)


for number in range(12):
    app.command(f"command-{number}")(a_command)
app()
'''


def _timed(*command: str) -> None:
    subprocess.run(command, capture_output=True, check=True)


def test_help_takes_at_most_half_as_long_again_as_a_bare_program(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    bare = tmp_path / "bare.py"
    bare.write_text(BARE, encoding="utf-8")
    program = str(Path(sys.executable).with_name("gaugelog"))
    found = compare(
        lambda: _timed(program, "--help"),
        lambda: _timed(sys.executable, str(bare), "--help"),
        repeats=15,
    )
    with capsys.disabled():
        print("\n" + found.line("gaugelog --help"))
    assert found.ratio <= 1.5
