"""Canonical JSON: one byte form for each value, and nothing that has two."""

from __future__ import annotations

import unicodedata
from typing import Any

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.errors import GaugelogError
from gaugelog.journal.canonical import LARGEST, NotCanonical, canonical, nfc, parse

TEXT = st.text(st.characters(exclude_categories=["Cs"])).map(nfc)
NAMES = st.text(st.characters(max_codepoint=127))
VALUES = st.recursive(
    st.none() | st.booleans() | st.integers(-LARGEST, LARGEST) | TEXT,
    lambda inner: st.lists(inner, max_size=4) | st.dictionaries(NAMES, inner, max_size=4),
    max_leaves=12,
)


@given(VALUES)
def test_what_is_written_reads_back_the_same(value: Any) -> None:
    data = canonical(value)
    assert value == parse(data, strict=True)
    assert data == canonical(parse(data))


def test_names_are_sorted_and_no_space_is_wasted() -> None:
    assert '{"a":["Ω",null,true],"b":-1}'.encode() == canonical({"b": -1, "a": ("Ω", None, True)})


@pytest.mark.parametrize(
    ("value", "words"),
    [
        (0.5, "float"),
        ([1, {"a": float("nan")}], "float"),
        (LARGEST + 1, "beyond"),
        (-LARGEST - 1, "beyond"),
        ({"Ω": 1}, "not ASCII"),
        ({1: "a"}, "not ASCII"),
        (unicodedata.normalize("NFD", "é"), "normal form C"),
        ("\ud800", "surrogate"),
        ({1, 2}, "not a JSON value"),
        (b"a", "not a JSON value"),
    ],
)
def test_a_value_without_one_form_is_refused(value: Any, words: str) -> None:
    with pytest.raises(NotCanonical, match=words):
        canonical(value)


def test_a_refusal_is_an_error_of_ours_and_a_value_error() -> None:
    assert issubclass(NotCanonical, GaugelogError)
    assert issubclass(NotCanonical, ValueError)


@pytest.mark.parametrize(
    ("data", "words"),
    [
        (b'{"a":1,"a":2}', "twice"),
        (b"1.0", "float"),
        (b"1e3", "float"),
        (b"NaN", "float"),
        (b"9007199254740992", "beyond"),
        (b"1" * 5000, "beyond"),
        (b'"\\ud800"', "surrogate"),
        (b'"a', "not JSON"),
        (b"\xff", "UTF-8"),
        (b"[" * 100_000, "too deeply"),
    ],
)
def test_bytes_that_mean_nothing_or_two_things_are_refused(data: bytes, words: str) -> None:
    with pytest.raises(NotCanonical, match=words):
        parse(data)


@pytest.mark.parametrize(
    "data",
    [
        b'{"a": 1}',
        b'{"b":1,"a":2}',
        b'{"a":1,"a":1}',
        b"-0",
        b'"\\u0061"',
        b'"\\/"',
        '"e\u0301"'.encode(),
        b'{"\xc3\xa9":1}',
        b'[{"x\xc3\xa9\\"y":1}]',
        b" 1",
    ],
)
def test_strictly_only_the_one_form_is_read(data: bytes) -> None:
    with pytest.raises(NotCanonical):
        parse(data, strict=True)


def test_text_that_looks_like_a_name_beyond_ascii_is_still_text() -> None:
    value: list[Any] = ['Ω":', {"a": 'é\\":'}, "\u0301 begins with an accent"]
    assert value == parse(canonical(value), strict=True)


@given(st.binary() | st.text().map(lambda text: text.encode("utf-8", "replace")))
def test_any_bytes_are_read_or_refused_in_our_own_words(data: bytes) -> None:
    try:
        value = parse(data, strict=True)
    except NotCanonical:
        return
    assert data == canonical(value)


def test_text_is_brought_into_normal_form_by_nfc() -> None:
    assert "é" == nfc("e\u0301")
