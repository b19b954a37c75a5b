"""Entries the fold can't follow: named plainly when the ledger is rebuilt, never a traceback."""

from __future__ import annotations

from collections.abc import Mapping
from pathlib import Path

import pytest

from gaugelog.errors import StorageTrouble
from gaugelog.journal.append import append
from gaugelog.journal.canonical import JsonValue
from gaugelog.journal.entry import Fact
from gaugelog.journal.ids import new_id
from gaugelog.work.history import check_logbook
from tests.work.job import Job, start_job


@pytest.fixture
def job(tmp_path: Path) -> Job:
    """A logbook with its people."""
    return start_job(tmp_path)


def _append_beside_the_ledger(job: Job, kind: str, content: Mapping[str, JsonValue]) -> None:
    """A well signed entry whose fact this version can't follow, as another program might add it."""
    with job.book.storage.writing() as writer:
        fact = Fact(kind, 1, ("t.okoro",), content)
        append(writer, job.book.chain, [fact], job.keys["c.ward"], job.clock.now(), new_id())


STRANGE: list[tuple[str, Mapping[str, JsonValue]]] = [
    ("reading.taken", {"crater": "Tycho"}),
    ("person.left", {"person": "nobody", "reason": "never came"}),
    ("plan.released", {"campaign": "none", "revision": 1, "meaning": "m"}),
    ("point.accepted", {"point": 5}),
]


@pytest.mark.parametrize(("kind", "content"), STRANGE)
def test_an_entry_that_can_not_be_followed_is_named(
    job: Job, kind: str, content: Mapping[str, JsonValue]
) -> None:
    _append_beside_the_ledger(job, kind, content)
    with pytest.raises(StorageTrouble, match=rf"\({kind}\) can't be followed") as caught:
        job.book.rebuild()
    assert "\n" not in caught.value.message
    report = check_logbook(job.book)
    assert {8} == {trouble.step for trouble in report.troubles}
    assert kind in report.troubles[0].what


def test_a_rebuild_that_fails_leaves_the_tables_as_they_were(job: Job) -> None:
    with job.book.reading() as view:
        before = view.name("t.okoro")
    _append_beside_the_ledger(job, *STRANGE[0])
    with pytest.raises(StorageTrouble):
        job.book.rebuild()
    with job.book.reading() as view:
        assert before == view.name("t.okoro")


def test_fields_and_parts_of_a_newer_program_are_passed_over_and_kept(job: Job) -> None:
    content: Mapping[str, JsonValue] = {
        "person": "t.okoro",
        "roles": ["technician"],
        "sheet": "0" * 64,
        "shoe_size": 44,
        "qualifications": [{"name": "bonding", "level": {"of": 3}}],
    }
    _append_beside_the_ledger(job, "person.enrolled", content)
    job.book.rebuild()
    with job.book.storage.reading() as reader:
        assert dict(content) == dict(list(reader.entries())[-1].body.fact)
    assert not [t for t in check_logbook(job.book).troubles if t.step == 8]
