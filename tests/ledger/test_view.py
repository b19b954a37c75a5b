"""The view: rows by label in any spelling, names of people, ids of whatever is called so."""

from __future__ import annotations

import sqlite3
from collections.abc import Iterator
from pathlib import Path

import pytest

from gaugelog.errors import Refused
from gaugelog.ledger import schema
from gaugelog.ledger.buffer import Buffer
from gaugelog.ledger.rows import Drop, Put
from gaugelog.ledger.stock import GaugeRow
from gaugelog.ledger.view import View
from tests.work.job import released_job


def _gauge(number: int, label: str) -> Put:
    row = {"id": f"g{number}", "label": label, "lot": "l", "pack": "p", "number": number}
    return Put("gauge", {**row, "state": "on shelf", "point": "", "received_on": ""})


@pytest.fixture
def connection() -> Iterator[sqlite3.Connection]:
    """An empty ledger in memory."""
    made = sqlite3.connect(":memory:")
    schema.create_tables(made)
    yield made
    made.close()


def _view(connection: sqlite3.Connection, *labels: str) -> View:
    buffer = Buffer()
    buffer.take(_gauge(number, label) for number, label in enumerate(labels, start=1))
    schema.write(connection, buffer)
    return View(connection, lambda _digest: None)


@pytest.mark.parametrize("typed", ["BRÜ-1/2", "brü-1/2", " BRÜ-1/2 ", "BRU\u0308-1/2"])
def test_a_label_is_found_in_any_case_and_form(connection: sqlite3.Connection, typed: str) -> None:
    found = _view(connection, "BRÜ-1/2", "BRÜ-1/3").gauge(typed)
    assert found is not None
    assert found.id == "g1"


def test_the_exact_spelling_goes_first_and_a_doubtful_one_is_refused(
    connection: sqlite3.Connection,
) -> None:
    view = _view(connection, "A/1", "a/1", "É/1", "é/1")
    exact = [view.gauge(label) for label in ("A/1", "a/1", "É/1", "é/1")]
    assert ["g1", "g2", "g3", "g4"] == [row.id for row in exact if row is not None]
    twice = _view(connection, "ab/1", "Ab/1", "öl/1", "Öl/1")
    for doubtful, named in (("AB/1", "ab/1 or Ab/1"), ("öL/1", "öl/1 or Öl/1")):
        with pytest.raises(Refused, match=f"{doubtful} may be {named}"):
            twice.gauge(doubtful)


def test_a_label_that_looks_like_a_pattern_is_taken_as_it_is(
    connection: sqlite3.Connection,
) -> None:
    view = _view(connection, "K%/1", "K_/1", "K' OR 1=1 --")
    assert view.gauge("K*/1") is None
    found = view.gauge("K' OR 1=1 --")
    assert found is not None
    assert found.id == "g3"


def test_rows_come_in_the_order_of_their_numbers(connection: sqlite3.Connection) -> None:
    view = _view(connection, *(f"K/{number}" for number in range(1, 13)))
    assert [f"K/{number}" for number in range(1, 13)] == [row.label for row in view.all(GaugeRow)]


def test_what_is_dropped_is_seen_no_more_and_changes_are_written_whole(
    connection: sqlite3.Connection,
) -> None:
    view = _view(connection, "K/1", "K/2")
    known = view.known()
    known.take([Drop("gauge", "g1"), _gauge(2, "K/9")])
    assert known.get("gauge", "g1") is None
    schema.write(connection, known)
    assert ["K/9"] == [row.label for row in view.all(GaugeRow)]


def test_a_subject_is_found_by_whatever_label_it_has(tmp_path: Path) -> None:
    job = released_job(tmp_path)
    with job.book.reading() as view:
        point, lot, meter = view.point("FB-2"), view.lot("L-3504"), view.instrument("RM-2")
        assert point is not None
        assert lot is not None
        assert meter is not None
        wanted = [point.id, lot.id, meter.id]
        assert wanted == [view.subject(label) for label in ("fb-2", "l-3504", "rm-2")]
        with pytest.raises(Refused, match="Nothing is called FB-9"):
            view.subject("FB-9")


def test_nobody_has_no_name(connection: sqlite3.Connection) -> None:
    view = _view(connection)
    assert view.identity("x") is None
    assert view.name("x") == "x (name erased)"
