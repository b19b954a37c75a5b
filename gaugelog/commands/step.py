"""`gaugelog step`: what comes next at a point, do it, skip it."""

from __future__ import annotations

from typing import TYPE_CHECKING, Annotated

import typer

from gaugelog.commands.calc.engine import parse_pairs
from gaugelog.commands.passphrases import Secrets
from gaugelog.commands.session import As, At, Json, SecretFd, open_logbook, unlock
from gaugelog.commands.talk import as_json, put, put_json, put_table, say
from gaugelog.errors import Fault, Faulty

if TYPE_CHECKING:
    from gaugelog.ledger.routes import StepInput
    from gaugelog.rules.progress import NextStep
    from gaugelog.work.steps import StepOutcome

group = typer.Typer(help="Steps: what comes next, do it, skip it.")

Point = Annotated[str, typer.Argument(help="Label of the point.")]


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
        put_json(as_json(found)) if json else _tell_step(found)
        return
    rows = steps.worklist(logbook)
    if json:
        put_json([as_json(row) for row in rows])
        return
    put_table(
        "Worklist",
        ["point", "zone", "state", "next step", "sent back, blocked by"],
        [
            [row.point, row.zone, row.state, row.title, " ".join([*row.sent_back, *row.blocks])]
            for row in rows
        ],
        empty="No plan is released. Try: gaugelog plan release",
    )


def _tell_step(found: NextStep) -> None:
    put(f"{found.point}, zone {found.zone}: {found.state}")
    put(*(line for told in found.sent_back for line in _wrapped(told, "SENT BACK: ")))
    if found.step is None:
        put(*found.blocks)
        if found.title != "none":
            put(f"Next: gaugelog submit {found.point}")
        return
    step = found.step
    hold = ", a HOLD: a second person decides" if step.hold else ""
    put(f"Step {found.number} of {found.count}{hold}: {step.title} [{step.id}]", "")
    put(*_wrapped(step.instruction))
    for caution in step.cautions:
        put(*_wrapped(caution, "CAUTION: "))
    if found.facts:
        put("", "From the plan:", *(line for fact in found.facts for line in _wrapped(fact)))
    if step.inputs:
        put("", "To enter:", *(_input_line(item) for item in step.inputs))
    put(*(f"  time: {window.sentence}" for window in found.windows if window.open))
    put("", *(f"BLOCKED: {block}" for block in found.blocks))
    put(*([] if found.blocks else [f"Next: {_command(found)}"]), *_ways_back(found))


def _ways_back(found: NextStep) -> list[str]:
    """Where a window is over, the step to go back to."""
    if found.step is None:
        return []
    pairs = zip(found.step.windows, found.windows, strict=False)
    return [
        f"Next: gaugelog step redo {found.point} {planned.after} --reason WHY"
        for planned, window in pairs
        if not window.open and planned.bound == "within"
    ]


def _wrapped(text: str, lead: str = "") -> list[str]:
    import textwrap

    indent = " " * (len(text) - len(text.lstrip()) + 2)
    return textwrap.wrap(
        lead + text.strip(), 78, initial_indent=indent, subsequent_indent=f"{indent}  "
    )


def _input_line(item: StepInput) -> str:
    unit = f", in {item.unit}" if item.unit else ""
    left_out = "" if item.required else ", may be left out"
    return f"  {item.name} = {item.prompt}{unit}{left_out}"


def _command(found: NextStep) -> str:
    names = " ".join(f"{item.name}=…" for item in found.step.inputs) if found.step else ""
    again = " --reason WHY" if found.again else ""
    return " ".join(f"gaugelog step do {found.point} {names}{again}".split())


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
    _tell_outcome(outcome)
    _tell_what_follows(steps.next_step(logbook, point), outcome)
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
        _tell_step(found)
    return {
        item.name: typer.prompt(f"{item.prompt}{f' ({item.unit})' if item.unit else ''}", err=True)
        for item in missing
    }


def _tell_outcome(outcome: StepOutcome) -> None:
    for shown in outcome.readings:
        reading = shown.reading
        put(f"{reading.check} {reading.stage} {reading.typed}: {reading.verdict.word.upper()}")
        put(*(f"  {line}" for line in shown.explained))
    say(*outcome.lines)


def _tell_what_follows(found: NextStep, outcome: StepOutcome) -> None:
    if not outcome.settled:
        return
    if found.step is None:
        say(f"Next: {found.title} of {found.point}: gaugelog submit {found.point}")
        return
    hold = ", a hold for a second person" if found.step.hold else ""
    say(f"Next, {found.number} of {found.count}{hold}: {found.step.title}")


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
