"""Hostile text in every field of a job: shown as text in every outlet, whatever the outlet is."""

from __future__ import annotations

import csv
import io
import json
import re
import shutil
import subprocess
from collections.abc import Callable, Iterator
from dataclasses import replace
from pathlib import Path
from typing import Any

import openpyxl
import pytest

from gaugelog.commands import session
from gaugelog.commands.talk import tell_error
from gaugelog.errors import Faulty
from gaugelog.intake.instruments import load_instruments
from gaugelog.intake.pictures import load_pictures
from gaugelog.intake.stock import load_stock
from gaugelog.journal.ids import new_id
from gaugelog.journal.keys import KeyFolder
from gaugelog.visible import visible
from gaugelog.work import amend, instruments, photos, plan, reviews, standing, steps, stock
from gaugelog.work.people import Newcomer
from tests.commands.desk import Command
from tests.commands.hostile_job import HOSTILE, REFUSED, SMALL_JOB, every_field, spoil, spoilable
from tests.foreign import needs
from tests.pictures import camera_jpeg
from tests.work import job as jobs
from tests.work.job import CHEAP_ROUNDS, INSULATION, WALK, Job, start_job

FAILED = {**INSULATION, "insulation": "0.4 GΩ"}
LEAST_KEPT = 60
"""Fields of the planner's files that keep free text; a guard against a walk that finds none."""


def _people(text: str) -> tuple[Newcomer, ...]:
    return tuple(replace(each, name=f"{text}{each.person}") for each in jobs.PEOPLE)


def _planned(job: Job, files: Path) -> None:
    planner = job.keys["c.ward"]
    received = load_stock([files / "lots.csv", files / "consumables.csv"], new_id=new_id)
    stock.receive(job.book, planner, received)
    meters = load_instruments(files / "instruments.toml", new_id=new_id)
    instruments.add(job.book, planner, meters)
    plan.load(job.book, planner, plan.understand(job.book, files / "plan"))
    plan.release(job.book, planner, meaning=HOSTILE)


def _worked(job: Job, home: Path) -> None:
    """Every deed that takes a word of people's own, with the hostile word."""
    for place, (who, typed) in enumerate(WALK):
        if "insulation" in typed and place < 12:
            job.do("t.okoro", FAILED, note=HOSTILE)
            job.do(who, typed, note=HOSTILE, reason=HOSTILE)
            continue
        job.do(who, typed, note=HOSTILE)
    picture = home / f"{HOSTILE.replace('/', '-')}.jpg"
    picture.write_bytes(camera_jpeg())
    photos.add(job.book, job.keys["t.okoro"], load_pictures([picture]), point="FB-1", note=HOSTILE)
    job.submit()
    reviews.give_back(
        job.book, job.keys["q.reyes"], point="FB-1", reason=HOSTILE, redo_from="finish"
    )
    job.do("t.okoro", {"labelled": "yes"}, note=HOSTILE)
    job.submit()
    job.accept()
    amend.amend(job.book, job.keys["t.okoro"], point="FB-1", reason=HOSTILE, redo_from="finish")
    job.do("t.okoro", {"safe": "yes"}, "FB-2", note=HOSTILE)
    steps.redo(job.book, job.keys["t.okoro"], point="FB-2", step="access", reason=HOSTILE)
    standing.set_standing(
        job.book, job.keys["c.ward"], label="K7-04", standing="quarantined", reason=HOSTILE
    )


@pytest.fixture(scope="module")
def _spoilt(tmp_path_factory: pytest.TempPathFactory) -> Path:
    home = tmp_path_factory.mktemp("hostile")
    kept = spoil(home / "files")
    assert len(kept) >= LEAST_KEPT
    with pytest.MonkeyPatch.context() as patch:
        patch.setattr(jobs, "PEOPLE", _people(HOSTILE))
        job = start_job(home)
    _planned(job, home / "files")
    _worked(job, home)
    job.book.storage.close()
    return home


@pytest.fixture
def spoilt(_spoilt: Path, monkeypatch: pytest.MonkeyPatch) -> Path:
    """The folder of the job; its logbook is the current one."""
    monkeypatch.setattr(session, "key_folder", lambda _: KeyFolder(_spoilt / "keys", CHEAP_ROUNDS))
    monkeypatch.chdir(_spoilt / "book")
    return _spoilt


LOOKS = (
    ("plan", "show"),
    ("plan", "check"),
    ("plan", "changes"),
    ("step", "next"),
    ("step", "next", "FB-1"),
    ("step", "next", "FB-2"),
    ("stock", "list"),
    ("person", "list"),
    ("instrument", "list"),
    ("photo", "list"),
    ("wiring", "show"),
    ("record",),
    ("journal", "show", "--last", "200"),
    ("journal", "show", "FB-1"),
    ("journal", "check"),
    ("diagnose", "FB-1"),
    ("doctor",),
)
NO_JSON = {("doctor",), ("diagnose", "FB-1"), ("plan", "changes")}
JSON = tuple(words for words in LOOKS if words not in NO_JSON)
_COLOUR = re.compile(r"\x1b\[[0-9;]*m")


@pytest.mark.parametrize("words", LOOKS, ids=" ".join)
def test_a_terminal_is_told_text_and_nothing_else(
    spoilt: Path, words: tuple[str, ...], command: Command
) -> None:
    told = command(*words)
    assert told.code in {0, 1, 4}, told.err
    for shown in (told.out, told.err):
        assert shown == visible(shown, keep_newlines=True)


@pytest.mark.parametrize("words", LOOKS, ids=" ".join)
def test_a_terminal_with_colours_gets_our_colours_and_no_others(
    spoilt: Path, words: tuple[str, ...], command: Command, monkeypatch: pytest.MonkeyPatch
) -> None:
    plain = command(*words)
    monkeypatch.setenv("FORCE_COLOR", "1")
    told = command(*words)
    assert plain.code == told.code
    bare = _COLOUR.sub("", told.out)
    assert bare == visible(bare, keep_newlines=True)
    assert plain.out.split() == bare.split()


def _texts(value: Any) -> Iterator[str]:
    if isinstance(value, str):
        yield value
    elif isinstance(value, dict):
        for key, each in value.items():
            yield key
            yield from _texts(each)
    elif isinstance(value, list):
        for each in value:
            yield from _texts(each)


@pytest.mark.parametrize("words", JSON, ids=" ".join)
def test_json_holds_the_text_as_it_was_and_only_printable_characters(
    spoilt: Path, words: tuple[str, ...], command: Command
) -> None:
    told = command(*words, "--json")
    assert told.code in {0, 1}, told.err
    assert told.out == visible(told.out, keep_newlines=True)
    found = [text for text in _texts(json.loads(told.out)) if HOSTILE[:12] in text]
    assert all(HOSTILE[:20] in text for text in found)


def test_the_journal_as_json_holds_every_word_as_it_was_typed(
    spoilt: Path, command: Command
) -> None:
    texts = list(_texts(json.loads(command("journal", "show", "--last", "400", "--json").out)))
    assert sum(HOSTILE in text for text in texts) >= LEAST_KEPT


@pytest.fixture
def exported(spoilt: Path, tmp_path: Path, command: Command) -> Callable[[str], Path]:
    """The wiring map as a file of a kind."""

    def made(kind: str) -> Path:
        file = tmp_path / f"map.{kind}"
        told = command("wiring", "export", str(file))
        assert told.code in {0, 1}, told.err
        return file

    return made


def _harmless(cell: str) -> bool:
    """Whether a spreadsheet takes a cell's text for text."""
    return not cell.lstrip().startswith(("=", "+", "-", "@")) or bool(
        re.fullmatch(r"[+-]?\d+(\.\d+)?", cell)
    )


def test_no_cell_of_a_csv_is_a_formula(exported: Callable[[str], Path]) -> None:
    text = exported("csv").read_text(encoding="utf-8-sig")
    cells = [cell for row in csv.reader(io.StringIO(text, newline="")) for cell in row]
    assert any(HOSTILE[:12] in cell for cell in cells)
    assert [] == [cell for cell in cells if not _harmless(cell) or visible(cell) != cell]


def test_no_cell_of_a_workbook_is_a_formula(exported: Callable[[str], Path]) -> None:
    sheet = openpyxl.load_workbook(exported("xlsx")).active
    cells = [cell for row in sheet.iter_rows() for cell in row if cell.value is not None]
    assert any(HOSTILE[:12] in str(cell.value) for cell in cells)
    assert {"s", "n"} >= {cell.data_type for cell in cells}


def _letters(pdf: Path) -> str:
    """A page's text without any white space, as a line may end anywhere."""
    done = subprocess.run(["pdftotext", pdf, "-"], capture_output=True, text=True, check=True)
    return "".join(done.stdout.split())


@needs("pdftotext")
def test_a_record_shows_hostile_text_as_text(
    spoilt: Path, tmp_path: Path, command: Command
) -> None:
    told = command("record", "FB-1", "--draft", "--out", str(tmp_path / "draft.pdf"))
    assert told.code == 0, told.err
    letters = _letters(tmp_path / "draft.pdf")
    assert letters.count("<script>s</script>") >= 20
    assert letters.count("{{7*7}}{%raw%}") >= 20
    assert b"/Launch" not in (tmp_path / "draft.pdf").read_bytes()


@needs("pdftotext")
def test_the_wiring_map_shows_hostile_text_as_text(exported: Callable[[str], Path]) -> None:
    letters = _letters(exported("pdf"))
    assert "{{7*7}}" in letters
    assert "<script>" in letters


def test_an_export_keeps_hostile_words_out_of_its_paths(
    spoilt: Path, tmp_path: Path, command: Command
) -> None:
    told = command("journal", "export", str(tmp_path / "out"))
    assert told.code == 0, told.err
    names = [str(file.relative_to(tmp_path)) for file in tmp_path.rglob("*")]
    assert names
    assert [] == [name for name in names if not re.fullmatch(r"[\w ./~-]+", name, re.ASCII)]


@pytest.mark.parametrize(("number", "field"), list(every_field()), ids=str)
def test_a_field_keeps_the_text_or_says_why_not(
    tmp_path: Path, number: int, field: Any, capsys: pytest.CaptureFixture[str]
) -> None:
    shutil.copytree(SMALL_JOB, tmp_path / "files")
    file, understood = spoilable(tmp_path / "files")[number]
    for text in (HOSTILE, *REFUSED):
        file.put(field, text)
        try:
            understood()
        except Faulty as error:
            tell_error(error)
        else:
            assert text == HOSTILE
        told = capsys.readouterr().err
        assert told == visible(told, keep_newlines=True)
        assert len(told) < 60_000
