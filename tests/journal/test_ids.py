"""Random ids."""

from __future__ import annotations

import base64
import re

import pytest

from gaugelog.journal.ids import base32_128, new_id


def test_an_id_is_26_small_letters_and_digits() -> None:
    assert re.fullmatch("[a-z2-7]{26}", new_id())


def test_ids_do_not_meet() -> None:
    assert 10_000 == len({new_id() for _ in range(10_000)})


def test_sixteen_bytes_read_back_from_their_letters() -> None:
    data = bytes(range(16))
    assert data == base64.b32decode(base32_128(data) + "======")


def test_other_lengths_are_refused() -> None:
    with pytest.raises(ValueError, match="15 bytes, not 16"):
        base32_128(bytes(15))
