"""Killed at any moment, nothing that was acknowledged is lost; two at work lose nothing either."""

from __future__ import annotations

import os
import random
import signal
import subprocess
import sys
import time
from pathlib import Path

import pytest

from gaugelog.ledger.readings import ReadingRow
from gaugelog.work.history import check_logbook
from gaugelog.work.logbook import Logbook
from tests.work.job import INSULATION, Job

ROOT = Path(__file__).parents[2]
BEFORE_INSULATION = 8

PATIENCE = 60.0
"""Seconds after which a worker that acknowledges nothing is broken, not slow."""

LONGEST_READING = 0.03
"""Seconds within which a kill falls anywhere in the making of the next reading."""


class Workers:
    """A process that forks workers on demand; each acknowledges readings to one file."""

    def __init__(self, home: Path) -> None:
        self.acknowledged = home / "acknowledged"
        self.acknowledged.touch()
        self._process = subprocess.Popen(
            [sys.executable, "-m", "tests.work.reader_at_work", home, self.acknowledged],
            stdin=subprocess.PIPE,
            stdout=subprocess.PIPE,
            text=True,
            cwd=ROOT,
        )

    def start(self) -> int:
        """Start a worker; returns its process number."""
        assert self._process.stdin is not None
        assert self._process.stdout is not None
        self._process.stdin.write("go\n")
        self._process.stdin.flush()
        return int(self._process.stdout.readline())

    def ids(self) -> list[str]:
        """The readings acknowledged so far."""
        return self.acknowledged.read_text(encoding="utf-8").split()

    def wait_for(self, count: int) -> None:
        """Wait until so many readings were acknowledged."""
        deadline = time.monotonic() + PATIENCE
        while len(self.ids()) < count:
            assert time.monotonic() < deadline, f"only {len(self.ids())} of {count} readings"
            time.sleep(0.001)

    def close(self) -> None:
        """End the process."""
        self._process.kill()
        self._process.wait()


def _kill_again_and_again(job: Job, home: Path, times: int) -> None:
    """Kill each worker at a moment of its own, after it acknowledged none, one or a few readings.

    Waiting for what was acknowledged, not for a clock, asks as much of a busy machine as of an
    idle one.
    """
    job.walk(BEFORE_INSULATION)
    job.book.storage.close()
    dice = random.Random(20261201)  # noqa: S311 (no secret)
    workers = Workers(home)
    asked = 0
    try:
        for _ in range(times):
            before, wanted = len(workers.ids()), dice.randint(0, 4)
            child = workers.start()
            workers.wait_for(before + wanted)
            time.sleep(dice.uniform(0, LONGEST_READING))
            os.kill(child, signal.SIGKILL)
            asked += wanted
    finally:
        workers.close()
    _everything_is_there(home, workers.ids(), least=asked)


def _everything_is_there(home: Path, ids: list[str], least: int) -> None:
    assert len(ids) >= least
    book = Logbook.open(home / "book")
    with book.reading() as view:
        kept = {row.id for row in view.all(ReadingRow, check="insulation")}
    assert set(ids) <= kept
    report = check_logbook(book)
    assert report.ok, report.summary


def test_fifty_kills_lose_nothing_that_was_acknowledged(job: Job, tmp_path: Path) -> None:
    _kill_again_and_again(job, tmp_path, 50)


@pytest.mark.slow
def test_two_hundred_kills_lose_nothing_that_was_acknowledged(job: Job, tmp_path: Path) -> None:
    _kill_again_and_again(job, tmp_path, 200)


def test_work_resumes_after_a_kill(job: Job, tmp_path: Path) -> None:
    _kill_again_and_again(job, tmp_path, 3)
    outcome = job.do(
        "t.okoro",
        {**INSULATION, "insulation": "19 GΩ"},
        reason="dried",
    )
    assert outcome.settled


def test_two_processes_at_once_lose_nothing_and_fork_nothing(job: Job, tmp_path: Path) -> None:
    job.walk(BEFORE_INSULATION)
    job.book.storage.close()
    workers = Workers(tmp_path)
    try:
        children = [workers.start(), workers.start()]
        workers.wait_for(60)
        for child in children:
            os.kill(child, signal.SIGKILL)
    finally:
        workers.close()
    _everything_is_there(tmp_path, workers.ids(), least=60)


def test_whoever_waits_for_another_writer_is_told(job: Job) -> None:
    waited: list[float] = []
    other = Logbook.open(job.book.folder, on_wait=waited.append)
    with job.book.storage.writing(), pytest.MonkeyPatch.context() as patch:
        patch.setattr("gaugelog.journal.storage.sqlite.GIVE_UP_SECONDS", 0.2)
        with pytest.raises(Exception, match="writing to the logbook"):
            other.rebuild()
    assert waited
