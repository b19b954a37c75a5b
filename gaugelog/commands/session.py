"""What each command starts from: which logbook, who acts, with which key, at which clock."""

from __future__ import annotations

import os
from dataclasses import dataclass
from pathlib import Path
from typing import TYPE_CHECKING, Annotated

import typer

from gaugelog.commands.passphrases import Secrets
from gaugelog.errors import KeyTrouble, Refused

if TYPE_CHECKING:
    from gaugelog.journal.keys import KeyFolder, Signer
    from gaugelog.work.logbook import Logbook

KEYS_VARIABLE = "GAUGELOG_KEYS"

Point = Annotated[str, typer.Argument(help="Label of the point.")]
As = Annotated[
    str,
    typer.Option("--as", envvar="GAUGELOG_PERSON", help="Id of the person who acts and signs."),
]
SecretFd = Annotated[
    int | None,
    typer.Option(help="Read passphrases from this file descriptor, one a line, as asked for."),
]
Json = Annotated[bool, typer.Option("--json", help="Give the data as JSON.")]
At = Annotated[
    str,
    typer.Option(
        help="When it was observed, if not now: 2026-12-01 14:30 or 14:30 (this machine's zone)."
    ),
]


@dataclass(frozen=True)
class Place:
    """Where the logbook is, as asked for on the command line; None: found by walking up."""

    folder: Path | None

    def find(self) -> Path:
        """The logbook's folder. Raises StorageTrouble when there is none."""
        from gaugelog.work.logbook import find_logbook

        found: Path = find_logbook(Path.cwd(), self.folder)
        return found


def open_logbook(ctx: typer.Context) -> Logbook:
    """The logbook the command is about."""
    from gaugelog.commands.talk import waiting
    from gaugelog.work.logbook import Logbook

    place: Place = ctx.obj
    return Logbook.open(place.find(), on_wait=waiting())


def keys_home() -> Path:
    """The folder of all private keys: `GAUGELOG_KEYS`, else the user's configuration folder."""
    named = os.environ.get(KEYS_VARIABLE)
    return Path(named) if named else Path(typer.get_app_dir("gaugelog")) / "keys"


def key_folder(logbook_id: str) -> KeyFolder:
    """The folder of the keys of one logbook."""
    from gaugelog.journal.keys import KeyFolder

    return KeyFolder(keys_home() / logbook_id)


def unlock(logbook: Logbook, person: str, secrets: Secrets, *, purpose: str = "") -> Signer:
    """The unlocked key of `person`, asked for once.

    Raises KeyTrouble when nobody was named or the key can't be opened, Refused when nobody of
    that id is enrolled.
    """
    return unlock_asking(logbook, person, secrets, purpose=purpose)[0]


def unlock_asking(
    logbook: Logbook, person: str, secrets: Secrets, *, purpose: str = ""
) -> tuple[Signer, str]:
    """The same, with the passphrase that opened the key."""
    from gaugelog.ledger.people import PersonRow

    _demand_named(person)
    with logbook.reading() as view:
        if view.get(PersonRow, person) is None:
            raise Refused(f"Nobody is enrolled as {person}.", "See `gaugelog person list`.")
    return _unlocked(logbook.id, person, secrets, purpose)


def unlock_for(logbook_id: str, person: str, secrets: Secrets, *, purpose: str = "") -> Signer:
    """The same for a logbook that is not open yet."""
    _demand_named(person)
    return _unlocked(logbook_id, person, secrets, purpose)[0]


def _demand_named(person: str) -> None:
    if not person:
        raise KeyTrouble(
            "Who acts was not said.", "Name the person with --as ID or GAUGELOG_PERSON."
        )


def _unlocked(logbook_id: str, person: str, secrets: Secrets, purpose: str) -> tuple[Signer, str]:
    phrase = secrets.ask(f"Passphrase of {person}" + (f" to {purpose}" if purpose else ""))
    return key_folder(logbook_id).unlock(person, phrase), phrase
