"""Damaged and missing parts of a logbook: named in plain words, never taken for sound."""

from __future__ import annotations

import json
import os
import shutil
import sqlite3
from collections.abc import Callable
from pathlib import Path

import pytest

from tests.commands.desk import Desk, overwrite

DATABASE = "logbook.db"
Damage = Callable[[Path], None]


def _torn(folder: Path) -> None:
    file = folder / DATABASE
    os.truncate(file, file.stat().st_size // 2)


def _a_folder(folder: Path) -> None:
    (folder / DATABASE).unlink()
    (folder / DATABASE).mkdir()


UNREADABLE: dict[str, tuple[Damage, str]] = {
    "header": (lambda at: overwrite(at / DATABASE, 0, b"\xff" * 64), "is not a logbook's database"),
    "page size": (lambda at: overwrite(at / DATABASE, 16, b"\0\0"), "is not a logbook's database"),
    "schema": (lambda at: overwrite(at / DATABASE, 100, b"\xff" * 200), "is damaged"),
    "torn": (_torn, "is damaged"),
    "emptied": (lambda at: os.truncate(at / DATABASE, 0), "holds no journal"),
    "gone": (lambda at: (at / DATABASE).unlink(), "is not there"),
    "a folder": (_a_folder, "can't be opened"),
    "no name": (lambda at: (at / "logbook.toml").unlink(), "logbook.toml is missing beside"),
    "name of bytes": (lambda at: overwrite(at / "logbook.toml", 0, b"\xff\0"), "is damaged"),
}


@pytest.mark.parametrize("damage", UNREADABLE)
def test_what_can_not_be_read_is_said_with_what_to_do(desk: Desk, damage: str) -> None:
    harm, said = UNREADABLE[damage]
    for name in ("logbook.db-wal", "logbook.db-shm"):
        (desk.folder / name).unlink(missing_ok=True)
    harm(desk.folder)
    for words in (("journal", "check"), ("step", "next"), ("journal", "rebuild")):
        told = desk.command(*words)
        assert 6 == told.code, told.err
        assert said in told.err
        assert "estore" in told.err or "from a backup" in told.err or "See that" in told.err
        assert "" == told.out


def _pages(file: Path) -> dict[int, str]:
    """Which table or index each page of the database belongs to."""
    with sqlite3.connect(file) as database:
        rows = database.execute("SELECT rootpage, name FROM sqlite_schema WHERE rootpage > 0")
        return {int(page): str(name) for page, name in rows}


def _page_of(file: Path, name: str) -> int:
    found = {held: page for page, held in _pages(file).items()}
    return found[name]


@pytest.mark.parametrize("page", ["entry", "sheet", "reading", "sqlite_autoindex_entry_1"])
def test_a_damaged_page_is_never_taken_for_sound(desk: Desk, page: str) -> None:
    file = desk.folder / DATABASE
    place = (_page_of(file, page) - 1) * 4096
    desk.command("journal", "check")
    overwrite(file, place, b"\x55" * 4096)
    told = desk.command("journal", "check")
    assert told.code in {1, 6}, told.out + told.err
    assert "is sound" not in told.out
    assert "backup" in told.out + told.err


def _half_way(desk: Desk) -> None:
    """The last page that holds entries is overwritten: the first entries can still be read."""
    file = desk.folder / DATABASE
    with sqlite3.connect(file) as database:
        database.execute("PRAGMA wal_checkpoint(TRUNCATE)")
    with sqlite3.connect(file) as database:
        (last,) = database.execute("SELECT header FROM entry ORDER BY seq DESC LIMIT 1").fetchone()
    place = file.read_bytes().rindex(bytes(last)[:40])
    overwrite(file, place // 4096 * 4096, b"\x55" * 4096)


def test_steps_that_a_failing_storage_cut_short_are_not_ticked(desk: Desk) -> None:
    _half_way(desk)
    told = desk.command("journal", "check")
    assert 1 == told.code, told.err
    assert "can't be read on from here" in told.out
    for title in ("Sequence", "Chain", "Bodies", "Deeds and signatures", "Certificates valid then"):
        line = next(line for line in told.out.splitlines() if title in line)
        assert not line.startswith("✓"), line
    steps = json.loads(desk.command("journal", "check", "--json").out)["steps"]
    assert "ok" not in {step["outcome"] for step in steps[:7]}
    assert "not finished" in {step["outcome"] for step in steps}


def test_missing_evidence_is_named_with_its_entry_and_the_rest_still_works(desk: Desk) -> None:
    shutil.rmtree(desk.folder / "evidence")
    told = desk.command("journal", "check")
    assert 1 == told.code
    assert "✗ 7. Evidence" in told.out
    assert "Restore the file from a backup" in told.out
    assert 0 == desk.command("step", "next").code
    handed = desk.command("record", "FB-1")
    assert 6 == handed.code
    assert "There is no evidence" in handed.err
    assert "backup" in handed.err


def test_evidence_that_was_swapped_is_not_handed_out(desk: Desk) -> None:
    (row,) = json.loads(desk.command("record", "--json").out)
    digest = row["sha256"]
    (desk.folder / "evidence" / digest[:2] / digest).write_bytes(b"%PDF-another")
    told = desk.command("record", "FB-1")
    assert told.code != 0
    assert "altered" in told.err
    assert not (desk.folder / "FB-1-r1.pdf").exists()


def test_a_deed_on_a_damaged_database_stores_nothing(desk: Desk) -> None:
    _half_way(desk)
    before = (desk.folder / DATABASE).read_bytes()
    told = desk.deed()
    assert told.code == 6, told.err
    assert "is damaged" in told.err
    assert before == (desk.folder / DATABASE).read_bytes()
