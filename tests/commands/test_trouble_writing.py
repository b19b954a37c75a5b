"""Full disks, folders that went away, and a person who stops half-way: nothing is lost."""

from __future__ import annotations

import os
import signal
import subprocess
import sys
import time
from dataclasses import replace
from datetime import timedelta
from pathlib import Path

import pytest

from gaugelog.commands import application
from gaugelog.errors import ExitCode
from tests.commands.desk import Desk, files_of_at_most, mounted

ROOM = 40_000
"""Bytes: room for SQLite's shared memory, not for what a deed writes."""

PROGRAM = (sys.executable, "-c", "from gaugelog.commands import main; main()")


def test_a_deed_on_a_full_disk_stores_nothing_and_says_so(desk: Desk) -> None:
    head = desk.head()
    with files_of_at_most(ROOM):
        told = desk.deed()
    assert told.code == 6, told.err
    assert "disk" in told.err
    desk.demand_whole(head)
    assert desk.deed().code == 0


def _filled(folder: Path) -> None:
    """Leave no byte free on the disk of `folder`."""
    with (folder / "filling").open("wb", buffering=0) as file:
        try:
            while file.write(b"\0" * 4096):
                pass
        except OSError:
            return


def test_a_logbook_on_a_disk_without_a_byte_left_is_read_and_a_deed_refused(
    desk: Desk, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    head = desk.head()
    small = tmp_path / "small"
    small.mkdir()
    with mounted("-t", "tmpfs", "-o", "size=4M", "tmpfs", small):
        subprocess.run(["cp", "-r", desk.folder, small / "book"], check=True)
        monkeypatch.chdir(small / "book")
        _filled(small)
        told = desk.deed()
        assert told.code == 6, told.err
        assert "The disk is full" in told.err
        assert "Make room" in told.err
        desk.demand_whole(head)
        (small / "filling").unlink()
        assert desk.deed().code == 0
        assert desk.command("journal", "check").code == 0
        monkeypatch.chdir(tmp_path)


OUTPUTS = (
    ("record", "FB-1", "--out"),
    ("wiring", "export"),
    ("backup",),
    ("journal", "export"),
)


@pytest.mark.parametrize("words", OUTPUTS, ids=" ".join)
def test_an_output_whose_folder_is_gone_is_named(desk: Desk, words: tuple[str, ...]) -> None:
    head = desk.head()
    (desk.folder / "a-file").write_text("", encoding="utf-8")
    target = desk.folder / "a-file" / "out.pdf"
    told = desk.command(*words, str(target))
    assert told.code == 6, told.err
    assert "a-file" in told.err
    assert len(told.err.splitlines()) >= 2
    desk.demand_whole(head)


@pytest.mark.parametrize(
    "words",
    [("record", "FB-1", "--out", "new.pdf"), ("wiring", "export", "new.csv")],
    ids=" ".join,
)
def test_an_output_on_a_full_disk_is_named_and_leaves_no_part(
    desk: Desk, words: tuple[str, ...]
) -> None:
    desk.head()
    with files_of_at_most(10):
        told = desk.command(*words)
    assert told.code == 6, told.err
    assert words[-1] in told.err
    assert "make room" in told.err
    assert [] == list(desk.folder.glob("*new.*"))


def _program(desk: Desk, *words: str) -> subprocess.CompletedProcess[str]:
    with Path("/dev/full").open("w", encoding="utf-8") as full:
        return subprocess.run(
            [*PROGRAM, *words],
            cwd=desk.folder,
            stdout=full,
            stderr=subprocess.PIPE,
            text=True,
            check=False,
        )


@pytest.mark.parametrize("words", [("journal", "head"), ("plan", "show", "--json")])
def test_data_that_does_not_fit_on_the_disk_is_no_success(
    desk: Desk, words: tuple[str, ...]
) -> None:
    told = _program(desk, *words)
    assert told.returncode == 6
    assert "Not all could be written: No space left on device" in told.stderr
    assert "Exception" not in told.stderr


def test_a_reader_that_has_had_enough_is_no_defect(desk: Desk) -> None:
    reading, writing = os.pipe()
    os.close(reading)
    done = subprocess.run(
        [*PROGRAM, "journal", "show", "--json"],
        cwd=desk.folder,
        stdout=writing,
        stderr=subprocess.PIPE,
        text=True,
        check=False,
    )
    os.close(writing)
    assert done.returncode == 1
    assert "" == done.stderr


def test_a_program_started_without_outlets_still_works(desk: Desk) -> None:
    line = f"{sys.executable} -c 'from gaugelog.commands import main; main()' plan show >&- 2>&-"
    done = subprocess.run(["sh", "-c", line], cwd=desk.folder, check=False)
    assert done.returncode == 0


def test_ctrl_c_is_told_and_has_a_code_of_its_own(
    desk: Desk, monkeypatch: pytest.MonkeyPatch
) -> None:
    head = desk.head()

    def stopped(*_: object, **__: object) -> None:
        raise KeyboardInterrupt

    monkeypatch.setattr("gaugelog.work.steps.do", stopped)
    told = desk.deed()
    assert ExitCode.STOPPED == told.code
    assert "stopped" in told.err
    desk.demand_whole(head)


def test_ctrl_c_before_the_command_line_is_read_has_the_same_code(
    desk: Desk, monkeypatch: pytest.MonkeyPatch
) -> None:
    def stopped(*_: object, **__: object) -> None:
        raise KeyboardInterrupt

    monkeypatch.setattr(application, "application", stopped)
    assert ExitCode.STOPPED == desk.command("plan", "show").code


def test_a_program_stopped_at_its_work_leaves_no_traceback(desk: Desk) -> None:
    head = desk.head()
    process = subprocess.Popen(
        [*PROGRAM, "record", "FB-2", "--draft", "--out", "draft.pdf"],
        cwd=desk.folder,
        stderr=subprocess.PIPE,
        text=True,
    )
    time.sleep(1.5)
    process.send_signal(signal.SIGINT)
    told = process.communicate(timeout=60)[1]
    assert process.returncode in {0, ExitCode.STOPPED}
    assert "Traceback" not in told
    desk.demand_whole(head)


def test_a_wrong_passphrase_is_told_and_keeps_nothing(desk: Desk) -> None:
    head = desk.head()
    told = desk.command(
        *("step", "do", "FB-2", "safe=yes", "--as", "t.okoro"), secrets="not this one\n"
    )
    assert told.code == 5
    assert "passphrase" in told.err
    desk.demand_whole(head)


def test_a_clock_set_back_is_noticed_and_loses_nothing(desk: Desk) -> None:
    assert desk.deed().code == 0
    now = desk.clock.now()
    desk.clock.set(replace(now, utc=now.utc - timedelta(minutes=40)))
    told = desk.sign("step", "redo", "FB-2", "access", "--reason", "the clock was wrong")
    assert told.code == 0, told.err
    checked = desk.command("journal", "check")
    assert checked.code == 0
    assert "The clock had been set back by 2400 s" in checked.out
