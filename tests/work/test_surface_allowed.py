"""What may be done to the surface: cleaners that the plan forbids on an article."""

from __future__ import annotations

import pytest

from gaugelog.errors import Faulty
from gaugelog.ledger.stock import ConsumableReceived
from gaugelog.work import plan, steps, stock
from tests.work.job import Job
from tests.work.test_stock_and_meters import Delivery
from tests.work.walking import typed_here, walk_to


def _receive(job: Job, label: str, name: str) -> None:
    cleaner = ConsumableReceived(
        id=f"cleaner{label}",
        label=label,
        type="cleaner",
        maker="Brightwater Supplies",
        name=name,
        received_on="2026-08-02",
    )
    stock.receive(job.book, job.keys["c.ward"], Delivery((), (cleaner,)))


def test_a_cleaner_that_the_article_forbids_is_refused(job: Job) -> None:
    _receive(job, "CL-9", "Chlorinated solvents, blend 4")
    walk_to(job, "clean")
    with pytest.raises(Faulty) as caught:
        job.do("t.okoro", {**typed_here(job)[1], "cleaner": "CL-9"})
    assert "girder must not be cleaned with chlorinated solvents, by" in str(caught.value.faults[0])
    assert job.do("t.okoro", typed_here(job)[1]).settled


def test_what_is_forbidden_is_read_at_the_step(job: Job) -> None:
    walk_to(job, "clean")
    facts = steps.next_step(job.book, "FB-1").facts
    assert "forbidden on girder: chlorinated solvents" in facts


def test_the_plan_check_warns_of_a_forbidden_cleaner_in_stock(job: Job) -> None:
    def told() -> list[tuple[str, str]]:
        found = plan.check(job.book)
        return [(each.level, each.what) for each in found if "cleaner" in each.what]

    assert [] == told()
    _receive(job, "CL-9", "Chlorinated solvents, blend 4")
    assert [
        (
            "warning",
            "must not be cleaned with chlorinated solvents; cleaner CL-9 in stock is "
            "Chlorinated solvents, blend 4",
        )
    ] == told()
