"""Resistances between terminals as people type them: "A to B = 350.2 ohm"."""

from __future__ import annotations

import re
from dataclasses import dataclass

from gaugelog.errors import Fault, Faulty
from gaugelog.intake.typed import TypedReading, parse_reading

_LIKE = "Type it like: A to B = 350.2 ohm; or: A to ARTICLE > 20 Mohm; or: A to B = OL."
_SIGN = re.compile(r"\s*(=|(?=[<>]))\s*")
_TO = re.compile(r"\s+to\s+", re.IGNORECASE)


@dataclass(frozen=True, slots=True)
class PinTyped:
    """A resistance typed between two terminals, which are still named as the person names them."""

    ends: tuple[str, str]
    reading: TypedReading


def parse_pin_reading(text: str) -> PinTyped:
    """Understand a resistance between two terminals. Raises Faulty with one plain sentence.

    >>> parse_pin_reading("A to B = 350.2 ohm").ends
    ('A', 'B')
    """
    places, found, figure = _parted(text.strip())
    ends = [" ".join(end.split()) for end in _TO.split(places)]
    if not found or len(ends) != 2 or not all(ends):
        raise Faulty([Fault(text.strip(), "is no resistance between two terminals.", _LIKE)])
    if ends[0].casefold() == ends[1].casefold():
        raise Faulty([Fault(text.strip(), "names one terminal twice.", _LIKE)])
    try:
        reading = parse_reading(figure, "insulation")
    except Faulty as error:
        raise Faulty([Fault(places, each.what, _remedy(each)) for each in error.faults]) from None
    return PinTyped((ends[0], ends[1]), reading)


def _remedy(fault: Fault) -> str:
    """What to do, by an example of this kind instead of an insulation's."""
    return _LIKE if fault.remedy.startswith("Type it like") else fault.remedy


def _parted(text: str) -> tuple[str, bool, str]:
    """Terminals and figure, parted at the first sign that does not belong to a name."""
    for match in _SIGN.finditer(text):
        places, figure = text[: match.start()], text[match.end() :]
        if _TO.search(places):
            return places, True, figure
    return text, False, ""
