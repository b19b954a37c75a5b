"""Verifies many signatures: a few at once where they come up, many with the help of a process.

Threads would have to pass Python's lock to and fro for each signature while the walk goes on,
which takes longer than doing one after the other. A second process has a lock of its own.
"""

from __future__ import annotations

import multiprocessing
from collections import deque
from collections.abc import Callable, Sequence
from concurrent.futures import Future, ProcessPoolExecutor
from concurrent.futures.process import BrokenProcessPool
from functools import lru_cache
from typing import NamedTuple

from cryptography.exceptions import InvalidSignature
from cryptography.hazmat.primitives.asymmetric import ec
from cryptography.hazmat.primitives.hashes import SHA256
from cryptography.hazmat.primitives.serialization import load_der_public_key

_ECDSA = ec.ECDSA(SHA256())

_BATCH = 256
_WORTH_A_HELPER = 8
"""Batches from which on a second process saves more time than it takes to start."""

_MOST_PENDING = 64
"""Batches that may wait for the helper; beyond that they are verified here, to bound memory."""


class Signed(NamedTuple):
    """A signature (ECDSA with SHA-256, DER) over `data` by a public key (DER), and whose it is."""

    key: bytes
    signature: bytes
    data: bytes
    position: int
    where: str


class Verifier:
    """Takes signatures one by one and tells which are bad, at the latest when finished."""

    def __init__(self, bad: Callable[[Signed], None]) -> None:
        self._bad = bad
        self._batch: list[Signed] = []
        self._pending: deque[tuple[list[Signed], Future[list[int]] | None]] = deque()
        self._helper: ProcessPoolExecutor | None = None
        self._may_help = True

    def add(self, signed: Signed) -> None:
        """Take one signature."""
        self._batch.append(signed)
        if len(self._batch) >= _BATCH:
            self._send()

    def finish(self) -> None:
        """Verify what is left. The helper works from the front, this process from the back."""
        self._tell(self._batch, bad_ones(self._batch))
        self._batch = []
        while self._pending:
            batch, promise = self._pending.pop()
            if promise is None or promise.cancel():
                self._tell(batch, bad_ones(batch))
            else:
                self._tell(batch, _answer(batch, promise))

    def close(self) -> None:
        """Let the helper go."""
        if self._helper is not None:
            self._helper.shutdown(cancel_futures=True)

    def _send(self) -> None:
        batch, self._batch = self._batch, []
        if len(self._pending) >= _MOST_PENDING:
            self._tell(batch, bad_ones(batch))
            self._drop_answered()
            return
        self._pending.append((batch, self._promise(batch)))
        if len(self._pending) == _WORTH_A_HELPER and self._helper is None and self._may_help:
            self._start_helper()

    def _drop_answered(self) -> None:
        while self._pending and (promise := self._pending[0][1]) is not None and promise.done():
            batch, _ = self._pending.popleft()
            self._tell(batch, _answer(batch, promise))

    def _start_helper(self) -> None:
        try:
            context = multiprocessing.get_context("spawn")
            self._helper = ProcessPoolExecutor(1, mp_context=context)
        except (OSError, ImportError, ValueError):  # no processes here: it is only a help
            self._may_help = False
            return
        waiting = [batch for batch, _ in self._pending]
        self._pending = deque((batch, self._promise(batch)) for batch in waiting)

    def _promise(self, batch: list[Signed]) -> Future[list[int]] | None:
        if self._helper is None or not self._may_help:
            return None
        try:
            return self._helper.submit(bad_ones, batch)
        except (BrokenProcessPool, RuntimeError, OSError):
            self._may_help = False
            return None

    def _tell(self, batch: Sequence[Signed], bad: Sequence[int]) -> None:
        for place in bad:
            self._bad(batch[place])


def bad_ones(batch: Sequence[Signed]) -> list[int]:
    """The places in the batch of the signatures that do not fit."""
    return [place for place, signed in enumerate(batch) if not _fits(signed)]


def _answer(batch: Sequence[Signed], promise: Future[list[int]]) -> list[int]:
    try:
        return promise.result()
    except (BrokenProcessPool, OSError):
        # The helper died; its work is done here.
        return bad_ones(batch)


def _fits(signed: Signed) -> bool:
    try:
        _loaded(signed.key).verify(signed.signature, signed.data, _ECDSA)
    except (InvalidSignature, ValueError):
        return False
    return True


@lru_cache(maxsize=256)
def _loaded(key: bytes) -> ec.EllipticCurvePublicKey:
    loaded = load_der_public_key(key)
    if not isinstance(loaded, ec.EllipticCurvePublicKey):
        raise TypeError("key is not on an elliptic curve.")
    return loaded
