"""Texts as they are kept: one Unicode form, no characters that only act and never show."""

from __future__ import annotations

import unicodedata
from collections.abc import Collection
from itertools import islice

from gaugelog.visible import visible

LONGEST = 500
"""Characters of a text, where nothing else is said."""


class Untidy(ValueError):
    """A text that can't be kept; its argument says why, its remedy what to do."""

    def __init__(self, what: str, remedy: str = "") -> None:
        super().__init__(what)
        self.what = what
        self.remedy = remedy


def tidied(text: str, longest: int = LONGEST) -> str:
    """The text without surrounding space, in Unicode form NFC. Raises Untidy when it can't be kept.

    Line feeds and tabs stay; other control characters and halves of a character pair do not.
    """
    if len(text) > longest:
        raise Untidy(f"has {len(text)} characters; {longest} are kept at most.")
    if text.isascii() and text.isprintable():
        return text.strip()
    for char in text:
        if unicodedata.category(char) in {"Cc", "Cs"} and char not in "\n\r\t":
            raise Untidy(f"holds the character {visible(char)}, which never shows.", "Remove it.")
    return unicodedata.normalize("NFC", text.replace("\r\n", "\n").strip())


def listed(names: Collection[str], most: int = 12) -> str:
    """Names one after the other; of many the first few, and how many there are.

    >>> listed(["a", "b"]), listed(["a", "b", "c"], most=2), listed([])
    ('a, b', 'a, b … (3 in all)', 'none')
    """
    shown = ", ".join(islice(names, most))
    if not names:
        return "none"
    return shown if len(names) <= most else f"{shown} … ({len(names)} in all)"
