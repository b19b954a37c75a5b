"""Start-up against bare programs: `--help` of as many commands, `step next` with the same query."""

from __future__ import annotations

import subprocess
import sys
from pathlib import Path

import pytest

from tests.bench.compare import compare
from tests.work.job import released_job

pytestmark = [pytest.mark.bench, pytest.mark.xdist_group("bench")]

WORKLIST = '''
import json
import sys

import typer
from rich.console import Console
from rich.table import Table
from sqlmodel import Field, Session, SQLModel, create_engine, select

app = typer.Typer()


class Point(SQLModel, table=True):
    id: str = Field(primary_key=True)
    label: str
    zone: str
    data: str


class Step(SQLModel, table=True):
    id: str = Field(primary_key=True)
    point: str
    step: str
    outcome: str


class Route(SQLModel, table=True):
    id: str = Field(primary_key=True)
    data: str


@app.command()
def worklist(file: str) -> None:
    """The points with their last step and the one after it."""
    table = Table("point", "zone", "next step")
    with Session(create_engine(f"sqlite:///{file}")) as session:
        route = json.loads(session.exec(select(Route)).first().data)
        steps = [each["title"] for each in route["steps"]]
        for point in session.exec(select(Point)).all():
            done = session.exec(select(Step).where(Step.point == point.id)).all()
            left = [*steps[len(done):], "none"]
            table.add_row(point.label, point.zone, left[0])
    Console().print(table)


app()
'''
BARE = '''
import typer
from rich.console import Console

app = typer.Typer(help="A bare program.", rich_markup_mode="markdown", no_args_is_help=True)


def a_command(name: str = typer.Argument(help="A name."), loud: bool = typer.Option(False)) -> None:
    """Say something."""
    Console().print(name)


for number in range(24):
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


def test_the_worklist_is_told_against_a_bare_program_with_the_same_libraries(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    job = released_job(tmp_path)
    job.walk(3)
    job.book.storage.close()
    bare = tmp_path / "bare.py"
    bare.write_text(WORKLIST, encoding="utf-8")
    program = str(Path(sys.executable).with_name("gaugelog"))
    found = compare(
        lambda: _timed(program, "--logbook", str(job.book.folder), "step", "next"),
        lambda: _timed(sys.executable, str(bare), str(job.book.folder / "logbook.db")),
        repeats=15,
    )
    with capsys.disabled():
        print("\n" + found.line("gaugelog step next"))
    # The issue sets no bound; this one keeps the start from growing heavy unnoticed.
    assert found.ratio <= 2.2
