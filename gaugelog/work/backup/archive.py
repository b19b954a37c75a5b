"""A backup opened for reading: every name known beforehand, every byte held to its digest."""

from __future__ import annotations

import hashlib
import shutil
import zipfile
import zlib
from collections.abc import Iterator
from contextlib import contextmanager
from pathlib import Path
from typing import BinaryIO

from gaugelog.errors import StorageTrouble
from gaugelog.work.backup.layout import ABOUT, SUMS, About, faults_of_names, parse_sums
from gaugelog.work.logbook import SIGN, UNFINISHED, parse_settings

PIECE = 1024 * 1024
"""Bytes read or written at once."""

_LARGEST_LIST = 64 * 1024 * 1024
_ANOTHER = "Use another backup."


class Archive:
    """A backup that is open: what it says of itself, and its files. Made by `opened`."""

    def __init__(self, path: Path, file: zipfile.ZipFile) -> None:
        self.path = path
        self._file = file
        self._sums = parse_sums(self._small(SUMS))
        fault = next(faults_of_names(file.namelist(), self._sums), None)
        if fault is not None:
            raise _damaged(path, fault)
        self.about = About.of(self._small(ABOUT))
        marked = self._small(SIGN)
        self.settings_file = marked.removeprefix(UNFINISHED.encode())
        """`logbook.toml` as it was before the backup marked it."""
        if self.settings_file == marked:
            raise _damaged(path, f"its {SIGN} is not that of a backup")
        self.settings = parse_settings(self.settings_file, f"{path}, {SIGN}")
        if self.settings["id"] != self.about.logbook:
            raise _damaged(path, f"{SIGN} and {ABOUT} name different logbooks")

    @property
    def size(self) -> int:
        """Bytes of all its files, unpacked."""
        return sum(info.file_size for info in self._file.infolist())

    def digest(self) -> str:
        """SHA-256 of the backup's file."""
        with _read_plainly(self.path), self.path.open("rb") as file:
            return hashlib.file_digest(file, "sha256").hexdigest()

    def unpack(self, folder: Path) -> None:
        """Write the logbook's files into an empty folder; it is marked as unfinished.

        Raises StorageTrouble when a file differs from its digest, or the folder can't take it.
        """
        free = shutil.disk_usage(folder).free
        if free < self.size:
            raise StorageTrouble(
                f"{folder} has room for {free // PIECE} MiB; the backup needs "
                f"{self.size // PIECE + 1} MiB.",
                "Make room, or choose a folder on another disk.",
            )
        (folder / "evidence").mkdir()
        for name, digest in self._sums.items():
            if name != ABOUT:
                self._unpack(name, digest, folder / name)

    def _unpack(self, name: str, digest: str, target: Path) -> None:
        target.parent.mkdir(parents=True, exist_ok=True)
        with target.open("xb") as out:
            found = self._copied(name, out)
        if found != digest:
            raise _damaged(self.path, f"{name} differs from its digest")

    def _copied(self, name: str, out: BinaryIO) -> str:
        """Write a file's bytes to `out`; returns their SHA-256."""
        digest = hashlib.sha256()
        for piece in self._pieces(name):
            digest.update(piece)
            out.write(piece)
        return digest.hexdigest()

    def _pieces(self, name: str) -> Iterator[bytes]:
        with _read_plainly(self.path), self._file.open(name) as file:
            while piece := file.read(PIECE):
                yield piece

    def _small(self, name: str) -> bytes:
        """A file that is read into memory."""
        if name not in self._file.namelist():
            raise _damaged(self.path, f"{name} is missing from it")
        if self._file.getinfo(name).file_size > _LARGEST_LIST:
            raise _damaged(self.path, f"{name} is far too large")
        return b"".join(self._pieces(name))


@contextmanager
def opened(path: Path) -> Iterator[Archive]:
    """Open a backup. Raises StorageTrouble when it is none, is damaged, or can't be read."""
    with _read_plainly(path):
        file = zipfile.ZipFile(path)
    with file:
        with _read_plainly(path):
            archive = Archive(path, file)
        yield archive


@contextmanager
def _read_plainly(path: Path) -> Iterator[None]:
    """Say in plain words what is wrong with a backup that can't be read."""
    try:
        yield
    except OSError as error:
        raise StorageTrouble(
            f"{path} can't be read: {error.strerror}.", "Name the backup's file."
        ) from error
    except (zipfile.BadZipFile, zlib.error, EOFError) as error:
        raise _damaged(path, str(error) or "it ends too early") from error
    except (NotImplementedError, RuntimeError, ValueError, RecursionError) as error:
        # What the zip library says of an encrypted file, an unknown packing, an impossible name.
        raise _damaged(path, str(error)) from error


def _damaged(path: Path, how: str) -> StorageTrouble:
    how = " ".join(how.split()).rstrip(".")
    return StorageTrouble(f"{path} is damaged or no backup: {how}.", _ANOTHER)
