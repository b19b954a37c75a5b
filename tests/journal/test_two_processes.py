"""Two programs that append to one file at once, and one that is killed while it does."""

from __future__ import annotations

import subprocess
import sys
import time
from dataclasses import dataclass
from pathlib import Path

import pytest

from gaugelog.journal.check import check
from gaugelog.journal.keys import KeyFolder
from gaugelog.journal.storage.sqlite import SqliteStorage
from tests.journal.appender import PASSPHRASE
from tests.journal.samples import CHAIN, SampleJournal, signer

ROOT = Path(__file__).parent.parent.parent


@dataclass
class Shared:
    """A journal in a file, the keys beside it."""

    journal: SampleJournal
    file: Path
    keys: Path

    def appender(self, count: int) -> subprocess.Popen[str]:
        """A process ready to append `count` deeds once it is told to go."""
        process = subprocess.Popen(
            [sys.executable, "-m", "tests.journal.appender", self.file, self.keys, str(count)],
            cwd=ROOT,
            stdin=subprocess.PIPE,
            stdout=subprocess.PIPE,
            text=True,
        )
        assert process.stdout
        assert "ready\n" == process.stdout.readline()
        return process


@pytest.fixture
def shared(tmp_path: Path) -> Shared:
    storage = SqliteStorage(tmp_path / "logbook.db")
    storage.create()
    own = signer("technician")
    keys = KeyFolder(tmp_path / "keys", kdf_rounds=10)
    keys.save("technician", own.private_key, own.certificate, own.chain[0], PASSPHRASE)
    return Shared(SampleJournal(storage).start(), storage.path, keys.path)


def _sound_entries(shared: Shared) -> set[str]:
    """The ids of all deeds, after a check that found nothing."""
    with shared.journal.storage.reading() as reader:
        report = check(reader, shared.journal.evidence)
        deeds = {entry.header.deed for entry in reader.entries(CHAIN, after=3)}
    assert report.ok, report.troubles
    return deeds


def test_two_processes_lose_nothing_never_fork_and_are_told_to_wait(shared: Shared) -> None:
    count = 150
    processes = [shared.appender(count) for _ in range(2)]
    for process in processes:
        assert process.stdin
        process.stdin.write("\n")
        process.stdin.flush()
    said = [process.communicate(timeout=60)[0].split() for process in processes]
    acknowledged = {line for lines in said for line in lines if line != "waited"}
    assert any("waited" in lines for lines in said)
    assert 2 * count == len(acknowledged)
    assert acknowledged == _sound_entries(shared)


def _killed(shared: Shared, after: float) -> list[str]:
    """What a process acknowledged before it was killed."""
    process = shared.appender(10_000)
    assert process.stdin
    process.stdin.write("\n")
    process.stdin.flush()
    time.sleep(after)
    process.kill()
    # A line that was cut off was not acknowledged.
    return process.communicate()[0].rpartition("\n")[0].split()


def test_a_killed_process_leaves_all_it_acknowledged_and_no_half_deed(shared: Shared) -> None:
    acknowledged: set[str] = set()
    for after in (0.01, 0.05, 0.1, 0.3):
        acknowledged |= set(_killed(shared, after))
        assert acknowledged <= _sound_entries(shared)
    assert acknowledged
    shared.journal.keep()
    _sound_entries(shared)
