"""What a backup holds: `backup.json`, `SHA256SUMS`, and the logbook's own files by their names.

The sums are in the form that `sha256sum -c` reads, so that a backup can be checked without
Gaugelog.
"""

from __future__ import annotations

import json
import re
from collections import Counter
from collections.abc import Iterator, Mapping, Sequence
from dataclasses import asdict, dataclass, fields

from gaugelog.errors import StorageTrouble
from gaugelog.journal.header import HEX_256
from gaugelog.work.logbook import SIGN

FORMAT = "gaugelog-backup 1"
ABOUT, SUMS, DATABASE = "backup.json", "SHA256SUMS", "logbook.db"
ALWAYS = (ABOUT, SUMS, SIGN, DATABASE)
"""The files that every backup holds."""

_EVIDENCE = re.compile(r"evidence/([0-9a-f]{2})/\1[0-9a-f]{62}")
_SHOWN = 200
_SUM = re.compile(r"([0-9a-f]{64}) [ *](.+)")


@dataclass(frozen=True, slots=True)
class About:
    """What `backup.json` says: of which logbook the backup is, and how far it goes."""

    format: str
    logbook: str
    name: str
    head: str
    """The head of the logbook's chain at the backup, as printed."""
    made: str
    """When, UTC, `2026-12-01T09:00:00Z`."""
    program: str

    def to_bytes(self) -> bytes:
        """The file."""
        return (json.dumps(asdict(self), ensure_ascii=False, indent=1) + "\n").encode()

    @staticmethod
    def of(data: bytes) -> About:
        """Read the file. Raises ValueError when it is none, StorageTrouble for a newer format."""
        found = json.loads(data)
        if not isinstance(found, dict):
            raise ValueError("it is no JSON object")
        about = About(**{field.name: _text(found, field.name) for field in fields(About)})
        if about.format != FORMAT:
            raise StorageTrouble(
                f"The backup was written in another format ({about.format}).", "Update Gaugelog."
            )
        return about


def _text(found: Mapping[str, object], name: str) -> str:
    value = found.get(name)
    if not isinstance(value, str):
        raise ValueError(f"it says no {name}")
    return value


def evidence_name(digest: str) -> str:
    """The name of an evidence file in a backup, the same as in the logbook's folder."""
    return f"evidence/{digest[:2]}/{digest}"


def sums_text(sums: Mapping[str, str]) -> str:
    """Digests by name, a line each, as `sha256sum -c` reads them."""
    return "".join(f"{digest}  {name}\n" for name, digest in sums.items())


def parse_sums(data: bytes) -> dict[str, str]:
    """Digests by name. Raises ValueError naming the line that is no sum."""
    sums: dict[str, str] = {}
    for number, line in enumerate(data.decode().splitlines(), start=1):
        match = _SUM.fullmatch(line)
        if match is None or HEX_256.fullmatch(match[1]) is None or match[2] in sums:
            raise ValueError(f"line {number} of {SUMS} can't be read")
        sums[match[2]] = match[1]
    return sums


def faults_of_names(names: Sequence[str], sums: Mapping[str, str]) -> Iterator[str]:
    """What is wrong with the names of a backup's files; a path out of the folder is among it."""
    held = Counter(names)
    for name, count in held.items():
        if name not in ALWAYS and _EVIDENCE.fullmatch(name) is None:
            yield f"it holds {name[:_SHOWN]!r}, which no backup holds"
        elif count > 1:
            yield f"it holds {name} twice"
        elif name != SUMS and name not in sums:
            yield f"{SUMS} does not name {name}"
    for name in (*ALWAYS, *sums):
        if name not in held:
            yield f"{name[:_SHOWN]} is missing from it"
