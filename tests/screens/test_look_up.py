"""Wiring, stock and plan on the screen: found by typing or scanning, told in full."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.errors import Refused
from gaugelog.journal.keys import KeyFolder
from gaugelog.screens.plan import PlanScreen
from gaugelog.screens.stock import StockScreen
from gaugelog.screens.wiring import WiringScreen
from gaugelog.work.logbook import Logbook
from gaugelog.work.standing import set_standing
from tests.screens.conftest import At
from tests.screens.pilot import LARGE, SMALL, Seen, run_screen
from tests.work.job import CHEAP_ROUNDS, changed_files, released_job, start_job


def refused(home: Path, change: tuple[str, str, str]) -> tuple[Logbook, KeyFolder]:
    """A logbook whose plan, changed so, is a draft that the check refuses."""
    files = changed_files(home, change)
    with pytest.raises(Refused):
        released_job(home, files)
    return Logbook.open(home / "book"), KeyFolder(home / "keys", CHEAP_ROUNDS)


SIZES = pytest.mark.parametrize("size", [SMALL, LARGE])


@SIZES
def test_the_circuit_under_the_cursor_is_drawn(at: At, size: tuple[int, int]) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.keys("f4")
        assert isinstance(seen.room, WiringScreen)
        assert "wiring: 2 circuits, 0 conflicts, 0 spare" in seen.lines()[0]
        assert "[1] FB-1" in seen.text()
        assert "●──────────────── W1 ───" in seen.text()
        await seen.keys("down")
        assert "[1] FB-2" in seen.text()

    job = at(0)
    run_screen(job.book, job.folder, play, size=size)


def test_what_is_used_twice_comes_first_and_is_named(tmp_path: Path) -> None:
    book, folder = refused(tmp_path, ("plan/circuits.csv", "M1,2,CB-19", "M1,1,CB-19"))

    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.keys("f4")
        assert "1 conflicts, 1 spare" in seen.lines()[0]
        assert "Used twice" in seen.text()
        assert "✗ channel M1/1: is used by C-1, C-2" in seen.text()
        await seen.keys("down", "down")
        assert "channel M1/2, connector J2: no circuit" in seen.text()

    run_screen(book, folder, play, size=LARGE)


@SIZES
def test_a_circuit_is_found_by_its_point_or_scanned_by_its_label(
    at: At, size: tuple[int, int]
) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.keys("f4")
        await seen.type("FB-2", enter=False)
        assert "C-1" not in seen.text()
        await seen.keys("escape")
        assert "C-1" in seen.text()
        await seen.type("c-2")
        assert "C-1" in seen.text()
        assert "[1] FB-2" in seen.text()

    job = at(0)
    run_screen(job.book, job.folder, play, size=size)


@SIZES
def test_stock_shows_what_is_left_wanted_and_held(at: At, size: tuple[int, int]) -> None:
    job = at(2)
    set_standing(
        job.book, job.keys["t.okoro"], label="AD-612", standing="quarantined", reason="left open"
    )

    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.keys("f10")
        assert isinstance(seen.room, StockScreen)
        assert "stock: 10 entries, 1 not to be used" in seen.lines()[0]
        assert "9 free on the shelf, 1 still wanted by the plan" in seen.text()
        assert "K7-03/1 in service at FB-1" in seen.text()
        await seen.type("AD-612")
        assert "✗ consumable AD-612 is quarantined: left open" in seen.text()
        await seen.type("K7-04/2")
        assert "pack K7-04: 5 of 5 left" in seen.text()

    run_screen(job.book, job.folder, play, size=size)


def test_a_lot_and_a_consumable_of_one_label_are_two_lines(tmp_path: Path) -> None:
    files = changed_files(tmp_path, ("consumables.csv", "SO-17", "L-3504"))
    job = released_job(tmp_path, files)

    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.keys("f10")
        await seen.type("L-3504", enter=False)
        assert "pack K7-04: 5 of 5 left" in seen.text()
        await seen.keys("down")
        assert "tin-lead 60/40" in seen.text().rpartition("────")[0]
        assert "pack K7-04" not in seen.text()

    run_screen(job.book, job.folder, play, size=LARGE)


def test_what_a_reason_says_of_a_standing_is_not_taken_for_it(at: At) -> None:
    job = at(2)
    for label in ("AD-612", "CT-088"):
        reason = f"its box is quarantined: {label} is quarantined: wet"
        set_standing(job.book, job.keys["t.okoro"], label=label, standing="scrapped", reason=reason)

    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.keys("f10")
        assert 2 == seen.text().count("✗ scrapped")
        assert "✗ quarantined" not in seen.text()

    run_screen(job.book, job.folder, play, size=LARGE)


def test_what_expires_or_is_due_is_said_with_the_days(at: At) -> None:
    job = at(0)
    job.clock.advance(135 * 86400)

    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.keys("f10")
        await seen.type("AD-612")
        assert "✗ expired" in seen.text()
        assert "2027-03-31, 1 d ago" in seen.text()
        await seen.type("RM-2")
        assert "2027-06-15, 75 d left" in seen.text()
        assert "certificate" in seen.text()
        assert "± of reading" in seen.text()

    run_screen(job.book, job.folder, play, size=LARGE)


def test_without_stock_the_command_is_named(tmp_path: Path) -> None:
    job = start_job(tmp_path)

    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.keys("f10")
        assert "gaugelog stock receive FILE" in seen.text()
        await seen.keys("f4")
        assert "✗ No plan is loaded." in seen.text()
        await seen.keys("f12")
        assert "gaugelog plan load FOLDER" in seen.text()

    run_screen(job.book, job.folder, play)


@SIZES
def test_the_plan_shows_what_warns_and_what_fits(at: At, size: tuple[int, int]) -> None:
    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.keys("f12")
        assert isinstance(seen.room, PlanScreen)
        assert "revision 1, released: 0✗ 2! " in seen.lines()[0]
        assert "! warning: FB-1" in seen.text()
        assert "permitted 5 µm/m" in seen.text()
        assert "(from memory)" in seen.text()
        await seen.type("stock suffices")
        assert "✓ fits: lot L-3504" in seen.text()

    job = at(0)
    run_screen(job.book, job.folder, play, size=size)


def test_a_plan_that_is_refused_says_so_first(tmp_path: Path) -> None:
    wrong = ("plan/campaign.toml", 'completion = "350 ohm"', 'completion = "120 ohm"')
    book, folder = refused(tmp_path, wrong)

    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.keys("f12")
        assert "draft" in seen.lines()[0]
        assert "Refused: the plan can't be released so" in seen.text()
        assert "✗ refusal:" in seen.text()

    run_screen(book, folder, play, size=LARGE)
