"""A small job to type commands at, and ways to make the machine under it fail for real."""

from __future__ import annotations

import os
import resource
import signal
import subprocess
from collections.abc import Callable, Iterator
from contextlib import contextmanager
from dataclasses import dataclass
from pathlib import Path

import pytest

from gaugelog.journal.clock import SetClock
from tests.work.job import WORD

NOBODY = 65534


@dataclass(frozen=True)
class Outcome:
    """What a command gave: its exit code, data and talk."""

    code: int
    out: str
    err: str


Command = Callable[..., Outcome]


@dataclass(frozen=True)
class Desk:
    """A logbook with a released plan, point FB-2 at its first step and FB-1 accepted."""

    folder: Path
    clock: SetClock
    command: Command

    def sign(self, *words: str, who: str = "t.okoro") -> Outcome:
        """A command signed by `who`."""
        return self.command(*words, "--as", who, secrets=f"{WORD}\n" * 2)

    def deed(self) -> Outcome:
        """The next step of FB-2."""
        return self.sign("step", "do", "FB-2", "safe=yes")

    def head(self) -> str:
        """The journal's head as printed."""
        return self.command("journal", "head").out.strip()

    def demand_whole(self, head: str) -> None:
        """See that the journal still checks, and that nothing came or went since `head`."""
        told = self.command("journal", "check", "--head", head)
        assert told.code == 0, told.out + told.err
        assert head == self.head()


@contextmanager
def mounted(*words: str | Path) -> Iterator[None]:
    """Something mounted as long as this lasts; skips where this user may not mount."""
    done = subprocess.run(["mount", *words], capture_output=True, text=True, check=False)
    if done.returncode:
        pytest.skip(f"needs to mount, which is not allowed here: {done.stderr.strip()}")
    try:
        yield
    finally:
        subprocess.run(["umount", "--lazy", words[-1]], check=True)


@contextmanager
def read_only(folder: Path) -> Iterator[None]:
    """`folder` on a medium that can't be written."""
    with mounted("--bind", folder, folder):
        done = subprocess.run(["mount", "-o", "remount,bind,ro", folder], check=False)
        if done.returncode != 0:
            pytest.skip("needs to mount read-only, which is not allowed here")
        yield


@contextmanager
def powerless(*folders: Path) -> Iterator[None]:
    """As somebody who may read the folders but write nothing in them; root steps down for it."""
    places = [place for folder in folders for place in (folder, *folder.rglob("*"))]
    for place in places:
        place.chmod(0o555 if place.is_dir() else 0o444)
    for parent in {parent for folder in folders for parent in folder.parents}:
        if parent.stat().st_uid == os.geteuid() and parent != Path("/"):
            parent.chmod(parent.stat().st_mode | 0o055)
    was_root = os.geteuid() == 0
    if was_root:
        os.seteuid(NOBODY)
    try:
        yield
    finally:
        if was_root:
            os.seteuid(0)
        for place in places:
            place.chmod(0o755 if place.is_dir() else 0o644)


@contextmanager
def files_of_at_most(size: int) -> Iterator[None]:
    """No file may grow beyond `size` bytes, as on a disk that is full."""
    soft, hard = resource.getrlimit(resource.RLIMIT_FSIZE)
    before = signal.signal(signal.SIGXFSZ, signal.SIG_IGN)
    resource.setrlimit(resource.RLIMIT_FSIZE, (size, hard))
    try:
        yield
    finally:
        resource.setrlimit(resource.RLIMIT_FSIZE, (soft, hard))
        signal.signal(signal.SIGXFSZ, before)


def overwrite(file: Path, place: int, data: bytes) -> None:
    """Damage a file: other bytes at `place`."""
    with file.open("r+b") as stream:
        stream.seek(place)
        stream.write(data)


Damage = Callable[[Path], None]
