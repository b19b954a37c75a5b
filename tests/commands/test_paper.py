"""A4 and Letter: what the plan says, what a command asks for instead, and what is refused."""

from __future__ import annotations

from pathlib import Path
from typing import Any, get_args

import pikepdf
import pytest

from gaugelog.commands import demo as playing
from gaugelog.commands.paper import SIZES, demand_paper
from gaugelog.documents.maker import PdfRecordMaker
from gaugelog.errors import Faulty
from gaugelog.intake.plan import load_plan
from gaugelog.ledger.campaign import Paper
from gaugelog.rules.pages import paper_of
from gaugelog.work import reviews
from gaugelog.work.logbook import Logbook
from tests.commands.conftest import PASSPHRASE, SMALL_JOB, Command
from tests.intake.conftest import counter

A4, LETTER = (210, 297), (216, 279)


def _sizes(file: Path) -> set[tuple[int, int]]:
    """The sizes of a file's pages, in millimetres."""
    with pikepdf.open(file) as opened:
        boxes: list[Any] = [page.MediaBox for page in opened.pages]
    return {(round(float(box[2]) / 72 * 25.4), round(float(box[3]) / 72 * 25.4)) for box in boxes}


def test_the_command_line_knows_the_sizes_that_pages_have() -> None:
    assert get_args(Paper) == SIZES
    assert demand_paper("") is None
    with pytest.raises(Faulty) as caught:
        demand_paper("A3")
    assert "neither a4 nor letter" in caught.value.faults[0].what


@pytest.mark.parametrize(("paper", "size"), [("", A4), ("a4", A4), ("letter", LETTER)])
def test_a_draft_has_the_size_that_is_asked_for(
    paper: str, size: tuple[int, int], demo: Path, command: Command
) -> None:
    words = ("--paper", paper) if paper else ()
    told = command("record", "FB-1", "--draft", "--out", "draft.pdf", *words)
    assert told.code == 0, told.err
    assert {size} == _sizes(Path("draft.pdf"))


def test_a_record_is_submitted_in_the_size_that_is_asked_for(demo: Path, command: Command) -> None:
    for words in (
        ("amend", "FB-1", "--reason", "the client wants Letter", "--as", "t.okoro"),
        ("submit", "FB-1", "--paper", "letter", "--as", "t.okoro"),
        ("accept", "FB-1", "--as", "q.reyes"),
    ):
        told = command(*words, secrets=f"{PASSPHRASE}\n")
        assert told.code == 0, told.err
    assert command("record", "FB-1", "--out", "r2.pdf").code == 0
    assert {LETTER} == _sizes(Path("r2.pdf"))


def test_a_signed_record_is_not_drawn_anew_on_other_paper(demo: Path, command: Command) -> None:
    told = command("record", "FB-1", "--paper", "letter")
    assert told.code == 4
    assert "handed out as it was drawn" in told.err


@pytest.mark.parametrize(
    "words",
    [("submit", "FB-1", "--as", "t.okoro"), ("record", "FB-1", "--draft"), ("demo", "elsewhere")],
)
def test_another_size_is_refused_before_anything_is_done(
    words: tuple[str, ...], demo: Path, command: Command
) -> None:
    told = command(*words, "--paper", "a5")
    assert told.code == 3
    assert "“a5” is neither a4 nor letter" in told.err
    assert not Path("elsewhere").exists()


def test_the_plan_says_what_is_usual_for_the_job(demo: Path, tmp_path: Path) -> None:
    files = playing._copy_files(SMALL_JOB, tmp_path / "letter", "letter")
    asked = load_plan(files / "plan", lots={"L-3504": "lot1"}, new_id=counter()).campaign
    silent = load_plan(SMALL_JOB / "plan", lots={"L-3504": "lot1"}, new_id=counter()).campaign
    assert ("letter", "a4") == (asked.paper, silent.paper)


def test_a_maker_draws_on_the_campaigns_paper(
    demo: Path, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    book = Logbook.open(demo / "logbook")
    with book.reading() as view:
        assert paper_of(view) == "a4"
    monkeypatch.setattr("gaugelog.documents.maker.paper_of", lambda _view: "letter")
    drawn = tmp_path / "draft.pdf"
    drawn.write_bytes(reviews.draft(book, PdfRecordMaker(), point="FB-1").pdf)
    assert {LETTER} == _sizes(drawn)
