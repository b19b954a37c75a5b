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
from tests.work.job import Job

ROOT = Path(__file__).parents[2]
BEFORE_INSULATION = 9


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

    def close(self) -> None:
        """End the process."""
        self._process.kill()
        self._process.wait()


def _kill_again_and_again(job: Job, home: Path, times: int) -> None:
    job.walk(BEFORE_INSULATION)
    job.book.storage.close()
    dice = random.Random(20261201)  # noqa: S311 (no secret)
    workers = Workers(home)
    try:
        for _ in range(times):
            child = workers.start()
            time.sleep(dice.uniform(0.005, 0.25))
            os.kill(child, signal.SIGKILL)
    finally:
        workers.close()
    _everything_is_there(home, workers.ids(), least=times)


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
        {"unplugged": "yes", "tester": "IT-5", "insulation": "19 GΩ"},
        reason="dried",
    )
    assert outcome.settled


def test_two_processes_at_once_lose_nothing_and_fork_nothing(job: Job, tmp_path: Path) -> None:
    job.walk(BEFORE_INSULATION)
    job.book.storage.close()
    workers = Workers(tmp_path)
    try:
        children = [workers.start(), workers.start()]
        deadline = time.monotonic() + 20
        while len(workers.ids()) < 60 and time.monotonic() < deadline:
            time.sleep(0.1)
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
