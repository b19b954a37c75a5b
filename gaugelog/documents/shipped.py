"""Where the shipped templates lie: inside the installed package, or at the top of the source."""

from __future__ import annotations

from functools import cache
from pathlib import Path

from gaugelog.errors import MachineTrouble

_PACKAGE = Path(__file__).parent.parent


@cache
def templates() -> Path:
    """The folder of templates. Raises MachineTrouble when the installation lacks it."""
    for folder in (_PACKAGE / "templates", _PACKAGE.parent / "templates"):
        if (folder / "record.html").is_file():
            return folder
    raise MachineTrouble(
        "The templates of the record are missing from this installation.",
        "Install Gaugelog again.",
    )


def template_bytes(name: str) -> bytes:
    """The bytes of one shipped template, named relative to the folder of templates."""
    return (templates() / name).read_bytes()
