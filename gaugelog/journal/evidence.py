"""Evidence: files kept by the SHA-256 of their bytes, so that a file names its own content."""

from __future__ import annotations

from pathlib import Path
from typing import Protocol

from gaugelog.errors import StorageTrouble
from gaugelog.journal.entry import sha256
from gaugelog.journal.files import write_whole
from gaugelog.journal.header import HEX_256


class Evidence(Protocol):
    """Where files that facts rest on are kept. Put and get; nothing is changed or removed."""

    def put(self, data: bytes) -> str:
        """Keep the bytes of a file; returns their SHA-256 digest. Twice the same is kept once."""
        ...

    def get(self, digest: str) -> bytes:
        """The bytes kept under a digest.

        Raises StorageTrouble when they are not there, or are no longer the ones that were kept.
        """
        ...

    def as_it_lies(self, digest: str) -> bytes:
        """The bytes under a digest whatever they are now: for copies that others will check.

        Raises StorageTrouble when there are none.
        """
        ...

    def has(self, digest: str) -> bool:
        """Whether something is kept under a digest."""
        ...

    def digests(self) -> list[str]:
        """All digests, sorted."""
        ...


class FolderEvidence:
    """Evidence in a folder: `ab/abcdef…`, the first two digits of the digest as sub-folder."""

    def __init__(self, path: Path) -> None:
        self.path = path

    def put(self, data: bytes) -> str:
        """Keep the bytes of a file. Raises StorageTrouble when they can't be written."""
        digest = sha256(data)
        place = self._place(digest)
        try:
            if place.is_file() and place.read_bytes() == data:
                return digest
            place.parent.mkdir(parents=True, exist_ok=True)
            write_whole(place, data)
        except OSError as error:
            raise StorageTrouble(
                f"The file can't be kept in {self.path}: {error.strerror}.",
                "See that you may write there and the disk has room.",
            ) from None
        return digest

    def get(self, digest: str) -> bytes:
        """The bytes kept under a digest. Raises StorageTrouble where they are gone or altered."""
        return _held_to(digest, self.as_it_lies(digest))

    def as_it_lies(self, digest: str) -> bytes:
        """The bytes under a digest whatever they are now."""
        if not self.has(digest):
            raise _not_there(digest)
        try:
            return self._place(digest).read_bytes()
        except OSError as error:
            raise StorageTrouble(
                f"The evidence {digest} can't be read: {error.strerror}.",
                "See that you may read it, or restore it from a backup.",
            ) from None

    def has(self, digest: str) -> bool:
        """Whether something is kept under a digest."""
        return HEX_256.fullmatch(digest) is not None and self._place(digest).is_file()

    def digests(self) -> list[str]:
        """All digests."""
        names = (file.name for file in self.path.glob("[0-9a-f][0-9a-f]/*"))
        return sorted(name for name in names if HEX_256.fullmatch(name))

    def _place(self, digest: str) -> Path:
        return self.path / digest[:2] / digest


class MemoryEvidence:
    """Evidence in memory, for tests and for checks without a folder."""

    def __init__(self) -> None:
        self._kept: dict[str, bytes] = {}

    def put(self, data: bytes) -> str:
        """Keep the bytes of a file."""
        digest = sha256(data)
        self._kept[digest] = data
        return digest

    def get(self, digest: str) -> bytes:
        """The bytes kept under a digest."""
        return _held_to(digest, self.as_it_lies(digest))

    def as_it_lies(self, digest: str) -> bytes:
        """The bytes under a digest whatever they are now."""
        if not self.has(digest):
            raise _not_there(digest)
        return self._kept[digest]

    def has(self, digest: str) -> bool:
        """Whether something is kept under a digest."""
        return digest in self._kept

    def digests(self) -> list[str]:
        """All digests."""
        return sorted(self._kept)


def _held_to(digest: str, data: bytes) -> bytes:
    """The bytes, if they are the ones that the digest names: nothing else is ever handed out."""
    if sha256(data) != digest:
        raise StorageTrouble(
            f"The file {digest} was altered or swapped since it was kept.",
            "Restore it from a backup; its digest says whether it is the right one.",
        )
    return data


def _not_there(digest: str) -> StorageTrouble:
    return StorageTrouble(
        f"There is no evidence {digest}.", "Restore the evidence folder from a backup."
    )
