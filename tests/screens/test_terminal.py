"""A real terminal, under tmux: from sign-on to a submitted record and its review by another."""

from __future__ import annotations

import os
import shutil
import subprocess
import sys
import time
from collections.abc import Iterator
from dataclasses import dataclass
from pathlib import Path

import pytest

from tests.foreign import needs
from tests.screens.conftest import At
from tests.work.job import WORD, Job

_SETTLE = 1.0
"""What was drawn takes the keys a moment later on a busy machine."""

GAUGELOG = str(Path(sys.executable).with_name("gaugelog"))


@dataclass
class Terminal:
    """A tmux session of its own server, so that nobody else's is touched."""

    socket: Path

    def tmux(self, *words: str) -> str:
        """A tmux command's output."""
        command = ["tmux", "-S", str(self.socket), *words]
        return subprocess.run(command, capture_output=True, text=True, check=True).stdout

    def type(self, *texts: str) -> None:
        """Type texts, each with Enter sent apart, as a hand or a scanner does."""
        for text in texts:
            self.tmux("send-keys", "-l", text)
            time.sleep(0.2)
            self.tmux("send-keys", "Enter")
            time.sleep(0.2)

    def press(self, key: str) -> None:
        """Press one key by tmux's name of it."""
        self.tmux("send-keys", key)

    def screen(self) -> str:
        """What stands on the terminal."""
        return self.tmux("capture-pane", "-p")

    def wait(self, text: str, seconds: float = 60.0) -> str:
        """Wait until a text stands there."""
        end = time.monotonic() + seconds
        while time.monotonic() < end:
            shown = self.screen()
            if text in shown:
                time.sleep(_SETTLE)
                return self.screen()
            time.sleep(0.2)
        raise AssertionError(f"“{text}” never came; there stands:\n{self.screen()}")


def _environment(job: Job, keys: Path) -> dict[str, str]:
    kept = {name: os.environ[name] for name in ("PATH", "HOME") if name in os.environ}
    folder = keys / job.book.id
    shutil.copytree(job.folder.path, folder)
    return {**kept, "GAUGELOG_KEYS": str(keys), "LANG": "C.UTF-8", "PS1": "prompt$ "}


@pytest.fixture
def terminal(tmp_path: Path) -> Iterator[Terminal]:
    """A terminal that is taken away afterwards."""
    found = Terminal(tmp_path / "tmux")
    yield found
    subprocess.run(
        ["tmux", "-S", str(found.socket), "kill-server"], capture_output=True, check=False
    )


def _begin(terminal: Terminal, job: Job, environment: dict[str, str]) -> None:
    words = [f"{name}={value}" for name, value in environment.items()]
    terminal.tmux(
        *("-f", "/dev/null", "new-session", "-d", "-x", "100", "-y", "32"),
        *("-c", str(job.book.folder), "env", "-i", *words, "TERM=screen-256color", "sh"),
    )


def _ran(job: Job, environment: dict[str, str], *words: str) -> str:
    done = subprocess.run(
        [GAUGELOG, *words],
        cwd=job.book.folder,
        env=environment,
        capture_output=True,
        text=True,
        check=False,
    )
    assert 0 == done.returncode, done.stdout + done.stderr
    return done.stdout + done.stderr


@needs("tmux", "pdfsig")
@pytest.mark.slow
def test_from_sign_on_to_a_record_with_both_signatures(
    at: At, terminal: Terminal, tmp_path: Path
) -> None:
    job = at(22)
    environment = _environment(job, tmp_path / "keys")
    _begin(terminal, job, environment)
    terminal.type(GAUGELOG)
    terminal.wait("Sign on")
    terminal.type("t.okoro", WORD)
    terminal.wait("For you now")
    terminal.type("FB-1")
    terminal.wait("23/23")
    terminal.type("yes")
    terminal.wait("Every step is done.")
    terminal.press("F5")
    terminal.wait("Signing says")
    terminal.type(WORD)
    terminal.wait("is signed and submitted; head")
    terminal.press("F8")
    terminal.wait("Who takes over?")
    terminal.type("q.reyes", WORD)
    terminal.wait("Quilla Reyes (QR)")
    terminal.press("F2")
    terminal.wait("You may review the record")
    terminal.type("FB-1")
    terminal.wait("f5 Accept")
    terminal.press("F5")
    terminal.wait("Accept the record")
    terminal.type(WORD)
    terminal.wait("FB-1 is accepted")
    terminal.press("C-q")
    terminal.wait("prompt$")
    pdf = tmp_path / "record.pdf"
    _ran(job, environment, "record", "FB-1", "--out", str(pdf))
    signed = subprocess.run(["pdfsig", str(pdf)], capture_output=True, text=True, check=False)
    assert 2 == signed.stdout.count("Signature is Valid")
    _ran(job, environment, "journal", "check")


@needs("tmux")
@pytest.mark.slow
def test_a_lost_terminal_keeps_what_was_half_typed(
    at: At, terminal: Terminal, tmp_path: Path
) -> None:
    job = at(1)
    environment = _environment(job, tmp_path / "keys")
    _begin(terminal, job, environment)
    terminal.type(f"{GAUGELOG} install FB-1")
    terminal.wait("Sign on")
    terminal.type("t.okoro", WORD)
    terminal.wait("2/23")
    terminal.type("K7-03/1")
    terminal.tmux("send-keys", "-l", "RM")
    terminal.wait("[RM ")
    time.sleep(1.0)
    terminal.tmux("kill-server")
    _begin(terminal, job, environment)
    terminal.type(GAUGELOG)
    terminal.wait("Sign on")
    terminal.type("t.okoro", WORD)
    shown = terminal.wait("2/23")
    assert "[K7-03/1" in shown
    assert "[RM " in shown
    _ran(job, environment, "journal", "check")


def test_without_a_terminal_the_help_is_given_and_the_screen_is_refused(
    at: At, tmp_path: Path
) -> None:
    job = at(0)
    environment = _environment(job, tmp_path / "keys")
    for words, code, told in (
        ((), 2, "Usage: gaugelog"),
        (("install", "FB-1"), 7, "The full screen needs a terminal."),
        (("review",), 7, "The full screen needs a terminal."),
    ):
        done = subprocess.run(
            [GAUGELOG, *words],
            cwd=job.book.folder,
            env=environment,
            capture_output=True,
            text=True,
            check=False,
        )
        assert code == done.returncode
        assert told in done.stdout + done.stderr
