"""Plans are loaded as drafts, replaced, released once; nothing of an earlier draft stays."""

from __future__ import annotations

from dataclasses import replace
from pathlib import Path

import pytest

from gaugelog.errors import Faulty, Refused
from gaugelog.intake.plan import PlanFacts
from gaugelog.intake.stock import load_stock
from gaugelog.journal.ids import new_id
from gaugelog.ledger.campaign import CampaignRow, ChannelRow, CriteriaRow
from gaugelog.ledger.circuits import CircuitRow
from gaugelog.ledger.points import GridRow, PointRow
from gaugelog.ledger.routes import RouteRow
from gaugelog.work import plan, steps, stock
from gaugelog.work.history import check_logbook
from tests.work.job import DEMO, Job, start_job

PLAN_TABLES = (CampaignRow, CriteriaRow, ChannelRow, RouteRow, PointRow, GridRow, CircuitRow)


@pytest.fixture
def stocked(tmp_path: Path) -> Job:
    """A logbook with the demo's stock and no plan."""
    job = start_job(tmp_path)
    received = load_stock([DEMO / "lots.csv", DEMO / "consumables.csv"], new_id=new_id)
    stock.receive(job.book, job.keys["c.ward"], received)
    return job


def _facts(job: Job) -> PlanFacts:
    return plan.understand(job.book, DEMO / "plan")


def _counts(job: Job) -> list[int]:
    with job.book.reading() as view:
        return [len(view.all(model)) for model in PLAN_TABLES]


def test_a_draft_that_is_loaded_again_leaves_nothing_of_the_first(stocked: Job) -> None:
    planner = stocked.keys["c.ward"]
    plan.load(stocked.book, planner, _facts(stocked))
    once = _counts(stocked)
    assert all(once)
    assert plan.load(stocked.book, planner, _facts(stocked)).revision == 2
    assert once == _counts(stocked)
    assert check_logbook(stocked.book).ok


def test_the_second_draft_can_be_released_and_worked(stocked: Job) -> None:
    planner = stocked.keys["c.ward"]
    for _ in range(3):
        plan.load(stocked.book, planner, _facts(stocked))
    assert plan.release(stocked.book, planner, meaning="go").revision == 3
    assert stocked.do("t.okoro", {"safe": "yes"}).settled


def test_a_draft_is_not_worked_from(stocked: Job) -> None:
    plan.load(stocked.book, stocked.keys["c.ward"], _facts(stocked))
    assert stocked.state() == "planned"
    with pytest.raises(Refused, match="not released"):
        stocked.do("t.okoro", {"safe": "yes"})


def test_only_a_planner_loads_and_releases(stocked: Job) -> None:
    with pytest.raises(Refused, match="role planner"):
        plan.load(stocked.book, stocked.keys["t.okoro"], _facts(stocked))
    plan.load(stocked.book, stocked.keys["c.ward"], _facts(stocked))
    with pytest.raises(Refused, match="role planner"):
        plan.release(stocked.book, stocked.keys["q.reyes"], meaning="go")


def test_without_a_plan_there_is_nothing_to_check_or_release(stocked: Job) -> None:
    with pytest.raises(Refused, match="No plan is loaded"):
        plan.check(stocked.book)
    with pytest.raises(Refused, match="No plan is loaded"):
        plan.release(stocked.book, stocked.keys["c.ward"], meaning="go")


def test_a_released_plan_is_neither_released_nor_replaced(job: Job) -> None:
    with pytest.raises(Refused, match="released already"):
        plan.release(job.book, job.keys["c.ward"], meaning="again")
    with pytest.raises(Refused, match="is released"):
        plan.load(job.book, job.keys["c.ward"], _facts(job))


def test_a_plan_for_a_lot_that_is_not_in_stock_is_no_plan(tmp_path: Path) -> None:
    job = start_job(tmp_path)
    with pytest.raises(Faulty) as caught:
        _facts(job)
    assert all("L-3504" in str(fault) for fault in caught.value.faults)
    assert len(caught.value.faults) == 2


def test_what_the_check_refuses_is_not_released(tmp_path: Path) -> None:
    job = start_job(tmp_path)
    planner = job.keys["c.ward"]
    received = load_stock([DEMO / "lots.csv", DEMO / "consumables.csv"], new_id=new_id)
    (lot,) = received.lots
    pack = lot.packs[0].model_copy(update={"pieces": lot.packs[0].pieces[:1]})
    few = replace(received, lots=(lot.model_copy(update={"packs": (pack,)}),))
    stock.receive(job.book, planner, few)
    plan.load(job.book, planner, _facts(job))
    refusals = [finding for finding in plan.check(job.book) if finding.level == "refusal"]
    assert refusals
    with pytest.raises(Refused, match=f"refuses {len(refusals)} things") as caught:
        plan.release(job.book, planner, meaning="go")
    assert refusals[0].what in caught.value.message
    assert "planned" == job.state()


def test_the_overview_names_lot_circuit_channel_and_route(job: Job) -> None:
    line = plan.overview(job.book)[0]
    assert ("FB-1", "L-3504", "C-1", "M1/1") == (line.point, line.lot, line.circuit, line.channel)
    assert ("5 µm/m", "released") == (line.permitted_error, line.state)


def test_a_released_plan_tells_its_warnings(job: Job) -> None:
    warnings = [finding for finding in plan.check(job.book) if finding.level == "warning"]
    with job.book.storage.reading() as reader:
        released = next(entry for entry in reader.entries() if entry.header.kind == "plan.released")
    assert len(warnings) == len(released.body.fact["warnings"])
    assert [step.state for step in steps.worklist(job.book)] == ["released", "released"]
