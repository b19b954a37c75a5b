"""`gaugelog`, `install` and `review`: the full screen, when somebody sits at a terminal."""

from __future__ import annotations

import sys
from pathlib import Path
from typing import TYPE_CHECKING, Annotated

import typer

from gaugelog.commands.session import Place, key_folder
from gaugelog.errors import MachineTrouble

if TYPE_CHECKING:
    from gaugelog.screens.desk import Desk
    from gaugelog.work.ports import RecordMaker

Point = Annotated[str, typer.Argument(help="Label of a point; left out: the list.")]


def install(ctx: typer.Context, point: Point = "") -> None:
    """Work at the article on the full screen: the worklist, or a point's step in hand."""
    open_screen(ctx.obj, "step" if point else "worklist", point)


def review(ctx: typer.Context, point: Point = "") -> None:
    """Review on the full screen: the queue, or one point's evidence."""
    open_screen(ctx.obj, "review", point)


def at_a_terminal() -> bool:
    """Whether somebody sits there: both ends are a terminal that can move its cursor."""
    import os

    return sys.stdin.isatty() and sys.stdout.isatty() and os.environ.get("TERM", "") != "dumb"


def is_logbook_here(place: Place) -> bool:
    """Whether `gaugelog` alone would find a logbook."""
    from gaugelog.errors import StorageTrouble

    if place.folder is None and not _sign_above(Path.cwd()):
        return False
    try:
        place.find()
    except StorageTrouble:
        return False
    return True


def _sign_above(start: Path) -> bool:
    # Looked at without the heavy room of deeds, so that a bare `gaugelog` elsewhere stays light.
    return any((folder / "logbook.toml").is_file() for folder in (start, *start.parents))


def open_screen(place: Place, where: str = "", point: str = "") -> None:
    """Open the full screen; `where` names its first screen, `point` what it is about.

    Raises MachineTrouble without a terminal, StorageTrouble without a logbook, and what nobody
    foresaw as it came, when the terminal is as it was before.
    """
    if not at_a_terminal():
        raise MachineTrouble(
            "The full screen needs a terminal.",
            "Without one: gaugelog step next, gaugelog step do, gaugelog submit, gaugelog accept.",
        )
    if place.folder is not None or not _sign_above(Path.cwd()):
        place.find()  # says that there is none, before the screen is there
    from gaugelog.screens.app import FullScreen

    app = FullScreen(lambda: _desk(place, point), where, point)
    app.run()
    if app.defect is not None:
        raise app.defect


def _desk(place: Place, point: str) -> Desk:
    """The logbook, opened, with what the screen needs; slow. Raises Refused for no such point."""
    from gaugelog.screens.desk import Desk
    from gaugelog.work.doing import point_row
    from gaugelog.work.logbook import Logbook

    logbook = Logbook.open(place.find())
    if point:
        with logbook.reading() as view:
            point_row(view, point)
    keys = key_folder(logbook.id)
    return Desk(logbook, keys, _maker, keys.path / "drafts")


def _maker() -> RecordMaker:
    from gaugelog.documents.maker import PdfRecordMaker

    return PdfRecordMaker()
