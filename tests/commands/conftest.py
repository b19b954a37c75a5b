"""A played small job to try commands on, made once for each worker; keys cheap to unlock."""

from __future__ import annotations

import os
import shutil
from datetime import timedelta
from pathlib import Path

import pytest

from gaugelog.commands import run, session, story
from gaugelog.journal.clock import Moment, SetClock
from gaugelog.journal.ids import new_id
from gaugelog.journal.keys import KeyFolder
from gaugelog.work import logbook
from tests.commands.desk import Command, Desk, Outcome
from tests.work.job import CHEAP_ROUNDS, START, released_job

SMALL_JOB = Path(__file__).parents[1] / "small_job"
"""Two points of the demo with its first chapter: played in a moment, and steady."""

__all__ = ["CHEAP_ROUNDS", "Command", "Outcome"]


@pytest.fixture(autouse=True)
def _cheap_keys(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(
        session,
        "key_folder",
        lambda logbook_id: KeyFolder(session.keys_home() / logbook_id, CHEAP_ROUNDS),
    )
    for module in ("person", "start"):
        monkeypatch.setattr(f"gaugelog.commands.{module}.key_folder", session.key_folder)
    for variable in ("GAUGELOG_LOGBOOK", "GAUGELOG_PERSON", "GAUGELOG_KEYS"):
        monkeypatch.delenv(variable, raising=False)


@pytest.fixture
def command(capsys: pytest.CaptureFixture[str]) -> Command:
    """Run a command line in this process; `secrets` are given on a file descriptor."""

    def typed(*words: str, secrets: str = "") -> Outcome:
        capsys.readouterr()
        if not secrets:
            code = run(list(words))
        else:
            reading, writing = os.pipe()
            os.write(writing, secrets.encode())
            os.close(writing)
            code = run([*words, "--secret-fd", str(reading)])
            os.close(reading)
        told = capsys.readouterr()
        return Outcome(code, told.out, told.err)

    return typed


@pytest.fixture(scope="session")
def _played(tmp_path_factory: pytest.TempPathFactory) -> Path:
    folder = tmp_path_factory.mktemp("played") / "demo"
    whole = KeyFolder.__init__

    def cheap(self: KeyFolder, path: Path, kdf_rounds: int = CHEAP_ROUNDS) -> None:
        whole(self, path, CHEAP_ROUNDS)

    with pytest.MonkeyPatch.context() as patch:
        patch.setattr(KeyFolder, "__init__", cheap)
        patch.setattr(story, "demo_files", lambda: SMALL_JOB)
        assert run(["demo", str(folder)]) == 0
    return folder


@pytest.fixture
def demo(_played: Path, tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    """A copy of a played demo's folder; its logbook is the current folder, its keys are found."""
    folder = tmp_path / "demo"
    shutil.copytree(_played, folder)
    monkeypatch.chdir(folder / "logbook")
    monkeypatch.setenv(session.KEYS_VARIABLE, str(folder / "keys"))
    return folder


@pytest.fixture(scope="session")
def _walked(tmp_path_factory: pytest.TempPathFactory) -> Path:
    home = tmp_path_factory.mktemp("walked")
    job = released_job(home)
    job.walk()
    job.submit()
    job.accept()
    job.book.storage.close()
    return home


@pytest.fixture
def desk(_walked: Path, tmp_path: Path, monkeypatch: pytest.MonkeyPatch, command: Command) -> Desk:
    """A copy of a small job: its logbook is the current folder, its clock stands a day later."""
    shutil.copytree(_walked, tmp_path / "desk")
    folder = tmp_path / "desk" / "book"
    keys = KeyFolder(tmp_path / "desk" / "keys", CHEAP_ROUNDS)
    clock = SetClock(Moment(START + timedelta(days=3), 0, new_id(), 1_000_000))
    monkeypatch.setattr(session, "key_folder", lambda _id: keys)
    monkeypatch.setattr(logbook, "SystemClock", lambda: clock)
    monkeypatch.chdir(folder)
    return Desk(folder, clock, command)


PASSPHRASE = story.PASSPHRASE
