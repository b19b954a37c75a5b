"""Plans of many grids, written as a planner's files: the small job's first point over and over."""

from __future__ import annotations

import csv
import re
import shutil
from pathlib import Path

from gaugelog.intake.instruments import load_instruments
from gaugelog.intake.stock import load_stock
from gaugelog.journal.ids import new_id
from gaugelog.work import instruments, stock
from tests.work.job import Job, start_job

SMALL_JOB = Path(__file__).parents[1] / "small_job"
CHANNELS = 8


def job_of(home: Path, grids: int) -> tuple[Job, Path]:
    """A logbook with stock for so many grids, and the folder of a plan of them, not yet loaded."""
    files = home / "files"
    shutil.copytree(SMALL_JOB, files)
    _write_plan(files / "plan", grids)
    _write_lots(files / "lots.csv", grids)
    job = start_job(home)
    planner = job.keys["c.ward"]
    received = load_stock([files / "lots.csv", files / "consumables.csv"], new_id=new_id)
    stock.receive(job.book, planner, received)
    meters = load_instruments(files / "instruments.toml", new_id=new_id)
    instruments.add(job.book, planner, meters)
    return job, files / "plan"


def _write_plan(plan: Path, grids: int) -> None:
    _repeat(plan / "grids.csv", [{"point": f"G-{place}"} for place in range(grids)])
    circuits = [
        {
            "circuit": f"C-{place}",
            "arm1": f"grid G-{place}",
            "module": f"M{place // CHANNELS}",
            "channel": str(place % CHANNELS + 1),
        }
        for place in range(grids)
    ]
    _repeat(plan / "circuits.csv", circuits)
    text = (plan / "campaign.toml").read_text(encoding="utf-8")
    before, first = text.split("[[module]]")[:2]
    heading, channel = first.split("  [[module.channel]]")[:2]
    modules = "".join(
        f"[[module]]{_named(heading, f'M{module}')}"
        + "".join(
            f"  [[module.channel]]{_named(channel, str(number + 1)).replace('J1', f'J{number}')}"
            for number in range(CHANNELS)
        )
        for module in range(-(-grids // CHANNELS))
    )
    (plan / "campaign.toml").write_text(before + modules, encoding="utf-8")


def _named(text: str, label: str) -> str:
    return re.sub(r'label = ".*?"', f'label = "{label}"', text, count=1)


def _write_lots(file: Path, grids: int) -> None:
    _repeat(file, [{"pack": f"P-{place}", "pieces": "10"} for place in range(-(-grids // 10))])


def _repeat(file: Path, changes: list[dict[str, str]]) -> None:
    """The first row of a table again and again, with other cells in some columns."""
    with file.open(encoding="utf-8", newline="") as stream:
        first = next(csv.DictReader(stream))
    with file.open("w", encoding="utf-8", newline="") as stream:
        writer = csv.DictWriter(stream, list(first))
        writer.writeheader()
        writer.writerows({**first, **changed} for changed in changes)
