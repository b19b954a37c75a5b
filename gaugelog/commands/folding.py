"""Sentences folded between words, so that no terminal breaks them within one."""

from __future__ import annotations

import re
import shutil
import textwrap
from typing import TextIO

_NARROWEST = 20

WHOLE_WORD = 12
"""A word of so many letters or less is not broken after its hyphens either."""


def folded(text: str, stream: TextIO) -> list[str]:
    """A text in lines that fit the terminal `stream` is; to a file or a pipe it goes as it is.

    What follows a line's first piece hangs two further in. A command to copy, after `Next`, is
    left whole.
    """
    if not stream.isatty():
        return [text]
    width = max(shutil.get_terminal_size().columns - 1, _NARROWEST)
    return [part for line in text.split("\n") for part in _pieces(line, width)]


def _pieces(line: str, width: int) -> list[str]:
    if len(line) <= width or line.lstrip().startswith("Next"):
        return [line]
    hanging = " " * (len(line) - len(line.lstrip()) + 2)
    return textwrap.wrap(
        line, width, subsequent_indent=hanging, break_long_words=False, break_on_hyphens=False
    )


def broken(cell: str) -> str:
    """A table's cell with its long words broken after their hyphens, where they have some.

    >>> broken("room-temperature-bond-metal")
    'room-\\ntemperature-\\nbond-metal'
    """
    return "\n".join(
        " ".join(_broken_word(word) for word in line.split(" ")) for line in cell.split("\n")
    )


def _broken_word(word: str) -> str:
    if len(word) <= WHOLE_WORD:
        return word
    lines = [""]
    for piece in re.findall(r"[^-]*-+|[^-]+", word):
        if lines[-1] and len(lines[-1]) + len(piece) > WHOLE_WORD:
            lines.append("")
        lines[-1] += piece
    return "\n".join(lines)
