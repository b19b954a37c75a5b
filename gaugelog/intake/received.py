"""A row of what was received, and the folder of its file."""

from __future__ import annotations

from dataclasses import dataclass
from pathlib import Path

from gaugelog.intake.fields import Fields
from gaugelog.intake.papers import Paper, paper_of


@dataclass(frozen=True, slots=True)
class Placed:
    """A row, and the folder of its file: what it names lies there."""

    row: Fields
    folder: Path

    @property
    def paper(self) -> Paper | None:
        """The certificate's file that the row names, or None; a fault where it can't be read."""
        return paper_of(self.row, self.folder)


def check_dates(row: Fields, received_on: str, expires: str | None) -> None:
    """Note a fault where something expired before it came."""
    if row.sound("received_on", "expires") and expires is not None and expires < received_on:
        row.fault("expires", "lies before the day it was received.", "Refuse it, or mend the date.")
