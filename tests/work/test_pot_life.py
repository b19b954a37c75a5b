"""Pot life at the coating step of the shipped route."""

from __future__ import annotations

import pytest

from gaugelog.errors import Refused
from tests.work.job import Job
from tests.work.walking import here, typed_here, walk_to


def test_a_coating_past_its_pot_life_is_refused(job: Job) -> None:
    walk_to(job, "coat")
    typed = typed_here(job)[1]
    with pytest.raises(Refused, match="CT-088 was mixed 46 min ago; its pot life is 45 min"):
        job.do("t.okoro", {**typed, "mixed": "46 min"})
    assert "coat" == here(job)
    assert job.do("t.okoro", {**typed, "mixed": "45 min"}).settled


def test_a_coating_that_nobody_timed_is_flagged(job: Job) -> None:
    walk_to(job, "coat")
    job.do("t.okoro", {"coating": "CT-088"})
    with job.book.storage.reading() as reader:
        flags = list(reader.entries())[-1].body.fact["flags"]
    assert ["CT-088 has a pot life of 45 min, and no time since it was mixed was entered."] == flags
