"""The command tree: every group under its name; heavy libraries wait until a command runs."""

from __future__ import annotations

from collections.abc import Callable
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


def application() -> typer.Typer:
    """The whole command line as one Typer application."""
    app = typer.Typer(
        name="gaugelog",
        help=_HELP,
        invoke_without_command=True,
        pretty_exceptions_enable=False,
        rich_markup_mode="markdown",
        context_settings={"help_option_names": ["-h", "--help"]},
    )
    app.callback()(_root)
    app.command("start", rich_help_panel=SET_UP)(start.start)
    for name, group in _GROUPS.items():
        app.add_typer(group, name=name, rich_help_panel=_PANELS[name])
    for name, command in _AT_WORK.items():
        app.command(name, rich_help_panel=WORK)(command)
    for command in (calc.calc, doctor.doctor, demo.demo):
        app.command(command.__name__, rich_help_panel=LOOK)(command)
    for command in (backup.backup, backup.restore):
        app.command(command.__name__, rich_help_panel=SET_UP)(command)
    return app


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
_AT_WORK: dict[str, Callable[..., None]] = {
    "install": screen.install,
    "review": screen.review,
    "diagnose": diagnose.diagnose,
    "submit": review.submit,
    "accept": review.accept,
    "return": review.give_back,
    "amend": review.amend,
    "replace": disposition.replace,
    "withdraw": disposition.withdraw,
    "record": record.record,
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
