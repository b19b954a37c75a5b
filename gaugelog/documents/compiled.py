"""Templates compiled once in a process: compiling takes longer than filling them in."""

from __future__ import annotations

from jinja2 import BytecodeCache
from jinja2.bccache import Bucket


class Compiled(BytecodeCache):
    """Compiled templates in memory, known again by name and source."""

    def __init__(self) -> None:
        self._kept: dict[str, bytes] = {}

    def load_bytecode(self, bucket: Bucket) -> None:
        """Give what was compiled before, where it was."""
        kept = self._kept.get(f"{bucket.key}-{bucket.checksum}")
        if kept is not None:
            bucket.bytecode_from_string(kept)

    def dump_bytecode(self, bucket: Bucket) -> None:
        """Keep what was compiled."""
        self._kept[f"{bucket.key}-{bucket.checksum}"] = bucket.bytecode_to_string()


COMPILED = Compiled()
