"""Makes the frozen logbook `v1`: run once, when the format was laid down; never again.

    python -m tests.frozen.make_v1 FOLDER

Every later version must open and check what lies in `tests/frozen/v1`. A new format gets a script
and a folder of its own.
"""

from __future__ import annotations

import shutil
import sqlite3
import sys
import tempfile
from pathlib import Path

from gaugelog.documents.maker import PdfRecordMaker
from gaugelog.work import people, reviews
from tests.work.job import WALK, Job, released_job

FAILING = {"unplugged": "yes", "tester": "IT-5", "insulation": "0.4 GΩ"}


def play(job: Job) -> None:
    """A point accepted after a failed check, a second one in work, a person gone."""
    job.walk(9)
    job.do("t.okoro", FAILING)
    job.do("t.okoro", WALK[9][1], reason="flux cleaned off")
    for who, typed in WALK[10:]:
        job.do(who, typed)
    maker, keys = PdfRecordMaker(), job.keys
    reviews.submit(job.book, keys["t.okoro"], maker, point="FB-1", meaning="I submit.")
    reviews.accept(job.book, keys["q.reyes"], maker, point="FB-1", meaning="I accept.")
    job.walk(3, "FB-2", "K7-03/2")
    people.revoke(job.book, keys["c.ward"], person="q.reyes", reason="left", erase_name=True)


def main() -> None:
    """Make the logbook and copy it, without its keys, to the folder named."""
    target = Path(sys.argv[1])
    with tempfile.TemporaryDirectory() as home:
        job = released_job(Path(home))
        play(job)
        head = job.book.head().printed
        job.book.storage.close()
        database = job.book.folder / "logbook.db"
        with sqlite3.connect(database) as connection:
            connection.execute("PRAGMA wal_checkpoint(TRUNCATE)")
        connection.close()
        shutil.copytree(job.book.folder, target, ignore=shutil.ignore_patterns("*-wal", "*-shm"))
    (target / "head.txt").write_text(f"{head}\n", encoding="utf-8")


if __name__ == "__main__":
    main()
