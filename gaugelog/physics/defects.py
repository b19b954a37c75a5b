"""Defects of wiring in words: what a suspect of a fitted size is called, and where it lies."""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

from gaugelog.physics.suspects import Suspect

Kind = Literal[
    "nothing", "open", "missing completion", "short", "leak", "wrong value", "joint", "swapped"
]

SHORT_PART = 0.02
"""A path under this part of a nominal arm is called a short, above it a leak."""


@dataclass(frozen=True, slots=True)
class Defect:
    """A defect as found: its kind, where it is, and its size in ohm where it has one.

    The size of a wrong value is the value found; of a joint what it adds; of a short or a leak
    the resistance of the path.
    """

    kind: Kind
    where: tuple[str, ...] = ()
    size: float | None = None

    @property
    def place(self) -> str:
        """Where it is, in words."""
        return " and ".join(self.where)

    @property
    def what(self) -> str:
        """What it is, ready for its place to follow."""
        size = "" if self.size is None else ohm(self.size)
        return {
            "nothing": "nothing wrong that resistance shows",
            "open": "open circuit in",
            "missing completion": "no completion at",
            "short": f"short of {size} between",
            "leak": f"leak of {size} between",
            "wrong value": f"{size} instead of the planned value in",
            "joint": f"joint with {size} too much at",
            "swapped": "swapped wires of",
        }[self.kind]

    @property
    def sentence(self) -> str:
        """The defect as a person reads it."""
        return f"{self.what} {self.place}".rstrip()


def found(suspect: Suspect, size: float | None, nominal: float) -> Defect:
    """The defect that a suspect of a fitted size is; `nominal` is an ordinary arm, ohm.

    Source: the words of the trade (common practice).
    """
    if suspect.family == "across":
        small = size is not None and size < SHORT_PART * nominal
        return Defect("short" if small else "leak", suspect.where, size)
    if suspect.family == "open":
        return Defect("missing completion" if suspect.completion else "open", suspect.where)
    if suspect.family == "value":
        return Defect("wrong value", suspect.where, size)
    added = None if size is None else size - suspect.present
    return Defect(suspect.family, suspect.where, added)


def ohm(value: float) -> str:
    """A resistance as people write it: three digits with Ω, kΩ, MΩ or GΩ.

    Source: SI prefixes.

    >>> ohm(2_100_000.0), ohm(999_600.0)
    ('2.1 MΩ', '1 MΩ')
    """
    for scale, unit, digits in ((1e9, "GΩ", 3), (1e6, "MΩ", 3), (1e3, "kΩ", 4)):
        if float(f"{value:.{digits}g}") >= scale:
            return f"{value / scale:.3g} {unit}"
    return f"{value:.1f} Ω"
