"""A process that appends to a journal and says what was acknowledged; run by tests.

`python -m tests.journal.appender FILE KEYS COUNT`: appends COUNT deeds as `technician`, printing
each deed's id once it is on disk, and `waited` when it had to wait for another process.
"""

from __future__ import annotations

import sys
from pathlib import Path

from gaugelog.journal.append import append
from gaugelog.journal.ids import new_id
from gaugelog.journal.keys import KeyFolder
from gaugelog.journal.storage.sqlite import SqliteStorage
from tests.journal.samples import CHAIN, START, note

PASSPHRASE = "correct horse battery"


def main(file: str, keys: str, count: str) -> None:
    """Append and acknowledge."""
    signer = KeyFolder(Path(keys)).unlock("technician", PASSPHRASE)
    storage = SqliteStorage(Path(file))
    print("ready", flush=True)
    sys.stdin.readline()
    waits: list[float] = []
    for _ in range(int(count)):
        deed = new_id()
        with storage.writing(waits.append) as writer:
            append(writer, CHAIN, [note("a"), note("b")], signer, START, deed)
        print(deed, flush=True)
    if waits:
        print("waited", flush=True)


if __name__ == "__main__":
    main(*sys.argv[1:])
