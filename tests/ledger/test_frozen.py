"""The frozen logbooks of earlier versions: this version opens, checks and replays each."""

from __future__ import annotations

import shutil
import sqlite3
from pathlib import Path

import pytest

from gaugelog.ledger import schema
from gaugelog.work import reviews, steps
from gaugelog.work.history import check_logbook
from gaugelog.work.logbook import Logbook

FROZEN = Path(__file__).parents[1] / "frozen"
HEADS = {"v1": "61:CR3RQILEKQ7WBL5VBAIJPY6XWE"}
"""The printed heads; a frozen logbook that is made anew is another one, and shows here."""

VERSIONS = sorted(path.name for path in FROZEN.iterdir() if (path / "logbook.toml").is_file())


@pytest.fixture(params=VERSIONS)
def frozen(request: pytest.FixtureRequest, tmp_path: Path) -> Path:
    """A copy of one frozen logbook."""
    return Path(shutil.copytree(FROZEN / request.param, tmp_path / request.param))


def test_there_is_one_of_the_first_version() -> None:
    assert "v1" in VERSIONS


def test_it_opens_and_checks_against_its_printed_head(frozen: Path) -> None:
    head = HEADS[frozen.name]
    book = Logbook.open(frozen)
    assert head == book.head().printed
    report = check_logbook(book, [head])
    assert report.ok, report.summary


def test_its_points_are_where_they_were(frozen: Path) -> None:
    book = Logbook.open(frozen)
    assert [(row.point, row.state) for row in steps.worklist(book)] == [
        ("FB-1", "accepted"),
        ("FB-2", "in work"),
    ]
    assert reviews.record(book, point="FB-1").pdf.startswith(b"%PDF-")


def test_a_ledger_of_another_version_is_replayed_when_opened(frozen: Path) -> None:
    with sqlite3.connect(frozen / "logbook.db") as database:
        database.execute("UPDATE ledger_version SET value = 0")
        database.execute("DROP TABLE reading")
    database.close()
    book = Logbook.open(frozen)
    with book.storage.reading() as reader:
        assert schema.LEDGER_VERSION == schema.ledger_version(reader.connection)
    assert check_logbook(book).ok
