"""A process that appends readings through deeds until it is killed; started by test_kill.

For each line on its input it forks a child that works; the child's number goes to the output.
Each reading that was acknowledged goes to the file named on the command line, one id a line,
written at once, after the deed has returned.
"""

from __future__ import annotations

import os
import sys
from contextlib import suppress
from datetime import timedelta
from pathlib import Path

from gaugelog.errors import Faulty
from gaugelog.journal.clock import Moment, SetClock
from gaugelog.journal.ids import new_id
from gaugelog.journal.keys import KeyFolder, UnlockedKey
from gaugelog.work import steps
from gaugelog.work.logbook import Logbook
from tests.work.job import CHEAP_ROUNDS, INSULATION, START, WORD

DAY = START + timedelta(days=1)
FAILING = {**INSULATION, "insulation": "0.4 GΩ"}


def opened(book: Path) -> Logbook:
    """The logbook on a fixed day, on which the meter's certificate and the person's hold."""
    return Logbook.open(book, clock=SetClock(Moment(DAY, 0, new_id(), 0)))


def warm(book: Path, key: UnlockedKey) -> None:
    """Load what a deed needs once for all workers, by a reading that is refused."""
    logbook = opened(book)
    with suppress(Faulty):
        steps.do(logbook, key, point="FB-1", typed={**FAILING, "insulation": ">999 TΩ"})
    logbook.storage.close()


def work(book: Path, key: UnlockedKey, kept: int) -> None:
    """Append readings for ever."""
    logbook = opened(book)
    number = 0
    while True:
        number += 1
        outcome = steps.do(
            logbook, key, point="FB-1", typed=FAILING, reason=f"again {os.getpid()} {number}"
        )
        os.write(kept, f"{outcome.readings[0].reading.id}\n".encode())


def main() -> None:
    """Fork a worker for each line on the input."""
    home, acknowledged = Path(sys.argv[1]), sys.argv[2]
    key = KeyFolder(home / "keys", CHEAP_ROUNDS).unlock("t.okoro", WORD)
    kept = os.open(acknowledged, os.O_WRONLY | os.O_CREAT | os.O_APPEND)
    warm(home / "book", key)
    for _line in sys.stdin:
        child = os.fork()
        if child == 0:
            work(home / "book", key, kept)
        sys.stdout.write(f"{child}\n")
        sys.stdout.flush()


if __name__ == "__main__":
    main()
