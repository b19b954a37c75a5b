"""Plans of 2 000 grids: how load, check and release grow, and the check against bare formulas."""

from __future__ import annotations

import time
from collections.abc import Callable
from pathlib import Path

import openpyxl
import pytest

from gaugelog.ledger.campaign import CampaignRow
from gaugelog.physics.bridge import strain_output
from gaugelog.physics.excitation import grid_power, largest_supply, power_density
from gaugelog.physics.leads import sensitivity_loss
from gaugelog.physics.temperature import mismatch_output
from gaugelog.rules.fit.plan import Plan
from gaugelog.rules.fit.supply import heat_sink_of
from gaugelog.work import plan
from tests.bench.compare import compare
from tests.bench.many import job_of
from tests.work.job import Job

pytestmark = [pytest.mark.bench, pytest.mark.xdist_group("bench")]

MANY, FEW = 2000, 200


def _as_workbook(file: Path) -> None:
    """A CSV table as a workbook of its own, in its place."""
    import csv

    book = openpyxl.Workbook(write_only=True)
    sheet = book.create_sheet()
    with file.open(encoding="utf-8", newline="") as stream:
        for row in csv.reader(stream):
            sheet.append(row)
    book.save(file.with_suffix(".xlsx"))
    file.unlink()


def _timed(name: str, act: Callable[[], object], spent: dict[str, float]) -> None:
    start = time.perf_counter()
    act()
    spent[name] = time.perf_counter() - start


def _seconds(home: Path, grids: int, *, workbook: bool) -> dict[str, float]:
    """How long each step from the planner's files to a released plan takes."""
    job, files = job_of(home, grids)
    if workbook:
        for name in ("grids.csv", "circuits.csv"):
            _as_workbook(files / name)
    planner, spent = job.keys["c.ward"], dict[str, float]()

    def loaded() -> None:
        plan.load(job.book, planner, plan.understand(job.book, files))

    _timed("load", loaded, spent)
    _timed("check", lambda: plan.check(job.book), spent)
    _timed("release", lambda: plan.release(job.book, planner, meaning="I release."), spent)
    assert plan.is_released(job.book)
    return spent


@pytest.mark.parametrize("workbook", [False, True], ids=["CSV", "XLSX"])
def test_ten_times_the_grids_take_little_more_than_ten_times_as_long(
    workbook: bool, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    _seconds(tmp_path / "warm", 20, workbook=workbook)
    runs = [
        (
            _seconds(tmp_path / f"few-{turn}", FEW, workbook=workbook),
            _seconds(tmp_path / f"many-{turn}", MANY, workbook=workbook),
        )
        for turn in range(3)
    ]
    few, many = min(runs, key=lambda pair: sum(pair[1].values()))
    ratio = sum(many.values()) / sum(few.values())
    with capsys.disabled():
        kind = "XLSX" if workbook else "CSV"
        for name, seconds in many.items():
            print(
                f"\n{kind}, {MANY} grids, {name}: {seconds:.2f} s, {FEW}: {few[name]:.2f} s", end=""
            )
        print(f"\n{kind}, {MANY} : {FEW} grids loaded, checked and released = {ratio:.1f}")
    assert ratio <= 15


@pytest.fixture
def loaded(tmp_path: Path) -> Job:
    """A logbook with a drafted plan of 2 000 grids."""
    job, files = job_of(tmp_path, MANY)
    plan.load(job.book, job.keys["c.ward"], plan.understand(job.book, files))
    return job


def _bare(job: Job) -> Callable[[], object]:
    """The same figures of each grid by the formulas alone, from plain numbers in memory."""
    with job.book.reading() as view:
        read = Plan(view, view.all(CampaignRow)[-1])
    numbers = []
    for circuit in read.circuits:
        (point,), (lot,) = read.points_of(circuit), read.lots_of(circuit)
        article, channel = read.article_of(point), read.channels[circuit.channel].channel
        assert article is not None
        assert lot.expansion_class is not None
        sink = heat_sink_of(article)
        assert sink is not None
        numbers.append(
            (
                *(point.strain_min.si(), point.strain_max.si(), lot.grids[0].gauge_factor.si()),
                *(article.material.poisson_ratio.si(), lot.nominal_resistance.si()),
                circuit.leads.resistance_per_length.si() * circuit.leads.length.si(),
                *(channel.excitation.si(), lot.grid_length.si(), lot.grid_width.si(), sink.most),
                *(article.material.expansion.si(), lot.expansion_class.si()),
                point.temperature_max.si() - point.temperature_min.si(),
            )
        )

    def act() -> None:
        for (
            low,
            high,
            factor,
            poisson,
            grid,
            wire,
            volts,
            length,
            width,
            most,
            own,
            of,
            rise,
        ) in numbers:
            for strain in (low, high):
                strain_output(strain, factor, "quarter three-wire", poisson)
            sensitivity_loss("quarter three-wire", grid, wire)
            power_density(grid_power(volts, grid, grid), length, width)
            largest_supply(most, grid, length, width, grid)
            mismatch_output(own, of, rise)

    return act


def test_a_check_is_told_against_the_bare_formulas(
    loaded: Job, capsys: pytest.CaptureFixture[str]
) -> None:
    found = compare(lambda: plan.check(loaded.book), _bare(loaded), repeats=5)
    with capsys.disabled():
        print("\n" + found.line(f"plan check of {MANY} grids"))
    # The issue sets no bound; this one keeps a slip of an order of magnitude from passing.
    assert found.ratio <= 40
