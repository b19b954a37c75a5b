"""`gaugelog instrument`: meters and references with certificate, due date and accuracy."""

from __future__ import annotations

from collections import Counter
from pathlib import Path
from typing import TYPE_CHECKING, Annotated

import typer

from gaugelog.commands.calc.engine import parse_pairs
from gaugelog.commands.passphrases import Secrets
from gaugelog.commands.session import As, At, Json, SecretFd, open_logbook, unlock
from gaugelog.commands.talk import as_json, put, put_json, put_table, say
from gaugelog.errors import Fault, Faulty
from gaugelog.visible import counted

if TYPE_CHECKING:
    from gaugelog.intake.papers import Paper
    from gaugelog.ledger.instruments import InstrumentAdded
    from gaugelog.ledger.papers import PaperOf
    from gaugelog.ledger.shiftchecks import MeterChecked

group = typer.Typer(help="Instruments: add with their certificates, check on a reference, list.")


@group.command()
def add(
    ctx: typer.Context,
    file: Annotated[Path, typer.Argument(help="TOML with one [[instrument]] each.")],
    as_: As = "",
    secret_fd: SecretFd = None,
) -> None:
    """Add instruments, or enter an instrument's new certificate (same label).

    A key certificate_file names the file of the certificate, beside the table.
    """
    from gaugelog.intake.instruments import load_instruments
    from gaugelog.journal.ids import new_id
    from gaugelog.work import instruments

    logbook = open_logbook(ctx)
    papers: dict[str, Paper] = {}
    facts = load_instruments(file, new_id=new_id, papers=papers)
    signer = unlock(logbook, as_, Secrets(secret_fd))
    instruments.add(logbook, signer, facts, papers)
    kept = f", {counted(len(papers), 'certificate')} kept" if papers else ""
    say(f"{counted(len(facts), 'instrument')} entered{kept}. Next: gaugelog instrument list")


@group.command()
def certificate(
    ctx: typer.Context,
    label: Annotated[str, typer.Argument(help="Label of the instrument.")],
    file: Annotated[Path, typer.Argument(help="The certificate: a PDF, a scan, any file.")],
    note: Annotated[str, typer.Option(help="A remark kept with it.")] = "",
    as_: As = "",
    secret_fd: SecretFd = None,
) -> None:
    """Keep the file of an instrument's certificate in force as evidence, by its SHA-256."""
    from gaugelog.intake.papers import load_paper
    from gaugelog.work import papers

    logbook = open_logbook(ctx)
    paper = load_paper(file)
    signer = unlock(logbook, as_, Secrets(secret_fd))
    kinds: tuple[PaperOf, ...] = ("instrument",)
    kept = papers.add(logbook, signer, paper, label=label, kinds=kinds, note=note)
    say(f"{kept.label}, {kept.number}: {kept.name} is kept; SHA-256 {kept.file}")


@group.command()
def check(
    ctx: typer.Context,
    meter: Annotated[str, typer.Argument(help="Label of the meter.")],
    pairs: Annotated[
        list[str] | None,
        typer.Argument(
            metavar="NAME=VALUE…",
            help='reference=RB-1 reads="350.02 ohm"; value="350 ohm" where it has several.',
        ),
    ] = None,
    note: Annotated[str, typer.Option(help="A remark kept with it.")] = "",
    at: At = "",
    as_: As = "",
    secret_fd: SecretFd = None,
) -> None:
    """Check a meter on a reference at the start of a shift; kept with its verdict.

    It agrees when it is off by no more than its accuracy and the reference's uncertainty allow
    together (E_n of 1 or less). Where the criteria ask for it, a meter that was not checked, or
    that failed, is not taken at a step.
    """
    from gaugelog.work import shift

    logbook = open_logbook(ctx)
    typed = _check_inputs(pairs or [])
    signer = unlock(logbook, as_, Secrets(secret_fd))
    done = shift.check(logbook, signer, meter=meter, note=note, at=at, **typed)
    put(*done.lines)
    raise typer.Exit(int(done.exit_code))


def _check_inputs(pairs: list[str]) -> dict[str, str]:
    """What was typed of a check. Raises Faulty naming all that is missing or not asked for."""
    typed = parse_pairs(pairs)
    faults = [
        Fault(name, "is not asked for here.", "Asked for: reference, reads, value.")
        for name in typed
        if name not in {"reference", "reads", "value"}
    ]
    faults += [
        Fault(name, "is missing.", 'Like reference=RB-1 reads="350.02 ohm".')
        for name in ("reference", "reads")
        if not typed.get(name, "").strip()
    ]
    if faults:
        raise Faulty(faults)
    return typed


@group.command()
def checks(
    ctx: typer.Context,
    meter: Annotated[str, typer.Argument(help="Label of a meter; left out: all.")] = "",
    json: Json = False,
) -> None:
    """List the checks of meters on references, every one that was kept."""
    from gaugelog.work import shift

    found = shift.checks(open_logbook(ctx), meter)
    if json:
        put_json([as_json(fact) for fact in found])
        return
    put_table(
        "Checks of meters",
        ["meter", "reference", ">known", ">reads", ">off", ">at most", "outcome", "when", "by"],
        [_check_cells(fact) for fact in found],
        empty="No meter was checked. Next: gaugelog instrument check METER reference=… reads=…",
    )


def _check_cells(fact: MeterChecked) -> list[str]:
    figures = [str(each) for each in (fact.value, fact.reads, fact.off, fact.at_most)]
    told = [fact.outcome, fact.observed_at, fact.checked_by]
    return [fact.label, fact.reference_label, *figures, *told]


@group.command("list")
def list_(ctx: typer.Context, json: Json = False) -> None:
    """List the instruments with their due dates and ranges."""
    from gaugelog.ledger.instruments import InstrumentAdded, InstrumentRow
    from gaugelog.ledger.papers import CertificateRow

    logbook = open_logbook(ctx)
    with logbook.reading() as view:
        rows = view.all(InstrumentRow)
        papers = Counter((row.item, row.number) for row in view.all(CertificateRow))
    found = [InstrumentAdded.model_validate_json(row.data) for row in rows]
    filed = [(item, papers[item.id, item.certificate_number]) for item in found]
    if json:
        put_json([as_json(item) | {"certificates": files} for item, files in filed])
        return
    put_table(
        "Instruments",
        ["label", "type", "serial", "certificate", ">files", "due", "range", ">accuracy"],
        [cells for item, files in filed for cells in _rows(item, files)],
        empty="No instrument is entered. Next: gaugelog instrument add instruments.toml",
    )


def _rows(item: InstrumentAdded, files: int) -> list[list[str]]:
    head = [item.label, item.type, item.serial, item.certificate_number, str(files), item.due]
    return [
        [
            *(head if index == 0 else [""] * len(head)),
            f"{span.quantity}, {span.low} to {span.high}",
            f"±({span.gain} + {span.offset})",
        ]
        for index, span in enumerate(item.ranges)
    ]
