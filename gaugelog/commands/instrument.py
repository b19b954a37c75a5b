"""`gaugelog instrument`: meters and references with certificate, due date and accuracy."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING, Annotated

import typer

from gaugelog.commands.passphrases import Secrets
from gaugelog.commands.session import As, Json, SecretFd, open_logbook, unlock
from gaugelog.commands.talk import as_json, put_json, put_table, say

if TYPE_CHECKING:
    from gaugelog.ledger.instruments import InstrumentAdded

group = typer.Typer(help="Instruments: add with their certificates, list.")


@group.command()
def add(
    ctx: typer.Context,
    file: Annotated[Path, typer.Argument(help="TOML with one [[instrument]] each.")],
    as_: As = "",
    secret_fd: SecretFd = None,
) -> None:
    """Add instruments, or enter an instrument's new certificate (same label)."""
    from gaugelog.intake.instruments import load_instruments
    from gaugelog.journal.ids import new_id
    from gaugelog.work import instruments

    logbook = open_logbook(ctx)
    facts = load_instruments(file, new_id=new_id)
    signer = unlock(logbook, as_, Secrets(secret_fd))
    instruments.add(logbook, signer, facts)
    say(f"{len(facts)} instruments entered.")


@group.command("list")
def list_(ctx: typer.Context, json: Json = False) -> None:
    """List the instruments with their due dates and ranges."""
    from gaugelog.ledger.instruments import InstrumentAdded, InstrumentRow

    logbook = open_logbook(ctx)
    with logbook.reading() as view:
        rows = view.all(InstrumentRow)
    found = [InstrumentAdded.model_validate_json(row.data) for row in rows]
    if json:
        put_json([as_json(item) for item in found])
        return
    put_table(
        "Instruments",
        ["label", "type", "serial", "certificate", "due", "range", ">accuracy"],
        [cells for item in found for cells in _rows(item)],
        empty="No instrument is entered. Try: gaugelog instrument add instruments.toml",
    )


def _rows(item: InstrumentAdded) -> list[list[str]]:
    head = [item.label, item.type, item.serial, item.certificate_number, item.due]
    return [
        [
            *(head if index == 0 else [""] * len(head)),
            f"{span.quantity}, {span.low} to {span.high}",
            f"±({span.gain} + {span.offset})",
        ]
        for index, span in enumerate(item.ranges)
    ]
