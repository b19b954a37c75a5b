"""The command tree: every group under its name; heavy libraries wait until a command runs."""

from __future__ import annotations

from pathlib import Path
from typing import Annotated

import typer

from gaugelog import __version__
from gaugelog.commands import (
    calc,
    demo,
    doctor,
    instrument,
    journal,
    person,
    plan,
    record,
    review,
    start,
    step,
    stock,
)
from gaugelog.commands.session import Place

_HELP = """Plan strain-gauge installations, lead them step by step, and keep signed records.

A logbook is a folder; commands find it by walking up from the current folder. Data goes to
stdout, talk to stderr. Try `gaugelog demo` first.
"""


def application() -> typer.Typer:
    """The whole command line as one Typer application."""
    app = typer.Typer(
        name="gaugelog",
        help=_HELP,
        no_args_is_help=True,
        pretty_exceptions_enable=False,
        context_settings={"help_option_names": ["-h", "--help"]},
    )
    app.callback()(_root)
    app.command("start")(start.start)
    for name, group in _GROUPS.items():
        app.add_typer(group, name=name)
    for command in (review.submit, review.accept):
        app.command(command.__name__)(command)
    app.command("return")(review.give_back)
    app.command("record")(record.record)
    app.command("calc")(calc.calc)
    app.command("doctor")(doctor.doctor)
    app.command("demo")(demo.demo)
    return app


_GROUPS: dict[str, typer.Typer] = {
    "person": person.group,
    "stock": stock.group,
    "instrument": instrument.group,
    "plan": plan.group,
    "step": step.group,
    "journal": journal.group,
}


def _version(asked: bool) -> None:
    if asked:
        typer.echo(f"gaugelog {__version__}")
        raise typer.Exit


def _root(
    ctx: typer.Context,
    logbook: Annotated[
        Path | None,
        typer.Option(
            envvar="GAUGELOG_LOGBOOK",
            help="The logbook's folder; found from the current folder when left out.",
        ),
    ] = None,
    debug: Annotated[
        bool, typer.Option("--debug", help="Show the traceback of an unexpected error.")
    ] = False,
    version: Annotated[bool, typer.Option("--version", is_eager=True, callback=_version)] = False,
) -> None:
    ctx.obj = Place(logbook)
