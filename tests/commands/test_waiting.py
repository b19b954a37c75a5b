"""A bar while a plan is loaded, checked and released: on a terminal only, never among the data."""

from __future__ import annotations

import os
import pty
import subprocess
import sys
from pathlib import Path

import pytest

from gaugelog.commands.waiting import bar
from gaugelog.work import plan
from tests.bench.many import job_of
from tests.commands.desk import Desk

PROGRAM = (sys.executable, "-c", "from gaugelog.commands import main; main()")


def _told_to_a_terminal(folder: Path) -> tuple[str, str]:
    """What `plan check` gives on stdout, and on a terminal at its stderr."""
    ours, theirs = pty.openpty()
    done = subprocess.run(
        [*PROGRAM, "plan", "check"],
        cwd=folder,
        stdout=subprocess.PIPE,
        stderr=theirs,
        text=True,
        check=False,
    )
    os.close(theirs)
    told = os.read(ours, 100_000).decode()
    os.close(ours)
    return done.stdout, told


def test_a_terminal_shows_how_far_the_check_has_come(desk: Desk) -> None:
    data, told = _told_to_a_terminal(desk.folder)
    assert "Checking the plan" in told
    assert desk.command("plan", "check").out == data


def test_a_pipe_is_told_nothing(capsys: pytest.CaptureFixture[str]) -> None:
    with bar("Checking") as progress:
        progress(1, 2)
    assert ("", "") == tuple(capsys.readouterr())


def test_load_check_and_release_tell_every_part_once_done(tmp_path: Path) -> None:
    job, files = job_of(tmp_path, 60)
    planner, told = job.keys["c.ward"], list[tuple[int, int]]()

    def progress(done: int, total: int) -> None:
        told.append((done, total))

    facts = plan.understand(job.book, files)
    plan.load(job.book, planner, facts, progress)
    assert [(50, 120), (100, 120), (120, 120)] == told
    told.clear()
    plan.check(job.book, progress)
    assert [done for done, _ in told] == list(range(1, told[-1][1] + 1))
