"""Handing a copy to the viewer of this system."""

from __future__ import annotations

import sys
import time
from pathlib import Path

import pytest

from gaugelog.errors import MachineTrouble
from gaugelog.screens.viewer import Viewer

pytestmark = pytest.mark.skipif(sys.platform != "linux", reason="xdg-open is of Linux")


@pytest.fixture
def opener(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    """An `xdg-open` that writes down what it is given, and talks."""
    told, program = tmp_path / "told", tmp_path / "bin" / "xdg-open"
    program.parent.mkdir()
    program.write_text(f'#!/bin/sh\necho noise; echo noise >&2\necho "$1" > {told}.new\n'
                       f"mv {told}.new {told}\n", encoding="utf-8")  # fmt: skip
    program.chmod(0o755)
    monkeypatch.setenv("PATH", f"{program.parent}:/usr/bin:/bin")
    return told


def test_the_viewer_gets_a_copy_under_the_name(
    opener: Path, capfd: pytest.CaptureFixture[str]
) -> None:
    path = Viewer().open(b"%PDF", "FB-1-r1.pdf")
    for _ in range(200):
        if opener.exists():
            break
        time.sleep(0.02)
    assert str(path) == opener.read_text(encoding="utf-8").strip()
    assert b"%PDF" == path.read_bytes()
    assert ("", "") == tuple(capfd.readouterr())


@pytest.mark.parametrize("name", ["../../etc/passwd", "-rf", ".hidden", "a b\n;c.jpg", "", "/"])
def test_a_name_leads_nowhere_else(opener: Path, name: str) -> None:
    viewer = Viewer()
    path = viewer.open(b"x", name)
    assert path.parent == viewer.open(b"x", "other").parent
    assert path.name[0] not in ".-"


def test_only_this_user_may_read_the_copies(opener: Path) -> None:
    assert 0o700 == Viewer().open(b"x", "a.pdf").parent.stat().st_mode & 0o777


def test_a_machine_without_a_viewer_is_told(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setenv("PATH", "/nowhere")
    with pytest.raises(MachineTrouble, match="no viewer to open"):
        Viewer().open(b"x", "a.pdf")


def test_no_room_for_the_copy_is_told(monkeypatch: pytest.MonkeyPatch) -> None:
    def full(*_: object, **__: object) -> None:
        raise OSError(28, "No space left on device")

    monkeypatch.setattr(Path, "write_bytes", full)
    with pytest.raises(MachineTrouble, match="No space left on device"):
        Viewer().open(b"x", "a.pdf")
