"""`gaugelog demo`: an invented job played from its input files to signed records."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING, Annotated

import typer

from gaugelog.commands.talk import console, put, say
from gaugelog.errors import Refused

if TYPE_CHECKING:
    from gaugelog.commands.story import Story

FOLDER = Path("gaugelog-demo")


def demo(
    folder: Annotated[Path, typer.Argument(help="Where to play it; a new folder.")] = FOLDER,
) -> None:
    """Play an invented job: three people, two points, signed records at the end.

    Makes a folder with the input files, a logbook, its keys and the records, and says what to
    look at and type next.
    """
    from gaugelog.commands.story import read_story
    from gaugelog.documents.maker import PdfRecordMaker

    if folder.exists() and any(folder.iterdir()):
        raise Refused(
            f"{folder} is there already.",
            f"Look into it, or play anew elsewhere: gaugelog demo {folder}-2",
        )
    story = read_story(PdfRecordMaker())
    _copy_files(story.files, folder)
    _play(story, folder)
    records = _hand_out(story, folder)
    _summary(story, folder, records)


def _copy_files(files: Path, folder: Path) -> None:
    import shutil

    shutil.copytree(files, folder / "input", ignore=shutil.ignore_patterns("__pycache__"))


def _play(story: Story, folder: Path) -> None:
    from rich.progress import BarColumn, MofNCompleteColumn, Progress, TextColumn

    acts = story.acts(folder)
    columns = (BarColumn(24), MofNCompleteColumn(), TextColumn("{task.description}", markup=False))
    with Progress(*columns, console=console(stderr=True), transient=True) as progress:
        task = progress.add_task("", total=len(acts))
        for title, act in acts:
            progress.update(task, description=title)
            act()
            progress.advance(task)
    say(f"Played {len(acts)} acts.")


def _hand_out(story: Story, folder: Path) -> list[Path]:
    from gaugelog.work import reviews

    written = []
    for row in reviews.records(story.book()):
        found = reviews.record(story.book(), point=row["point"])
        target = folder / f"{found.file_name}.pdf"
        target.write_bytes(found.pdf)
        written.append(target)
    return written


def _summary(story: Story, folder: Path, records: list[Path]) -> None:
    from gaugelog.commands.story import PASSPHRASE

    program, first = _how_to_type(), records[0].name if records else "FB-1-r1.pdf"
    put(
        "",
        f"The invented job “{story.told['name']}” is in {folder}/:",
        "  input/     the files a planner writes; README.md there explains each",
        "  logbook/   the logbook: journal, ledger, evidence",
        "  keys/      the three people's keys, here only because this is a demo",
        *(f"  {path.name}  the signed record of a point" for path in records),
        "",
        "Look at: FB-2, where the insulation failed at 0.42 GΩ, was put right and passed.",
        "",
        "Type next:",
        f"  cd {folder}/logbook",
        "  export GAUGELOG_KEYS=../keys    # the passphrase of everyone: " + PASSPHRASE,
        f"  {program} journal check    # is every entry as it was signed?",
        f"  {program} journal show FB-2    # what happened at a point",
        f"  {program} plan show    # points, lots, circuits, channels, states",
        f"  {program} step next FB-1    # what a point needs now",
        f"  {program} record    # the records and their digests",
        f"  pdfsig ../{first}    # the signatures, judged by a foreign program",
        "",
        f"Head of the journal: {story.book().head().printed}",
    )


def _how_to_type() -> str:
    """How this very program is typed from the logbook's folder: its name, or its whole path."""
    import shutil
    import sys

    if shutil.which("gaugelog"):
        return "gaugelog"
    started = Path(sys.argv[0])
    return str(started.absolute()) if started.name == "gaugelog" else "gaugelog"
