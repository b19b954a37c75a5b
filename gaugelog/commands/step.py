"""`gaugelog step`: what comes next at a point, do it, skip it."""

from __future__ import annotations

from typing import TYPE_CHECKING, Annotated

import typer

from gaugelog.commands.calc.engine import parse_pairs
from gaugelog.commands.passphrases import Secrets
from gaugelog.commands.session import As, At, Json, Point, SecretFd, open_logbook, unlock
from gaugelog.commands.steptext import prompt_for, tell_outcome, tell_step, tell_what_follows
from gaugelog.commands.talk import as_json, ask, put_json, put_table, say
from gaugelog.commands.walk import walk
from gaugelog.errors import Fault, Faulty

if TYPE_CHECKING:
    from gaugelog.rules.progress import NextStep

group = typer.Typer(help="Steps: what comes next, do it, walk on, go back, skip, note.")
group.command()(walk)


@group.command("next")
def next_(
    ctx: typer.Context,
    point: Annotated[str, typer.Argument(help="Label of a point; left out: all points.")] = "",
    json: Json = False,
) -> None:
    """Show the next step: instruction, cautions, what to enter, and what blocks it."""
    from gaugelog.work import steps

    logbook = open_logbook(ctx)
    if point:
        found = steps.next_step(logbook, point)
        put_json(as_json(found)) if json else tell_step(found)
        return
    rows = steps.worklist(logbook)
    if json:
        put_json([as_json(row) for row in rows])
        return
    put_table(
        "Worklist",
        ["point", "zone", "state", "next step", "read first, blocked by"],
        [
            [row.point, row.zone, row.state, row.title, " ".join([*row.sent_back, *row.blocks])]
            for row in rows
        ],
        empty="No plan is loaded. Next: gaugelog plan load FOLDER",
    )


@group.command()
def do(
    ctx: typer.Context,
    point: Point,
    pairs: Annotated[
        list[str] | None,
        typer.Argument(metavar="NAME=VALUE…", help='What to enter: resistance="350.4 ohm".'),
    ] = None,
    note: Annotated[str, typer.Option(help="A remark kept with the step.")] = "",
    reason: Annotated[
        str,
        typer.Option(help="Why a reading is taken again, or why --at lies before an earlier step."),
    ] = "",
    refuse: Annotated[
        str | None, typer.Option(help="At a hold: refuse with this reason instead of releasing.")
    ] = None,
    at: At = "",
    as_: As = "",
    secret_fd: SecretFd = None,
) -> None:
    """Do the next step of a point; at a hold step, decide it as the second person.

    Inputs left out are asked for when a person sits at the terminal. A reading that fails is
    kept, and the step stays open until it is measured again with a reason.
    """
    from gaugelog.work import steps

    logbook = open_logbook(ctx)
    found = steps.next_step(logbook, point)
    typed = {**parse_pairs(pairs or [])}
    if not found.blocks:
        typed.update(_ask_missing(found, typed))
    if refuse is not None and not refuse.strip():
        raise Faulty([Fault("--refuse", "is empty.", "Say why the hold is refused.")])
    steps.rehearse(logbook, point=point, typed=typed, at=at, reason=reason)
    signer = unlock(logbook, as_, Secrets(secret_fd), purpose=_purpose(found))
    outcome = steps.do(
        logbook,
        signer,
        point=point,
        typed=typed,
        note=note,
        reason=reason,
        refuse=refuse or "",
        at=at,
    )
    tell_outcome(outcome)
    tell_what_follows(steps.next_step(logbook, point), outcome)
    raise typer.Exit(int(outcome.exit_code))


def _purpose(found: NextStep) -> str:
    if found.step is None:
        return ""
    return f"sign the hold “{found.step.title}”" if found.step.hold else ""


def _ask_missing(found: NextStep, typed: dict[str, str]) -> dict[str, str]:
    import sys

    if found.step is None or not sys.stdin.isatty():
        return {}
    missing = [item for item in found.step.inputs if item.name not in typed and item.required]
    if missing:
        tell_step(found)
    return {item.name: ask(prompt_for(item), needed=True) for item in missing}


@group.command()
def redo(
    ctx: typer.Context,
    point: Point,
    step: Annotated[str, typer.Argument(help="Id of the step to go back to, as in brackets.")],
    reason: Annotated[str, typer.Option(help="Why; kept in the record.")],
    as_: As = "",
    secret_fd: SecretFd = None,
) -> None:
    """Go back to an earlier step: it and those after it are done again."""
    from gaugelog.work import steps

    logbook = open_logbook(ctx)
    signer = unlock(logbook, as_, Secrets(secret_fd))
    say(*steps.redo(logbook, signer, point=point, step=step, reason=reason).lines)


@group.command()
def note(
    ctx: typer.Context,
    point: Point,
    text: Annotated[str, typer.Argument(help="What was found, or why the step stays open.")],
    as_: As = "",
    secret_fd: SecretFd = None,
) -> None:
    """Leave a note at the open step; it is told there until the step is done, and in the record."""
    from gaugelog.work.noting import leave_note

    logbook = open_logbook(ctx)
    signer = unlock(logbook, as_, Secrets(secret_fd))
    say(*leave_note(logbook, signer, point=point, note=text).lines)


@group.command()
def skip(
    ctx: typer.Context,
    point: Point,
    reason: Annotated[str, typer.Option(help="Why; kept in the record.")],
    as_: As = "",
    secret_fd: SecretFd = None,
) -> None:
    """Skip the next step with a reason, where its skip rule lets you."""
    from gaugelog.work import steps

    logbook = open_logbook(ctx)
    signer = unlock(logbook, as_, Secrets(secret_fd))
    outcome = steps.skip(logbook, signer, point=point, reason=reason)
    say(*outcome.lines)
