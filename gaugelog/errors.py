"""The one tree of errors that stop the program, and the faults found in people's input.

What is wrong with data comes back as a list of `Fault`; what stops the program is raised as a
`GaugelogError`, which can explain itself to a person and knows its exit code.
"""

from __future__ import annotations

from collections.abc import Iterable
from dataclasses import dataclass
from enum import IntEnum
from typing import ClassVar


class ExitCode(IntEnum):
    """What the command's exit status means; documented in the README."""

    OK = 0
    TROUBLE = 1
    """A check found trouble: the journal, the plan or the machine is not as it should be."""
    USAGE = 2
    """The command line could not be understood."""
    FAULTS = 3
    """A file or a typed value has faults; each was named with its place, nothing was stored."""
    REFUSED = 4
    """A rule forbids the deed now: order of steps, failed check, missing role or signature."""
    KEY = 5
    """A passphrase, key or certificate is wrong, missing, revoked or expired."""
    STORAGE = 6
    """The logbook could not be read or written: missing, damaged, busy, full or read-only."""
    MACHINE = 7
    """Something the machine should have is missing, such as the library that draws PDF pages."""
    UNEXPECTED = 70
    """A defect of Gaugelog itself; nothing half-done was stored."""
    STOPPED = 130
    """The person stopped it with Ctrl-C; a deed is kept whole or not at all."""


class GaugelogError(Exception):
    """Something stopped the program; says what happened and what to do.

    `message` is one plain sentence; `remedy` says what the person can do about it.
    """

    exit_code: ClassVar[ExitCode] = ExitCode.UNEXPECTED

    def __init__(self, message: str, remedy: str = "") -> None:
        super().__init__(message)
        self.message = message
        self.remedy = remedy


class Refused(GaugelogError):
    """A rule forbids the deed now."""

    exit_code = ExitCode.REFUSED


class KeyTrouble(GaugelogError):
    """A passphrase, key or certificate is wrong, missing, revoked or expired."""

    exit_code = ExitCode.KEY


class StorageTrouble(GaugelogError):
    """The logbook could not be read or written."""

    exit_code = ExitCode.STORAGE


class MachineTrouble(GaugelogError):
    """The machine lacks something that the deed needs."""

    exit_code = ExitCode.MACHINE


@dataclass(frozen=True, slots=True)
class Fault:
    """One thing wrong in people's input, with its place and what to do.

    `where` reads like `grids.csv, row 7, column lot` or `point BR-2, step clean`.
    """

    where: str
    what: str
    remedy: str = ""

    def __str__(self) -> str:
        """The fault on one line, as a person reads it."""
        text = f"{self.where}: {self.what}"
        return f"{text} {self.remedy}" if self.remedy else text


class Faulty(GaugelogError):
    """Input had faults; carries every one of them, and says what was therefore not done."""

    exit_code = ExitCode.FAULTS

    def __init__(self, faults: Iterable[Fault], outcome: str = "nothing was stored") -> None:
        self.faults = tuple(faults)
        count = len(self.faults)
        super().__init__(
            f"{count} fault{'' if count == 1 else 's'} found; {outcome}.",
            f"Put {'it' if count == 1 else 'them'} right and try again.",
        )
