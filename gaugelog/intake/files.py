"""Reading people's files: bytes, text in UTF-8, TOML with line and column of a slip."""

from __future__ import annotations

import codecs
import stat
import tomllib
from pathlib import Path
from typing import Any

from gaugelog.errors import Fault, Faulty

LARGEST = 8 * 1024 * 1024
"""Bytes beyond which a file is no plan of a person's."""

_SAVE = "Save it as UTF-8; spreadsheets call that “CSV UTF-8”."


def read_bytes(path: Path, largest: int | None = None) -> bytes:
    """The file's bytes, at most `largest` or LARGEST.

    Raises Faulty when it can't be read, is empty or larger than that.
    """
    most = LARGEST if largest is None else largest
    try:
        found = path.stat()
        size = found.st_size
        if not stat.S_ISREG(found.st_mode):
            raise Faulty([Fault(path.name, "is no file.", "Name the file itself.")])
        data = path.read_bytes() if size <= most else b""
    except (OSError, ValueError) as error:
        reason = getattr(error, "strerror", None) or "its name can't be one"
        remedy = "See that it is there, is a file, and may be read."
        raise Faulty([Fault(path.name, f"can't be read: {reason}.", remedy)]) from error
    if size > most:
        raise Faulty([Fault(path.name, f"has {size} bytes; {most} are read at most.")])
    if not data.removeprefix(codecs.BOM_UTF8).strip():
        raise Faulty([Fault(path.name, "is empty.")])
    return data


def text_of(name: str, data: bytes) -> str:
    """The text of a file. Raises Faulty with the line of the first byte that is not UTF-8."""
    if data.startswith((codecs.BOM_UTF16_LE, codecs.BOM_UTF16_BE)):
        raise Faulty([Fault(name, "is UTF-16 text.", _SAVE)])
    if data.startswith(b"PK\x03\x04"):
        raise Faulty([Fault(name, "is a spreadsheet or an archive, not text.", _SAVE)])
    try:
        text = data.decode("utf-8-sig")
    except UnicodeDecodeError as error:
        line = data.count(b"\n", 0, error.start) + 1
        byte = f"byte {data[error.start]:02X}"
        what = f"is not UTF-8 text ({byte}); an older code such as Latin-1 is not guessed."
        raise Faulty([Fault(f"{name}, line {line}", what, _SAVE)]) from error
    if "\x00" in text:
        line = text.count("\n", 0, text.index("\x00")) + 1
        raise Faulty([Fault(f"{name}, line {line}", "holds a zero byte, so it is no text.", _SAVE)])
    return text


def toml_of(name: str, data: bytes) -> dict[str, Any]:
    """The values of a TOML file. Raises Faulty with line and column of a slip."""
    text = text_of(name, data)
    try:
        return tomllib.loads(text)
    except tomllib.TOMLDecodeError as error:
        remedy = "Mend the line; text stands in quotes, lists in square brackets."
        raise Faulty([Fault(name, f"is no TOML: {error}.", remedy)]) from error
    except RecursionError as error:
        raise Faulty([Fault(name, "is nested too deeply.")]) from error
    except ValueError as error:
        # The parser lets through what Python says about a number of thousands of digits.
        raise Faulty([Fault(name, "holds a number of far too many digits.")]) from error
