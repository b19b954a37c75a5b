"""`gaugelog plan`: load the planner's files, check the plan, look at it, release and revise it."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING, Annotated, Any

import typer

from gaugelog.commands.passphrases import Secrets
from gaugelog.commands.session import As, Json, Point, SecretFd, open_logbook, unlock
from gaugelog.commands.talk import as_json, put, put_json, put_prose, put_table, say
from gaugelog.commands.waiting import bar
from gaugelog.errors import ExitCode
from gaugelog.visible import counted
from gaugelog.work.meanings import RELEASE_MEANING, SEEN_MEANING

if TYPE_CHECKING:
    from gaugelog.ledger.revisions import PlanRevised
    from gaugelog.rules.fit import PlanFinding

group = typer.Typer(help="The plan: load, check, show, release.")

_SIGNS = {"ok": "✓", "warning": "!", "refusal": "✗"}
_MARKS = {"added": "+", "changed": "~", "dropped": "-"}


@group.command()
def load(
    ctx: typer.Context,
    folder: Annotated[
        Path,
        typer.Argument(
            help="Folder with campaign.toml, criteria.toml, and grids and circuits, .csv or .xlsx."
        ),
    ],
    reason: Annotated[
        str, typer.Option(help="Why a plan that is released is revised; needed only then.")
    ] = "",
    as_: As = "",
    secret_fd: SecretFd = None,
) -> None:
    """Load a plan as a draft; it replaces an earlier draft.

    Every fault of every file is named at once; nothing is stored unless all is right. With
    --reason, a plan that is released gets a draft revision, and what it changes is told; work
    goes on under the released one until the revision is released.
    """
    from gaugelog.work import plan

    logbook = open_logbook(ctx)
    with bar("Reading the plan"):
        facts = plan.understand(logbook, folder)
    signer = unlock(logbook, as_, Secrets(secret_fd))
    if reason and plan.is_released(logbook):
        from gaugelog.work import revising

        _tell_changes(revising.revise(logbook, signer, facts, reason=reason))
        say("Next: gaugelog plan check")
        return
    with bar("Keeping the plan") as progress:
        loaded = plan.load(logbook, signer, facts, progress)
    say(
        f"Draft revision {loaded.revision} loaded: {counted(len(loaded.points), 'point')}, "
        f"{counted(len(loaded.circuits), 'circuit')}.",
        "Next: gaugelog plan check",
    )


@group.command()
def check(ctx: typer.Context, json: Json = False) -> None:
    """Check the plan: does everything fit? Each finding comes with its figure and source.

    Exit code 1 when something is refused.
    """
    from gaugelog.work import plan

    logbook = open_logbook(ctx)
    with bar("Checking the plan") as progress:
        findings = plan.check(logbook, progress)
    if json:
        put_json([as_json(finding) for finding in findings])
    else:
        _tell_findings(findings)
    if any(finding.level == "refusal" for finding in findings):
        raise typer.Exit(int(ExitCode.TROUBLE))


def _tell_findings(findings: list[PlanFinding]) -> None:
    for finding in findings:
        figure = f" [{finding.figure}]" if finding.figure else ""
        source = f" ({finding.source})" if finding.source else ""
        put_prose(f"{_SIGNS[finding.level]} {finding.subject}: {finding.what}{figure}{source}")
    levels = [finding.level for finding in findings]
    put(
        "",
        f"{counted(levels.count('refusal'), 'refusal')}, "
        f"{counted(levels.count('warning'), 'warning')}, "
        f"{levels.count('ok')} ok.",
    )


def _tell_changes(revised: PlanRevised) -> None:
    put(f"Plan revision {revised.revision}: {revised.reason}")
    for change in revised.changes:
        put(f"{_MARKS[change.what]} {change.subject} {change.label} {change.what}")
        put(*(f"    {line}" for line in change.lines))


@group.command()
def changes(ctx: typer.Context, json: Json = False) -> None:
    """Tell what the draft of a revision changes; without one, what the newest revision did."""
    from gaugelog.work import revising

    revised = revising.changes(open_logbook(ctx))
    if not json:
        _tell_changes(revised)
        return
    told = {"revision": revised.revision, "reason": revised.reason}
    put_json({**told, "changes": as_json(revised.changes)})


@group.command()
def seen(
    ctx: typer.Context,
    point: Point,
    remark: Annotated[str, typer.Option(help="What you found; kept in the record's story.")],
    redo_from: Annotated[
        str, typer.Option(help="Step to go on from; left out: nothing is done again.")
    ] = "",
    as_: As = "",
    secret_fd: SecretFd = None,
) -> None:
    """Say, as a reviewer, that you looked at what a revision changed where work was done."""
    from gaugelog.work import revising

    logbook = open_logbook(ctx)
    signer = unlock(logbook, as_, Secrets(secret_fd), purpose=f"let {point} go on")
    revising.see(
        logbook, signer, point=point, remark=remark, meaning=SEEN_MEANING, redo_from=redo_from
    )
    say(f"{point} may go on. Next: gaugelog step next {point}")


@group.command()
def show(ctx: typer.Context, json: Json = False) -> None:
    """Show the plan, by route: each point with its place, lot, circuit, channel and state."""
    from gaugelog.work import plan

    rows = plan.overview(open_logbook(ctx))
    if json:
        put_json([as_json(row) for row in rows])
        return
    if not rows:
        say("No plan is loaded. Next: gaugelog plan load FOLDER")
    for route in dict.fromkeys(row.route for row in rows):
        told = [_cells(row) for row in rows if row.route == route]
        put_table(f"Points by route {route}", _COLUMNS, told, empty="")


_COLUMNS = ("point", "zone", "lot", "circuit", "channel", ">permitted error", "state", "touched by")


def _cells(row: Any) -> list[str]:
    return [
        row.point,
        row.zone,
        row.lot,
        row.circuit,
        row.channel,
        row.permitted_error,
        row.state,
        "; ".join(row.touched),
    ]


@group.command()
def release(ctx: typer.Context, as_: As = "", secret_fd: SecretFd = None) -> None:
    """Release the plan: it and its criteria are frozen, and work may begin. A sign-off."""
    from gaugelog.work import plan

    logbook = open_logbook(ctx)
    signer = unlock(logbook, as_, Secrets(secret_fd), purpose="release the plan")
    with bar("Checking the plan once more") as progress:
        released = plan.release(logbook, signer, meaning=RELEASE_MEANING, progress=progress)
    say(f"Revision {released.revision} is released. Next: gaugelog step next")
