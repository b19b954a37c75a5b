"""Making a backup: one view of the database, the evidence, and the sums of both, in one file."""

from __future__ import annotations

import hashlib
import io
import os
import shutil
import tempfile
import zipfile
from collections.abc import Iterator
from contextlib import contextmanager
from dataclasses import dataclass
from pathlib import Path
from typing import BinaryIO

from gaugelog import __version__
from gaugelog.errors import Refused, StorageTrouble
from gaugelog.journal.check import Report, check
from gaugelog.journal.clock import Moment
from gaugelog.journal.entry import Head
from gaugelog.journal.files import settle
from gaugelog.journal.storage.snapshot import copy_database
from gaugelog.journal.storage.troubles import told_plainly
from gaugelog.work.backup.archive import PIECE, opened
from gaugelog.work.backup.layout import (
    ABOUT,
    DATABASE,
    FORMAT,
    SUMS,
    About,
    evidence_name,
    sums_text,
)
from gaugelog.work.logbook import SIGN, UNFINISHED, Logbook


@dataclass(frozen=True, slots=True)
class BackedUp:
    """A backup that was made: up to which head, how large, and what the check found."""

    path: Path
    head: Head
    files: int
    size: int
    """Bytes of the backup's file."""
    digest: str
    """SHA-256 of the backup's file."""
    report: Report


def backup(logbook: Logbook, target: Path) -> BackedUp:
    """Back the logbook up to a new file while others may go on working in it.

    What is backed up is checked, and backed up even when the check finds trouble. Raises Refused
    when `target` is there, StorageTrouble when it can't be written; then nothing is left.
    """
    if target.exists():
        raise _taken(target)
    with _written_plainly(target), _scratch(target) as scratch:
        _demand_room(target, logbook.storage.path.stat().st_size)
        with logbook.storage.reading() as reader:
            with told_plainly(target):
                copy_database(reader, scratch / DATABASE)
            head = reader.head(logbook.chain)
            report = check(reader, logbook.evidence)
        if head is None:
            raise StorageTrouble("The journal is empty.", "Start the logbook again.")
        draft = scratch / "backup.zip"
        files = _pack(logbook, head, scratch / DATABASE, draft)
        size = draft.stat().st_size
        try:
            settle(draft, target)
        except FileExistsError:
            raise _taken(target) from None
    with opened(target) as archive:
        return BackedUp(target, head, files, size, archive.digest(), report)


def _taken(target: Path) -> Refused:
    return Refused(f"{target} is there already.", "Give each backup a name of its own.")


def _pack(logbook: Logbook, head: Head, database: Path, draft: Path) -> int:
    """Write the zip; returns the number of the logbook's files in it."""
    moment = logbook.clock.now()
    # Evidence is kept before the entry that names it, so all that the copied database names
    # is there by now.
    with zipfile.ZipFile(draft, "w") as archive, database.open("rb") as snapshot:
        packing = _Packing(archive, moment)
        packing.add(ABOUT, io.BytesIO(_about(logbook, head, moment).to_bytes()))
        settings = UNFINISHED.encode() + (logbook.folder / SIGN).read_bytes()
        packing.add(SIGN, io.BytesIO(settings))
        packing.add(DATABASE, snapshot)
        for digest in logbook.evidence.digests():
            packing.add(evidence_name(digest), io.BytesIO(logbook.evidence.as_it_lies(digest)))
        sums = sums_text(packing.sums)
        packing.add(SUMS, io.BytesIO(sums.encode()))
    return len(packing.sums) - len((ABOUT, SUMS))


def _about(logbook: Logbook, head: Head, moment: Moment) -> About:
    made = f"{moment.utc:%Y-%m-%dT%H:%M:%SZ}"
    program = f"gaugelog {__version__}"
    return About(FORMAT, logbook.id, logbook.name, head.printed, made, program)


class _Packing:
    """Files going into a zip, each summed as it goes."""

    def __init__(self, archive: zipfile.ZipFile, moment: Moment) -> None:
        self.sums: dict[str, str] = {}
        self._archive = archive
        self._time = moment.utc.timetuple()[:6]

    def add(self, name: str, source: BinaryIO) -> None:
        """Pack a file."""
        info = zipfile.ZipInfo(name, self._time)
        info.compress_type = zipfile.ZIP_DEFLATED
        info.external_attr = 0o644 << 16
        info.file_size = source.seek(0, os.SEEK_END)
        source.seek(0)
        digest = hashlib.sha256()
        with self._archive.open(info, "w") as out:
            while piece := source.read(PIECE):
                digest.update(piece)
                out.write(piece)
        self.sums[name] = digest.hexdigest()


def _demand_room(target: Path, needed: int) -> None:
    """Raise StorageTrouble when the disk can't even take a copy of the database."""
    free = shutil.disk_usage(target.parent).free
    if free < needed:
        raise StorageTrouble(
            f"The disk of {target} has room for {free // 1000} kB; the backup needs more than "
            f"{needed // 1000} kB.",
            "Make room, or write the backup to another disk.",
        )


@contextmanager
def _scratch(target: Path) -> Iterator[Path]:
    """A folder beside the target, so that the finished file only needs its name."""
    with tempfile.TemporaryDirectory(prefix=f".{target.name}.", dir=target.parent) as name:
        yield Path(name)


@contextmanager
def _written_plainly(target: Path) -> Iterator[None]:
    try:
        yield
    except OSError as error:
        raise StorageTrouble(
            f"The backup can't be written to {target}: {error.strerror}.",
            "See that the folder is there, may be written, and the disk has room.",
        ) from error
