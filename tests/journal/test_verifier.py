"""Verifying many signatures, here and with a second process."""

from __future__ import annotations

from concurrent.futures import Future
from concurrent.futures.process import BrokenProcessPool

import pytest
from cryptography.hazmat.primitives.serialization import Encoding, PublicFormat

from gaugelog.journal.check import verifier
from gaugelog.journal.check.verifier import Signed, Verifier, bad_ones
from tests.journal.samples import signer


def signed(position: int, *, good: bool = True) -> Signed:
    """A signature, or one that does not fit."""
    own = signer("technician")
    public = own.private_key.public_key()
    key = public.public_bytes(Encoding.DER, PublicFormat.SubjectPublicKeyInfo)
    data = str(position).encode()
    return Signed(key, own.sign(data if good else b"other"), data, position, f"entry {position}")


def found_bad(count: int, bad: set[int]) -> set[int]:
    """The positions that a verifier calls bad among `count` signatures."""
    told: list[Signed] = []
    judge = Verifier(told.append)
    try:
        for position in range(count):
            judge.add(signed(position, good=position not in bad))
        judge.finish()
    finally:
        judge.close()
    assert len(told) == len({one.position for one in told})
    return {one.position for one in told}


@pytest.fixture
def small(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(verifier, "_BATCH", 5)
    monkeypatch.setattr(verifier, "_WORTH_A_HELPER", 2)


def test_signatures_that_do_not_fit_are_found_by_place() -> None:
    assert [1, 3] == bad_ones([signed(place, good=place % 2 == 0) for place in range(4)])


def test_bytes_that_are_no_signature_do_not_fit() -> None:
    assert [0] == bad_ones([signed(1)._replace(signature=b"junk")])


@pytest.mark.parametrize("count", [0, 1, 4])
def test_a_few_are_verified_without_help(count: int) -> None:
    assert set(range(count)) == found_bad(count, set(range(count)))


@pytest.mark.usefixtures("small")
def test_many_are_verified_with_help_and_none_is_left_out_or_told_twice() -> None:
    bad = {0, 4, 5, 33, 58, 59}
    assert bad == found_bad(60, bad)


@pytest.mark.usefixtures("small")
def test_more_than_may_wait_are_verified_here_at_once(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(verifier, "_MOST_PENDING", 3)
    bad = {0, 20, 58}
    assert bad == found_bad(60, bad)


@pytest.mark.usefixtures("small")
def test_without_processes_all_is_done_here(monkeypatch: pytest.MonkeyPatch) -> None:
    def no_process(*_: object, **__: object) -> None:
        raise OSError("no more processes")

    monkeypatch.setattr(verifier, "ProcessPoolExecutor", no_process)
    assert {7, 29} == found_bad(30, {7, 29})


class _Dying:
    """A helper that takes work and dies of it."""

    def __init__(self, *_: object, **__: object) -> None:
        self.taken = 0

    def submit(self, *_: object) -> Future[list[int]]:
        self.taken += 1
        if self.taken > 3:
            raise BrokenProcessPool("dead")
        promise: Future[list[int]] = Future()
        promise.set_running_or_notify_cancel()
        promise.set_exception(BrokenProcessPool("dead"))
        return promise

    def shutdown(self, *, cancel_futures: bool) -> None:
        assert cancel_futures


@pytest.mark.usefixtures("small")
def test_what_a_helper_that_died_left_undone_is_done_here(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(verifier, "ProcessPoolExecutor", _Dying)
    assert {1, 13, 28} == found_bad(30, {1, 13, 28})
