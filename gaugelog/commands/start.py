"""`gaugelog start`: a new logbook with its authority and its custodian."""

from __future__ import annotations

from pathlib import Path
from typing import Annotated

import typer

from gaugelog.commands.passphrases import Secrets
from gaugelog.commands.session import SecretFd, key_folder
from gaugelog.commands.talk import say


def start(
    folder: Annotated[Path, typer.Argument(help="The new logbook's folder; new or empty.")],
    name: Annotated[str, typer.Option(help="The logbook's name, as on records.")],
    custodian: Annotated[str, typer.Option(help="Id of the person who holds the authority.")],
    custodian_name: Annotated[str, typer.Option(help="The custodian's name.")],
    initials: Annotated[str, typer.Option(help="The custodian's initials.")],
    role: Annotated[
        list[str] | None, typer.Option(help="Further roles of the custodian; repeatable.")
    ] = None,
    authority: Annotated[
        Path | None,
        typer.Option(
            help="PKCS#12 file of an organisation's certificate authority, instead of an own one."
        ),
    ] = None,
    secret_fd: SecretFd = None,
) -> None:
    """Start a logbook in a new folder: its journal, its authority and its custodian.

    Asks a new passphrase for the custodian; with --authority first that file's passphrase.
    """
    from gaugelog.work import people

    secrets = Secrets(secret_fd)
    given = None
    if authority is not None:
        given = (authority.read_bytes(), secrets.ask(f"Passphrase of {authority.name}"))
    logbook = people.start(
        folder,
        keys_of=key_folder,
        name=name,
        custodian=people.Newcomer(
            custodian, custodian_name, initials, ("custodian", *(role or ())), ()
        ),
        passphrase=secrets.choose(f"of {custodian}"),
        authority=given,
    )
    say(
        f"Logbook “{name}” started in {folder}.",
        f"Head {logbook.head().printed}",
        f"Next: cd {folder}; gaugelog person enrol --help",
    )
