"""Sentences folded between words, so that no terminal breaks them within one."""

from __future__ import annotations

import shutil
import textwrap
from typing import TextIO

_NARROWEST = 20


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
