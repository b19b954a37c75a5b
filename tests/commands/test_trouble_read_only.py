"""A logbook on media or in a folder that can't be written: it is read, and what writes says why."""

from __future__ import annotations

import shutil
import sqlite3
from pathlib import Path

import pytest

from tests.commands.desk import Desk, Outcome, powerless, read_only

LOOKS = (
    ("journal", "check"),
    ("journal", "head"),
    ("journal", "show"),
    ("step", "next", "FB-2"),
    ("step", "next"),
    ("plan", "show"),
    ("plan", "check"),
    ("stock", "list"),
    ("person", "list"),
    ("instrument", "list"),
    ("wiring", "show"),
    ("record",),
)
DEEDS = (
    ("t.okoro", ("step", "do", "FB-2", "safe=yes")),
    ("c.ward", ("person", "revoke", "t.okoro", "--reason", "left the firm")),
    ("t.okoro", ("amend", "FB-1", "--reason", "a slip")),
)


def _looked(desk: Desk) -> dict[str, Outcome]:
    return {" ".join(words): desk.command(*words) for words in LOOKS}


def test_read_only_media_are_read_as_any_other(desk: Desk) -> None:
    expected = _looked(desk)
    with read_only(desk.folder):
        told = _looked(desk)
    assert expected == told
    assert {0} == {each.code for each in told.values()}


def test_a_draft_is_drawn_from_read_only_media(desk: Desk, tmp_path: Path) -> None:
    with read_only(desk.folder):
        told = desk.command("record", "FB-2", "--draft", "--out", str(tmp_path / "draft.pdf"))
    assert told.code == 0, told.err
    assert (tmp_path / "draft.pdf").read_bytes().startswith(b"%PDF-")


def test_a_backup_is_made_from_read_only_media(desk: Desk, tmp_path: Path) -> None:
    with read_only(desk.folder):
        told = desk.command("backup", str(tmp_path / "kept.zip"))
    assert told.code == 0, told.err
    assert (tmp_path / "kept.zip").is_file()


@pytest.mark.parametrize(("who", "words"), DEEDS)
def test_a_deed_on_read_only_media_is_refused_in_plain_words(
    desk: Desk, who: str, words: tuple[str, ...]
) -> None:
    head = desk.head()
    with read_only(desk.folder):
        told = desk.sign(*words, who=who)
    assert told.code == 6, told.err
    assert "is read-only" in told.err
    assert "copy the whole logbook" in told.err
    desk.demand_whole(head)


def test_a_folder_without_write_permission_is_read_as_any_other(desk: Desk) -> None:
    expected = _looked(desk)
    with powerless(desk.folder):
        told = _looked(desk)
    assert expected == told
    assert {0} == {each.code for each in told.values()}


def test_a_deed_without_write_permission_is_refused_in_plain_words(desk: Desk) -> None:
    head = desk.head()
    keys = desk.folder.parent / "keys"
    keys.chmod(0o755)
    for file in keys.iterdir():
        file.chmod(0o644)
    with powerless(desk.folder):
        told = desk.deed()
    assert told.code == 6, told.err
    assert "may not be written" in told.err
    desk.demand_whole(head)


def test_a_database_that_may_not_be_read_is_said_so(desk: Desk) -> None:
    head = desk.head()
    with powerless(desk.folder):
        pass
    (desk.folder / "logbook.db").chmod(0)
    with powerless():
        told = desk.command("step", "next")
    (desk.folder / "logbook.db").chmod(0o644)
    assert told.code == 6, told.err
    assert "can't be opened" in told.err
    desk.demand_whole(head)


def test_what_a_dead_program_left_in_the_write_ahead_log_is_read_from_read_only_media(
    desk: Desk, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    holding = sqlite3.connect(desk.folder / "logbook.db")
    holding.execute("BEGIN")
    holding.execute("SELECT count(*) FROM entry").fetchone()
    before = desk.head()
    assert desk.deed().code == 0
    after = desk.head()
    left = tmp_path / "left"
    shutil.copytree(desk.folder, left, ignore=shutil.ignore_patterns("*-shm"))
    holding.close()
    monkeypatch.chdir(left)
    with read_only(left):
        assert (left / "logbook.db-wal").stat().st_size > 0
        assert before != after == desk.head()
        assert desk.command("journal", "check").code == 0


def test_a_logbook_of_an_older_ledger_is_read_from_read_only_media(desk: Desk) -> None:
    shown = desk.command("plan", "show")
    with sqlite3.connect(desk.folder / "logbook.db") as database:
        database.execute("UPDATE ledger_version SET value = 1")
        database.execute("DROP TABLE point")
    with read_only(desk.folder):
        assert shown == desk.command("plan", "show")
        told = desk.deed()
    assert told.code == 6
    assert "is read-only" in told.err
