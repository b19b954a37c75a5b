"""Files that are there whole or not at all."""

from __future__ import annotations

import errno
import os
import secrets
from pathlib import Path


def write_whole(path: Path, data: bytes, *, mode: int = 0o644) -> None:
    """Write `data` beside `path`, see it onto the disk, then give it its name.

    A power cut leaves the old file or the new one, never a part. Raises OSError.
    """
    draft = path.with_name(f".{path.name}.{secrets.token_hex(8)}.part")
    descriptor = os.open(draft, os.O_WRONLY | os.O_CREAT | os.O_EXCL, mode)
    try:
        with os.fdopen(descriptor, "wb") as file:
            file.write(data)
            file.flush()
            os.fsync(file.fileno())
        draft.replace(path)
    except BaseException:
        draft.unlink(missing_ok=True)
        raise
    _sync_folder(path.parent)


def settle(draft: Path, path: Path) -> None:
    """See a draft that was written beside `path` onto the disk, then give it its new name.

    Nothing is ever overwritten: raises FileExistsError when the name is taken, else OSError.
    """
    with draft.open("rb+") as file:
        os.fsync(file.fileno())
    try:
        # Unlike a renaming, a link fails where the name has been taken meanwhile.
        os.link(draft, path)
    except FileExistsError:
        raise
    except OSError:  # a file system without links
        if path.exists():
            raise FileExistsError(errno.EEXIST, os.strerror(errno.EEXIST), str(path)) from None
        draft.replace(path)
    else:
        draft.unlink()
    _sync_folder(path.parent)


def _sync_folder(folder: Path) -> None:
    # The new name is on disk only when the folder is; Windows has no way to ask for it.
    try:
        descriptor = os.open(folder, os.O_RDONLY)
    except OSError:
        return
    try:
        os.fsync(descriptor)
    finally:
        os.close(descriptor)
