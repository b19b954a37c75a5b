"""Stock in quarantine or scrapped is not used; what is in place rests until it is freed."""

from __future__ import annotations

from collections.abc import Callable

import pytest

from gaugelog.errors import Faulty, Refused
from gaugelog.ledger.standing import Standing
from gaugelog.ledger.stock import GaugeRow
from gaugelog.work import plan, steps
from gaugelog.work.history import check_logbook
from gaugelog.work.standing import set_standing
from tests.work.job import WALK, Job

WHY = "foil lifts at the tabs"


def _set(job: Job, label: str, standing: Standing, who: str = "c.ward", reason: str = WHY) -> None:
    set_standing(job.book, job.keys[who], label=label, standing=standing, reason=reason)


def _told(deed: Callable[[], object]) -> str:
    with pytest.raises(Faulty) as caught:
        deed()
    return caught.value.faults[0].what


def _states(job: Job) -> dict[str, str]:
    with job.book.reading() as view:
        return {row.label: row.state for row in view.all(GaugeRow)}


@pytest.mark.parametrize("label", ["L-3504", "K7-03", "K7-03/1"])
def test_a_gauge_in_quarantine_by_itself_its_pack_or_its_lot_is_not_taken(
    job: Job, label: str
) -> None:
    job.walk(1)
    _set(job, label, "quarantined", "t.okoro")
    assert f"{label} is quarantined: {WHY}." in _told(lambda: job.do(*WALK[1]))
    _set(job, label, "free", reason="looked at under the glass")
    assert job.do(*WALK[1]).settled


def test_a_consumable_in_quarantine_is_not_used(job: Job) -> None:
    job.walk(6)
    _set(job, "AD-612", "quarantined")
    assert "AD-612 is quarantined" in _told(lambda: job.do(*WALK[6], minutes=10))


def test_work_rests_on_a_gauge_in_place_until_its_lot_is_freed(job: Job) -> None:
    job.walk()
    _set(job, "L-3504", "quarantined")
    with pytest.raises(Refused, match="lot L-3504 is quarantined"):
        job.submit()
    _set(job, "L-3504", "free")
    job.submit()
    _set(job, "K7-03", "quarantined")
    with pytest.raises(Refused, match="pack K7-03 is quarantined"):
        job.accept()
    _set(job, "K7-03", "free")
    assert 1 == job.accept().revision


def test_another_piece_can_be_taken_where_the_first_is_in_quarantine(job: Job) -> None:
    job.walk(2)
    _set(job, "K7-03/1", "quarantined")
    with pytest.raises(Refused, match="gauge K7-03/1 is quarantined"):
        job.do(*WALK[2])
    steps.redo(job.book, job.keys["t.okoro"], point="FB-1", step="gauge", reason="quarantine")
    other = {**WALK[1][1], "gauge": "K7-03/2"}
    assert job.do("t.okoro", other, reason="another piece").settled
    assert job.do(*WALK[2]).settled


def test_scrap_takes_what_is_on_the_shelf_and_leaves_what_is_in_service(job: Job) -> None:
    job.walk(2)
    _set(job, "K7-03", "scrapped")
    states = _states(job)
    assert "in service" == states.pop("K7-03/1")
    pack = [state for label, state in states.items() if label.startswith("K7-03/")]
    assert {"scrapped"} == set(pack)
    assert job.do(*WALK[2]).settled
    assert check_logbook(job.book).ok


def test_a_scrapped_gauge_is_not_taken_and_never_freed(job: Job) -> None:
    job.walk(1)
    _set(job, "K7-03/1", "scrapped", "t.okoro")
    assert "K7-03/1 is scrapped" in _told(lambda: job.do(*WALK[1]))
    for standing in ("free", "quarantined"):
        with pytest.raises(Refused, match="for good"):
            _set(job, "K7-03/1", standing)


def test_a_gauge_in_service_is_not_scrapped(job: Job) -> None:
    job.walk(2)
    with pytest.raises(Refused, match="in service"):
        _set(job, "K7-03/1", "scrapped")


def test_the_plan_check_does_not_count_what_is_in_quarantine(job: Job) -> None:
    _set(job, "L-3504", "quarantined")
    refused = [item for item in plan.check(job.book) if item.level == "refusal"]
    assert [("lot L-3504", "stock is short")] == [(item.subject, item.what) for item in refused]


def test_a_technician_stops_the_use_of_stock_but_does_not_free_it(job: Job) -> None:
    _set(job, "K7-03", "quarantined", "t.okoro")
    with pytest.raises(Refused, match="role planner or reviewer or custodian"):
        _set(job, "K7-03", "free", "t.okoro")


def test_what_is_unknown_or_stands_so_already_or_has_no_reason_is_refused(job: Job) -> None:
    with pytest.raises(Refused, match="Nothing in stock is called K9"):
        _set(job, "K9", "quarantined")
    with pytest.raises(Refused, match="is free already"):
        _set(job, "K7-03", "free")
    with pytest.raises(Faulty):
        _set(job, "K7-03", "quarantined", reason=" ")


def test_a_record_refused_for_its_stock_leaves_no_file_with_both_signatures(job: Job) -> None:
    job.walk()
    job.submit()
    before = job.book.evidence.digests()
    _set(job, "L-3504", "quarantined", "t.okoro")
    with pytest.raises(Refused):
        job.accept()
    assert before == job.book.evidence.digests()
