"""The head of a chain: the number and hash of its last entry, whole and as printed on paper."""

from __future__ import annotations

import re
from dataclasses import dataclass

from gaugelog.errors import Fault, Faulty
from gaugelog.journal.ids import ID_BYTES, base32_128

HASH_BYTES = 32
NO_HASH = bytes(HASH_BYTES)
"""What the first entry of a chain gives as the hash of the one before."""

_PRINTED = re.compile(r"([1-9][0-9]{0,14}):([A-Z2-7]{26})")
# The digits that base32 leaves out, read as the letters they are mistaken for.
_MISREAD = str.maketrans("018", "OIB")


@dataclass(frozen=True, slots=True)
class PrintedHead:
    """A head as it stands on a record: the sequence number and 128 bits of the hash."""

    seq: int
    code: str

    def __str__(self) -> str:
        """As printed, `12:` and 26 characters."""
        return f"{self.seq}:{self.code}"


@dataclass(frozen=True, slots=True)
class Head:
    """An entry of a chain by number and hash; the last one, unless said otherwise."""

    chain: str
    seq: int
    hash: bytes

    @property
    def printed(self) -> str:
        """`12:` and the first 128 bits of the hash as 26 base32 characters."""
        return str(self.short)

    @property
    def short(self) -> PrintedHead:
        """What of this head goes on paper."""
        return PrintedHead(self.seq, base32_128(self.hash[:ID_BYTES]))

    @staticmethod
    def parse_printed(text: str) -> PrintedHead:
        """Read a head as a person copies it from paper.

        Small letters, spaces and hyphens are taken as meant, and 0, 1, 8 as O, I, B. Raises
        Faulty when the rest is not a number, a colon and 26 characters.
        """
        seq, colon, code = re.sub(r"[\s-]", "", text).partition(":")
        match = _PRINTED.fullmatch(f"{seq}{colon}{code.upper().translate(_MISREAD)}")
        if match is None:
            remedy = "Copy it as printed: a number, a colon and 26 letters and digits."
            raise Faulty([Fault("head", f"{text!r} is not a printed head.", remedy)])
        return PrintedHead(int(match[1]), match[2])
