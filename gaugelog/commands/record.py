"""`gaugelog record`: hand out a point's signed record, or draw a draft of it."""

from __future__ import annotations

from pathlib import Path
from typing import Annotated

import typer

from gaugelog.commands.outputs import write_out
from gaugelog.commands.paper import PaperAsked, demand_paper
from gaugelog.commands.session import Json, open_logbook
from gaugelog.commands.talk import put, put_json, put_table, say
from gaugelog.errors import Refused


def record(
    ctx: typer.Context,
    point: Annotated[str, typer.Argument(help="Label of the point; left out: list records.")] = "",
    out: Annotated[Path | None, typer.Option(help="File to write; default POINT-rN.pdf.")] = None,
    revision: Annotated[int | None, typer.Option(help="Revision; default the newest.")] = None,
    draft: Annotated[
        bool, typer.Option("--draft", help="Draw the record as it stands, marked as a draft.")
    ] = False,
    paper: PaperAsked = "",
    json: Json = False,
) -> None:
    """Hand out the signed record of a point. It is never drawn or signed again.

    With --draft, draws the present state marked DRAFT on every page. The file's path goes to
    stdout.
    """
    from gaugelog.documents.maker import PdfRecordMaker
    from gaugelog.work import reviews

    size = demand_paper(paper)
    if size and not draft:
        raise Refused(
            "A signed record is handed out as it was drawn; --paper is for a --draft.",
            "Its size is chosen when it is submitted: gaugelog submit POINT --paper letter",
        )
    logbook = open_logbook(ctx)
    if not point:
        _list(reviews.records(logbook), json)
        return
    if draft:
        found = reviews.draft(logbook, PdfRecordMaker(size), point=point)
    else:
        found = reviews.record(logbook, point=point, revision=revision)
    target = out or Path(f"{found.file_name}.pdf")
    _demand_free(target, found.pdf, draft and out is None)
    write_out(target, found.pdf)
    say(f"{point}: {found.description}")
    put(str(target))


def _demand_free(target: Path, pdf: bytes, drawn_again: bool) -> None:
    """Raise Refused rather than write over another file; a draft takes the earlier one's place."""
    if not drawn_again and target.is_file() and target.read_bytes() != pdf:
        raise Refused(f"{target} is there already and is another file.", "Name one with --out.")


def _short(name: str, value: object) -> str:
    """A cell of the list; a digest by its beginning, whole with --json."""
    return f"{str(value)[:12]} …" if name == "sha256" else str(value)


def _list(rows: list[dict[str, str]], json: bool) -> None:
    if json:
        put_json(rows)
        return
    put_table(
        "Records",
        ["point", ">revision", "state", "submitted by", "accepted by", "head", "SHA-256", "reason"],
        [[_short(name, value) for name, value in row.items()] for row in rows],
        empty="No record is signed yet. Next: gaugelog step next",
    )
