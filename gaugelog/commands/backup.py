"""`gaugelog backup` and `gaugelog restore`: a logbook in one file, and a logbook of it again."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING, Annotated

import typer

from gaugelog.commands.passphrases import Secrets
from gaugelog.commands.session import As, Json, SecretFd, keys_home, open_logbook, unlock_for
from gaugelog.commands.talk import put, put_json, say
from gaugelog.errors import ExitCode

if TYPE_CHECKING:
    from gaugelog.work.backup import BackedUp, Restored

_UNITS = (("MB", 1_000_000), ("kB", 1_000))


def backup(
    ctx: typer.Context,
    file: Annotated[Path, typer.Argument(help="The new backup, such as bridge-2026-12-01.zip.")],
    json: Json = False,
) -> None:
    """Back the logbook up to a new file, and print the head it goes up to.

    Others may go on working meanwhile. Holds logbook.toml, the database and the evidence, with
    their SHA-256; private keys are not in it. What is backed up is checked: exit code 1 when the
    journal is not sound.
    """
    from gaugelog.work.backup import backup as make

    logbook = open_logbook(ctx)
    done = make(logbook, file)
    if json:
        put_json(
            {
                "file": str(done.path),
                "sha256": done.digest,
                "bytes": done.size,
                "head": done.head.printed,
                "sound": done.report.ok,
            }
        )
    else:
        put(done.head.printed)
    _tell_backup(done, keys_home() / logbook.id)
    if not done.report.ok:
        raise typer.Exit(int(ExitCode.TROUBLE))


def _tell_backup(done: BackedUp, keys: Path) -> None:
    say(
        f"{done.path}: {done.files} files, {_sized(done.size)}. {done.report.summary}",
        *(f"  ✗ {each.where}: {each.what}" for each in done.report.troubles[:5]),
        f"Keep it, and the head above, away from this machine. The keys in {keys} are not in it: "
        "keep a copy of them apart.",
    )


def _sized(count: int) -> str:
    unit, factor = next(((u, f) for u, f in _UNITS if count >= f), ("bytes", 1))
    return f"{count / factor:.3g} {unit}"


def restore(
    ctx: typer.Context,
    file: Annotated[Path, typer.Argument(help="The backup.")],
    folder: Annotated[Path, typer.Argument(help="The logbook's folder; new or empty.")],
    reason: Annotated[str, typer.Option(help="Why; kept in the journal.")],
    head: Annotated[
        list[str] | None,
        typer.Option(
            help="A head that stands on paper, 137:ABC…, the newest there is; repeatable."
        ),
    ] = None,
    as_: As = "",
    secret_fd: SecretFd = None,
    json: Json = False,
) -> None:
    """Make a logbook of a backup, and name what is missing by the heads that stand on paper.

    The backup's sums and its journal are checked; then the first entry says that the logbook was
    restored, and what is missing, signed by who acts. Prints the new head.
    """
    from gaugelog.work.backup import opened
    from gaugelog.work.backup import restore as make

    with opened(file) as archive:
        signer = unlock_for(archive.settings["id"], as_, Secrets(secret_fd), purpose="restore")
        done = make(archive, folder, signer, reason=reason, printed=head or [])
    if json:
        put_json(
            {
                "folder": str(done.folder),
                "entries": done.entries,
                "head_at_backup": done.at_backup,
                "missing": done.missing.model_dump() if done.missing else None,
                "troubles": list(done.troubles),
                "head": done.head,
            }
        )
    else:
        put(done.head)
    _tell_restored(done, asked=bool(head))
    if done.troubles:
        raise typer.Exit(int(ExitCode.TROUBLE))


def _tell_restored(done: Restored, *, asked: bool) -> None:
    say(
        f"“{done.name}” is restored in {done.folder}: {done.entries} entries up to "
        f"{done.at_backup}, backed up {done.made}."
    )
    if done.missing is not None:
        are = "is" if done.missing.first == done.missing.last else "are"
        say(
            f"{done.missing} {are} not in this backup, as the printed head proves.".capitalize(),
            "  What was done then must be entered again, or done again.",
        )
    elif asked:
        say("No printed head proves anything missing.")
    else:
        say(
            "No head was given: what may be missing after the backup is not known.",
            "  Look at the newest record; restore anew with --head if it goes further.",
        )
    for trouble in done.troubles:
        say(f"  ✗ lost before the backup: {trouble}")
    say("The head above is that of the entry which says so. Work on in this folder only.")
