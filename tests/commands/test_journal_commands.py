"""`gaugelog journal`: sound when it is, trouble named when it is not."""

from __future__ import annotations

import json
import sqlite3
from pathlib import Path

from tests.commands.conftest import Command
from tests.foreign import needs


def test_a_played_demo_is_sound(demo: Path, command: Command) -> None:
    told = command("journal", "check")
    assert told.code == 0
    assert told.out.count("✓") == 8
    assert "sound" in told.out


def test_the_check_says_what_is_so_and_what_only_a_head_would_prove(
    demo: Path, command: Command
) -> None:
    told = command("journal", "check").out
    assert "✓ 7. Evidence: every file is there, with the SHA-256 that was signed" in told
    assert "No printed head was given" in told
    head = command("journal", "head").out.strip()
    told = command("journal", "check", "--head", head).out
    assert f"Nothing is cut off up to {head}." in told
    assert "No printed head was given" not in told


def test_the_check_of_troubles_counts_them_in_their_step(demo: Path, command: Command) -> None:
    with sqlite3.connect(demo / "logbook" / "logbook.db") as database:
        database.execute("UPDATE reading SET word = 'pass' WHERE word = 'fail'")
    told = command("journal", "check", "--head", "1:AAAAAAAAAAAAAAAAAAAAAAAAAA").out
    assert "✗ 3. Chain: 1 trouble\n" in told
    assert "✗ 8. Ledger rebuilt and compared: 1 trouble\n" in told
    assert "Nothing is cut off" not in told


def test_the_check_as_json_lists_its_steps(demo: Path, command: Command) -> None:
    found = json.loads(command("journal", "check", "--json").out)
    assert [step["number"] for step in found["steps"]] == [1, 2, 3, 4, 5, 6, 7, 8]


def test_a_ledger_table_that_was_edited_is_named(demo: Path, command: Command) -> None:
    with sqlite3.connect(demo / "logbook" / "logbook.db") as database:
        database.execute("UPDATE reading SET word = 'pass' WHERE word = 'fail'")
    told = command("journal", "check")
    assert told.code == 1
    assert "✗ 8. Ledger rebuilt and compared" in told.out
    assert "table reading" in told.out
    assert "word" in told.out


def test_the_ledger_can_be_rebuilt_from_the_journal(demo: Path, command: Command) -> None:
    with sqlite3.connect(demo / "logbook" / "logbook.db") as database:
        database.execute("DELETE FROM reading")
    assert command("journal", "rebuild").code == 0
    assert command("journal", "check").code == 0


def test_a_printed_head_of_a_longer_journal_shows_the_cut(demo: Path, command: Command) -> None:
    told = command("journal", "check", "--head", "999:ABCDEFGHIJKLMNOPQRSTUVWXYZ")
    assert told.code == 1
    assert "999" in told.out


def test_the_head_on_the_record_is_in_the_journal(demo: Path, command: Command) -> None:
    rows = json.loads(command("record", "--json").out)
    for row in rows:
        assert command("journal", "check", "--head", row["head"]).code == 0


def test_a_head_that_is_none_is_told_with_what_it_looks_like(demo: Path, command: Command) -> None:
    told = command("journal", "check", "--head", "nonsense")
    assert told.code == 3
    assert "26 letters" in told.err


def test_entries_are_told_by_label_and_in_words(demo: Path, command: Command) -> None:
    told = command("journal", "show", "FB-2", "--last", "40")
    assert "insulation cabled 0.42 GΩ, FAIL" in told.out
    assert "attempt 2" in told.out


def test_one_entry_shows_header_and_body(demo: Path, command: Command) -> None:
    entry = json.loads(command("journal", "show", "1").out)
    assert entry["header"]["kind"] == "journal.begun"
    assert entry["signed"] is False


def test_nothing_by_that_name_is_told(demo: Path, command: Command) -> None:
    told = command("journal", "show", "FB-9")
    assert told.code == 4
    assert "Nothing is called FB-9" in told.err


@needs("openssl")
def test_an_export_goes_to_a_new_folder(demo: Path, command: Command) -> None:
    told = command("journal", "export", str(demo / "out"))
    assert told.code == 0
    assert (demo / "out" / "READ ME.txt").is_file()
    assert (demo / "out" / "authority.pem").is_file()


def test_outside_a_logbook_the_way_to_one_is_told(tmp_path: Path, command: Command) -> None:
    told = command("--logbook", str(tmp_path), "journal", "head")
    assert told.code == 6
    assert "There is no logbook" in told.err
