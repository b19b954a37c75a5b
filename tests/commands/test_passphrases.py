"""Passphrases come unseen from the keyboard, or one a line from a file descriptor."""

from __future__ import annotations

import os

import pytest

from gaugelog.commands.passphrases import Secrets
from gaugelog.errors import ExitCode, KeyTrouble


def _descriptor(text: str) -> int:
    reading, writing = os.pipe()
    os.write(writing, text.encode())
    os.close(writing)
    return reading


def test_lines_are_taken_in_order() -> None:
    secrets = Secrets(_descriptor("first one\nsecond one\n"))
    assert secrets.ask("a") == "first one"
    assert secrets.ask("b") == "second one"


def test_a_new_passphrase_is_read_once_from_a_descriptor() -> None:
    assert Secrets(_descriptor("long enough\n")).choose("of x") == "long enough"


def test_too_few_lines_name_the_passphrase_that_is_missing() -> None:
    secrets = Secrets(_descriptor("only one\n"))
    secrets.ask("a")
    with pytest.raises(KeyTrouble, match=r"Passphrase of q\.reyes"):
        secrets.ask("Passphrase of q.reyes")


def test_a_closed_descriptor_is_told_plainly() -> None:
    with pytest.raises(KeyTrouble, match="can't be read") as caught:
        Secrets(987).ask("a")
    assert ExitCode.KEY == caught.value.exit_code


def test_a_typing_slip_in_a_new_passphrase_is_caught(monkeypatch: pytest.MonkeyPatch) -> None:
    answers = iter(["long enough", "long enuogh"])
    monkeypatch.setattr(Secrets, "ask", lambda _self, _prompt: next(answers))
    with pytest.raises(KeyTrouble, match="differ"):
        Secrets().choose("of x")


def test_a_secret_never_shows_in_a_repr() -> None:
    secrets = Secrets(_descriptor("very secret\n\n"))
    secrets._lines = ["very secret"]
    assert "very secret" not in repr(secrets)
