"""Certificates as files: read whole, kept as they are, named beside the thing they are of."""

from __future__ import annotations

from collections.abc import Iterator
from contextlib import contextmanager
from dataclasses import dataclass
from pathlib import Path

from gaugelog.errors import Fault, Faulty
from gaugelog.intake.fields import Fields
from gaugelog.intake.files import read_bytes

COLUMN = "certificate_file"
"""The name under which people's files name a certificate's file."""

LARGEST = 40 * 1024 * 1024
"""Bytes beyond which a file is no certificate."""


@dataclass(frozen=True, slots=True)
class Paper:
    """A certificate's file: its own name and its bytes."""

    name: str
    data: bytes


def load_paper(path: Path) -> Paper:
    """Read a certificate's file, of whatever kind. Raises Faulty when it can't be read."""
    return Paper(path.name, read_bytes(path, LARGEST))


def paper_of(each: Fields, folder: Path) -> Paper | None:
    """The certificate that a row or table names by its file beside it, or None.

    A file that can't be read is a fault at the value that names it.
    """
    named = each.text(COLUMN, needed=False)
    if not named:
        return None
    with _told_at(each):
        return load_paper(folder / named)
    return None


@contextmanager
def _told_at(each: Fields) -> Iterator[None]:
    try:
        yield
    except Faulty as error:
        for found in error.faults:
            each.pass_on(
                COLUMN,
                Fault(each.where(COLUMN), f"{found.where} {found.what}", found.remedy),
            )
