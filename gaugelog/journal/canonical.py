"""Canonical JSON: one byte form for each value, so that a hash of it means something.

The form is RFC 8785 for the values the journal allows: null, true, false, whole numbers within
±(2⁵³ − 1), text in Unicode normal form C, lists, and objects whose names are ASCII. There are no
floats: a reading is the decimal text that was typed. Within these bounds the standard library
writes RFC 8785 byte for byte.
"""

from __future__ import annotations

import json
import re
import unicodedata
from collections.abc import Mapping, Sequence
from typing import NoReturn, TypeAlias

from gaugelog.errors import GaugelogError

JsonValue: TypeAlias = "bool | int | str | Sequence[JsonValue] | Mapping[str, JsonValue] | None"
"""What the journal can keep. Lists and tuples are arrays, dicts are objects."""

LARGEST = 2**53 - 1
"""The largest whole number that every JSON reader keeps exactly."""


class NotCanonical(GaugelogError, ValueError):
    """A value has no canonical form, or bytes are not in it."""


def nfc(text: str) -> str:
    """Return `text` in Unicode normal form C, as the journal wants it."""
    return unicodedata.normalize("NFC", text)


def canonical(value: JsonValue) -> bytes:
    """Return the one UTF-8 form of `value`.

    Raises NotCanonical for a float, a number out of range, a name that is not ASCII text, text
    that is not in normal form C or holds a lone surrogate, and anything that is not JSON.

    >>> canonical({"b": 1, "a": ["Ω", None]}).decode()
    '{"a":["Ω",null],"b":1}'
    """
    try:
        _allow(value)
        return _written(value)
    except RecursionError:
        raise NotCanonical("The value is nested too deeply to be kept.") from None


def parse(data: bytes, *, strict: bool = False) -> JsonValue:
    """Return the value that `data` holds.

    Refuses names given twice, floats, numbers out of range and lone surrogates; with `strict`
    also any bytes that differ from `canonical` of their own value. Raises NotCanonical.
    """
    try:
        text = data.decode("utf-8")
        if strict:
            return _read_canonical(data, text)
        value: JsonValue = _READ(text)
        _written(value)
    except RecursionError:
        raise NotCanonical("The JSON is nested too deeply.") from None
    except UnicodeDecodeError:
        raise NotCanonical("The bytes are not UTF-8 text.") from None
    except json.JSONDecodeError as error:
        raise NotCanonical(f"The bytes are not JSON: {error}.") from None
    return value


def _read_canonical(data: bytes, text: str) -> JsonValue:
    # Writing the value again shows doubled names, spaces, escapes, -0 and whatever comes after
    # the value. The quotes around each text compose with nothing, so the whole is in normal form
    # just when each text in it is.
    value: JsonValue = _READ_FIRST(text)[0]
    if _written(value) != data:
        raise NotCanonical("The JSON is not in canonical form.")
    if not data.isascii():
        _allow_text(text)
        if _NAME_BEYOND_ASCII.search(text):
            raise NotCanonical("A name in the JSON is not ASCII text.")
    return value


def _written(value: JsonValue) -> bytes:
    try:
        return _WRITE(value).encode("utf-8")
    except UnicodeEncodeError:
        raise NotCanonical("The text holds half of a surrogate pair.") from None


def _allow(value: object) -> None:
    if type(value) is str:
        if not value.isascii():
            _allow_text(value)
    elif isinstance(value, str):
        _allow_text(value)
    elif isinstance(value, dict):
        for name, member in value.items():
            if not isinstance(name, str) or not name.isascii():
                raise NotCanonical(f"The name {name!r} is not ASCII text.")
            _allow(member)
    elif isinstance(value, list | tuple):
        for member in value:
            _allow(member)
    elif isinstance(value, int):
        _allow_number(value)
    elif isinstance(value, float):
        raise NotCanonical(f"{value!r} is a float; the journal keeps decimal text.")
    elif value is not None:
        raise NotCanonical(f"A {type(value).__name__} is not a JSON value.")


def _allow_text(text: str) -> None:
    if text.isascii() or unicodedata.is_normalized("NFC", text):
        return
    raise NotCanonical(f"The text {text!r} is not in Unicode normal form C.")


def _allow_number(number: int) -> None:
    if not -LARGEST <= number <= LARGEST:
        raise NotCanonical(f"The number {number} is beyond ±(2**53 - 1).")


def _whole(text: str) -> int:
    # Seventeen characters cover the range with its sign; longer text is refused before int()
    # spends time on it.
    if len(text) > len(str(-LARGEST)):
        raise NotCanonical("A number is beyond ±(2**53 - 1).")
    number = int(text)
    _allow_number(number)
    return number


def _no_float(text: str) -> NoReturn:
    raise NotCanonical(f"{text} is a float; the journal keeps decimal text.")


def _no_doubles(pairs: list[tuple[str, JsonValue]]) -> dict[str, JsonValue]:
    found = dict(pairs)
    if len(found) != len(pairs):
        raise NotCanonical("A name is given twice in one object.")
    return found


_NAME_BEYOND_ASCII = re.compile(r'[^\x00-\x7f](?:[^"\\]|\\.)*":')
"""From a character beyond ASCII to the end of its text, which a colon shows to be a name."""

# A value that holds itself is found before, by walking it.
_WRITE = json.JSONEncoder(
    sort_keys=True,
    separators=(",", ":"),
    ensure_ascii=False,
    allow_nan=False,
    check_circular=False,
).encode
_READ = json.JSONDecoder(
    parse_float=_no_float,
    parse_int=_whole,
    parse_constant=_no_float,
    object_pairs_hook=_no_doubles,
).decode
# Without the hook for pairs the decoder is twice as fast; writing the value again finds doubles.
_READ_FIRST = json.JSONDecoder(
    parse_float=_no_float, parse_int=_whole, parse_constant=_no_float
).raw_decode
