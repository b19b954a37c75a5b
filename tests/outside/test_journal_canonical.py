"""Canonical JSON against RFC 8785: its own examples, and a library that implements it."""

from __future__ import annotations

from typing import Any

import pytest
import rfc8785
from hypothesis import given, settings

from gaugelog.journal.canonical import LARGEST, canonical
from tests.journal.test_canonical import VALUES


@settings(max_examples=500)
@given(VALUES)
def test_bytes_equal_those_of_a_library_for_rfc_8785(value: Any) -> None:
    assert rfc8785.dumps(value) == canonical(value)


def test_literals_and_text_are_as_in_rfc_8785_section_3_2_2() -> None:
    # RFC 8785, 3.2.2 and 3.2.4: the "string" and "literals" of its sample, from memory; its
    # numbers are floats, which the journal has not.
    value = {"string": '€$\u000f\nA\'B"\\\\"/', "literals": [None, True, False]}
    expected = r"""{"literals":[null,true,false],"string":"€$\u000f\nA'B\"\\\\\"/"}"""
    assert expected.encode() == canonical(value)


@pytest.mark.parametrize("number", [LARGEST, -LARGEST])
def test_whole_numbers_go_as_far_as_i_json_lets_them(number: int) -> None:
    # RFC 7493 (I-JSON), 2.2: integers within ±(2**53 − 1) are kept exactly.
    assert str(9007199254740991 * (1 if number > 0 else -1)).encode() == canonical(number)
