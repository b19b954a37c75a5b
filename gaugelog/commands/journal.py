"""`gaugelog journal`: check the chain, print its head, look at entries, export them."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING, Annotated, Any

import typer

from gaugelog.commands.session import Json, open_logbook
from gaugelog.commands.talk import put, put_json, put_prose, put_table, say
from gaugelog.errors import ExitCode
from gaugelog.visible import counted

if TYPE_CHECKING:
    from gaugelog.journal.check.report import Report, StepResult
    from gaugelog.journal.entry import Entry

group = typer.Typer(help="The journal: check it, print its head, look at it, export it.")

_SIGNS = {"ok": "✓", "trouble": "✗", "not asked": "–", "not finished": "?"}
_NOTES = {
    "not asked": "not asked",
    "not finished": "not finished; no trouble in what could be read",
}


@group.command()
def check(
    ctx: typer.Context,
    head: Annotated[
        list[str] | None,
        typer.Option(help="A head as printed on a record, 137:ABC…; may be given several times."),
    ] = None,
    json: Json = False,
) -> None:
    """Check the whole journal and say of each trouble which entry it is in.

    Steps: format, sequence, chain, bodies, deeds and signatures, certificates valid then,
    evidence, ledger rebuilt and compared. Exit code 1 when there is trouble.
    """
    from gaugelog.work.history import check_logbook

    logbook = open_logbook(ctx)
    report = check_logbook(logbook, printed=head or [])
    if json:
        put_json(report.as_json())
    else:
        _tell_report(report, head or [])
    if not report.ok:
        raise typer.Exit(int(ExitCode.TROUBLE))


def _tell_report(report: Report, heads: list[str]) -> None:
    for step in report.steps:
        put_prose(f"{_SIGNS[step.outcome]} {step.number}. {step.title}: {_found(step)}")
        for trouble in step.troubles:
            put_prose(f"    {trouble.where}: {trouble.what}")
            if trouble.remedy:
                put_prose(f"      → {trouble.remedy}")
    for notice in report.notices:
        put_prose(f"· {notice.where}: {notice.what}")
    put_prose("", report.summary, *_about_heads(report, heads))


def _found(step: StepResult) -> str:
    if step.troubles:
        return counted(len(step.troubles), "trouble")
    return _NOTES.get(step.outcome) or _SOUND[step.number]


_SOUND = {
    1: "every entry has a form that this program knows",
    2: "the entries are numbered without a gap",
    3: "each entry holds the hash of the one before",
    4: "each entry says what its hash was taken of",
    5: "each deed is whole and signed by who acted",
    6: "each signer's certificate was in force",
    7: "every file is there, with the SHA-256 that was signed",
    8: "the tables say what the journal says",
}
"""What is so when a step of the check finds nothing."""


def _about_heads(report: Report, heads: list[str]) -> list[str]:
    """What the printed heads that were given prove, or what stays open without any."""
    if not heads:
        return [
            "No printed head was given: entries cut off at the end would not show. Take one from "
            "a record or a backup: gaugelog journal check --head 137:ABC…"
        ]
    return [f"Nothing is cut off up to {', '.join(heads)}."] if report.ok else []


@group.command()
def head(ctx: typer.Context, json: Json = False) -> None:
    """Print the head: its sequence number and 128 bits of its hash. Keep it elsewhere."""
    logbook = open_logbook(ctx)
    found = logbook.head()
    if json:
        put_json({"chain": found.chain, "sequence": found.seq, "head": found.printed})
    else:
        put(found.printed)


@group.command()
def show(
    ctx: typer.Context,
    about: Annotated[
        str, typer.Argument(help="An entry's number, or the label of a point, lot, meter, person.")
    ] = "",
    last: Annotated[int, typer.Option(min=1, help="How many entries, the newest ones.")] = 30,
    json: Json = False,
) -> None:
    """Show entries: the newest, one by number, or those about a subject."""
    from gaugelog.work.history import entries_about
    from gaugelog.work.telling import labels

    logbook = open_logbook(ctx)
    found = entries_about(logbook, about)[-last:]
    if json:
        put_json([_entry_json(entry) for entry in found])
    elif about.isdigit():
        put_json(_entry_json(found[0]))
    else:
        with logbook.reading() as view:
            names = labels(view)
        put_table(
            "Journal",
            [">entry", "time (UTC)", "by", "what", "about"],
            [_entry_row(entry, names) for entry in found],
            empty="No entry is about that. Next: gaugelog journal show",
        )


def _entry_row(entry: Entry, names: dict[str, str]) -> list[str]:
    from gaugelog.work.telling import about_line, what_line

    header = entry.header
    when = header.time[:16].replace("T", " ")
    return [str(header.seq), when, header.actor, what_line(entry), about_line(entry, names)]


def _entry_json(entry: Entry) -> dict[str, Any]:
    from gaugelog.journal.canonical import parse

    body = parse(entry.body_bytes) if entry.body_bytes is not None else None
    return {
        "hash": entry.hash.hex(),
        "header": parse(entry.header_bytes),
        "body": body,
        "signed": entry.signature is not None,
    }


@group.command()
def rebuild(ctx: typer.Context) -> None:
    """Throw the ledger's tables away and fold them anew from the journal, which is untouched."""
    logbook = open_logbook(ctx)
    logbook.rebuild()
    say("The ledger is rebuilt. Next: gaugelog journal check")


@group.command()
def export(
    ctx: typer.Context,
    folder: Annotated[Path, typer.Argument(help="A new or empty folder.")],
    photos: Annotated[
        bool, typer.Option("--photos", help="The originals of photos too, with the camera's data.")
    ] = False,
) -> None:
    """Write every entry, certificate and evidence file out, to be checked without Gaugelog.

    The folder's READ ME.txt says how, with openssl and sha256sum only. Originals of photos, which
    may tell the place, are left out unless asked for.
    """
    from gaugelog.work.history import export_journal

    logbook = open_logbook(ctx)
    count = export_journal(logbook, folder, photos=photos)
    say(f"{count} entries written to {folder}; READ ME.txt there says how to check them.")
