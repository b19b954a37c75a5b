"""Verifies many signatures: a few where they come up, many with the help of a second process.

Threads would have to pass Python's lock to and fro for each signature while the walk goes on,
which takes longer than doing one after the other. A second process has a lock of its own.
"""

from __future__ import annotations

import subprocess
import sys
from collections import deque
from collections.abc import Callable, Sequence
from concurrent.futures import Future, ThreadPoolExecutor
from typing import NamedTuple

from gaugelog.journal.check.look import where
from gaugelog.journal.verifying import Signature, packed, verdicts

_BATCH = 512
_MOST_PENDING = 32
"""Batches that may wait for the helper; beyond that they are verified here, to bound memory."""

_SWITCH_SECONDS = 0.0005
"""How soon the walk gives up Python's lock to the thread that talks with the helper."""


class Signed(NamedTuple):
    """A signature of an entry: its place in the walk, its chain and number, and the signature."""

    position: int
    chain: str
    seq: object
    signature: Signature

    @property
    def where(self) -> str:
        """Which entry it is, for people."""
        return where(self.chain, self.seq)


class Helper:
    """A second process that verifies, a batch at a time in the order given."""

    def __init__(self) -> None:
        """Start the process. Raises OSError when there can be none."""
        if getattr(sys, "frozen", False) or not sys.executable:
            raise OSError("there is no interpreter to start")
        # -P: never import from the current folder, which may be a logbook of anyone's.
        self._process = subprocess.Popen(
            [sys.executable, "-P", "-m", "gaugelog.journal.verifying"],
            stdin=subprocess.PIPE,
            stdout=subprocess.PIPE,
            stderr=subprocess.DEVNULL,
        )
        # One thread talks with the process. After each write and read it must win Python's lock
        # from the walk: hence large batches, packed beforehand, and a lock that is given up soon.
        self._talker = ThreadPoolExecutor(1)
        self._interval = sys.getswitchinterval()
        sys.setswitchinterval(_SWITCH_SECONDS)

    def promise(self, batch: Sequence[Signature]) -> Future[bytes]:
        """The verdicts on a batch, once the process has come to it."""
        return self._talker.submit(self._ask, packed(batch), len(batch))

    def close(self) -> None:
        """End the process."""
        sys.setswitchinterval(self._interval)
        self._process.kill()
        self._talker.shutdown(cancel_futures=True)
        self._process.communicate()

    def _ask(self, data: bytes, count: int) -> bytes:
        incoming, outgoing = self._process.stdin, self._process.stdout
        if incoming is None or outgoing is None:
            raise OSError("the helper has no pipes")
        incoming.write(data)
        incoming.flush()
        answer = outgoing.read(count)
        if len(answer) != count:
            raise OSError("the helper has ended")
        return answer


class Verifier:
    """Takes signatures one by one and tells which are bad, at the latest when finished."""

    def __init__(self, bad: Callable[[Signed], None]) -> None:
        self._bad = bad
        self._batch: list[Signed] = []
        self._pending: deque[tuple[list[Signed], Future[bytes] | None]] = deque()
        self._helper: Helper | None = None

    def call_for_help(self) -> None:
        """Start a second process, which is worth it for some thousand signatures."""
        try:
            self._helper = Helper()
        except OSError:  # no processes here: it is only a help
            self._helper = None

    def add(self, signed: Signed) -> None:
        """Take one signature."""
        self._batch.append(signed)
        if len(self._batch) >= _BATCH:
            self._put_aside()

    def finish(self) -> None:
        """Verify what is left. The helper works from the front, this process from the back."""
        self._tell(self._batch)
        self._batch = []
        while self._pending:
            self._tell(*self._pending.pop())

    def close(self) -> None:
        """Let the helper go."""
        if self._helper is not None:
            self._helper.close()

    def _put_aside(self) -> None:
        batch, self._batch = self._batch, []
        while self._pending and _is_answered(self._pending[0][1]):
            self._tell(*self._pending.popleft())
        if len(self._pending) >= _MOST_PENDING:
            self._tell(batch)
            return
        promise = self._helper.promise(_signatures(batch)) if self._helper else None
        self._pending.append((batch, promise))

    def _tell(self, batch: Sequence[Signed], promise: Future[bytes] | None = None) -> None:
        for signed, verdict in zip(batch, _verdicts(batch, promise), strict=True):
            if verdict:
                self._bad(signed)


def _verdicts(batch: Sequence[Signed], promise: Future[bytes] | None) -> bytes:
    if promise is not None and not promise.cancel():
        try:
            return promise.result()
        except (OSError, ValueError):
            pass  # the helper died; its work is done here
    return verdicts(_signatures(batch))


def _signatures(batch: Sequence[Signed]) -> list[Signature]:
    return [signed.signature for signed in batch]


def _is_answered(promise: Future[bytes] | None) -> bool:
    return promise is not None and promise.done()
