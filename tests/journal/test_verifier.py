"""Verifying many signatures, here and with a second process."""

from __future__ import annotations

import io

import pytest
from cryptography.hazmat.primitives.serialization import Encoding, PublicFormat
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.journal.check import verifier
from gaugelog.journal.check.verifier import Helper, Signed, Verifier
from gaugelog.journal.verifying import Signature, fits, packed, serve, unpacked, verdicts
from tests.journal.samples import signer


def signature(text: str, *, good: bool = True) -> Signature:
    """A signature over a text, or one that does not fit."""
    own = signer("technician")
    public = own.private_key.public_key()
    key = public.public_bytes(Encoding.DER, PublicFormat.SubjectPublicKeyInfo)
    data = text.encode()
    return Signature(key, own.sign(data if good else b"other"), data)


def found_bad(count: int, bad: set[int], *, helped: bool = True) -> set[int]:
    """The positions that a verifier calls bad among `count` signatures."""
    told: list[Signed] = []
    judge = Verifier(told.append)
    if helped:
        judge.call_for_help()
    try:
        for place in range(count):
            one = signature(str(place), good=place not in bad)
            judge.add(Signed(place, "chain", place, one))
        judge.finish()
    finally:
        judge.close()
    assert len(told) == len({one.position for one in told})
    return {one.position for one in told}


@pytest.fixture
def small(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr(verifier, "_BATCH", 5)


def test_signatures_that_do_not_fit_are_told_by_place() -> None:
    batch = [signature(str(place), good=place % 2 == 0) for place in range(4)]
    assert bytes([0, 1, 0, 1]) == verdicts(batch)


def test_bytes_that_are_no_signature_do_not_fit() -> None:
    assert not fits(signature("a")._replace(signature=b"junk"))


@given(st.lists(st.tuples(st.binary(), st.binary(), st.binary()), max_size=5))
def test_a_batch_reads_back_from_its_bytes(parts: list[tuple[bytes, bytes, bytes]]) -> None:
    batch = [Signature(*part) for part in parts]
    assert batch == list(unpacked(packed(batch)[4:]))


def test_batches_are_answered_until_there_are_no_more() -> None:
    first, second = [signature("a"), signature("b", good=False)], [signature("c")]
    outgoing = io.BytesIO()
    serve(io.BytesIO(packed(first) + packed(second) + b"\x00"), outgoing)
    assert bytes([0, 1, 0]) == outgoing.getvalue()


def test_a_second_process_gives_the_same_verdicts() -> None:
    helper = Helper()
    try:
        promises = [helper.promise([signature(str(place), good=place > 1)]) for place in range(3)]
        assert [b"\x01", b"\x01", b"\x00"] == [promise.result(20) for promise in promises]
    finally:
        helper.close()


@pytest.mark.usefixtures("small")
@pytest.mark.parametrize("count", [0, 1, 5, 12])
@pytest.mark.parametrize("helped", [True, False])
def test_any_number_is_verified_with_and_without_help(count: int, helped: bool) -> None:
    assert set(range(count)) == found_bad(count, set(range(count)), helped=helped)


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
def test_where_no_process_can_be_started_all_is_done_here(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setattr("sys.executable", "/nowhere/python")
    assert {7, 29} == found_bad(30, {7, 29})
    monkeypatch.setattr("sys.executable", "")
    assert {7, 29} == found_bad(30, {7, 29})


@pytest.mark.usefixtures("small")
def test_what_a_helper_that_died_left_undone_is_done_here(monkeypatch: pytest.MonkeyPatch) -> None:
    ask = Helper._ask

    def die_after_the_first(self: Helper, data: bytes, count: int) -> bytes:
        answer = ask(self, data, count)
        self._process.kill()
        return answer

    monkeypatch.setattr(Helper, "_ask", die_after_the_first)
    assert {1, 13, 28} == found_bad(30, {1, 13, 28})
