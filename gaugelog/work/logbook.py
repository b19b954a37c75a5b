"""The logbook: a folder with its journal, ledger and evidence; one deed is one transaction."""

from __future__ import annotations

import sqlite3
import tomllib
from collections.abc import Callable, Iterable, Iterator
from contextlib import contextmanager
from dataclasses import dataclass, field, replace
from pathlib import Path
from typing import TYPE_CHECKING, cast

from gaugelog.errors import Refused, StorageTrouble
from gaugelog.journal.append import append, begin
from gaugelog.journal.certificates import certificates_of
from gaugelog.journal.clock import Clock, Moment, SystemClock
from gaugelog.journal.entry import Entry, Fact, Head
from gaugelog.journal.evidence import FolderEvidence
from gaugelog.journal.header import NAME
from gaugelog.journal.ids import new_id
from gaugelog.journal.keys import Signer
from gaugelog.journal.storage.sqlite import SqliteReader, SqliteStorage, SqliteWriter
from gaugelog.journal.storage.standin import StandIn
from gaugelog.journal.storage.troubles import NotWritable
from gaugelog.ledger import fold, schema
from gaugelog.ledger.base import FactBody
from gaugelog.ledger.view import View
from gaugelog.work.kept import fit_to_keep, text_to_keep

if TYPE_CHECKING:
    from gaugelog.journal.canonical import JsonValue
    from gaugelog.journal.storage.port import OnWait

SIGN = "logbook.toml"
"""The file that makes a folder a logbook."""

DATABASE = "logbook.db"
"""The file beside it that holds journal and ledger."""

FORMAT = 1

UNFINISHED = 'state = "backup"  # not to be worked in; `gaugelog restore` makes a logbook of it\n'
"""The line atop `logbook.toml` in a backup, until the entry that says it was restored is kept."""


@dataclass
class Deed:
    """One deed in the making: what is known, and what it keeps. All of it, or nothing."""

    view: View
    writer: SqliteWriter
    chain: str
    signer: Signer
    moment: Moment
    id: str
    evidence: FolderEvidence
    facts: list[Fact] = field(default_factory=list)
    repeated: tuple[Entry, ...] = ()
    """What this very deed kept before, where the caller asks again for lack of an answer."""

    def keep(
        self, body: FactBody, about: Iterable[str], *, evidence: Iterable[str] = (), sheet: str = ""
    ) -> None:
        """Keep a fact of the trade; `about` names every subject concerned.

        Raises Faulty for text that can't be kept.
        """
        content = body.model_dump(mode="json", exclude_none=True)
        self.keep_fact(
            Fact(
                body.kind,
                body.version,
                tuple(dict.fromkeys(about)),
                content,
                tuple(evidence),
                (sheet,) if sheet else (),
            )
        )

    def keep_fact(self, fact: Fact) -> None:
        """Keep a fact of the journal's own. Raises Faulty for text that can't be kept."""
        content = cast("dict[str, JsonValue]", fit_to_keep(fact.content))
        self.facts.append(replace(fact, content=content))


class Logbook:
    """An open logbook. `id` names it among key folders, `chain` is this copy's own chain."""

    def __init__(
        self,
        folder: Path,
        settings: dict[str, str],
        *,
        clock: Clock | None = None,
        on_wait: OnWait | None = None,
    ) -> None:
        self.folder = folder
        self.id = settings["id"]
        self.name = settings["name"]
        self.chain = settings["chain"]
        self.clock = clock or SystemClock()
        self.storage = SqliteStorage(folder / DATABASE)
        self.evidence = FolderEvidence(folder / "evidence")
        self._on_wait = on_wait

    @classmethod
    def create(cls, folder: Path, name: str, *, clock: Clock | None = None) -> Logbook:
        """Lay down an empty logbook in a new or empty folder; `begin` makes it usable.

        Raises StorageTrouble when something is in the folder, or it can't be written.
        """
        settings = {"id": new_id(), "name": text_to_keep(name), "chain": new_id()}
        try:
            folder.mkdir(parents=True, exist_ok=True)
            if any(folder.iterdir()):
                raise StorageTrouble(f"{folder} is not empty.", "Choose a new folder.")
            logbook = cls(folder, settings, clock=clock)
            logbook.storage.create()
            (folder / "evidence").mkdir()
            (folder / SIGN).write_text(_settings_text(settings), encoding="utf-8")
        except OSError as error:
            raise StorageTrouble(
                f"{folder} can't be written: {error.strerror}.", "Choose a folder you may write."
            ) from error
        with logbook.storage.writing() as writer:
            schema.create_tables(writer.connection)
        return logbook

    @classmethod
    def open(
        cls, folder: Path, *, clock: Clock | None = None, on_wait: OnWait | None = None
    ) -> Logbook:
        """Open the logbook in `folder`; replays the journal when the ledger is of another version.

        Raises StorageTrouble when there is none or it can't be read.
        """
        logbook = cls(folder, _read_settings(folder), clock=clock, on_wait=on_wait)
        with logbook.storage.reading() as reader:
            version = schema.ledger_version(reader.connection)
        if version > schema.LEDGER_VERSION:
            raise StorageTrouble(
                f"The logbook in {folder} was last used with a newer Gaugelog "
                f"(ledger {version}, this one knows {schema.LEDGER_VERSION}).",
                "Update Gaugelog: this one would pass over what it does not know.",
            )
        if version != schema.LEDGER_VERSION:
            logbook._bring_up_to_date()
        return logbook

    def _bring_up_to_date(self) -> None:
        """Rebuild the ledger; of a logbook that can't be written, in a copy to read from."""
        try:
            self.rebuild()
        except NotWritable:
            self.storage = copy = StandIn(self.storage)
            self.rebuild()
            copy.seal()

    def begin(self, signer: Signer, facts: Callable[[Deed], None]) -> list[Entry]:
        """Keep the first deed: authority, custodian's certificate, and what `facts` adds."""
        deed = new_id()
        with self.storage.writing(self._on_wait) as writer:
            moment = self.clock.now()
            making = self._deed(writer, signer, moment, deed)
            facts(making)
            kept = begin(writer, making.facts, signer, moment, self.chain, deed, name=self.name)
            fold.keep(writer.connection, kept)
        return kept

    def discard(self) -> None:
        """Take away what `create` laid down, of a logbook that never began; the folder stays."""
        import shutil

        self.storage.close()
        for file in (SIGN, "logbook.db", "logbook.db-wal", "logbook.db-shm"):
            (self.folder / file).unlink(missing_ok=True)
        shutil.rmtree(self.folder / "evidence", ignore_errors=True)

    @contextmanager
    def reading(self) -> Iterator[View]:
        """Look at what is known: one unchanging view."""
        with self.storage.reading() as reader, _ledger_told():
            yield self._view(reader)

    @contextmanager
    def deed(self, signer: Signer, deed: str | None = None) -> Iterator[Deed]:
        """Do one deed: rules are asked, facts are kept, tables follow; all of it or nothing.

        Raises Refused when the signer's certificate is not in force, and StorageTrouble when the
        logbook can't be written.
        """
        with self.storage.writing(self._on_wait) as writer, _ledger_told():
            # Not before: another may have written while this one waited.
            moment = self.clock.now()
            standing = certificates_of(writer).standing(
                signer.fingerprint, signer.person, moment.utc
            )
            if standing:
                raise Refused(
                    f"{signer.person} can't sign: {standing}", "Have the person enrolled anew."
                )
            making = self._deed(writer, signer, moment, deed or new_id())
            making.repeated = tuple(writer.deed(making.id))
            yield making
            if making.facts:
                kept = append(writer, self.chain, making.facts, signer, moment, making.id)
                fold.keep(writer.connection, kept)

    def head(self) -> Head:
        """The head of this logbook's own chain."""
        with self.storage.reading() as reader:
            head = reader.head(self.chain)
        if head is None:
            raise StorageTrouble("The journal is empty.", "Start the logbook again.")
        return head

    def rebuild(self) -> None:
        """Throw the ledger's tables away and fold them anew from the journal."""
        with self.storage.writing(self._on_wait) as writer:
            fold.rebuild(writer)

    def _deed(self, writer: SqliteWriter, signer: Signer, moment: Moment, deed: str) -> Deed:
        view = self._view(writer)
        return Deed(view, writer, self.chain, signer, moment, deed, self.evidence)

    def _view(self, reader: SqliteReader) -> View:
        return View(reader.connection, reader.sheet)


@contextmanager
def _ledger_told() -> Iterator[None]:
    """Say plainly that a table of the ledger is missing or has other columns."""
    try:
        yield
    except sqlite3.OperationalError as error:
        if "no such" not in str(error) and "no column" not in str(error):
            raise
        raise StorageTrouble(
            f"The ledger's tables are not as Gaugelog laid them down: {error}.",
            "Nothing is lost: rebuild them with `gaugelog journal rebuild`.",
        ) from error


def find_logbook(start: Path, asked: Path | None) -> Path:
    """The logbook's folder: the one asked for, else found by walking up from `start`.

    Raises StorageTrouble when there is none.
    """
    if asked is not None:
        if (asked / SIGN).is_file():
            return asked
        if (asked / DATABASE).is_file():
            raise _without_sign(asked)
        raise StorageTrouble(
            f"There is no logbook in {asked}.", "Name the folder that holds logbook.toml."
        )
    for folder in (start, *start.parents):
        if (folder / SIGN).is_file():
            return folder
        if (folder / DATABASE).is_file():
            raise _without_sign(folder)
    raise StorageTrouble(
        "There is no logbook here or in any folder above.",
        "Go into one, name it with --logbook, or make one with `gaugelog start`.",
    )


def _without_sign(folder: Path) -> StorageTrouble:
    return StorageTrouble(
        f"{SIGN} is missing beside {folder / DATABASE}; it names the logbook.",
        f"Nothing else is lost: put {SIGN} back from a backup.",
    )


def _settings_text(settings: dict[str, str]) -> str:
    import json

    lines = ["# A Gaugelog logbook. Keep this file with logbook.db and evidence/.", "format = 1"]
    # A JSON string is a TOML string.
    lines += [f"{key} = {json.dumps(value)}" for key, value in settings.items()]
    return "\n".join(lines) + "\n"


def _read_settings(folder: Path) -> dict[str, str]:
    try:
        data = (folder / SIGN).read_bytes()
    except OSError as error:
        raise StorageTrouble(
            f"{folder / SIGN} can't be read: {error.strerror}.", "Restore it from a backup."
        ) from error
    if data.startswith(UNFINISHED.encode()):
        raise StorageTrouble(
            f"{folder} was unpacked from a backup and its restoring was not finished.",
            "Delete the folder, then: gaugelog restore FILE.zip FOLDER --as ID",
        )
    return parse_settings(data, str(folder / SIGN))


def _demand_names(settings: dict[str, str]) -> None:
    """The ids name folders and chains, so they may be nothing but names. Raises ValueError."""
    for key in ("id", "chain"):
        if NAME.fullmatch(settings[key]) is None:
            raise ValueError(f"{key} is no name.")


def parse_settings(data: bytes, where: str) -> dict[str, str]:
    """What `logbook.toml` says: `id`, `name`, `chain`. Raises StorageTrouble naming `where`."""
    try:
        found = tomllib.loads(data.decode())
        settings = {key: str(found[key]) for key in ("id", "name", "chain")}
        version = int(found["format"])
        _demand_names(settings)
    except (tomllib.TOMLDecodeError, UnicodeDecodeError, KeyError, ValueError, TypeError) as error:
        raise StorageTrouble(f"{where} is damaged.", "Restore it from a backup.") from error
    if version > FORMAT:
        raise StorageTrouble(
            f"{where} was written by a newer Gaugelog (format {version}).", "Update Gaugelog."
        )
    return settings
