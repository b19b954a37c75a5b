"""Files that commands write for people: there whole or not at all, or said why not."""

from __future__ import annotations

from pathlib import Path

from gaugelog.errors import StorageTrouble


def write_out(file: Path, data: bytes) -> None:
    """Write a file, or what stands at its place in a pipeline. Raises StorageTrouble naming it."""
    from gaugelog.journal.files import write_whole

    try:
        if file.exists() and not file.is_file():
            file.write_bytes(data)
        else:
            write_whole(file.resolve(), data)
    except (OSError, ValueError) as error:
        reason = getattr(error, "strerror", None) or "its name can't be one"
        raise StorageTrouble(
            f"{file} can't be written: {reason}.", "Name another place, or make room in this one."
        ) from error
