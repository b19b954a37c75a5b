"""Foreign text made safe to look at: every control, bidi and unseen character becomes visible."""

from __future__ import annotations

import unicodedata

_UNSEEN = frozenset({"Cc", "Cf", "Cs", "Co", "Cn", "Zl", "Zp"})


def visible(text: str, *, keep_newlines: bool = False) -> str:
    """Return `text` with characters that could act on an outlet shown as `‹U+001B›`.

    Covers the Unicode categories Cc, Cf, Cs, Co, Cn, Zl and Zp: escape sequences, line and
    paragraph separators, bidirectional controls, zero-width and unassigned characters. With
    `keep_newlines` a line feed stays a line feed. Printable text of any script is unchanged.

    >>> visible("ok \\x1b[31mred")
    'ok ‹U+001B›[31mred'
    """
    if text.isascii() and text.isprintable():
        return text
    return "".join(_shown(char, keep_newlines) for char in text)


def _shown(char: str, keep_newlines: bool) -> str:
    if char == "\n" and keep_newlines:
        return char
    if unicodedata.category(char) in _UNSEEN:
        return f"‹U+{ord(char):04X}›"
    return char


def counted(count: int, one: str, many: str = "") -> str:
    """A count with its noun; `many` where the plural is not `one` with an s.

    >>> counted(1, "fault"), counted(3, "entry", "entries")
    ('1 fault', '3 entries')
    """
    return f"{count} {one if count == 1 else many or one + 's'}"
