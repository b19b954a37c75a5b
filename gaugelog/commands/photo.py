"""`gaugelog photo`: photos of a point as evidence, kept as they are."""

from __future__ import annotations

from contextlib import suppress
from pathlib import Path
from typing import TYPE_CHECKING, Annotated

import typer

from gaugelog.commands.outputs import write_out
from gaugelog.commands.passphrases import Secrets
from gaugelog.commands.session import As, At, Json, Point, SecretFd, open_logbook, unlock
from gaugelog.commands.talk import as_json, put, put_json, put_table, say

if TYPE_CHECKING:
    from gaugelog.ledger.photos import PhotoKept

group = typer.Typer(help="Photos: keep them as evidence of a point, list them, write out copies.")


@group.command()
def add(
    ctx: typer.Context,
    point: Point,
    files: Annotated[list[Path], typer.Argument(help="JPEG, PNG, WebP or TIFF, one or several.")],
    step: Annotated[str, typer.Option(help="Id of the step that they show.")] = "",
    note: Annotated[str, typer.Option(help="What they show; it is printed under them.")] = "",
    at: At = "",
    as_: As = "",
    secret_fd: SecretFd = None,
) -> None:
    """Keep photos of a point as evidence, bit for bit, by their SHA-256.

    The record shows them smaller, without the camera's data and the place; the originals stay
    in the logbook. A step may ask for a photo itself: step do POINT photo=FILE.
    """
    from gaugelog.intake.pictures import load_pictures
    from gaugelog.work import photos

    logbook = open_logbook(ctx)
    pictures = load_pictures(files)
    signer = unlock(logbook, as_, Secrets(secret_fd))
    kept = photos.add(logbook, signer, pictures, point=point, step=step, note=note, at=at)
    say(*(f"{point}: {_told(each)} is kept; SHA-256 {each.file}" for each in kept))


@group.command()
def export(
    ctx: typer.Context,
    point: Point,
    folder: Annotated[Path, typer.Argument(help="Where to; it is made where it is not there.")],
    originals: Annotated[
        bool,
        typer.Option("--originals", help="The files as given, with the camera's data."),
    ] = False,
) -> None:
    """Write a point's photos out, as a client may have them: smaller, without the camera's data.

    The paths go to stdout.
    """
    from gaugelog.documents.pictures import client_copy
    from gaugelog.work import photos

    logbook = open_logbook(ctx)
    found = [fact for _, fact in photos.kept(logbook, point)]
    with suppress(OSError):  # what can't be written is told of the file
        folder.mkdir(parents=True, exist_ok=True)
    for number, fact in enumerate(found, start=1):
        data = logbook.evidence.get(fact.file)
        ending = _ENDINGS[fact.format] if originals else "jpg"
        target = folder / f"{point}-photo-{number}.{ending}"
        write_out(target, data if originals else client_copy(fact.name, data))
        put(str(target))


_ENDINGS = {"JPEG": "jpg", "PNG": "png", "WEBP": "webp", "TIFF": "tif"}


@group.command("list")
def list_(
    ctx: typer.Context,
    point: Annotated[str, typer.Argument(help="Label of a point; left out: all points.")] = "",
    json: Json = False,
) -> None:
    """List the photos with their step, size, digest, who kept them and when."""
    from gaugelog.work import photos

    found = photos.kept(open_logbook(ctx), point)
    if json:
        put_json([{**as_json(fact), "point": label} for label, fact in found])
        return
    put_table(
        "Photos",
        ["point", "step", "file", "pixels", "SHA-256", "taken", "by", "note"],
        [_cells(label, fact) for label, fact in found],
        empty="No photo is kept. Next: gaugelog photo add POINT FILE.jpg",
    )


def _told(fact: PhotoKept) -> str:
    return f"{fact.name}, {fact.format}, {fact.width} × {fact.height} pixels,"


def _cells(label: str, fact: PhotoKept) -> list[str]:
    size = f"{fact.width} × {fact.height}"
    digest = f"{fact.file[:12]} …"
    return [label, fact.step, fact.name, size, digest, fact.observed_at, fact.kept_by, fact.note]
