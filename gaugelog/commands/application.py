"""The command tree: every group under its name; heavy libraries wait until a command runs."""

from __future__ import annotations

import os
from collections.abc import Callable, Collection
from inspect import getdoc
from pathlib import Path
from typing import Annotated

import typer

from gaugelog import __version__
from gaugelog.commands import (
    backup,
    calc,
    demo,
    diagnose,
    disposition,
    doctor,
    instrument,
    journal,
    person,
    photo,
    plan,
    record,
    review,
    screen,
    start,
    step,
    stock,
    wiring,
)
from gaugelog.commands.examples import add_examples
from gaugelog.commands.session import Place

_HELP = """Plan strain-gauge installations, lead them step by step, and keep signed records.

A logbook is a folder; commands find it by walking up from the current folder. Data goes to
stdout, talk to stderr. Try `gaugelog demo` first.
"""


SET_UP, WORK, LOOK = "Set up", "Plan and work", "Look, check, compute"
_PANELS = {
    **dict.fromkeys(("person", "stock", "instrument"), SET_UP),
    **dict.fromkeys(("plan", "wiring", "step", "photo"), WORK),
    "journal": LOOK,
}


def application(words: Collection[str] | None = None) -> typer.Typer:
    """The command line as one Typer application.

    With the `words` of a command line, only commands among them are there in full, of the others
    name and help: looking at the options of all of them takes most of the time to start.
    """
    asked = None if words is None or _completing() else frozenset(words)
    app = typer.Typer(
        name="gaugelog",
        help=_HELP,
        invoke_without_command=True,
        pretty_exceptions_enable=False,
        rich_markup_mode="markdown",
        context_settings={"help_option_names": ["-h", "--help"]},
    )
    app.callback()(_root)
    for name, group in _GROUPS.items():
        whole = group if asked is None or name in asked else typer.Typer(help=group.info.help)
        app.add_typer(whole, name=name, rich_help_panel=_PANELS[name])
    for name, (panel, command) in _COMMANDS.items():
        called = command if asked is None or name in asked else _not_called
        app.command(name, rich_help_panel=panel, help=getdoc(command))(called)
    add_examples(app)
    return app


def _not_called() -> None:
    """Stand in for a command that the words don't name."""


def _completing() -> bool:
    return "_GAUGELOG_COMPLETE" in os.environ


_GROUPS: dict[str, typer.Typer] = {
    "person": person.group,
    "stock": stock.group,
    "instrument": instrument.group,
    "plan": plan.group,
    "wiring": wiring.group,
    "step": step.group,
    "photo": photo.group,
    "journal": journal.group,
}
_COMMANDS: dict[str, tuple[str, Callable[..., None]]] = {
    "start": (SET_UP, start.start),
    "backup": (SET_UP, backup.backup),
    "restore": (SET_UP, backup.restore),
    "install": (WORK, screen.install),
    "review": (WORK, screen.review),
    "diagnose": (WORK, diagnose.diagnose),
    "submit": (WORK, review.submit),
    "accept": (WORK, review.accept),
    "return": (WORK, review.give_back),
    "amend": (WORK, review.amend),
    "replace": (WORK, disposition.replace),
    "withdraw": (WORK, disposition.withdraw),
    "record": (WORK, record.record),
    "calc": (LOOK, calc.calc),
    "doctor": (LOOK, doctor.doctor),
    "demo": (LOOK, demo.demo),
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
    version: Annotated[
        bool, typer.Option("--version", is_eager=True, callback=_version, help="Tell the version.")
    ] = False,
) -> None:
    ctx.obj = Place(logbook)
    if ctx.invoked_subcommand is None:
        _alone(ctx, ctx.obj)


def _alone(ctx: typer.Context, place: Place) -> None:
    """`gaugelog` without a command: the full screen in a logbook, at a terminal; else the help."""
    if screen.at_a_terminal() and screen.is_logbook_here(place):
        screen.open_screen(place)
        return
    typer.echo(ctx.get_help())
    raise typer.Exit(2)
