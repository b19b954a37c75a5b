"""What every storage must do; run on each by subclassing `StorageContract`."""

from __future__ import annotations

import threading
from collections.abc import Callable
from dataclasses import replace
from itertools import pairwise

import pytest

from gaugelog.errors import StorageTrouble
from gaugelog.journal.append import append
from gaugelog.journal.entry import Entry, Head, sha256
from gaugelog.journal.ids import new_id
from gaugelog.journal.storage.memory import MemoryStorage
from gaugelog.journal.storage.port import Reader, Storage, Writer
from tests.journal.samples import CHAIN, START, SampleJournal, note, signer


class Stopped(Exception):
    """Raised by a test within a transaction."""


def keep(writer: Writer, chain: str = CHAIN, text: str = "clean", deed: str = "") -> Entry:
    """Append one entry, signed by the technician."""
    return append(writer, chain, [note(text)], signer("technician"), START, deed or new_id())[0]


class StorageContract:
    """A storage keeps what it is given, in order, and gives it back byte for byte."""

    @pytest.fixture
    def storage(self) -> Storage:
        raise NotImplementedError

    def test_a_new_storage_holds_nothing(self, storage: Storage) -> None:
        with storage.reading() as reader:
            assert [] == reader.chains()
            assert reader.head(CHAIN) is None
            assert reader.entry(CHAIN, 1) is None
            assert [] == list(reader.entries())
            assert [] == reader.deed("deed-1")
            assert [] == reader.sheets()
            assert [] == reader.missing_guards()
            assert [] == reader.damages()

    def test_entries_come_back_byte_for_byte_by_chain_and_number(self, storage: Storage) -> None:
        with storage.writing() as writer:
            kept = [keep(writer, chain) for chain in ("b", "a", "b")]
        with storage.reading() as reader:
            assert [kept[1], kept[0], kept[2]] == list(reader.entries())
            assert [kept[0], kept[2]] == list(reader.entries("b"))
            assert [kept[2]] == list(reader.entries("b", after=1))
            assert kept[2] == reader.entry("b", 2)
            assert ["a", "b"] == reader.chains()

    def test_an_entry_is_filed_where_its_header_says(self, storage: Storage) -> None:
        with storage.writing() as writer:
            entry = keep(writer, deed="deed-1")
        with storage.reading() as reader:
            assert [(CHAIN, 1, "deed-1", 1, "note.taken", entry)] == list(reader.filed(CHAIN))

    def test_the_head_is_the_last_entry_of_its_chain(self, storage: Storage) -> None:
        with storage.writing() as writer:
            keep(writer)
            last = keep(writer)
        with storage.reading() as reader:
            assert Head(CHAIN, 2, last.hash) == reader.head(CHAIN)

    def test_a_writer_reads_what_it_has_just_written(self, storage: Storage) -> None:
        with storage.writing() as writer:
            entry = keep(writer, deed="deed-1")
            assert entry.head == writer.head(CHAIN)
            assert [entry] == writer.deed("deed-1")

    def test_a_deed_is_found_by_its_id_in_order(self, storage: Storage) -> None:
        journal = SampleJournal(storage).start()
        journal.keep(note("a"), note("b"), deed="deed-1")
        with storage.reading() as reader:
            assert [1, 2] == [entry.header.index for entry in reader.deed("deed-1")]

    def test_entries_are_found_by_kind(self, storage: Storage) -> None:
        journal = SampleJournal(storage).start()
        journal.keep()
        with storage.reading() as reader:
            found = reader.of_kinds(["journal.begun", "note.taken"])
            assert [1, 4] == [entry.header.seq for entry in found]

    def test_a_body_may_be_withheld(self, storage: Storage) -> None:
        with MemoryStorage().writing() as elsewhere:
            shown = replace(keep(elsewhere), body_bytes=None)
        with storage.writing() as writer:
            writer.insert(shown)
        with storage.reading() as reader:
            assert [shown] == list(reader.entries())

    def test_an_exception_undoes_everything(self, storage: Storage) -> None:
        def stop_half_way() -> None:
            with storage.writing() as writer:
                keep(writer)
                writer.put_sheet(b"name")
                raise Stopped

        with pytest.raises(Stopped):
            stop_half_way()
        with storage.reading() as reader:
            assert [] == list(reader.entries())
            assert [] == reader.sheets()

    def test_a_reader_has_one_view_whatever_is_written_meanwhile(self, storage: Storage) -> None:
        with storage.reading() as reader:
            with storage.writing() as writer:
                keep(writer)
            assert reader.head(CHAIN) is None
        with storage.reading() as reader:
            assert reader.head(CHAIN) is not None

    @pytest.mark.parametrize(
        "spoil",
        [
            lambda entry: entry,
            lambda entry: _with(entry, seq=3, deed="deed-2"),
            lambda entry: _with(entry, seq=2, deed="deed-2"),
            lambda entry: _with(entry, previous=entry.hash.hex(), deed="deed-2"),
            lambda entry: _with(entry, seq=2, previous=entry.hash.hex()),
            lambda entry: _with(entry, chain="b", seq=1),
        ],
    )
    def test_an_entry_that_does_not_fit_is_refused(
        self, storage: Storage, spoil: Callable[[Entry], Entry]
    ) -> None:
        with storage.writing() as writer:
            entry = keep(writer, deed="deed-1")
        with pytest.raises(StorageTrouble) as caught, storage.writing() as writer:
            writer.insert(spoil(entry))
        assert caught.value.remedy
        with storage.reading() as reader:
            assert [entry] == list(reader.entries())

    def test_identity_sheets_are_kept_by_digest_and_erased(self, storage: Storage) -> None:
        with storage.writing() as writer:
            digest = writer.put_sheet(b"name")
            assert digest == writer.put_sheet(b"name")
        assert sha256(b"name") == digest
        with storage.reading() as reader:
            assert b"name" == reader.sheet(digest)
            assert [digest] == reader.sheets()
        with storage.writing() as writer:
            writer.erase_sheet(digest)
        with storage.reading() as reader:
            assert reader.sheet(digest) is None
        with pytest.raises(StorageTrouble, match="no identity sheet"), storage.writing() as writer:
            writer.erase_sheet(digest)

    def test_a_second_writer_waits_and_is_told_so(self, storage: Storage) -> None:
        waits: list[float] = []
        waiting = threading.Event()

        def on_wait(seconds: float) -> None:
            waits.append(seconds)
            waiting.set()

        def second() -> None:
            with storage.writing(on_wait) as writer:
                keep(writer, text="second")

        thread = threading.Thread(target=second)
        with storage.writing() as writer:
            thread.start()
            assert waiting.wait(5)
            keep(writer, text="first")
        thread.join(5)
        assert waits == sorted(waits)
        with storage.reading() as reader:
            assert ["first", "second"] == [entry.body.fact["text"] for entry in reader.entries()]

    def test_many_writers_lose_nothing_and_never_fork(self, storage: Storage) -> None:
        def write() -> None:
            for _ in range(10):
                with storage.writing() as writer:
                    keep(writer)

        threads = [threading.Thread(target=write) for _ in range(4)]
        for thread in threads:
            thread.start()
        for thread in threads:
            thread.join(20)
        with storage.reading() as reader:
            assert list(range(1, 41)) == [entry.header.seq for entry in reader.entries()]
            assert _linked(reader)


def _with(entry: Entry, **fields: str | int) -> Entry:
    header = replace(entry.header, **fields)  # type: ignore[arg-type]
    return replace(entry, header_bytes=header.to_bytes())


def _linked(reader: Reader) -> bool:
    entries = list(reader.entries(CHAIN))
    return all(before.hash.hex() == after.header.previous for before, after in pairwise(entries))
