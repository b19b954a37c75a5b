"""The other shipped routes: the bond-line clock of a hot cure, the long gauge on concrete."""

from __future__ import annotations

import shutil
from pathlib import Path

import pytest

from gaugelog.errors import Refused
from gaugelog.intake.instruments import load_instruments
from gaugelog.intake.stock import load_stock
from gaugelog.journal.ids import new_id
from gaugelog.work import instruments, plan, steps, stock
from tests.work.job import DEMO, WALK, Job, start_job

BOND, AFTER_BOND = 6, 7


def _job(home: Path, route: str, *changes: tuple[str, str]) -> Job:
    """A released plan whose points follow `route`, with other changes to the campaign."""
    files = home / "files"
    shutil.copytree(DEMO, files)
    for name, old, new in [
        ("grids.csv", "room-temperature-bond-metal", route),
        *(("campaign.toml", old, new) for old, new in changes),
    ]:
        text = (files / "plan" / name).read_text(encoding="utf-8")
        assert old in text
        (files / "plan" / name).write_text(text.replace(old, new), encoding="utf-8")
    job = start_job(home)
    planner = job.keys["c.ward"]
    received = load_stock([files / "lots.csv", files / "consumables.csv"], new_id=new_id)
    stock.receive(job.book, planner, received)
    instruments.add(job.book, planner, load_instruments(files / "instruments.toml", new_id=new_id))
    plan.load(job.book, planner, plan.understand(job.book, files / "plan"))
    return job


def _released(job: Job) -> Job:
    plan.release(job.book, job.keys["c.ward"], meaning="I release.")
    return job


HOT = ('largest_process_temperature = "80 degC"', 'largest_process_temperature = "200 degC"')


@pytest.fixture
def curing(tmp_path: Path) -> Job:
    """A point with its bond line at 160 °C."""
    job = _released(_job(tmp_path, "hot-cure-bond-metal", HOT))
    job.walk(BOND)
    job.do("t.okoro", {**WALK[BOND][1], "adhesive": "AD-177"})
    job.do("t.okoro", {"bond-line": "160 degC"})
    return job


def test_the_next_lower_listed_temperature_gives_the_cure_time(curing: Job) -> None:
    # Common practice: the sheet lists 60 min at 150 °C and 30 min at 175 °C; at 160 °C 60 count.
    (window,) = steps.next_step(curing.book, "FB-1").windows
    assert not window.open
    with pytest.raises(Refused, match="to wait"):
        curing.do("t.okoro", {"held": "yes"}, minutes=45)
    assert curing.do("t.okoro", {"held": "yes"}, minutes=16).settled


def test_a_bond_line_below_every_listed_cure_ends_no_cure(tmp_path: Path) -> None:
    job = _released(_job(tmp_path, "hot-cure-bond-metal", HOT))
    job.walk(BOND)
    job.do("t.okoro", {**WALK[BOND][1], "adhesive": "AD-177"})
    job.do("t.okoro", {"bond-line": "120 degC"})
    with pytest.raises(Refused, match="too cold"):
        job.do("t.okoro", {"held": "yes"}, minutes=600)


def test_a_cured_point_is_read_and_goes_on(curing: Job) -> None:
    curing.do("t.okoro", {"held": "yes"}, minutes=61)
    for who, typed in WALK[AFTER_BOND:]:
        curing.do(who, typed)
    assert curing.submit().revision == 1


def test_a_route_hotter_than_the_article_may_get_is_refused(tmp_path: Path) -> None:
    job = _job(tmp_path, "hot-cure-bond-metal")
    found = [each for each in plan.check(job.book) if each.level == "refusal"]
    assert [each.figure for each in found] == ["175 °C of 80 °C"]
    with pytest.raises(Refused, match="hotter than the article"):
        _released(job)


def test_a_long_gauge_on_concrete_walks_its_route(tmp_path: Path) -> None:
    job = _released(_job(tmp_path, "long-gauge-concrete"))
    job.walk()
    assert job.submit().revision == 1
