"""Talk fits a narrow terminal, goes to files as it is, and tables hold no empty columns."""

from __future__ import annotations

import io

import pytest

from gaugelog.commands.folding import folded
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


def test_a_table_without_rows_is_told_on_stderr(capsys: pytest.CaptureFixture[str]) -> None:
    put_table("T", ["a"], [], empty="Nothing. Next: gaugelog step next")
    told = capsys.readouterr()
    assert ("", "Nothing. Next: gaugelog step next\n") == (told.out, told.err)
