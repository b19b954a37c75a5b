"""Qualifications that lapse: the step that names one is refused, the record tells of the others."""

from __future__ import annotations

import shutil
from collections.abc import Mapping
from pathlib import Path
from typing import Any

import pytest

from gaugelog.errors import Refused
from gaugelog.intake.instruments import load_instruments
from gaugelog.intake.route import shipped_routes
from gaugelog.intake.stock import load_stock
from gaugelog.journal.ids import new_id
from gaugelog.work import instruments, people, plan, steps, stock
from gaugelog.work.people import Newcomer
from tests.work.job import DEMO, WORD, Job, start_job
from tests.work.walking import typed_here, walk_to

ROUTE = "room-temperature-bond-metal"
NEEDED = "Strain gauge bonding"


@pytest.fixture
def asking(tmp_path: Path) -> Job:
    """A job on a route of its own, whose bonding step and layout hold name a qualification."""
    files = tmp_path / "files"
    shutil.copytree(DEMO, files)
    route = shipped_routes()[ROUTE].decode("utf-8")
    for step in ("bond", "layout-hold"):
        line = f'id = "{step}"'
        assert line in route
        route = route.replace(line, f'{line}\nqualification = "{NEEDED}"', 1)
    (files / "plan" / "own.toml").write_text(route.replace(f'"{ROUTE}"', '"own"', 1))
    grids = files / "plan" / "grids.csv"
    grids.write_text(grids.read_text(encoding="utf-8").replace(ROUTE, "own.toml"))
    job = start_job(tmp_path)
    planner = job.keys["c.ward"]
    received = load_stock([files / "lots.csv", files / "consumables.csv"], new_id=new_id)
    stock.receive(job.book, planner, received)
    instruments.add(job.book, planner, load_instruments(files / "instruments.toml", new_id=new_id))
    plan.load(job.book, planner, plan.understand(job.book, files / "plan"))
    plan.release(job.book, planner, meaning="I release.")
    return job


def qualify(job: Job, person: str, role: str, *qualifications: str) -> None:
    """Enrol a person anew with these qualifications."""
    job.keys[person] = people.enrol(
        job.book,
        job.keys["c.ward"],
        job.folder.unlock_authority(WORD),
        job.folder,
        newcomer=Newcomer(person, f"Name of {person}", "NN", (role,), qualifications),
        passphrase=WORD,
    )


def _done(job: Job) -> Mapping[str, Any]:
    with job.book.storage.reading() as reader:
        return list(reader.entries())[-1].body.fact


def _reach_bond(job: Job, *qualifications: str) -> None:
    qualify(job, "q.reyes", "reviewer", NEEDED)
    walk_to(job, "bond")
    qualify(job, "t.okoro", "technician", *qualifications)


@pytest.mark.parametrize(
    ("held", "told"),
    [
        (
            ("strain gauge bonding until 2026-11-16",),
            "The qualification “Strain gauge bonding” of t.okoro ended on 2026-11-16; "
            "“Bond the gauge” needs it",
        ),
        (
            ("strain gauge bonding until 2025-11-16", "strain gauge bonding until 2026-10-01"),
            "ended on 2026-10-01",
        ),
        (("wiring until 2030-01-01",), "t.okoro has no qualification “Strain gauge bonding”"),
        ((), "t.okoro has no qualification"),
    ],
)
def test_a_step_is_refused_without_the_qualification_it_names(
    asking: Job, held: tuple[str, ...], told: str
) -> None:
    _reach_bond(asking, *held)
    with pytest.raises(Refused, match=told):
        asking.do("t.okoro", typed_here(asking)[1])


@pytest.mark.parametrize(
    "held",
    [
        ("strain gauge bonding until 2026-11-17",),
        ("STRAIN GAUGE BONDING",),
        ("strain gauge bonding until 2026-01-01", "strain gauge bonding until 2027-01-01"),
    ],
)
def test_a_qualification_holds_to_the_end_of_its_last_day(
    asking: Job, held: tuple[str, ...]
) -> None:
    _reach_bond(asking, *held)
    assert asking.do("t.okoro", typed_here(asking)[1]).settled


def test_a_hold_that_names_one_is_decided_by_who_holds_it(asking: Job) -> None:
    walk_to(asking, "layout-hold")
    with pytest.raises(Refused, match=r"q\.reyes has no qualification “Strain gauge bonding”"):
        asking.do("q.reyes", {})


def test_the_step_says_what_it_needs(asking: Job) -> None:
    _reach_bond(asking, NEEDED)
    assert f"qualification: {NEEDED}" in steps.next_step(asking.book, "FB-1").facts


def test_a_lapsed_qualification_is_told_where_no_step_names_it(job: Job) -> None:
    qualify(job, "t.okoro", "technician", "bonding until 2026-11-16", "wiring until 2027-01-01")
    job.do("t.okoro", typed_here(job)[1])
    assert ["The qualification “bonding” of t.okoro ended on 2026-11-16."] == _done(job)["flags"]


def test_nobody_works_on_after_the_last_qualification_has_lapsed(job: Job) -> None:
    qualify(job, "t.okoro", "technician", "bonding until 2026-10-01", "wiring until 2026-11-16")
    with pytest.raises(Refused, match="no qualification in force: “wiring” ended on 2026-11-16"):
        job.do("t.okoro", typed_here(job)[1])
    qualify(job, "t.okoro", "technician", "bonding until 2026-10-01", "wiring until 2026-11-17")
    assert job.do("t.okoro", typed_here(job)[1]).settled
