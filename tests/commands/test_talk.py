"""Talk fits a narrow terminal, goes to files as it is, and tables hold no empty columns."""

from __future__ import annotations

import io

import pytest

from gaugelog.commands.folding import broken, folded
from gaugelog.commands.talk import put_table

LONG = (
    "  The passphrase does not open the key; if it is surely right, the file is damaged: "
    "restore it from a backup."
)


class _Terminal(io.StringIO):
    def isatty(self) -> bool:
        return True


@pytest.fixture(autouse=True)
def _eighty(monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.setenv("COLUMNS", "80")
    monkeypatch.setenv("TERM", "dumb")  # no codes for bold, which would count as letters


def test_a_sentence_folds_between_words_and_what_follows_hangs() -> None:
    first, second = folded(LONG, _Terminal())
    assert first.startswith("  The passphrase")
    assert max(len(first), len(second)) < 80
    assert second.startswith("    ")
    assert LONG.split() == first.split() + second.split()


def test_to_a_file_a_sentence_goes_as_it_is() -> None:
    assert [LONG] == folded(LONG, io.StringIO())


@pytest.mark.parametrize("line", ["Next: gaugelog step do FB-1 " + "name=… " * 20, "x" * 200, ""])
def test_what_is_to_be_copied_is_left_whole(line: str) -> None:
    assert [line] == folded(line, _Terminal())


def test_lines_fold_one_by_one() -> None:
    assert ["one", "two"] == folded("one\ntwo", _Terminal())


def test_a_column_that_says_nothing_is_left_out(capsys: pytest.CaptureFixture[str]) -> None:
    put_table("T", ["a", "empty", ">b"], [["1", "", "2"], ["3", "", ""]], empty="none")
    told = capsys.readouterr().out
    assert "empty" not in told
    assert "a" in told.splitlines()[2]
    assert "b" in told.splitlines()[2]


def test_a_table_that_is_too_wide_breaks_long_words_after_their_hyphens(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    row = ["North-abutment-flange-gauge-1", "room-temperature-bond-metal", "x " * 30]
    put_table("T", ["point", "route", "what"], [row], empty="")
    assert row[1] in capsys.readouterr().out  # to a pipe there is room
    monkeypatch.setattr("sys.stdout.isatty", lambda: True)
    put_table("T", ["point", "route", "what"], [row], empty="")
    told = capsys.readouterr().out
    assert max(len(line) for line in told.splitlines()) <= 80
    words = {word for line in told.splitlines() for word in line.split()}
    assert {"North-", "abutment-", "room-", "temperature-", "bond-metal"} <= words


def test_a_head_is_never_broken(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    monkeypatch.setattr("sys.stdout.isatty", lambda: True)
    head = "137:ABCDEFGHIJKLMNOPQRSTUVWXYZ"
    for others in range(8):
        row = [head, *["somebody"] * others]
        put_table("Records", ["head", *["by"] * others], [row], empty="")
        told = capsys.readouterr().out
        assert head in told
        assert others == told.count("somebody")


@pytest.mark.parametrize(
    ("cell", "lines"),
    [
        ("hot-cure", ["hot-cure"]),
        ("hot-cure-bond-metal", ["hot-cure-", "bond-metal"]),
        ("a word-of-hyphens-and more", ["a word-of-", "hyphens-and more"]),
        ("nohyphensatallinhere", ["nohyphensatallinhere"]),
        ("--------------", ["--------------"]),
        ("", [""]),
    ],
)
def test_words_break_only_after_hyphens(cell: str, lines: list[str]) -> None:
    assert lines == broken(cell).split("\n")


def test_where_a_column_would_be_lost_each_row_is_told_in_words(
    monkeypatch: pytest.MonkeyPatch, capsys: pytest.CaptureFixture[str]
) -> None:
    monkeypatch.setattr("sys.stdout.isatty", lambda: True)
    columns = [f"{'>' * (place % 2)}column {place}" for place in range(12)]
    rows = [[f"value-{place}" for place in range(12)], ["", "more", *[""] * 10]]
    put_table("T", columns, rows, empty="")
    told = capsys.readouterr().out
    assert "column 0 value-0\n  column 1 value-1; column 2 value-2;" in told
    assert "column 11 value-11" in " ".join(told.split())
    assert told.rstrip().endswith("\n  column 1 more")
    assert max(len(line) for line in told.splitlines()) <= 80


def test_a_table_without_rows_is_told_on_stderr(capsys: pytest.CaptureFixture[str]) -> None:
    put_table("T", ["a"], [], empty="Nothing. Next: gaugelog step next")
    told = capsys.readouterr()
    assert ("", "Nothing. Next: gaugelog step next\n") == (told.out, told.err)
