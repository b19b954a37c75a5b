"""`gaugelog stock`: gauge lots and consumables as received, what is left, what may be used."""

from __future__ import annotations

from collections import Counter
from pathlib import Path
from typing import TYPE_CHECKING, Annotated, Any

import typer

from gaugelog.commands.passphrases import Secrets
from gaugelog.commands.session import As, Json, SecretFd, open_logbook, unlock
from gaugelog.commands.talk import put_json, put_table, say
from gaugelog.visible import counted

if TYPE_CHECKING:
    from gaugelog.ledger.papers import PaperOf
    from gaugelog.ledger.standing import Standing
    from gaugelog.ledger.stock import ConsumableReceived, LotReceived
    from gaugelog.ledger.view import View

group = typer.Typer(
    help="Stock: receive lots, keep their certificates, list them, set what may be used."
)

Label = Annotated[
    str, typer.Argument(help="A lot, a pack (K7-03), a gauge (K7-03/4), a consumable.")
]
Reason = Annotated[str, typer.Option(help="Why; it is kept with the standing.")]


@group.command()
def receive(
    ctx: typer.Context,
    files: Annotated[
        list[Path],
        typer.Argument(help="CSV or XLSX of gauge lots (a row a pack) or of consumables."),
    ],
    as_: As = "",
    secret_fd: SecretFd = None,
) -> None:
    """Receive gauge lots and consumables from CSV or XLSX files.

    Every fault of every file is named at once; nothing is stored unless all is right. More packs
    of a lot that is in stock are received in the same way. A column certificate_file names the
    file of the certificate, beside the table.
    """
    from gaugelog.intake.stock import load_stock
    from gaugelog.journal.ids import new_id
    from gaugelog.work import stock

    logbook = open_logbook(ctx)
    facts = load_stock(files, new_id=new_id)
    signer = unlock(logbook, as_, Secrets(secret_fd))
    done = stock.receive(logbook, signer, facts, facts.papers)
    more = f", {counted(done.packs, 'pack')} more of lots in stock" if done.packs else ""
    papers = f", {counted(done.certificates, 'certificate')}" if done.certificates else ""
    say(
        f"Received: {counted(done.lots, 'gauge lot')}{more}, "
        f"{counted(done.consumables, 'consumable')}{papers}.",
        "Next: gaugelog stock list",
    )


@group.command()
def certificate(
    ctx: typer.Context,
    label: Annotated[str, typer.Argument(help="A gauge lot or a consumable lot.")],
    file: Annotated[Path, typer.Argument(help="The certificate: a PDF, a scan, any file.")],
    note: Annotated[str, typer.Option(help="A remark kept with it.")] = "",
    as_: As = "",
    secret_fd: SecretFd = None,
) -> None:
    """Keep the certificate of a lot as evidence, bit for bit, by its SHA-256."""
    from gaugelog.intake.papers import load_paper
    from gaugelog.work import papers

    logbook = open_logbook(ctx)
    paper = load_paper(file)
    signer = unlock(logbook, as_, Secrets(secret_fd))
    kinds: tuple[PaperOf, ...] = ("lot", "consumable")
    kept = papers.add(logbook, signer, paper, label=label, kinds=kinds, note=note)
    say(f"{kept.item_kind} {kept.label}: {kept.name} is kept; SHA-256 {kept.file}")


@group.command("list")
def list_(ctx: typer.Context, json: Json = False) -> None:
    """List gauge lots with what is left on the shelf, and consumables with their expiry."""
    logbook = open_logbook(ctx)
    with logbook.reading() as view:
        lots, consumables = _lots(view), _consumables(view)
        standing = _standing(view)
    if json:
        put_json({"lots": lots, "consumables": consumables, "standing": standing})
        return
    put_table(
        "Gauge lots",
        ["lot", "type", ">Ω", ">factor", ">on shelf", ">in service", ">other", ">files"],
        [[str(value) for value in row.values()] for row in lots],
        empty="No gauge lot was received. Next: gaugelog stock receive lots.csv",
    )
    put_table(
        "Consumables",
        ["lot", "kind", "name", "expires", ">files"],
        [[str(value) for value in row.values()] for row in consumables],
        empty="No consumable was received. Next: gaugelog stock receive consumables.csv",
    )
    if standing:
        put_table(
            "Not free to use",
            ["label", "kind", "standing", "since", "by", "reason"],
            [list(row.values()) for row in standing],
            empty="",
        )


@group.command()
def quarantine(
    ctx: typer.Context, label: Label, reason: Reason, as_: As = "", secret_fd: SecretFd = None
) -> None:
    """Stop the use of a lot, a pack, a gauge or a consumable until it is freed."""
    _set(ctx, label, "quarantined", reason, as_, secret_fd)


@group.command()
def free(
    ctx: typer.Context, label: Label, reason: Reason, as_: As = "", secret_fd: SecretFd = None
) -> None:
    """Let something in quarantine be used again; not the technician's to say."""
    _set(ctx, label, "free", reason, as_, secret_fd)


@group.command()
def scrap(
    ctx: typer.Context, label: Label, reason: Reason, as_: As = "", secret_fd: SecretFd = None
) -> None:
    """Scrap a gauge, or what is on the shelf of a pack or lot; for good."""
    _set(ctx, label, "scrapped", reason, as_, secret_fd)


def _set(
    ctx: typer.Context, label: str, standing: Standing, reason: str, as_: str, fd: int | None
) -> None:
    from gaugelog.work.standing import set_standing

    logbook = open_logbook(ctx)
    signer = unlock(logbook, as_, Secrets(fd))
    done = set_standing(logbook, signer, label=label, standing=standing, reason=reason)
    scrapped = f"; {counted(len(done.scraps), 'gauge')} taken off the shelf" if done.scraps else ""
    say(f"{done.item_kind} {done.label} is {done.standing}{scrapped}.")


def _standing(view: View) -> list[dict[str, str]]:
    from gaugelog.ledger.standing import StandingRow

    return [
        {
            "label": row.label,
            "kind": row.item_kind,
            "standing": row.standing,
            "since": row.at,
            "by": row.by,
            "reason": row.reason,
        }
        for row in view.all(StandingRow)
        if row.standing != "free"
    ]


def _lots(view: View) -> list[dict[str, Any]]:
    from gaugelog.ledger.stock import GaugeRow, LotReceived, LotRow

    papers = _papers(view)
    states: dict[str, Counter[str]] = {}
    for gauge in view.all(GaugeRow):
        states.setdefault(gauge.lot, Counter())[gauge.state] += 1
    return [
        _lot(LotReceived.model_validate_json(row.data), states.get(row.id, Counter()))
        | {"certificates": papers[row.id]}
        for row in view.all(LotRow)
    ]


def _lot(lot: LotReceived, states: Counter[str]) -> dict[str, Any]:
    shelf, service = states["on shelf"], states["in service"]
    return {
        "lot": lot.label,
        "type": lot.type,
        "nominal_resistance_ohm": lot.nominal_resistance.value,
        "gauge_factor": lot.grids[0].gauge_factor.value,
        "on_shelf": shelf,
        "in_service": service,
        "other": states.total() - shelf - service,
    }


def _consumables(view: View) -> list[dict[str, Any]]:
    from gaugelog.ledger.stock import ConsumableReceived, ConsumableRow

    rows = view.all(ConsumableRow)
    papers = _papers(view)
    return [
        _consumable(ConsumableReceived.model_validate_json(row.data))
        | {"certificates": papers[row.id]}
        for row in rows
    ]


def _papers(view: View) -> Counter[str]:
    """How many certificates are kept of what, by its id."""
    from gaugelog.ledger.papers import CertificateRow

    return Counter(row.item for row in view.all(CertificateRow))


def _consumable(lot: ConsumableReceived) -> dict[str, Any]:
    return {
        "lot": lot.label,
        "kind": lot.type,
        "name": lot.name,
        "expires": lot.expires or "does not expire",
    }
