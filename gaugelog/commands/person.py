"""`gaugelog person`: who may act in the logbook."""

from __future__ import annotations

import json as json_library
from typing import Annotated

import typer

from gaugelog.commands.passphrases import Secrets
from gaugelog.commands.session import (
    As,
    Json,
    SecretFd,
    key_folder,
    open_logbook,
    unlock,
    unlock_asking,
)
from gaugelog.commands.talk import put_json, put_table, say

group = typer.Typer(help="People: enrol, list, revoke.")

Id = Annotated[str, typer.Argument(help="The person's id; it stands in the journal for ever.")]


@group.command()
def enrol(
    ctx: typer.Context,
    person: Id,
    name: Annotated[str, typer.Option(help="Name as it stands on records.")],
    initials: Annotated[str, typer.Option(help="Initials, as in a stamp.")],
    role: Annotated[
        list[str], typer.Option(help="planner, technician, reviewer or custodian; repeatable.")
    ],
    qualification: Annotated[
        list[str] | None,
        typer.Option(help='What the person is qualified for, "bonding until 2027-05-01".'),
    ] = None,
    as_: As = "",
    secret_fd: SecretFd = None,
) -> None:
    """Enrol a person, or enrol one anew: a new key, certified by the logbook's authority.

    Asks the custodian's passphrase, then the person's own new one.
    """
    from gaugelog.rules.who import demand_role
    from gaugelog.work import people

    logbook = open_logbook(ctx)
    secrets = Secrets(secret_fd)
    keys = key_folder(logbook.id)
    signer, phrase = unlock_asking(logbook, as_, secrets)
    with logbook.reading() as view:
        demand_role(view, signer.person, "custodian")
    done = people.enrol(
        logbook,
        signer,
        keys.unlock_authority(phrase),
        keys,
        newcomer=people.Newcomer(person, name, initials, tuple(role), tuple(qualification or ())),
        passphrase=secrets.choose(f"of {person}"),
    )
    say(f"{person} is enrolled as {', '.join(role)}; certificate {done.fingerprint[:16]} …")


@group.command("list")
def list_(ctx: typer.Context, json: Json = False) -> None:
    """List the people of the logbook."""
    from gaugelog.ledger.people import PersonRow

    logbook = open_logbook(ctx)
    with logbook.reading() as view:
        people = [(row, view.name(row.id)) for row in view.all(PersonRow)]
    if json:
        put_json(
            [
                {
                    "id": row.id,
                    "name": name,
                    "roles": json_library.loads(row.roles),
                    "qualifications": json_library.loads(row.qualifications),
                    "active": bool(row.active),
                }
                for row, name in people
            ]
        )
        return
    put_table(
        "People",
        ["id", "name", "roles", "qualifications", "state"],
        [
            [
                row.id,
                name,
                ", ".join(json_library.loads(row.roles)),
                "; ".join(_qualification(item) for item in json_library.loads(row.qualifications)),
                "active" if row.active else "revoked",
            ]
            for row, name in people
        ],
        empty="Nobody is enrolled yet. Next: gaugelog person enrol --help",
    )


def _qualification(item: dict[str, str]) -> str:
    return item["name"] + (f" until {item['until']}" if item.get("until") else "")


@group.command()
def revoke(
    ctx: typer.Context,
    person: Id,
    reason: Annotated[str, typer.Option(help="Why; kept in the journal.")],
    erase_name: Annotated[
        bool, typer.Option("--erase-name", help="Also erase name and initials, for good.")
    ] = False,
    as_: As = "",
    secret_fd: SecretFd = None,
) -> None:
    """Revoke a person's certificate: what was signed stays valid, nothing more can be signed."""
    from gaugelog.work import people

    logbook = open_logbook(ctx)
    custodian = unlock(logbook, as_, Secrets(secret_fd))
    people.revoke(logbook, custodian, person=person, reason=reason, erase_name=erase_name)
    say(f"{person} can sign no more. What was signed before stays valid.")
