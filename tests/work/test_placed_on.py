"""The article under a point: what is computed from it is never taken from thin air."""

from __future__ import annotations

import pytest

from gaugelog.errors import Refused
from gaugelog.ledger.points import PointPlanned
from gaugelog.rules.placed import poisson_at
from tests.work.job import Job


def test_poissons_ratio_is_that_of_the_points_article(job: Job) -> None:
    with job.book.reading() as view:
        row = view.point("FB-1")
        assert row is not None
        planned = PointPlanned.model_validate_json(row.data)
        assert 0.3 == poisson_at(view, planned)


def test_no_poissons_ratio_is_taken_for_an_article_that_is_not_known(job: Job) -> None:
    with job.book.reading() as view:
        row = view.point("FB-1")
        assert row is not None
        planned = PointPlanned.model_validate_json(row.data)
        lost = planned.model_copy(update={"article": "another"})
        with pytest.raises(Refused, match="The article of FB-1 is not known"):
            poisson_at(view, lost)
