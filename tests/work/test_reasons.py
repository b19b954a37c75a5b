"""Deeds that ask for a reason refuse an empty one alike, before anything else is looked at."""

from __future__ import annotations

from collections.abc import Callable

import pytest

from gaugelog.errors import Faulty
from gaugelog.work import amend, dispositions, people, reviews, steps
from tests.work.job import Job

DEEDS: dict[str, Callable[[Job], object]] = {
    "skip": lambda job: steps.skip(job.book, job.keys["t.okoro"], point="FB-1", reason=" "),
    "redo": lambda job: steps.redo(
        job.book, job.keys["t.okoro"], point="FB-1", step="clean", reason=" "
    ),
    "give back": lambda job: reviews.give_back(
        job.book, job.keys["q.reyes"], point="FB-1", reason=" "
    ),
    "amend": lambda job: amend.amend(job.book, job.keys["t.okoro"], point="FB-1", reason=" "),
    "replace": lambda job: dispositions.replace(
        job.book, job.keys["t.okoro"], point="FB-1", reason=" ", meaning="m"
    ),
    "withdraw": lambda job: dispositions.withdraw(
        job.book, job.keys["c.ward"], point="FB-1", reason=" ", meaning="m"
    ),
    "revoke": lambda job: people.revoke(job.book, job.keys["c.ward"], person="t.okoro", reason=" "),
}


@pytest.mark.parametrize("name", DEEDS)
def test_an_empty_reason_is_refused_in_one_sentence(job: Job, name: str) -> None:
    before = job.book.head().printed
    with pytest.raises(Faulty) as caught:
        DEEDS[name](job)
    assert ["reason: is empty. Say why; it is kept in the journal."] == [
        str(fault) for fault in caught.value.faults
    ]
    assert before == job.book.head().printed
