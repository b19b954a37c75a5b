"""Restoring a backup into a new folder; the first entry after it says so, signed."""

from __future__ import annotations

import shutil
from collections.abc import Iterator, Sequence
from contextlib import contextmanager
from dataclasses import dataclass
from pathlib import Path

from gaugelog.errors import StorageTrouble
from gaugelog.journal.check import Report, check
from gaugelog.journal.clock import Clock
from gaugelog.journal.entry import Head, PrintedHead
from gaugelog.journal.files import write_whole
from gaugelog.journal.keys import Signer
from gaugelog.ledger.restored import EntriesMissing, LogbookRestored
from gaugelog.rules.who import demand_role
from gaugelog.work.backup.archive import Archive
from gaugelog.work.backup.missing import missing_entries, parse_heads
from gaugelog.work.kept import demand_reason
from gaugelog.work.logbook import SIGN, Logbook

_EVIDENCE_STEP = 7
"""The step of the check that looks at files; what it finds does not break the chain."""


@dataclass(frozen=True, slots=True)
class Restored:
    """A logbook that was restored: what is missing, and what was lost before the backup."""

    folder: Path
    name: str
    entries: int
    """Entries of the backup."""
    made: str
    """When the backup was made, UTC."""
    at_backup: str
    """The head at the backup, as printed."""
    missing: EntriesMissing | None
    troubles: tuple[str, ...]
    head: str
    """The head now, as printed; it is the entry that says the logbook was restored."""


def restore(
    archive: Archive,
    folder: Path,
    signer: Signer,
    *,
    reason: str,
    printed: Sequence[str] = (),
    clock: Clock | None = None,
) -> Restored:
    """Make a logbook of a backup in a new or empty folder.

    `printed` are heads as they stand on paper. The journal is checked, and the entry that says
    it was restored is kept before the logbook can be opened. Raises Faulty, Refused or
    StorageTrouble; then nothing is left in the folder.
    """
    heads = parse_heads(printed)
    demand_reason(reason, "nothing was restored")
    with _claimed(folder):
        archive.unpack(folder)
        logbook = Logbook(folder, archive.settings, clock=clock)
        try:
            done = _Restoring(archive, logbook, heads).done(signer, reason.strip())
        finally:
            logbook.storage.close()
        # Until here the folder is marked as unfinished, and no command opens it.
        write_whole(folder / SIGN, archive.settings_file)
    return done


@dataclass(frozen=True, slots=True)
class _Restoring:
    """A backup that is unpacked, on its way to a logbook."""

    archive: Archive
    logbook: Logbook
    printed: Sequence[PrintedHead]

    def done(self, signer: Signer, reason: str) -> Restored:
        """Check the journal, rebuild the ledger, keep the entry."""
        report, head, missing = self._checked()
        lost = tuple(
            f"{each.where}: {each.what}" for each in report.troubles if each.step == _EVIDENCE_STEP
        )
        self.logbook.rebuild()
        about = self.archive.about
        fact = LogbookRestored(
            logbook=self.logbook.id,
            backup=self.archive.digest(),
            made=about.made,
            head=head.printed,
            printed=tuple(map(str, self.printed)),
            missing=missing,
            troubles=lost,
            reason=reason,
        )
        with self.logbook.deed(signer) as deed:
            demand_role(deed.view, signer.person, "custodian", "planner", "technician")
            deed.keep(fact, [self.logbook.id])
        return Restored(
            self.logbook.folder,
            self.logbook.name,
            report.entries,
            about.made,
            head.printed,
            missing,
            lost,
            self.logbook.head().printed,
        )

    def _checked(self) -> tuple[Report, Head, EntriesMissing | None]:
        with self.logbook.storage.reading() as reader:
            report = check(reader, self.logbook.evidence)
            broken = [each for each in report.troubles if each.step != _EVIDENCE_STEP]
            if broken:
                raise StorageTrouble(
                    f"The journal in {self.archive.path} is not sound: {broken[0].where}: "
                    f"{broken[0].what}",
                    "Use another backup, and keep this one to find out what happened.",
                )
            head = reader.head(self.logbook.chain)
            if head is None or head.printed != self.archive.about.head:
                raise StorageTrouble(
                    f"The journal in {self.archive.path} does not end at the head it names, "
                    f"{self.archive.about.head}.",
                    "Use another backup.",
                )
            return report, head, missing_entries(reader, head, self.printed)


@contextmanager
def _claimed(folder: Path) -> Iterator[None]:
    """Have a new or empty folder to fill; when that fails, leave it as it was found."""
    there = folder.is_dir()
    try:
        folder.mkdir(parents=True, exist_ok=True)
        if any(folder.iterdir()):
            raise StorageTrouble(f"{folder} is not empty.", "Choose a new folder.")
    except OSError as error:
        raise _unwritable(folder, error) from error
    try:
        yield
    except BaseException as error:
        _clear(folder, keep=there)
        if isinstance(error, OSError):
            raise _unwritable(folder, error) from error
        raise


def _clear(folder: Path, *, keep: bool) -> None:
    shutil.rmtree(folder, ignore_errors=True)
    if keep:
        folder.mkdir(exist_ok=True)


def _unwritable(folder: Path, error: OSError) -> StorageTrouble:
    return StorageTrouble(
        f"{folder} can't be written: {error.strerror}.",
        "Choose a folder that you may write, on a disk with room.",
    )
