"""Where a passphrase comes from: the keyboard, unseen, or a file descriptor for scripts."""

from __future__ import annotations

import os
import sys
from dataclasses import dataclass, field

from gaugelog.errors import KeyTrouble


@dataclass
class Secrets:
    """Asks for passphrases; from descriptor `fd` one line each, else from the keyboard."""

    fd: int | None = None
    _lines: list[str] | None = field(default=None, repr=False)

    def ask(self, prompt: str) -> str:
        """One passphrase. Raises KeyTrouble when there is nobody to ask."""
        if self.fd is not None:
            return self._next_line(prompt)
        if not sys.stdin.isatty():
            raise KeyTrouble(
                f"A passphrase is needed ({prompt}), and there is no terminal to ask at.",
                "Give it on a file descriptor: --secret-fd 3 3<file",
            )
        import getpass

        try:
            return getpass.getpass(f"{prompt}: ", stream=sys.stderr)
        except EOFError as error:
            raise KeyTrouble("No passphrase was typed.", "Run the command again.") from error

    def choose(self, prompt: str) -> str:
        """A new passphrase; typed twice at the keyboard. Raises KeyTrouble if they differ."""
        first = self.ask(f"New passphrase {prompt}, at least 8 characters")
        if self.fd is None and self.ask("The same again") != first:
            raise KeyTrouble("The two passphrases differ.", "Run the command again.")
        return first

    def _next_line(self, prompt: str) -> str:
        if self._lines is None:
            self._lines = _read_all(self.fd or 0).splitlines()
        if not self._lines:
            raise KeyTrouble(
                f"File descriptor {self.fd} ended before this passphrase: {prompt}.",
                "Give one passphrase a line, in the order they are asked.",
            )
        return self._lines.pop(0)


def _read_all(fd: int) -> str:
    try:
        with os.fdopen(fd, encoding="utf-8", closefd=False) as stream:
            return stream.read()
    except (OSError, UnicodeDecodeError) as error:
        raise KeyTrouble(
            f"File descriptor {fd} can't be read as text.", "Open it, such as 3<secrets.txt"
        ) from error
