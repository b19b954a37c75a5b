"""Files as such: what can't be read as text is told with what to do."""

from __future__ import annotations

import os
from pathlib import Path

import pytest

from gaugelog.intake import files
from gaugelog.intake.files import read_bytes, text_of, toml_of
from gaugelog.intake.texts import Untidy, tidied
from tests.intake.conftest import faults_of, lines_of


def test_a_byte_order_mark_is_passed_over() -> None:
    assert "lot\n" == text_of("f.csv", b"\xef\xbb\xbflot\n")


def test_latin_1_is_told_with_its_line_and_byte() -> None:
    (line,) = lines_of(lambda: text_of("f.csv", "a\nBräu\n".encode("latin-1")))
    assert line.startswith("f.csv, line 2: is not UTF-8 text (byte E4)")
    assert "Save it as UTF-8" in line


@pytest.mark.parametrize(
    ("data", "what"),
    [
        ("lot\n".encode("utf-16"), "is UTF-16 text."),
        (b"PK\x03\x04rest", "is a spreadsheet or an archive, not text."),
        (b"a\nb\x00c", "holds a zero byte, so it is no text."),
    ],
)
def test_other_codes_are_told(data: bytes, what: str) -> None:
    assert what == faults_of(lambda: text_of("f", data))[0].what


@pytest.mark.parametrize("data", [b"", b" \n\t", b"\xef\xbb\xbf", b"\xef\xbb\xbf\n"])
def test_an_empty_file_is_told(tmp_path: Path, data: bytes) -> None:
    (tmp_path / "f").write_bytes(data)
    assert "is empty." == faults_of(lambda: read_bytes(tmp_path / "f"))[0].what


def test_a_folder_or_a_pipe_is_no_file(tmp_path: Path) -> None:
    os.mkfifo(tmp_path / "pipe")
    for path in (tmp_path, tmp_path / "pipe"):
        assert "is no file." == faults_of(lambda path=path: read_bytes(path))[0].what  # type: ignore[misc]


@pytest.mark.parametrize("name", ["none.csv", "a\x00b", "x" * 300])
def test_a_file_that_can_not_be_there_is_told(tmp_path: Path, name: str) -> None:
    assert "can't be read" in faults_of(lambda: read_bytes(tmp_path / name))[0].what


def test_a_file_far_too_large_is_not_read(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    (tmp_path / "f").write_bytes(b"x" * 11)
    monkeypatch.setattr(files, "LARGEST", 10)
    assert (
        "has 11 bytes; 10 are read at most."
        == faults_of(lambda: read_bytes(tmp_path / "f"))[0].what
    )


def test_a_slip_in_toml_is_told_with_line_and_column() -> None:
    (line,) = lines_of(lambda: toml_of("f.toml", b'a = 1\nb = "open\n'))
    assert "line 2" in line
    assert "column" in line


def test_line_feeds_and_tabs_stay_in_texts() -> None:
    assert "a\n\tb" == tidied(" a\r\n\tb ")


@pytest.mark.parametrize("char", ["\x00", "\x1b", "\x7f", "\x85", "\ud800"])
def test_characters_that_only_act_are_refused(char: str) -> None:
    with pytest.raises(Untidy, match="which never shows"):
        tidied(f"a{char}b")


@pytest.mark.parametrize("text", ["שלום", "नमस्ते\u200d", "😀", "{{ 7 }}", "=1+1", "[bold]"])
def test_any_printable_text_is_kept_as_it_is(text: str) -> None:
    assert text == tidied(text)
