"""`gaugelog demo`: an invented job played from its input files to signed records."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING, Annotated

import typer

from gaugelog.commands.paper import PaperAsked, demand_paper
from gaugelog.commands.talk import console, put, say
from gaugelog.errors import Refused

if TYPE_CHECKING:
    from gaugelog.commands.story import Story

FOLDER = Path("gaugelog-demo")

ALWAYS_NEXT = (
    ("journal check", "is every entry as it was signed?"),
    ("journal show FB-2", "what happened at a point"),
    ("plan show", "points, lots, circuits, channels, states"),
    ("wiring show", "which wire goes to which pin; spare channels"),
    ("record", "the records and their digests"),
)
"""What the summary names to type in every case, and why; the story adds to it."""


def demo(
    folder: Annotated[Path, typer.Argument(help="Where to play it; a new folder.")] = FOLDER,
    paper: PaperAsked = "",
) -> None:
    """Play an invented job: three people, fifteen points, signed records at the end.

    Makes a folder with the input files, a logbook, its keys and the records, and says what to
    look at and type next.
    """
    from gaugelog.commands.story import read_story
    from gaugelog.documents.maker import PdfRecordMaker

    size = demand_paper(paper)
    if folder.exists() and any(folder.iterdir()):
        raise Refused(
            f"{folder} is there already.",
            f"Look into it, or play anew elsewhere: gaugelog demo {folder}-2",
        )
    story = read_story(PdfRecordMaker())
    story.files = _copy_files(story.files, folder, size)
    _play(story, folder)
    records = _hand_out(story, folder)
    _summary(story, folder, records)


def _copy_files(files: Path, folder: Path, paper: str | None) -> Path:
    """The files as the demo plays them: where another paper is asked for, the campaign says so."""
    import re
    import shutil

    copy = folder / "input"
    shutil.copytree(files, copy, ignore=shutil.ignore_patterns("__pycache__"))
    if paper:
        campaign = copy / "plan" / "campaign.toml"
        text = campaign.read_text(encoding="utf-8")
        told = re.sub('(?m)^paper = "[a-z0-9]+"', f'paper = "{paper}"', text)
        campaign.write_text(told, encoding="utf-8", newline="\n")
    return copy


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
    """The newest record of each point, in `records`."""
    from gaugelog.work import reviews

    written = []
    (folder / "records").mkdir()
    for point in dict.fromkeys(row["point"] for row in reviews.records(story.book())):
        found = reviews.record(story.book(), point=point)
        target = folder / "records" / f"{found.file_name}.pdf"
        target.write_bytes(found.pdf)
        written.append(target)
    return written


def _summary(story: Story, folder: Path, records: list[Path]) -> None:
    put(
        "",
        f"The invented job “{story.told['name']}” is in {folder}/:",
        "  input/     the files a planner writes; README.md there explains each",
        "  logbook/   the logbook: journal, ledger, evidence",
        "  keys/      the three people's keys, here only because this is a demo",
        f"  records/   the newest signed record of each of {len(records)} points",
        "",
        "Look at:",
        *(f"  {line}" for line in story.told_by_chapters("look")),
        "",
        *_next_lines(story, folder, records[0]),
        "",
        f"Head of the journal: {story.book().head().printed}",
    )


def _next_lines(story: Story, folder: Path, first: Path) -> list[str]:
    from gaugelog.commands.story import PASSPHRASE

    program = _how_to_type()
    typed = [*ALWAYS_NEXT, *story.told_by_chapters("next")]
    return [
        "Type next:",
        f"  cd {folder}/logbook",
        f"  export GAUGELOG_KEYS=../keys    # the passphrase of everyone: {PASSPHRASE}",
        f"  {program}    # the full screen: sign on as t.okoro",
        *(f"  {program} {words}    # {why}" for words, why in typed),
        f"  pdfsig ../records/{first.name}    # the signatures, judged by a foreign program",
    ]


def _how_to_type() -> str:
    """How this very program is typed from the logbook's folder: its name, or its whole path."""
    import shutil
    import sys

    if shutil.which("gaugelog"):
        return "gaugelog"
    started = Path(sys.argv[0])
    return str(started.absolute()) if started.name == "gaugelog" else "gaugelog"
